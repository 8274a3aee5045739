// The smooth regions: deduction, what is refused and how it is said, measures, edges, boxes, the
// order of words, constant evaluation.

#include "support/seeds.hpp"

#include "leat/engines/splitmix64.hpp"
#include "leat/regions.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <numbers>
#include <string>

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double pi = std::numbers::pi;

const std::string size_text = ", must be finite and at least 2^-960";
const std::string coarse = ", must be at least 256 steps between neighbouring numbers at the "
                           "region's edge; place the region nearer to the origin";
const std::string no_edge = ", must leave the region's edge finite";

template <class Make>
void expect_refused(Make make, const std::string& text) {
    try {
        (void)make();
        ADD_FAILURE() << "accepted; expected " << text;
    } catch (const leat::invalid_parameter& e) {
        EXPECT_EQ(std::string(e.what()), text);
    }
}

TEST(SmoothRegions, DimensionsAreDeduced) {
    using namespace leat;
    static_assert(std::is_same_v<decltype(box{{0, 0}, {1, 1}}), box<2>>);
    static_assert(std::is_same_v<decltype(box{{0, 0}, {0.5, 1.5}}), box<2>>);
    static_assert(std::is_same_v<decltype(ball{{0, 0, 0}, 2.5F}), ball<3>>);
    static_assert(std::is_same_v<decltype(sphere{{0.5, 0.5}, 1}), sphere<2>>);
    static_assert(std::is_same_v<decltype(shell{{0, 0, 0}, 1, 2.5}), shell<3>>);
    static_assert(std::is_same_v<decltype(segment{{0, 0}, {1, 2}}), segment<2>>);
    static_assert(std::is_same_v<decltype(annulus{{0, 1.5}, 1, 2}), annulus<double>>);
    static_assert(std::is_same_v<decltype(sector{{0, 1.5}, 1, 0, 2.5}), sector<double>>);
    static_assert(std::is_same_v<decltype(ellipsoid{{0, 0, 0}, {1, 2, 3}}), ellipsoid<double>>);
    static_assert(std::is_same_v<decltype(cap{{0, 0, 0}, 1, {0, 0, 1}, 1.5}), cap<double>>);
    static_assert(std::is_same_v<decltype(cone{{0, 0, 0}, {0, 0, 1}, 1, 2.5}), cone<double>>);
    static_assert(std::is_same_v<decltype(torus{{0, 0, 0}, 2, 0.5}), torus<double>>);
    static_assert(std::is_same_v<decltype(rotation{}), rotation<double>>);
    static_assert(sphere<3>::dimension == 3 && sphere<3>::measured_dimension == 2);
    static_assert(ball<5>::measured_dimension == 5 && segment<2>::measured_dimension == 1);
    static_assert(rotation<>::dimension == 4 && rotation<>::measured_dimension == 3);
    const std::array<double, 3> centre{1, 2, 3};
    EXPECT_EQ((ball<3>{centre, 1}.centre()), centre);
}

