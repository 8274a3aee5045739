// Disk and ellipses: construction, what is refused and how it is said, areas, boxes, the order of
// words, constant evaluation.

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

template <class Make>
void expect_refused(Make make, const std::string& text) {
    try {
        (void)make();
        ADD_FAILURE() << "accepted; expected " << text;
    } catch (const leat::invalid_parameter& e) {
        EXPECT_EQ(std::string(e.what()), text);
    }
}

TEST(Disk, IsDeducedAsDoubleFromAnyArithmeticTypes) {
    const int i = 3;
    const float f = 0.5f;
    const std::array<double, 2> centre{3, 4};
    const std::array<int, 2> whole{3, 4};
    static_assert(std::is_same_v<decltype(leat::disk{{0, 0}, 1}), leat::disk<double>>);
    static_assert(std::is_same_v<decltype(leat::disk{{i, 4L}, f}), leat::disk<double>>);
    static_assert(std::is_same_v<decltype(leat::disk{{{3.0, 4.0}}, 1}), leat::disk<double>>);
    EXPECT_EQ((leat::disk{{i, 4L}, f}), (leat::disk{centre, 0.5}));
    EXPECT_EQ((leat::disk{{i, 4L}, f}), (leat::disk{whole, 0.5}));
    EXPECT_EQ((leat::disk<float>{{i, 4L}, 0.1}).radius(), 0.1f);
    EXPECT_NE((leat::disk{{3, 4}, 0.5}), (leat::disk{{3, 4}, 0.25}));
}

TEST(Ellipse, IsDeducedAsDoubleFromAnyArithmeticTypes) {
    const int i = 3;
    static_assert(std::is_same_v<decltype(leat::ellipse{{0, 0}, 2, 1}), leat::ellipse<double>>);
    static_assert(
        std::is_same_v<decltype(leat::ellipse{{i, i}, i, 1.f, i}), leat::ellipse<double>>);
    static_assert(std::is_same_v<decltype(leat::ellipse_by_rejection{{i, i}, i, 1}),
                                 leat::ellipse_by_rejection<double>>);
    const leat::ellipse e{{1, 2}, i, 1, 0.5};
    EXPECT_EQ(e.centre(), (std::array<double, 2>{1, 2}));
    EXPECT_EQ(e.semi_x(), 3);
    EXPECT_EQ(e.semi_y(), 1);
    EXPECT_EQ(e.rotation(), 0.5);
    EXPECT_EQ((leat::ellipse{{0, 0}, 2, 1}), (leat::ellipse{{0, 0}, 2, 1, 0}));
}

TEST(Disk, RefusesWhatItCannotDrawUniformly) {
    using leat::disk;
    const std::string size = ", must be finite and at least 2^-960";
    const std::string coarse = ", must be at least 256 steps between neighbouring numbers at the "
                               "region's edge; place the region nearer to the origin";
    expect_refused([] { return disk{{0, 0}, 0}; }, "leat::disk: radius = 0" + size);
    expect_refused([] { return disk{{0, 0}, -1}; }, "leat::disk: radius = -1" + size);
    expect_refused([] { return disk{{0, 0}, infinity}; }, "leat::disk: radius = inf" + size);
    expect_refused([] { return disk{{0, 0}, nan}; }, "leat::disk: radius = nan" + size);
    expect_refused([] { return disk{{0, 0}, 1e-300}; }, "leat::disk: radius = 1e-300" + size);
    expect_refused(
        [] {
            return disk<float>{{0, 0}, 1e-35};
        },
        "leat::disk: radius = 1.0000000180025095e-35, must be finite and at least 2^-100");
    expect_refused(
        [] {
            return disk{{infinity, 0}, 1};
        },
        "leat::disk: centre = inf, must be finite");
    expect_refused([] { return disk{{0, nan}, 1}; }, "leat::disk: centre = nan, must be finite");
    expect_refused(
        [] {
            return disk{{1e308, 0}, 1e308};
        },
        "leat::disk: radius = 1e+308, must leave the region's edge finite");
    expect_refused([] { return disk{{1e15, 0}, 1}; }, "leat::disk: radius = 1" + coarse);
    expect_refused([] { return disk{{0, -1e15}, 1}; }, "leat::disk: radius = 1" + coarse);
    EXPECT_NO_THROW((disk{{1e15, 0}, 32})); // 256 steps of 1/8
    EXPECT_THROW((disk{{1e15, 0}, 31.9}), leat::invalid_parameter);
}

