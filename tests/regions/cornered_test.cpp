// Triangles, simplices, polygons, meshes and regions made of regions: uniform by measure (promise
// P4), right areas, exact refusals (promise P5), and the classic wrong samplers.

#include "regions/uniform_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/region_list.hpp"
#include "support/seeds.hpp"

#include "leat/regions.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <gtest/gtest.h>

#include <chrono>
#include <cmath>
#include <cstdint>
#include <numbers>
#include <string>
#include <vector>

namespace {

using namespace leat_test;
using point = std::array<double, 2>;
using ring = std::vector<point>;

/// Of the weights of a uniform point of a simplex, those left after the first k are as a point of a
/// simplex of fewer dimensions; the sum s of k weights has P(s <= x | s of k + 1) = (x / s')^k
/// (Devroye, Non-Uniform Random Variate Generation, 1986, V.2.2).
template <std::size_t N>
unit_numbers<N> simplex_numbers(const std::array<double, N>& weights) {
    unit_numbers<N> u{};
    double above = 1;
    double sum = 0;
    for (const double w : weights) {
        sum += w;
    }
    for (std::size_t k = N; k > 0; --k) {
        u[k - 1] = whole_power(sum / above, k);
        above = sum;
        sum = k == 2 ? weights[0] : sum - weights[k - 1];
    }
    return u;
}

TEST(CorneredGoodness, Triangle) {
    auto g = source_of_this_test().stream();
    const leat::triangle sail{{1, 1}, {1, 4}, {5, 3}}; // a + x (0, 3) + y (4, 2)
    const auto weights = [](const point& p) {
        const double y = (p[0] - 1) / 4;
        return simplex_numbers<2>({(p[1] - 1 - 2 * y) / 3, y});
    };
    check(uniform_report(unit_numbers_of(sail, weights, many, g)));
}

TEST(CorneredGoodness, Tetrahedron) {
    auto g = source_of_this_test().stream();
    const leat::tetrahedron cell{{1, 2, 3}, {1, 2, 5}, {4, 2, 3}, {1, 7, 3}};
    const auto weights = [](const auto& p) {
        return simplex_numbers<3>({(p[0] - 1) / 3, (p[1] - 2) / 5, (p[2] - 3) / 2});
    };
    check(uniform_report(unit_numbers_of(cell, weights, many, g)));
}

TEST(CorneredGoodness, SimplexOfFive) {
    auto g = source_of_this_test().stream();
    check(uniform_report(unit_numbers_of(leat::simplex<5>{}, simplex_numbers<5>, many, g)));
}

/// Sixty unit squares: those from 0 to 8 in x and y, but for the four in the middle; sheared, so
/// that no edge but the bottom lies along an axis.
point sheared(double x, double y) { return {x + 2 * y, y}; }

leat::polygon<> frame() {
    return leat::polygon{
        ring{sheared(0, 0), sheared(3, 0), sheared(8, 0), sheared(8, 8), sheared(0, 8)},
        {ring{sheared(3, 3), sheared(5, 3), sheared(5, 5), sheared(3, 5)}}};
}

std::vector<outcome> frame_report(const std::vector<point>& points) {
    std::vector<std::uint64_t> counts(60, 0);
    for (const auto& [x, y] : points) {
        const auto i = static_cast<std::size_t>(std::clamp(x - 2 * y, 0.0, 7.5));
        const auto j = static_cast<std::size_t>(std::clamp(y, 0.0, 7.5));
        std::size_t cell = 8 * j + i;
        for (const std::size_t hole :
             {36u, 35u, 28u, 27u}) { // from above: the rest keeps its place
            cell -= cell > hole ? 1 : 0;
        }
        ++counts[cell];
    }
    return {chi_square_test("sixty equal cells", counts)};
}

template <class Sampler>
std::vector<point> draw_points(const Sampler& sampler, int n) {
    auto g = source_of_this_test().stream();
    std::vector<point> points(static_cast<std::size_t>(n));
    for (point& p : points) {
        p = sampler(g);
    }
    return points;
}

TEST(CorneredGoodness, PolygonWithAHole) {
    const leat::polygon<> field = frame();
    EXPECT_EQ(field.measure(), 60); // shoelace formula: 64 - 4
    EXPECT_EQ(field.triangles(), 9u);
    check(frame_report(draw_points(field, many)));
}

/// Area, centroid and second moment of x by the shoelace formula and its like (Green's theorem;
/// common practice).
struct ring_moments {
    double area = 0;
    double x = 0;
    double y = 0;
    explicit ring_moments(const ring& r) {
        for (std::size_t i = 0; i < r.size(); ++i) {
            const point& a = r[i];
            const point& b = r[(i + 1) % r.size()];
            const double cross = a[0] * b[1] - b[0] * a[1];
            area += cross / 2;
            x += (a[0] + b[0]) * cross / 6;
            y += (a[1] + b[1]) * cross / 6;
        }
        x /= area;
        y /= area;
        area = std::abs(area);
    }
};

/// A star with n points.
ring star(int n) {
    ring r;
    for (int i = 0; i < 2 * n; ++i) {
        const double angle = std::numbers::pi * i / n;
        const double radius = (i % 2 == 0 ? 1 : 0.4) * (1 + 0.3 * std::sin(3 * angle));
        r.push_back({3 + radius * std::cos(angle), radius * std::sin(angle) - 2});
    }
    return r;
}

TEST(CorneredGoodness, CentroidOfAPolygon) {
    const ring r = star(20);
    const ring_moments exact(r);
    const leat::polygon<> p{r};
    EXPECT_NEAR(p.measure(), exact.area, 1e-13);
    double x = 0;
    double y = 0;
    double square_x = 0;
    double square_y = 0;
    for (const point& q : draw_points(p, few)) {
        x += q[0];
        y += q[1];
        square_x += (q[0] - exact.x) * (q[0] - exact.x);
        square_y += (q[1] - exact.y) * (q[1] - exact.y);
    }
    check(mean_test("centroid x", x, few, {exact.x, square_x / few}));
    check(mean_test("centroid y", y, few, {exact.y, square_y / few}));
}

TEST(Polygon, HundredThousandVertices) {
    const ring r = star(50000);
    const auto start = std::chrono::steady_clock::now();
    const leat::polygon<> p{r};
    const std::chrono::duration<double> time = std::chrono::steady_clock::now() - start;
    EXPECT_LT(time.count(), 20); // 0.1 s on an idle machine: this catches a square, no more
    EXPECT_EQ(p.triangles(), 99998u);
    EXPECT_NEAR(p.measure(), ring_moments(r).area, 1e-10);
}

// Small integers, for which everything is decided exactly by multiplication: a ring is accepted
// if and only if no vertex lies on an edge of which it is not an end and no two edges cross.
TEST(Polygon, AcceptsJustTheSimpleRings) {
    auto g = source_of_this_test().stream();
    int accepted = 0;
    for (int trial = 0; trial < 20000; ++trial) {
        const auto n = leat::uniform_integer<std::size_t>{3, 8}(g);
        const auto span = leat::uniform_integer{2, 7}(g);
        ring r(n);
        for (point& p : r) {
            p[0] = leat::uniform_integer{-1, span}(g);
            p[1] = leat::uniform_integer{0, span}(g);
        }
        const auto side = [](const point& a, const point& b, const point& c) {
            return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);
        };
        bool simple = true;
        for (std::size_t i = 0; i < n; ++i) {
            const point& a = r[i];
            const point& b = r[(i + 1) % n];
            for (std::size_t j = 0; j < n; ++j) {
                const point& c = r[j];
                const point& d = r[(j + 1) % n];
                const bool end = j == i || j == (i + 1) % n;
                const double dot = (a[0] - c[0]) * (b[0] - c[0]) + (a[1] - c[1]) * (b[1] - c[1]);
                simple = simple && (end || side(a, b, c) != 0 || dot > 0) && (i == j || a != c);
                simple = simple &&
                         !(side(a, b, c) * side(a, b, d) < 0 && side(c, d, a) * side(c, d, b) < 0);
            }
        }
        try {
            const leat::polygon<> p{r};
            ASSERT_TRUE(simple) << testing::PrintToString(r);
            EXPECT_NEAR(p.measure(), ring_moments(r).area, 1e-12);
            EXPECT_EQ(p.triangles(), n - 2);
            EXPECT_TRUE(p.contains(p(g)));
            ++accepted;
        } catch (const leat::invalid_parameter& e) {
            ASSERT_FALSE(simple) << testing::PrintToString(r) << e.what();
        }
    }
    EXPECT_GT(accepted, 2000);
}