TEST(SmoothRegions, RefuseSizesAndPlaces) {
    using namespace leat;
    expect_refused([] { return ball<3>{{0, 0, 0}, 0}; }, "leat::ball: radius = 0" + size_text);
    expect_refused([] { return ball<3>{{0, 0, 0}, -2}; }, "leat::ball: radius = -2" + size_text);
    expect_refused(
        [] {
            return ball<3>{{0, 0, 0}, 1e-300};
        },
        "leat::ball: radius = 1e-300" + size_text);
    expect_refused(
        [] {
            return ball<3>{{0, nan, 0}, 1};
        },
        "leat::ball: centre = nan, must be finite");
    expect_refused([] { return ball<3>{{0, 1e15, 0}, 1}; }, "leat::ball: radius = 1" + coarse);
    expect_refused(
        [] {
            return ball<3>{{0, 1e308, 0}, 1e308};
        },
        "leat::ball: radius = 1e+308" + no_edge);
    expect_refused(
        [] {
            return ball<2, float>{{0, 3e38F}, 1e38F};
        },
        "leat::ball: radius = 9.999999680285692e+37" + no_edge);
    expect_refused(
        [] {
            return sphere<4>{{0, 0, 0, 0}, infinity};
        },
        "leat::sphere: radius = inf" + size_text);
    expect_refused([] { return sphere<2>{{1e15, 0}, 1}; }, "leat::sphere: radius = 1" + coarse);
    expect_refused(
        [] {
            return shell<3>{{0, 0, 0}, 2, 1};
        },
        "leat::shell: inner = 2, must be below outer");
    expect_refused(
        [] {
            return shell<3>{{0, 0, 0}, 1, 1};
        },
        "leat::shell: inner = 1, must be below outer");
    expect_refused(
        [] {
            return shell<3>{{0, 0, 0}, -1, 1};
        },
        "leat::shell: inner = -1, must be 0 or at least 2^-960");
    expect_refused(
        [] {
            return annulus{{0, 0}, nan, 1};
        },
        "leat::annulus: inner = nan, must be 0 or at least 2^-960");
    expect_refused([] { return annulus{{0, 0}, 0, 0}; }, "leat::annulus: outer = 0" + size_text);
    expect_refused(
        [] {
            return annulus{{0, 0}, 1, 1 + 0x1p-45};
        },
        "leat::annulus: outer - inner = 2.842170943040401e-14" + coarse);
    expect_refused(
        [] {
            return ellipsoid{{0, 0, 0}, {1, 2, 0}};
        },
        "leat::ellipsoid: semi_axes = 0" + size_text);
    expect_refused(
        [] {
            return ellipsoid{{0, 0, 1e15}, {1, 2, 3}};
        },
        "leat::ellipsoid: semi_axes = 3" + coarse);
    expect_refused(
        [] {
            return ellipsoid{{0, 0, 1e308}, {1, 2, 1e308}};
        },
        "leat::ellipsoid: semi_axes = 1e+308" + no_edge);
    expect_refused(
        [] {
            return torus{{0, 0, 0}, 1, 2};
        },
        "leat::torus: minor = 2, must be at most major");
    expect_refused(
        [] {
            return torus{{0, 0, 0}, 1, 1e-15};
        },
        "leat::torus: minor = 1e-15" + coarse);
    expect_refused(
        [] {
            return torus{{0, 0, 0}, 1.5e308, 1e308};
        },
        "leat::torus: major = 1.5e+308" + no_edge);
}

TEST(SmoothRegions, RefuseEndsAndCorners) {
    using namespace leat;
    using plane = std::vector<std::array<double, 2>>;
    expect_refused(
        [] {
            return box<2>{{0, 0}, {1, 0}};
        },
        "leat::box: high = 0, must be above low in every coordinate");
    expect_refused([] { return box<2>{{0, nan}, {1, 1}}; }, "leat::box: low = nan, must be finite");
    expect_refused(
        [] {
            return box<2>{{0, 0}, {infinity, 1}};
        },
        "leat::box: high = inf, must be finite");
    expect_refused(
        [] {
            return box<2>{{0, 1e15}, {1, 1e15 + 1}};
        },
        "leat::box: high - low = 1" + coarse);
    expect_refused(
        [] {
            return box<1>{{0}, {1e-300}};
        },
        "leat::box: high - low = 1e-300" + size_text);
    expect_refused(
        [] {
            return segment<2>{{1, 2}, {1, 2}};
        },
        "leat::segment: length = 0" + size_text);
    expect_refused(
        [] {
            return segment<2>{{1, infinity}, {1, 2}};
        },
        "leat::segment: a = inf, must be finite");
    expect_refused(
        [] {
            return segment<2>{{1e15, 0}, {1e15 + 3, 4}};
        },
        "leat::segment: length = 5" + coarse);
    expect_refused(
        [] {
            return segment<1>{{0}, {1e-295}};
        },
        "leat::segment: length = 1e-295" + size_text);
    expect_refused([] { return polyline<2>{plane{}}; },
                   "leat::polyline: vertices = 0, must be at least 2");
    expect_refused(
        [] {
            return polyline<2>{plane{{0, 0}}};
        },
        "leat::polyline: vertices = 1, must be at least 2");
    expect_refused(
        [] {
            return polyline<2>{plane{{1, 2}, {1, 2}}};
        },
        "leat::polyline: length = 0" + size_text);
    expect_refused(
        [] {
            return polyline<2>{plane{{1, 2}, {nan, 2}}};
        },
        "leat::polyline: vertex = nan, must be finite");
    expect_refused(
        [] {
            return polyline<2>{plane{{1e15, 2}, {1e15 + 1, 2}}};
        },
        "leat::polyline: length = 1" + coarse);
}