TEST(Ellipse, RefusesWhatItCannotDrawUniformly) {
    using leat::ellipse;
    const std::string size = ", must be finite and at least 2^-960";
    const std::string coarse = ", must be at least 256 steps between neighbouring numbers at the "
                               "region's edge; place the region nearer to the origin";
    const std::string angle = ", must be from -1000 to 1000 (radians)";
    expect_refused([] { return ellipse{{0, 0}, 0, 1}; }, "leat::ellipse: semi_x = 0" + size);
    expect_refused([] { return ellipse{{0, 0}, 1, -2}; }, "leat::ellipse: semi_y = -2" + size);
    expect_refused([] { return ellipse{{0, 0}, nan, 1}; }, "leat::ellipse: semi_x = nan" + size);
    expect_refused(
        [] {
            return ellipse{{0, infinity}, 1, 1};
        },
        "leat::ellipse: centre = inf, must be finite");
    expect_refused(
        [] {
            return ellipse{{0, 0}, 1, 1, nan};
        },
        "leat::ellipse: rotation = nan" + angle);
    expect_refused(
        [] {
            return ellipse{{0, 0}, 1, 1, -1001};
        },
        "leat::ellipse: rotation = -1001" + angle);
    expect_refused(
        [] {
            return ellipse{{0, 1e15}, 1000, 1};
        },
        "leat::ellipse: semi_y = 1" + coarse);
    // Along the axes any two sizes go together; turned, the small one must show in both
    // coordinates.
    EXPECT_NO_THROW((ellipse{{0, 0}, 1e300, 1e-280}));
    expect_refused(
        [] {
            return ellipse{{0, 0}, 1e300, 1, 1e-40};
        },
        "leat::ellipse: semi_y = 1" + coarse);
    expect_refused(
        [] {
            return ellipse{{1e308, 0}, 1e308, 1e308};
        },
        "leat::ellipse: semi_x = 1e+308, must leave the region's edge finite");
    expect_refused(
        [] {
            return leat::ellipse_by_rejection{{0, 0}, 0, 1};
        },
        "leat::ellipse_by_rejection: semi_x = 0" + size);
}

// A thin turned ellipse fills next to nothing of its box: pi a b / (4 hx hy).
TEST(EllipseByRejection, RefusesAHopelessBox) {
    EXPECT_NEAR((leat::ellipse_by_rejection{{0, 0}, 3, 1}).acceptance(), std::numbers::pi / 4,
                1e-15);
    const leat::ellipse_by_rejection thin{{0, 0}, 600, 1, std::numbers::pi / 4};
    EXPECT_NEAR(thin.acceptance(), std::numbers::pi / 2 * 600 / (600.0 * 600 + 1), 1e-12);
    try {
        (void)leat::ellipse_by_rejection{{0, 0}, 6000, 1, std::numbers::pi / 4};
        ADD_FAILURE();
    } catch (const leat::invalid_parameter& e) {
        EXPECT_NE(std::string(e.what()).find("must be at least 1/1024: the ellipse is too thin"),
                  std::string::npos)
            << e.what();
    }
}

// pi r^2, pi a b (Euclid; Archimedes). Saturated where it does not fit, as in the laws.
TEST(DiskAndEllipse, MeasureIsTheArea) {
    EXPECT_EQ((leat::disk{{5, 6}, 1}).measure(), std::numbers::pi);
    EXPECT_DOUBLE_EQ((leat::disk{{5, 6}, 2.5}).measure(), 19.634954084936208); // regions.disk.2.5
    EXPECT_DOUBLE_EQ((leat::ellipse{{0, 0}, 5, 0.5, 1}).measure(), 7.853981633974483);
    EXPECT_DOUBLE_EQ((leat::ellipse{{0, 0}, 1e300, 1e-280}).measure(), std::numbers::pi * 1e20);
    EXPECT_EQ((leat::disk<float>{{0, 0}, 1}).measure(), std::numbers::pi_v<float>);
    EXPECT_EQ((leat::disk{{0, 0}, 1e300}).measure(), std::numeric_limits<double>::max());
    EXPECT_EQ((leat::disk{{0, 0}, 1e-200}).measure(), std::numeric_limits<double>::min());
    EXPECT_EQ((leat::disk<float>{{0, 0}, 1e30}).measure(), std::numeric_limits<float>::max());
    EXPECT_EQ((leat::disk<float>{{0, 0}, 1e-25}).measure(), std::numeric_limits<float>::min());
}