TEST(Polygon, ContainsItsEdgesAndNothingBeyond) {
    const leat::polygon<> p = frame();
    EXPECT_TRUE(p.contains(sheared(0, 0)));
    EXPECT_TRUE(p.contains(sheared(3, 4)));  // on the hole's edge
    EXPECT_FALSE(p.contains(sheared(4, 4))); // in the hole
    EXPECT_TRUE(p.contains(sheared(0, 4)));
    EXPECT_FALSE(p.contains({std::nextafter(8.0, 0.0), 4})); // an ulp left of the left edge
    EXPECT_TRUE(p.contains({std::nextafter(8.0, 9.0), 4}));
}

// The sign of an area that rounding loses: along y = x, one ulp up or down.
TEST(Orientation, IsExact) {
    const double e = 0x1p-52;
    using leat::detail::turn;
    EXPECT_GT(turn({0.5, 0.5}, {12, 12}, {24, 24 + 16 * e}), 0);
    EXPECT_LT(turn({0.5, 0.5}, {12, 12}, {24, 24 - 16 * e}), 0);
    EXPECT_EQ(turn({0.5, 0.5}, {12, 12}, {24, 24}), 0);
    EXPECT_GT(turn({0.5 + e, 0.5 + 2 * e}, {2, 2}, {3, 3}), 0);
    EXPECT_LT(turn({0.5 + 2 * e, 0.5 + e}, {2, 2}, {3, 3}), 0);
    static_assert(turn({0.1, 0.1}, {0.2, 0.2}, {0.3, 0.3}) == 0);
}

