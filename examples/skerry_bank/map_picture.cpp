#include "map_picture.hpp"

#include <algorithm>
#include <cmath>

#include "svg.hpp"
#include "text.hpp"

namespace skerry {
namespace {

constexpr double width = 960;
constexpr double side = 28;   // left and right of the chart
constexpr double top = 70;    // title
constexpr double bottom = 84; // legend
constexpr double inset = 46;  // from the chart's edge to what is drawn in it
constexpr double tallest = 900;

/// The chart's place on the page, and the way from kilometres east and north to pixels.
class chart {
public:
    chart(const input& in, const leat::region_bounds<double, 2>& lease) {
        const double west = std::min(lease.low[0], in.port.x_km);
        const double east = std::max(lease.high[0], in.port.x_km);
        const double south = std::min(lease.low[1], in.port.y_km);
        const double north = std::max(lease.high[1], in.port.y_km);
        const double room = width - 2 * side - 2 * inset;
        scale_ = std::min(room / (east - west), tallest / (north - south));
        height_ = (north - south) * scale_ + 2 * inset;
        west_ = (west + east) / 2 - (width / 2 - side) / scale_; // the chart's edge
        north_ = north + inset / scale_;
    }
    [[nodiscard]] double x(double km_east) const { return side + (km_east - west_) * scale_; }
    [[nodiscard]] double y(double km_north) const { return top + (north_ - km_north) * scale_; }
    [[nodiscard]] double pixels(double km) const { return km * scale_; }
    [[nodiscard]] double km(double pixels) const { return pixels / scale_; }
    [[nodiscard]] double height() const { return height_; }

private:
    double scale_, height_, west_, north_;
};

void draw_scale_bar(svg& picture, const chart& map) {
    const double km = round_step(map.km(180));
    const double right_end = width - side - 20;
    const double y = top + map.height() - 20;
    const double left_end = right_end - map.pixels(km);
    const auto style = R"(stroke="#22303c" stroke-width="2")";
    picture.line(left_end, y, right_end, y, style)
        .line(left_end, y - 5, left_end, y + 5, style)
        .line(right_end, y - 5, right_end, y + 5, style)
        .text((left_end + right_end) / 2, y - 8, shortest(km) + " km", 13, anchor::middle);
}

void draw_north(svg& picture) {
    const double x = width - side - 30;
    const double y = top + 22;
    picture
        .path("M " + coordinate(x) + " " + coordinate(y) + " l 8 26 l -8 -6 l -8 6 z",
              R"(fill="#22303c")")
        .text(x, y + 42, "N", 14, anchor::middle, R"(font-weight="bold")");
}

void draw_port(svg& picture, const input& in, const chart& map, double way_km) {
    const double x = map.x(in.port.x_km);
    const double y = map.y(in.port.y_km);
    const double farm_x = map.x(in.lease.centre_x_km);
    const double farm_y = map.y(in.lease.centre_y_km);
    picture.line(x, y, farm_x, farm_y,
                 R"(stroke="#b5472f" stroke-width="1.5" stroke-dasharray="7 6" opacity="0.75")");
    picture.rectangle(x - 7, y - 7, 14, 14, R"(fill="#b5472f" stroke="#ffffff" stroke-width="2")");
    // Beside the port, on the side away from the farm's line.
    const double label_y = farm_y < y ? y + 26 : y - 16;
    const bool at_left = x < width / 2;
    picture.text(at_left ? x - 8 : x + 8, label_y,
                 "port, " + fixed(way_km, 1) + " km from the middle of the lease", 13,
                 at_left ? anchor::start : anchor::end);
}

/// Whether every turbine's number has room between its neighbours.
bool numbers_fit(const input& in, const chart& map) {
    return map.pixels(in.turbines.min_spacing_m / 1000) >= 20;
}

void draw_turbines(svg& picture, const input& in, const farm& place, const chart& map) {
    const double spacing = map.pixels(in.turbines.min_spacing_m / 1000);
    for (const site& at : place.sites) {
        picture.circle(map.x(at.x_km), map.y(at.y_km), spacing / 2,
                       R"(fill="#ffffff" fill-opacity="0.45" stroke="#5b93ab" stroke-width="0.8")");
    }
    int number = 0;
    for (const site& at : place.sites) {
        const double x = map.x(at.x_km);
        const double y = map.y(at.y_km);
        picture.circle(x, y, 3.6, R"(fill="#12425c")");
        if (numbers_fit(in, map)) {
            picture.text(x, y + 11.5, std::to_string(number), 8, anchor::middle,
                         R"(fill="#12425c")");
        }
        ++number;
    }
}

void draw_legend(svg& picture, const input& in, const chart& map, double y) {
    picture.circle(side + 10, y - 4, 3.6, R"(fill="#12425c")");
    picture.text(side + 24, y, numbers_fit(in, map) ? "turbine, with its number" : "turbine", 13);
    picture.circle(side + 246, y - 4, 8, R"(fill="#ffffff" stroke="#5b93ab" stroke-width="0.8")");
    picture.text(side + 262, y,
                 "circles do not overlap: turbines at least " +
                     shortest(in.turbines.min_spacing_m) + " m apart",
                 13);
    picture.ellipse(side + 690, y - 4, 14, 7, 0, R"(fill="#cde3ea" stroke="#2a6f88")");
    picture.text(side + 712, y, "lease", 13);
}

} // namespace

std::string map_picture(const input& in, const farm& place) {
    const leat::ellipse lease = region_of(in.lease);
    const chart map(in, lease.bounds());
    const double height = top + map.height() + bottom;
    svg picture(width, height, "Map of " + in.title);
    picture.text(side, 34, in.title + ": the farm", 22, anchor::start, R"(font-weight="bold")");
    picture.text(side, 56,
                 std::to_string(in.turbines.count) + " turbines of " +
                     shortest(in.turbines.rated_mw) + " MW, placed at random in a lease of " +
                     fixed(lease.measure(), 0) + " km\u00b2",
                 14);
    picture.rectangle(side, top, width - 2 * side, map.height(),
                      R"(fill="#eaf3f7" stroke="#b9ced8")");
    picture.ellipse(map.x(in.lease.centre_x_km), map.y(in.lease.centre_y_km),
                    map.pixels(in.lease.semi_x_km), map.pixels(in.lease.semi_y_km),
                    -in.lease.angle_degrees,
                    R"(fill="#cde3ea" stroke="#2a6f88" stroke-width="1.5")");
    const double dx = in.lease.centre_x_km - in.port.x_km;
    const double dy = in.lease.centre_y_km - in.port.y_km;
    draw_port(picture, in, map, std::sqrt(dx * dx + dy * dy));
    draw_turbines(picture, in, place, map);
    draw_scale_bar(picture, map);
    draw_north(picture);
    const double below = top + map.height();
    draw_legend(picture, in, map, below + 30);
    picture.text(side, below + 62,
                 "Planning illustration on invented data. Not a chart: not to be used for "
                 "navigation.",
                 12, anchor::start, R"(fill="#5d6b76")");
    return picture.finish();
}

} // namespace skerry