TEST(DiskAndEllipse, EdgePointsOnTheAxesAreContained) {
    const leat::disk d{{3, 4}, 2.5};
    EXPECT_EQ(d.bounds().low, (std::array<double, 2>{0.5, 1.5}));
    EXPECT_EQ(d.bounds().high, (std::array<double, 2>{5.5, 6.5}));
    EXPECT_TRUE(d.contains({0.5, 4}) && d.contains({3, 6.5}));
    EXPECT_TRUE(d.contains({3 + 1.5, 4 + 2})); // a 3-4-5 triangle
    EXPECT_FALSE(d.contains({3 + 1.5, std::nextafter(6.0, 7.0)}));
    EXPECT_FALSE(d.contains({std::nextafter(0.5, 0.0), 4}));
    const leat::ellipse e{{0, 0}, 3, 0.7};
    EXPECT_TRUE(e.contains({3, 0}) && e.contains({0, -0.7}));
    EXPECT_FALSE(e.contains({std::nextafter(3.0, 4.0), 0}));
    EXPECT_FALSE(e.contains({0, std::nextafter(-0.7, -1.0)}));
}

// The box of a turned ellipse: half widths sqrt(a^2 cos^2 + b^2 sin^2) and with sin, cos exchanged
// (any analytic geometry), by the standard library here.
TEST(Ellipse, BoundsFollowTheRotation) {
    for (const double angle : {0.0, 0.4, -2.5, 1.0, 30.0, std::numbers::pi / 2, 999.0}) {
        const auto box = leat::ellipse{{0, 0}, 8.5, 3.2, angle}.bounds();
        const double x = std::hypot(8.5 * std::cos(angle), 3.2 * std::sin(angle));
        const double y = std::hypot(8.5 * std::sin(angle), 3.2 * std::cos(angle));
        EXPECT_NEAR(box.high[0], x, 1e-12) << angle;
        EXPECT_NEAR(box.high[1], y, 1e-12) << angle;
        EXPECT_EQ(box.low[0], -box.high[0]);
        EXPECT_EQ(box.low[1], -box.high[1]);
    }
    // counter-clockwise: the tip of the first axis is where the angle points
    EXPECT_TRUE(
        (leat::ellipse{{0, 0}, 8.5, 1, 0.4}).contains({8.4 * std::cos(0.4), 8.4 * std::sin(0.4)}));
    EXPECT_FALSE(
        (leat::ellipse{{0, 0}, 8.5, 1, 0.4}).contains({8.4 * std::cos(0.4), -8.4 * std::sin(0.4)}));
}

// As thin as can be turned: semi_y is 450 steps between neighbouring numbers at the tips.
TEST(Ellipse, ContainsItsPointsWhereItIsThinnest) {
    const leat::ellipse needle{{0, 0}, 1, 5e-14, 0.7};
    auto g = leat_test::source_of_this_test().stream();
    for (int i = 0; i < 20000; ++i) {
        const auto p = needle(g);
        ASSERT_TRUE(needle.contains(p)) << p[0] << " " << p[1];
    }
    EXPECT_THROW((leat::ellipse{{0, 0}, 1, 1e-14, 0.7}), leat::invalid_parameter);
}

// Two words a trial, x first; a coordinate is (2 k + 1) / 2^53 - 1, k the upper 53 bits.
TEST(Disk, WordsAreTakenInTheStatedOrder) {
    const std::uint64_t quarter = std::uint64_t{1} << 62; // k = 2^51: -1/2 + 2^-53
    const std::uint64_t half = std::uint64_t{1} << 63;    // k = 2^52: 2^-53
    leat::scripted g{0, 0, quarter, half};
    const auto p = leat::disk{{0, 0}, 1}(g);
    EXPECT_EQ(g.asked(), 4u); // the corner was rejected
    EXPECT_EQ(p[0], -0.5 + 0x1p-53);
    EXPECT_EQ(p[1], 0x1p-53);
    leat::scripted32 h{0x40000000u, 0x80000000u};
    const auto q = leat::disk<float>{{0, 0}, 2}(h);
    EXPECT_EQ(q[0], 2 * (-0.5f + 0x1p-24f));
    EXPECT_EQ(q[1], 2 * 0x1p-24f);
}