TEST(CorneredGoodness, MeshOfAnOctahedron) {
    auto g = source_of_this_test().stream();
    const leat::triangle_mesh<> mesh{
        {{1, 0, 0}, {-1, 0, 0}, {0, 1, 0}, {0, -1, 0}, {0, 0, 1}, {0, 0, -1}},
        {{0, 2, 4}, {0, 2, 5}, {0, 3, 4}, {0, 3, 5}, {1, 2, 4}, {1, 2, 5}, {1, 3, 4}, {1, 3, 5}}};
    EXPECT_NEAR(mesh.measure(), 4 * std::sqrt(3.0), 1e-14); // 2 sqrt(3) a^2, a^2 = 2
    std::vector<std::uint64_t> faces(8, 0);
    const auto numbers = unit_numbers_of(
        mesh,
        [&faces](const auto& p) {
            ++faces[(p[0] < 0 ? 4u : 0u) + (p[1] < 0 ? 2u : 0u) + (p[2] < 0 ? 1u : 0u)];
            return simplex_numbers<2>({std::abs(p[0]), std::abs(p[1])});
        },
        many, g);
    check(uniform_report(numbers));
    check(chi_square_test("faces", faces));
}

TEST(CorneredGoodness, MeshByArea) {
    auto g = source_of_this_test().stream();
    const leat::triangle_mesh<> mesh{{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 3}},
                                     {{0, 1, 2}, {0, 1, 3}}}; // areas 1/2 and 3/2
    std::uint64_t low = 0;
    for (int i = 0; i < few; ++i) {
        low += mesh(g)[2] == 0 ? 1u : 0u;
    }
    check(count_test("smaller triangle", low, few, 0.25));
}

TEST(CombinationGoodness, EitherByMeasure) {
    auto g = source_of_this_test().stream();
    const leat::either parts{leat::disk{{-5, 0}, 1}, leat::box{{0, 0}, {1, 2}},
                             leat::disk{{5, 0}, 2}};
    const double pi = std::numbers::pi;
    std::vector<std::uint64_t> counts(3, 0);
    for (int i = 0; i < few; ++i) {
        const double x = parts(g)[0];
        ++counts[x < -2 ? 0 : x < 2 ? 1 : 2];
    }
    const double all = 5 * pi + 2;
    EXPECT_NEAR(parts.measure(), all, 1e-14);
    const std::vector<double> shares{pi / all, 2 / all, 4 * pi / all};
    check(chi_square_test("parts", counts, shares));
}

TEST(CombinationGoodness, WithoutAndRejection) {
    auto g = source_of_this_test().stream();
    const leat::without rim{leat::disk{{0, 0}, 2}, leat::disk{{0, 0}, 1}};
    const auto numbers = [](const point& p) {
        return unit_numbers<2>{(p[0] * p[0] + p[1] * p[1] - 1) / 3, turn_of(p[1], p[0])};
    };
    check(uniform_report(unit_numbers_of(rim, numbers, few, g)));
    const auto share = rim.estimate_acceptance(few, g);
    check(count_test("share outside", share.accepted, share.trials, 0.75));
    EXPECT_LT(share.low, share.share);
    EXPECT_GT(share.high, share.share);
    std::uint64_t trials = 0;
    for (int i = 0; i < 1000; ++i) {
        trials += rim.draw_counted(g).trials;
    }
    EXPECT_NEAR(static_cast<double>(trials) / 1000, 4.0 / 3, 0.2); // 9.5 standard deviations
}