TEST(SmoothRegions, RefuseAnglesAndAxes) {
    using namespace leat;
    const std::string radians = ", must be from -1000 to 1000 (radians)";
    const std::string half = ", must be from 2^-44 to pi (radians)";
    expect_refused([] { return sector{{0, 0}, 1, nan, 1}; }, "leat::sector: from = nan" + radians);
    expect_refused([] { return sector{{0, 0}, 1, 0, 1001}; }, "leat::sector: to = 1001" + radians);
    expect_refused(
        [] {
            return sector{{0, 0}, 1, 1, 1};
        },
        "leat::sector: to = 1, must be above from");
    expect_refused(
        [] {
            return sector{{0, 0}, 1, 0, 6.5};
        },
        "leat::sector: to - from = 6.5, must be at most 2 pi");
    expect_refused(
        [] {
            return sector{{1, 0}, 1, 0, 1e-15};
        },
        "leat::sector: radius * (to - from) = 1e-15" + coarse);
    expect_refused(
        [] {
            return cap{{0, 0, 0}, 1, {0, 0, 0}, 1};
        },
        "leat::cap: axis = 0, must have a coordinate of at least 2^-960 in size");
    expect_refused(
        [] {
            return cap{{0, 0, 0}, 1, {0, infinity, 0}, 1};
        },
        "leat::cap: axis = inf, must be finite");
    expect_refused(
        [] {
            return cap{{0, 0, 0}, 1, {0, 0, 1}, 0};
        },
        "leat::cap: half_angle = 0" + half);
    expect_refused(
        [] {
            return cap{{0, 0, 0}, 1, {0, 0, 1}, 3.2};
        },
        "leat::cap: half_angle = 3.2" + half);
    expect_refused(
        [] {
            return cap{{0, 0, 100}, 1, {0, 0, 1}, 1e-12};
        },
        "leat::cap: radius * half_angle = 1e-12" + coarse);
    expect_refused(
        [] {
            return cylinder{{0, 0, nan}, {0, 0, 1}, 1, 1};
        },
        "leat::cylinder: base = nan, must be finite");
    expect_refused(
        [] {
            return cylinder{{0, 0, 0}, {0, 0, 1}, 1, 0};
        },
        "leat::cylinder: height = 0" + size_text);
    expect_refused(
        [] {
            return cylinder{{0, 0, 0}, {0, 0, 1}, 1, 1e-130};
        },
        "leat::cylinder: height = 1e-130, must be from 2^-400 to 2^400 times the radius");
    expect_refused(
        [] {
            return cylinder{{0, 0, 0}, {0, 1, 1}, 1, 1e-20};
        },
        "leat::cylinder: height = 1e-20" + coarse);
    expect_refused(
        [] {
            return cylinder{{0, 0, 0}, {0, 1, 1}, 1e-20, 1};
        },
        "leat::cylinder: radius = 1e-20" + coarse);
    expect_refused(
        [] {
            return cone{{0, 0, 1e308}, {0, 0, 1}, 1e308, 1e308};
        },
        "leat::cone: radius = 1e+308" + no_edge);
    expect_refused(
        [] {
            return cone{{0, 0, 0}, {0, 0, 1}, -1, 1};
        },
        "leat::cone: radius = -1" + size_text);
    expect_refused(
        [] {
            return direction_in_cone{{0, 0, 1}, -1};
        },
        "leat::direction_in_cone: half_angle = -1" + half);
    expect_refused(
        [] {
            return lambert_direction{{0, 0, 0}};
        },
        "leat::lambert_direction: normal = 0, must have a "
        "coordinate of at least 2^-960 in size");
    expect_refused(
        [] {
            return von_mises_fisher{{0, 0, 1}, -1};
        },
        "leat::von_mises_fisher: concentration = -1, must be from 0 to 2^80");
    expect_refused(
        [] {
            return von_mises_fisher<float>{{0, 0, 1}, nan};
        },
        "leat::von_mises_fisher: concentration = nan, must be from 0 to 2^20");
}

