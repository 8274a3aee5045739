#include "shapes.hpp"

#include "leat/core/errors.hpp"
#include "leat/regions.hpp"
#include "leat/uniform/unit.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <sstream>
#include <utility>

namespace scatter {
namespace {

using nlohmann::json;
using ring = std::vector<point>;

const json& member(const json& object, const char* key, const std::string& where) {
    if (!object.is_object() || !object.contains(key)) {
        throw bad_input(where + " needs \"" + key + "\"");
    }
    return object.at(key);
}

double number(const json& object, const char* key, const std::string& where) {
    const json& value = member(object, key, where);
    if (!value.is_number()) {
        throw bad_input(where + ": \"" + key + "\" must be a number");
    }
    return value.get<double>();
}

point as_point(const json& value, const std::string& where) {
    if (!value.is_array() || value.size() != 2 || !value[0].is_number() || !value[1].is_number()) {
        throw bad_input(where + ": a point must be [x, y]");
    }
    return {value[0].get<double>(), value[1].get<double>()};
}

ring as_ring(const json& value, const std::string& where) {
    if (!value.is_array()) {
        throw bad_input(where + ": a ring must be a list of points");
    }
    ring r;
    for (const json& p : value) {
        r.push_back(as_point(p, where));
    }
    return r;
}

/// What all regions give alike.
template <class Region>
shape shape_of(const Region& region) {
    shape s;
    s.draw = [region](leat::stream& g) { return region(g); };
    s.contains = [region](const point& p) { return region.contains(p); };
    s.low = region.bounds().low;
    s.high = region.bounds().high;
    return s;
}

/// An outline as that of a gap in what lies under it.
std::string blank(const std::string& outline) { return "<g fill=\"#fff\">" + outline + "</g>"; }

/// The share of a disk's area below the line at t radii from its centre: of the ellipse too, whose
/// image it is.
double disk_share_below(double t) {
    t = std::clamp(t, -1.0, 1.0);
    return 0.5 + (t * std::sqrt(1 - t * t) + std::asin(t)) / std::numbers::pi;
}

/// The ellipse, and the two mistakes made most: as area-false images of the unit square.
shape elliptic(point centre, double semi_x, double semi_y, double angle) {
    const leat::ellipse<> region{centre, semi_x, semi_y, angle};
    shape s = shape_of(region);
    const double c = std::cos(angle);
    const double d = std::sin(angle);
    const point reach{std::hypot(semi_x * c, semi_y * d), std::hypot(semi_x * d, semi_y * c)};
    const double area = region.measure();
    s.area_below = [=](std::size_t axis, double t) {
        return area * disk_share_below((t - centre[axis]) / reach[axis]);
    };
    const auto place = [=](double u, double v) -> point {
        return {centre[0] + u * semi_x * c - v * semi_y * d,
                centre[1] + u * semi_x * d + v * semi_y * c};
    };
    s.wrong.push_back({"uniform radius", [place](leat::stream& g) {
                           const double radius = leat::unit(g);
                           const double turn = 2 * std::numbers::pi * leat::unit(g);
                           return place(radius * std::cos(turn), radius * std::sin(turn));
                       }});
    s.wrong.push_back({"uniform in chord", [place](leat::stream& g) {
                           const double u = 2 * leat::unit(g) - 1;
                           const double v = 2 * leat::unit(g) - 1;
                           return place(u, v * std::sqrt(1 - u * u));
                       }});
    std::ostringstream svg;
    svg << "<ellipse rx=\"" << semi_x << "\" ry=\"" << semi_y << "\" transform=\"translate("
        << centre[0] << ' ' << centre[1] << ") rotate(" << angle * 180 / std::numbers::pi
        << ")\"/>";
    s.outline = svg.str();
    return s;
}

/// The signed area of a ring's part below t (each corner between two sides is cut off where it
/// passes the line).
double signed_area_below(const ring& r, std::size_t axis, double t) {
    double area = 0;
    ring kept;
    for (std::size_t i = 0; i < r.size(); ++i) {
        const point& a = r[i];
        const point& b = r[(i + 1) % r.size()];
        if (a[axis] <= t) {
            kept.push_back(a);
        }
        if ((a[axis] <= t) != (b[axis] <= t)) {
            const double share = (t - a[axis]) / (b[axis] - a[axis]);
            kept.push_back({a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])});
        }
    }
    for (std::size_t i = 0; i < kept.size(); ++i) {
        const point& a = kept[i];
        const point& b = kept[(i + 1) % kept.size()];
        area += (a[0] * b[1] - b[0] * a[1]) / 2;
    }
    return area;
}

shape polygonal(const ring& outer, const std::vector<ring>& holes) {
    shape s = shape_of(leat::polygon<>{outer, holes});
    s.area_below = [=](std::size_t axis, double t) {
        double area = std::abs(signed_area_below(outer, axis, t));
        for (const ring& hole : holes) {
            area -= std::abs(signed_area_below(hole, axis, t));
        }
        return area;
    };
    std::ostringstream svg;
    svg << "<path d=\"";
    const auto draw = [&svg](const ring& r) {
        for (std::size_t i = 0; i < r.size(); ++i) {
            svg << (i == 0 ? "M" : "L") << r[i][0] << ' ' << r[i][1];
        }
        svg << 'Z';
    };
    draw(outer);
    std::for_each(holes.begin(), holes.end(), draw);
    svg << "\"/>";
    s.outline = svg.str();
    return s;
}