// E. B. Wilson's interval: 8 of 10 at 95 % is 0.4902 to 0.9433 (from memory, verified by solving
// |k/n - p| = 1.959964 sqrt(p (1 - p) / n) for p).
TEST(Rejection, AcceptanceHasWilsonsInterval) {
    const auto found = leat::detail::acceptance_of(8, 10);
    for (const double p : {found.low, found.high}) {
        EXPECT_NEAR(std::abs(0.8 - p), 1.959963984540054 * std::sqrt(p * (1 - p) / 10), 1e-15);
    }
    EXPECT_EQ(leat::detail::acceptance_of(0, 10).low, 0);
    EXPECT_EQ(leat::detail::acceptance_of(10, 10).high, 1);
}

// The mistakes that survive a look at a plot.

TEST(PlantedFaults, NormalisedWeightsOfATriangleAreRejected) {
    auto g = source_of_this_test().stream();
    const auto faulty = [](leat::stream& words) {
        const double a = leat::unit(words);
        const double b = leat::unit(words);
        const double c = leat::unit(words);
        return simplex_numbers<2>({a / (a + b + c), b / (a + b + c)});
    };
    std::vector<unit_numbers<2>> numbers(few);
    for (auto& u : numbers) {
        u = faulty(g);
    }
    EXPECT_TRUE(is_rejected(uniform_report(numbers)));
}

// A square in three triangles, chosen alike or by area.
template <class Choose>
std::vector<outcome> cut_square_report(Choose choose) {
    const leat::triangle<> parts[] = {leat::triangle{{0, 0}, {0.25, 0}, {0, 1}},
                                      leat::triangle{{0.25, 0}, {1, 0}, {0, 1}},
                                      leat::triangle{{1, 0}, {1, 1}, {0, 1}}};
    return uniform_report(draw_points(
        [&](leat::stream& words) {
            const std::size_t chosen = choose(leat::unit(words));
            return parts[chosen](words);
        },
        few));
}

TEST(PlantedFaults, TrianglesChosenWithoutRegardToAreaAreRejected) {
    EXPECT_TRUE(is_rejected(cut_square_report([](double u) {
        return u < 1.0 / 3 ? 0u : u < 2.0 / 3 ? 1u : 2u;
    })));
}

TEST(PlantedFaults, TrianglesChosenByAreaPass) {
    check(cut_square_report([](double u) { return u < 0.125 ? 0u : u < 0.5 ? 1u : 2u; }));
}

template <class Make>
void expect_refused(Make make, const std::string& text) {
    try {
        make();
        ADD_FAILURE() << "accepted, instead of " << text;
    } catch (const leat::error& e) {
        EXPECT_EQ(e.what(), text);
    }
}

TEST(RefusedRegions, Rings) {
    const ring square{{0, 0}, {4, 0}, {4, 4}, {0, 4}};
    const auto refused = [&](const ring& outer, const std::vector<ring>& holes,
                             const std::string& text) {
        expect_refused([&] { leat::polygon{outer, holes}; }, "leat::polygon: " + text);
    };
    const std::string touch = ", rings must not touch themselves or each other";
    const std::string cross = ", rings must not cross themselves or each other";
    refused({{0, 0}, {1, 0}}, {},
            "ring.size() = 2, must be at least 3, and 2^31 vertices in all at most");
    refused(square, {{{1, 1}}},
            "holes[].size() = 1, must be at least 3, and 2^31 vertices in all at most");
    refused({{0, 0}, {1, 1}, {1, 0}, {0, 1}}, {},
            "the edge ring[0]-ring[1] crosses ring[2]-ring[3]" + cross);
    refused({{0, 0}, {1, 0}, {0, 1}, {0, 0}}, {},
            "ring[0] and ring[3] are the same point, must be given once");
    refused({{0, 0}, {4, 0}, {4, 4}, {2, 0}, {0, 4}}, {},
            "ring[3] lies on the edge ring[0]-ring[1]" + touch);
    refused({{0, 0}, {1, 1}, {2, 2}}, {},
            "the edges ring[2]-ring[0] and ring[0]-ring[1] overlap, rings must enclose an area");
    refused(square, {{{1, 1}, {5, 1}, {3, 3}}},
            "the edge ring[1]-ring[2] crosses holes[0][0]-holes[0][1]" + cross);
    refused(square, {{{5, 5}, {6, 5}, {6, 6}}},
            "holes[0] must lie inside the ring and outside other holes");
    refused(square, {{{1, 1}, {3, 1}, {3, 3}, {1, 3}}, {{2, 2}, {2.5, 2}, {2, 2.5}}},
            "holes[1] must lie inside the ring and outside other holes");
    refused(square, {{{0, 1}, {1, 1}, {1, 2}}},
            "holes[0][0] lies on the edge ring[3]-ring[0]" + touch);
    refused({{0, 0}, {NAN, 1}, {1, 1}}, {}, "vertex = nan, must be finite");
    refused({{0, 0}, {1e-200, 1}, {1, 1}}, {},
            "vertex = 1e-200, must be 0 or at least 2^-400 of the largest coordinate");
    refused({{0, 0}, {1, 0}, {2, 0}}, {}, "half width = 0, must be finite and at least 2^-960");
}