TEST(SmoothRegions, RefuseMatrices) {
    using leat::affine_image;
    const std::string singular =
        "leat::affine_image: the matrix is singular, or too close to it to be undone";
    static constexpr leat::box<2> unit{{0, 0}, {1, 1}};
    expect_refused([] { return affine_image{unit, {{{1, 2}, {2, 4}}}, {0, 0}}; }, singular);
    expect_refused([] { return affine_image{unit, {{{0, 0}, {0, 0}}}, {0, 0}}; }, singular);
    expect_refused(
        [] {
            return affine_image{unit, {{{1, 1}, {1, 1 + 0x1p-45}}}, {0, 0}};
        },
        singular);
    expect_refused(
        [] {
            return affine_image{unit, {{{1, nan}, {0, 1}}}, {0, 0}};
        },
        "leat::affine_image: matrix = nan, must be finite");
    expect_refused(
        [] {
            return affine_image{unit, {{{1e200, 0}, {0, 1}}}, {0, 0}};
        },
        "leat::affine_image: matrix = 1e+200, must be 0 or from 2^-500 to 2^500 in size");
    expect_refused(
        [] {
            return affine_image{unit, {{{1, 0}, {0, 1}}}, {0, infinity}};
        },
        "leat::affine_image: shift = inf, must be finite");
    expect_refused(
        [] {
            return affine_image{unit, {{{1, 0}, {0, 1}}}, {0, 1e15}};
        },
        "leat::affine_image: half width = 0.5" + coarse);
    expect_refused(
        [] {
            return affine_image{leat::box<1>{{0}, {1e300}}, {{{1e100}}}, {0}};
        },
        "leat::affine_image: the image's edge must be finite");
}

// Archimedes; Pappus; elementary geometry. What regions.json lists is checked in
// smooth_goodness_test.cpp.
TEST(SmoothRegions, Measures) {
    using namespace leat;
    EXPECT_DOUBLE_EQ((box<3>{{0, 0, -4}, {60, 12, 0}}.measure()), 60.0 * 12 * 4);
    EXPECT_DOUBLE_EQ((box<2>{{-1e308, 0}, {1e308, 1e-280}}.measure()), 2e28);
    EXPECT_DOUBLE_EQ((segment{{0, 0}, {3, 4}}.measure()), 5);
    EXPECT_DOUBLE_EQ((segment<2>{{-1e308, 0}, {0.4e308, 1e308}}.measure()),
                     std::hypot(1.4, 1) * 1e308);
    EXPECT_EQ((segment<1>{{-1.7e308}, {1.7e308}}.measure()), std::numeric_limits<double>::max());
    EXPECT_DOUBLE_EQ((sector{{1, 1}, 2, 0, pi / 2}.measure()), pi);
    EXPECT_DOUBLE_EQ((sector{{1, 1}, 2, -1, 0.5}.measure()), 3);
    EXPECT_DOUBLE_EQ((ellipsoid{{0, 0, 0}, {3, 2, 1}}.measure()), 8 * pi);
    EXPECT_DOUBLE_EQ((cylinder{{0, 0, 0}, {1, 2, 3}, 2, 5}.measure()), 20 * pi);
    EXPECT_DOUBLE_EQ((cone{{0, 0, 0}, {1, 2, 3}, 2, 6}.measure()), 8 * pi);
    EXPECT_DOUBLE_EQ((cap{{0, 0, 0}, 2, {1, 2, 3}, pi}.measure()), 16 * pi);
    EXPECT_NEAR((cap{{0, 0, 0}, 2, {1, 2, 3}, 1e-8}.measure() / (4e-16 * pi)), 1, 1e-14);
    EXPECT_DOUBLE_EQ((torus{{0, 0, 0}, 3, 1}.measure()), 12 * pi * pi);
    EXPECT_DOUBLE_EQ(rotation{}.measure(), 2 * pi * pi);
    EXPECT_NEAR((shell{{0, 0, 0}, 1, 1 + 1e-9}.measure()) / (4 * pi * (1 + 1e-9 - 1) * (1 + 1e-9)),
                1, 1e-12); // 4 pi r^2 dr, at the middle
    EXPECT_EQ((ball<3>{{0, 0, 0}, 1e300}.measure()), std::numeric_limits<double>::max());
    EXPECT_EQ((ball<3>{{0, 0, 0}, 1e-200}.measure()), std::numeric_limits<double>::min());
    EXPECT_EQ((ball<3, float>{{0, 0, 0}, 1e30}.measure()), std::numeric_limits<float>::max());
    EXPECT_DOUBLE_EQ((ball<1>{{0}, 3}.measure()), 6);
    EXPECT_DOUBLE_EQ((affine_image{disk{{5, 5}, 1}, {{{0, 3}, {-2, 0}}}, {0, 0}}.measure()),
                     6 * pi);
}