shape read_shape(const json& value, const std::string& where);

/// A shape outside others, which must lie inside it, apart from each other: then areas subtract.
shape less(shape from, const std::vector<shape>& removed, const std::string& where) {
    for (std::size_t i = 0; i < removed.size(); ++i) {
        leat::stream probe = leat::source{"probe"}.stream(i);
        for (int n = 0; n < 1000; ++n) {
            const point p = removed[i].draw(probe);
            bool clear = from.contains(p);
            for (std::size_t j = 0; j < removed.size(); ++j) {
                clear = clear && (i == j || !removed[j].contains(p));
            }
            if (!clear) {
                throw bad_input(where + ": what is removed must lie inside, and apart");
            }
        }
        from.outline += blank(removed[i].outline);
    }
    const auto outside = [removed](const point& p) {
        return std::none_of(removed.begin(), removed.end(),
                            [&p](const shape& s) { return s.contains(p); });
    };
    const auto whole = from;
    from.wrong.clear();
    from.contains = [=](const point& p) { return whole.contains(p) && outside(p); };
    from.draw = [=](leat::stream& g) {
        for (int trial = 0; trial < 700000; ++trial) {
            const point p = whole.draw(g);
            if (outside(p)) {
                return p;
            }
        }
        throw bad_input("nothing is left of a shape");
    };
    from.area_below = [=](std::size_t axis, double t) {
        double area = whole.area_below(axis, t);
        for (const shape& s : removed) {
            area -= s.area_below(axis, t);
        }
        return area;
    };
    return from;
}

shape read_shape(const json& value, const std::string& where) {
    const json& type = member(value, "type", where);
    const auto at = [&](const char* key) { return number(value, key, where); };
    const auto point_at = [&](const char* key) {
        return as_point(member(value, key, where), where);
    };
    if (type == "disk") {
        const leat::disk<> region{point_at("centre"), at("radius")};
        shape s = elliptic(region.centre(), region.radius(), region.radius(), 0);
        s.draw = shape_of(region).draw;
        s.contains = shape_of(region).contains;
        return s;
    }
    if (type == "ellipse") {
        const double degrees = value.contains("degrees") ? at("degrees") : 0;
        return elliptic(point_at("centre"), at("semi_x"), at("semi_y"),
                        degrees * std::numbers::pi / 180);
    }
    if (type == "annulus") {
        const point centre = point_at("centre");
        const double inner = at("inner");
        const double outer = at("outer");
        shape s = shape_of(leat::annulus<>{centre, inner, outer});
        const shape disk = elliptic(centre, outer, outer, 0);
        const shape hole = elliptic(centre, inner, inner, 0);
        s.area_below = [=](std::size_t axis, double t) {
            return disk.area_below(axis, t) - hole.area_below(axis, t);
        };
        s.outline = disk.outline + blank(hole.outline);
        return s;
    }
    if (type == "box") {
        const point low = point_at("low");
        const point high = point_at("high");
        shape s = polygonal({low, {high[0], low[1]}, high, {low[0], high[1]}}, {});
        s.draw = shape_of(leat::box<2>{low, high}).draw;
        return s;
    }
    if (type == "triangle") {
        const point a = point_at("a");
        const point b = point_at("b");
        const point c = point_at("c");
        shape s = polygonal({a, b, c}, {});
        s.draw = shape_of(leat::triangle<>{a, b, c}).draw;
        return s;
    }
    if (type == "polygon") {
        std::vector<ring> holes;
        if (value.contains("holes")) {
            for (const json& hole : value.at("holes")) {
                holes.push_back(as_ring(hole, where));
            }
        }
        return polygonal(as_ring(member(value, "ring", where), where), holes);
    }
    if (type == "without") {
        std::vector<shape> removed;
        for (const json& part : member(value, "removed", where)) {
            removed.push_back(read_shape(part, where));
        }
        return less(read_shape(member(value, "from", where), where), removed, where);
    }
    throw bad_input(where + ": \"type\" must be disk, ellipse, annulus, box, triangle, polygon or "
                            "without");
}

} // namespace

scene read_scene(const json& root) {
    scene s;
    s.title = member(root, "title", "the file").get<std::string>();
    s.unit = member(root, "unit", "the file").get<std::string>();
    s.seed = member(root, "seed", "the file").get<std::uint64_t>();
    for (const json& entry : member(root, "layers", "the file")) {
        const std::string where = "layer " + std::to_string(s.layers.size() + 1);
        const double points = number(entry, "points", where);
        if (!(points >= 1600 && points <= 1e7 && points == std::floor(points))) {
            throw bad_input(where + ": \"points\" must be a whole number from 1600 to 10000000");
        }
        const auto name = member(entry, "name", where).get<std::string>();
        try {
            s.layers.push_back({name, static_cast<std::size_t>(points),
                                read_shape(member(entry, "shape", where), where)});
        } catch (const leat::error& e) {
            throw bad_input(where + ": " + e.what());
        }
    }
    if (s.layers.empty()) {
        throw bad_input("the file needs at least one layer");
    }
    return s;
}

} // namespace scatter