TEST(RefusedRegions, CornersAndCombinations) {
    const std::string small =
        "the area is too small beside the coordinates for points in it to be told apart; place "
        "the region nearer to the origin, or make it thicker";
    expect_refused([] { leat::triangle{{0, 0}, {1, 1}, {2, 2}}; }, "leat::triangle: " + small);
    expect_refused(
        [] {
            leat::triangle{{0, 0}, {1, 1}, {1, 1 + 0x1p-52}};
        },
        "leat::triangle: " + small);
    expect_refused(
        [] {
            leat::triangle{{0, 0}, {0, 1}, {0, 2}};
        },
        "leat::triangle: half width = 0, must be finite and at least 2^-960");
    expect_refused(
        [] {
            leat::triangle{{0, 0}, {INFINITY, 1}, {0, 2}};
        },
        "leat::triangle: corner = inf, must be finite");
    const std::string flat =
        "the corners lie too nearly in one plane for points between them to be told apart";
    expect_refused(
        [] {
            leat::tetrahedron{{0, 0, 0}, {1, 1, 1}, {2, 2, 2}, {0, 1, 2}};
        },
        "leat::tetrahedron: " + flat);
    expect_refused([] { leat::simplex<2>{{{{0, 0}, {1, 1}, {3, 3}}}}; }, "leat::simplex: " + flat);
    const std::vector<std::array<double, 3>> corners{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}};
    expect_refused(
        [&] {
            leat::triangle_mesh{corners, {{0, 1, 3}}};
        },
        "leat::triangle_mesh: triangles[0][2] = 3, must be below the number of vertices");
    expect_refused(
        [&] {
            leat::triangle_mesh{corners, std::vector<std::array<int, 3>>{{0, 1, -1}}};
        },
        "leat::triangle_mesh: triangles[0][2] = -1, must be below the number of vertices");
    expect_refused(
        [&] {
            leat::triangle_mesh{corners, {}};
        },
        "leat::triangle_mesh: triangles.size() = 0, must be from 1 to 2^32");
    expect_refused(
        [&] {
            leat::triangle_mesh{corners, {{0, 1, 1}}};
        },
        "leat::triangle_mesh: the triangles must have an area: all have none");
    const leat::disk inner{{0, 0}, 1};
    const leat::without nothing{inner, leat::disk{{0, 0}, 2}};
    expect_refused([&] { static_cast<void>(nothing.measure()); },
                   "leat::without: measure() is not known: give it to the constructor, or take "
                   "estimate_acceptance times the measure of the region around it");
    auto g = source_of_this_test().stream();
    expect_refused([&] { static_cast<void>(nothing(g)); },
                   "leat::without: rejected 700000 trials: the shape fills less than 1/10000 of "
                   "the region around it, if anything, or the engine is stuck");
    expect_refused([&] { static_cast<void>(nothing.estimate_acceptance(0, g)); },
                   "leat::without: trials = 0, must be at least 1");
    expect_refused(
        [&] {
            leat::rejection{inner, signs_differ{}, 4};
        },
        "leat::rejection: measure = 4, must be above 0 and at most that of the region "
        "around it");
    expect_refused(
        [&] {
            leat::either{inner, leat::disk{{9, 9}, 1e300}};
        },
        "leat::either: measure[1] = 1.7976931348623157e+308, must fit in the type of "
        "its region");
}

} // namespace