TEST(SmoothRegions, EdgesAreContainedAndTheNextNumberIsNot) {
    using namespace leat;
    const auto next = [](double x) { return std::nextafter(x, infinity); };
    const ball<3> b{{1, 2, 3}, 2};
    EXPECT_TRUE(b.contains({3, 2, 3}) && b.contains({1, 2, 1}));
    EXPECT_FALSE(b.contains({next(3), 2, 3}) || b.contains({2.5, 3.5, 3.1}));
    const annulus a{{0, 0}, 3, 5};
    EXPECT_TRUE(a.contains({3, 0}) && a.contains({3, 4}) && a.contains({0, -5}));
    EXPECT_FALSE(a.contains({std::nextafter(3.0, 0.0), 0}) || a.contains({next(3), 4}));
    EXPECT_FALSE(a.contains({0, 0}));
    const cylinder c{{0, 0, 1}, {0, 0, 2}, 5, 2};
    EXPECT_TRUE(c.contains({3, 4, 1}) && c.contains({-3, 4, 3}));
    EXPECT_FALSE(c.contains({3, 4, next(3)}) || c.contains({next(3), 4, 2}));
    const cone k{{0, 0, 0}, {0, 0, 1}, 4, 4};
    EXPECT_TRUE(k.contains({4, 0, 0}) && k.contains({0, 0, 4}) && k.contains({0, 2, 2}));
    EXPECT_FALSE(k.contains({0, next(2), 2}) || k.contains({0.1, 0, 4}));
    const sector s{{0, 0}, 5, 0, pi / 2};
    EXPECT_TRUE(s.contains({3, 4}) && s.contains({0, 0}) && s.contains({2, 0}));
    EXPECT_FALSE(s.contains({2, -1e-300}) || s.contains({-1e-10, 2}) || s.contains({next(3), 4}));
    const sector reflex{{0, 0}, 1, 0, 1.5 * pi};
    EXPECT_TRUE(reflex.contains({-0.5, 0.5}) && reflex.contains({-0.5, -0.5}));
    EXPECT_FALSE(reflex.contains({0.5, -0.5}));
    const ellipsoid e{{0, 0, 0}, {3, 2, 1}};
    EXPECT_TRUE(e.contains({3, 0, 0}) && e.contains({0, 0, -1}));
    EXPECT_FALSE(e.contains({next(3), 0, 0}) || e.contains({2, 2, 0}));
    const affine_image f{box{{0, 0}, {2, 1}}, {{{1, 1}, {0, 1}}}, {0, 0}};
    EXPECT_TRUE(f.contains({3, 1}) && f.contains({0, 0}));
    EXPECT_FALSE(f.contains({0, 1}) || f.contains({3, 0}));
}

// Surfaces have a tolerance of 1e-12 of the size.
TEST(SmoothRegions, SurfacesContainWhatIsNear) {
    using namespace leat;
    const sphere<3> s{{0, 0, 0}, 10};
    EXPECT_TRUE(s.contains({0, 6, 8}) && s.contains({0, 6, 8 - 9e-12}));
    EXPECT_FALSE(s.contains({0, 6, 8 - 2e-11}) || s.contains({0, 6, 8 + 2e-11}));
    EXPECT_FALSE(s.contains({0, 0, 0}));
    const cap c{{0, 0, 0}, 10, {0, 0, 1}, 1};
    EXPECT_TRUE(c.contains({0, 6, 8}));
    EXPECT_FALSE(c.contains({0, 8, -6}) ||
                 c.contains({10 * std::sin(1.01), 0, 10 * std::cos(1.01)}));
    const cap large{{0, 0, 0}, 10, {0, 0, 1}, 3};
    EXPECT_TRUE(large.contains({0, 6, -8}));
    EXPECT_FALSE(large.contains({0, 0, -10}));
    const torus t{{0, 0, 0}, 3, 1};
    EXPECT_TRUE(t.contains({0, 4, 0}) && t.contains({-2, 0, 0}) && t.contains({0, 3, 1}));
    EXPECT_FALSE(t.contains({0, 3, 0}) || t.contains({0, 3, 0.99}) || t.contains({0, 0, 1}));
    const segment<2> w{{0, 0}, {3, 4}};
    EXPECT_TRUE(w.contains({1.5, 2}) && w.contains({0, 0}) && w.contains({3, 4}));
    EXPECT_FALSE(w.contains({1.5, 2.0001}) || w.contains({3, 4.0001}));
}