TEST(Ellipse, IsTheImageOfTheDiskPointOfTheSameWords) {
    const leat::disk unit{{0, 0}, 1};
    const leat::ellipse e{{10, 20}, 4, 2, 0.4};
    auto g = leat_test::source_of_this_test().stream();
    for (int i = 0; i < 1000; ++i) {
        const auto start = g.position();
        const auto [u, v] = unit(g);
        const auto end = g.position();
        g.seek(start);
        const auto p = e(g);
        EXPECT_EQ(g.position(), end);
        EXPECT_NEAR(p[0], 10 + 4 * u * std::cos(0.4) - 2 * v * std::sin(0.4), 1e-14);
        EXPECT_NEAR(p[1], 20 + 4 * u * std::sin(0.4) + 2 * v * std::cos(0.4), 1e-14);
    }
}

// The early verdict by integers never differs from contains(): trials that straddle the edge, and
// regions on a coarse grid, where many are in doubt.
template <class Region>
void expect_verdict_of_contains(const Region& region, std::uint64_t x, std::uint64_t y,
                                bool inside) {
    leat::scripted g{x, y};
    bool drawn = true;
    try {
        EXPECT_TRUE(region.contains(region(g)));
    } catch (const leat::stream_exhausted&) {
        drawn = false;
    }
    EXPECT_EQ(drawn, inside) << x << " " << y;
}

TEST(Disk, EarlyVerdictsAgreeWithContains) {
    auto g = leat_test::source_of_this_test().stream();
    for (const auto& region :
         {leat::disk{{0, 0}, 1}, leat::disk{{1e15, -1e15}, 32}, leat::disk{{1e12, 7}, 100}}) {
        for (int i = 0; i < 200000; ++i) {
            const std::uint64_t x = g();
            std::uint64_t y = g();
            if (i % 2 == 0) { // on the edge, give or take 1024 steps
                const double u = std::ldexp(static_cast<double>(x >> 11), -52) - 1;
                const double v = 1 + std::sqrt(1 - u * u);
                y = std::min(static_cast<std::uint64_t>(std::ldexp(v, 52)) + (y >> 54) - 512,
                             (std::uint64_t{1} << 53) - 1)
                    << 11;
            }
            // The point of this trial, by the specification.
            std::array<double, 2> p{};
            const std::uint64_t words[] = {x, y};
            for (std::size_t j = 0; j < 2; ++j) {
                const auto k = static_cast<std::int64_t>(words[j] >> 11);
                const auto steps = static_cast<double>(2 * k + 1 - (std::int64_t{1} << 53));
                const volatile double offset = steps * (region.radius() * 0x1p-53);
                p[j] = region.centre()[j] + offset;
            }
            expect_verdict_of_contains(region, x, y, region.contains(p));
        }
    }
}

// P1 and constexpr: one function at compile time and at run time.
constexpr std::array<double, 4> draw_two() {
    leat::splitmix64 g{20261201};
    const auto p = leat::disk{{3, 4}, 2.5}(g);
    const auto q = leat::ellipse{{-1, 2}, 8.5, 3.2, 0.4}(g);
    return {p[0], p[1], q[0], q[1]};
}

TEST(DiskAndEllipse, ConstantEvaluationGivesTheSameBits) {
    constexpr auto at_compile_time = draw_two();
    const auto at_run_time = draw_two();
    EXPECT_EQ(at_compile_time, at_run_time);
    constexpr leat::ellipse_by_rejection e{{-1, 2}, 8.5, 3.2, 0.4};
    static_assert(e.contains({-1, 2}) && e.measure() > 85);
}

// Away from the origin, on the coarsest grid accepted, the moments are still those of a disk.
TEST(Disk, IsUniformOnACoarseGrid) {
    const leat::disk far{{1e15, 1e15}, 32};
    auto g = leat_test::source_of_this_test().stream();
    double square = 0;
    constexpr int n = 100000;
    for (int i = 0; i < n; ++i) {
        const auto p = far(g);
        const double x = (p[0] - 1e15) / 32;
        square += x * x;
    }
    leat_test::check(leat_test::mean_test("x^2", square, n, {0.25, 0.125 - 0.0625}));
}

} // namespace