// A sampled surface point is within the few ulp that the headers state.
TEST(SmoothRegions, SurfacePointsLieWithinAFewUlp) {
    using namespace leat;
    auto g = leat_test::source_of_this_test().stream();
    const sphere<3> s{{0, 0, 0}, 1};
    const sphere<10> high{std::array<double, 10>{}, 1};
    const rotation r;
    const cap polar{{0, 0, 0}, 1, {1, 2, 3}, 0.01};
    const torus ring{{0, 0, 0}, 2, 0.5};
    const auto off = [](const auto& p) {
        long double square = 0;
        for (const double x : p) {
            square += static_cast<long double>(x) * x;
        }
        return std::abs(static_cast<double>(std::sqrt(square) - 1)) / 0x1p-52;
    };
    for (int i = 0; i < 20000; ++i) {
        EXPECT_LE(off(s(g)), 5);
        EXPECT_LE(off(high(g)), 9);
        EXPECT_LE(off(r(g)), 4);
        const auto q = ring(g);
        const long double across = std::sqrt(static_cast<long double>(q[0]) * q[0] +
                                             static_cast<long double>(q[1]) * q[1]) -
                                   2;
        const auto tube =
            static_cast<double>(std::sqrt(across * across + static_cast<long double>(q[2]) * q[2]));
        EXPECT_LE(std::abs(tube - 0.5) / 0x1p-51, 8); // the outer radius is 2.5
        EXPECT_LE(off(polar(g)), 6);
        EXPECT_LE(off(von_mises_fisher{{1, 2, 3}, 5}(g)), 6);
        EXPECT_LE(off(lambert_direction{{1, 2, 3}}(g)), 6);
    }
}

// The box of a cap and of a sector: the extreme directions in it, by the standard library.
TEST(SmoothRegions, BoundsAreTight) {
    using namespace leat;
    const cap c{{0, 0, 0}, 2, {0, 0, 1}, 0.5};
    EXPECT_NEAR(c.bounds().high[0], 2 * std::sin(0.5), 1e-15);
    EXPECT_NEAR(c.bounds().low[1], -2 * std::sin(0.5), 1e-15);
    EXPECT_EQ(c.bounds().high[2], 2);
    EXPECT_NEAR(c.bounds().low[2], 2 * std::cos(0.5), 1e-15);
    const auto half = sector{{0, 0}, 1, -0.5, 2}.bounds();
    EXPECT_EQ(half.high, (std::array<double, 2>{1, 1}));
    EXPECT_NEAR(half.low[0], std::cos(2), 1e-15);
    EXPECT_NEAR(half.low[1], std::sin(-0.5), 1e-15);
    const auto k = cone{{0, 0, 0}, {0, 0, 1}, 3, 2}.bounds();
    EXPECT_EQ(k.low, (std::array<double, 3>{-3, -3, 0}));
    EXPECT_EQ(k.high, (std::array<double, 3>{3, 3, 2}));
    const auto tilted = cylinder{{0, 0, 0}, {3, 0, 4}, 5, 10}.bounds();
    EXPECT_NEAR(tilted.high[0], 6 + 5 * 0.8, 1e-14);
    EXPECT_NEAR(tilted.low[0], -4, 1e-14);
    EXPECT_NEAR(tilted.high[1], 5, 1e-14);
    EXPECT_NEAR(tilted.high[2], 8 + 5 * 0.6, 1e-14);
}

TEST(Rotation, TurnsVectorsAsQuaternionsDo) {
    using leat::rotation;
    // a quarter turn about z: x to y (any text on quaternions)
    const double h = std::sqrt(0.5);
    const auto y = rotation<>::apply({h, 0, 0, h}, {1, 0, 0});
    EXPECT_NEAR(y[0], 0, 1e-15);
    EXPECT_NEAR(y[1], 1, 1e-15);
    EXPECT_NEAR(y[2], 0, 1e-15);
    const auto same = rotation<>::apply({-1, 0, 0, 0}, {1, 2, 3});
    EXPECT_EQ(same, (std::array<double, 3>{1, 2, 3}));
}

// Densities by solid angle integrate to 1: over the sphere by the mean of density / (1 / 4 pi) over
// isotropic directions would be a statistical check; here by the midpoint rule in the height.
TEST(Directions, DensitiesIntegrateToOne) {
    using namespace leat;
    const auto integral = [](const auto& law) { // of a law about z
        constexpr int n = 200000;
        double sum = 0;
        for (int i = 0; i < n; ++i) {
            const double z = (i + 0.5) / n * 2 - 1;
            sum += law.density({std::sqrt(1 - z * z), 0, z});
        }
        return sum * 2 / n * 2 * pi;
    };
    EXPECT_NEAR(integral(isotropic_direction<>{}), 1, 1e-11);
    EXPECT_NEAR((integral(direction_in_cone{{0, 0, 5}, 0.7})), 1, 1e-4); // a step at the rim
    EXPECT_NEAR((integral(lambert_direction{{0, 0, 5}})), 1, 1e-9);
    for (const double c : {0.0, 1e-30, 0.3, 2.0, 50.0}) {
        EXPECT_NEAR((integral(von_mises_fisher{{0, 0, 5}, c})), 1, 1e-7) << c;
    }
    // regions.vmf.2: A = coth k - 1/k is the mean height
    EXPECT_NEAR((von_mises_fisher{{0, 0, 1}, 2}.density({0, 0, 1})),
                2 * std::exp(2) / (4 * pi * std::sinh(2)), 1e-15);
}

// The order of words, as the headers state it; k = 2^51 of 53 bits gives -1/2 + 2^-53.
TEST(SmoothRegions, WordsAreTakenInTheStatedOrder) {
    using namespace leat;
    const std::uint64_t quarter = std::uint64_t{1} << 62;
    const std::uint64_t half = std::uint64_t{1} << 63;
    scripted for_ball{0, 0, 0, quarter, half, half};
    const auto p = ball<3>{{0, 0, 0}, 1}(for_ball);
    EXPECT_EQ(for_ball.asked(), 6u); // the corner was rejected
    EXPECT_EQ(p, (std::array<double, 3>{-0.5 + 0x1p-53, 0x1p-53, 0x1p-53}));
    scripted for_cylinder{quarter, half, half}; // disk, height
    const auto q = cylinder{{0, 0, 0}, {0, 0, 1}, 2, 4}(for_cylinder);
    EXPECT_NEAR(q[0], -1, 1e-15);
    EXPECT_NEAR(q[1], 0, 1e-15);
    EXPECT_NEAR(q[2], 2, 1e-15);
    scripted for_box{quarter, half};
    const auto r = box<2>{{0, 0}, {4, 8}}(for_box);
    EXPECT_NEAR(r[0], 1, 1e-15);
    EXPECT_NEAR(r[1], 4, 1e-14);
    scripted for_sector{0, half, quarter}; // radius, radius, angle
    const auto s = sector{{0, 0}, 2, 0, 2}(for_sector);
    EXPECT_NEAR(s[0], std::cos(0.5), 1e-15);
    EXPECT_NEAR(s[1], std::sin(0.5), 1e-15);
    scripted for_segment{quarter};
    EXPECT_NEAR((segment{{0, 0}, {4, 8}}(for_segment)[1]), 2, 1e-15);
}

// P1 and constexpr: one function at compile time and at run time.
constexpr auto draw_some() {
    using namespace leat;
    splitmix64 g{20261201};
    std::array<double, 12> all{};
    std::size_t n = 0;
    const auto keep = [&](const auto& region) {
        const auto p = region(g);
        all[n++] = p[0];
    };
    keep(ball<3>{{0, 0, 0}, 2});
    keep(ball<4>{{0, 0, 0, 0}, 2});
    keep(sphere<4>{{0, 0, 0, 0}, 2});
    keep(shell<3>{{0, 0, 0}, 2, 2.5});
    keep(sector{{1, 2}, 3, 0.5, 4});
    keep(cap{{0, 0, 0}, 1, {1, 2, 3}, 1});
    keep(cone{{0, 0, 0}, {1, 2, 3}, 1, 2});
    keep(torus{{0, 0, 0}, 2, 1});
    keep(rotation{});
    keep(von_mises_fisher{{1, 2, 3}, 4});
    keep(affine_image{box<2>{{0, 0}, {1, 1}}, {{{1, 2}, {0, 1}}}, {3, 4}});
    keep(segment{{0, 0}, {4, 8}});
    return all;
}

TEST(SmoothRegions, ConstantEvaluationGivesTheSameBits) {
    constexpr auto at_compile_time = draw_some();
    EXPECT_EQ(at_compile_time, draw_some());
}

} // namespace
