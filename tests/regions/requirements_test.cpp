// What every region must do, whatever its shape: one typed test that a later region joins by adding
// its type and its samples to `sample_regions`.

#include "support/seeds.hpp"

#include "leat/engines/lehmer.hpp"
#include "leat/regions.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <complex>
#include <type_traits>
#include <vector>

namespace {

using leat_test::source_of_this_test;

/// Regions of every size and place that a type must get right.
template <class Region>
std::vector<Region> sample_regions();

template <>
std::vector<leat::disk<>> sample_regions() {
    return {leat::disk{{0, 0}, 1},          leat::disk{{-3, 1e6}, 0.25},
            leat::disk{{0, 0}, 1e300},      leat::disk{{1e300, -1e300}, 1e299},
            leat::disk{{0, 0}, 0x1p-960},   leat::disk{{1e15, 1e15}, 32},
            leat::disk{{1e-300, 0}, 1e-280}};
}
template <>
std::vector<leat::disk<float>> sample_regions() {
    return {leat::disk<float>{{0, 0}, 1}, leat::disk<float>{{1e4, -3}, 0.5},
            leat::disk<float>{{0, 0}, 1e38}, leat::disk<float>{{0, 0}, 0x1p-100}};
}
template <class Ellipse>
std::vector<Ellipse> sample_ellipses() {
    return {Ellipse{{0, 0}, 1, 1},
            Ellipse{{0, 0}, 8.5, 3.2, 0.4},
            Ellipse{{-3, 1e6}, 0.25, 7, -2.5},
            Ellipse{{0, 0}, 1e300, 1e-280},
            Ellipse{{0, 0}, 1.5e308, 1.5e308, 0.7},
            Ellipse{{0, 0}, 0x1p-960, 0x1.8p-959, 1},
            Ellipse{{1e15, 1e15}, 32, 70, 1}};
}
template <>
std::vector<leat::ellipse<>> sample_regions() {
    return sample_ellipses<leat::ellipse<>>();
}
template <>
std::vector<leat::ellipse<float>> sample_regions() {
    return {leat::ellipse<float>{{0, 0}, 2, 1}, leat::ellipse<float>{{5, -3}, 100, 0.25, 0.4},
            leat::ellipse<float>{{0, 0}, 0x1p-100, 1e38}};
}
template <>
std::vector<leat::ellipse_by_rejection<>> sample_regions() {
    return sample_ellipses<leat::ellipse_by_rejection<>>();
}

template <class Region>
class RegionRequirements : public testing::Test {};
using regions = testing::Types<leat::disk<>, leat::disk<float>, leat::ellipse<>,
                               leat::ellipse<float>, leat::ellipse_by_rejection<>>;
TYPED_TEST_SUITE(RegionRequirements, regions);

// P4: a solid contains every point it draws, and so do its bounds; also where rounding is coarse.
TYPED_TEST(RegionRequirements, EveryPointDrawnIsInside) {
    for (const auto& region : sample_regions<TypeParam>()) {
        auto g = source_of_this_test().stream();
        for (int i = 0; i < 20000; ++i) {
            const auto p = region(g);
            ASSERT_TRUE(region.contains(p)) << p[0] << " " << p[1];
            ASSERT_TRUE(region.bounds().contains(p)) << p[0] << " " << p[1];
        }
    }
}

// The same from engines of other ranges, which word64 and word32 make whole words of.
TYPED_TEST(RegionRequirements, AnyEngineServes) {
    for (const auto& region : sample_regions<TypeParam>()) {
        leat::minimal_standard g{1};
        for (int i = 0; i < 100; ++i) {
            ASSERT_TRUE(region.contains(region(g)));
        }
    }
}

TYPED_TEST(RegionRequirements, ContainsTheCentreAndNothingBeyondItsBounds) {
    using real = typename TypeParam::real_type;
    constexpr real infinity = std::numeric_limits<real>::infinity();
    constexpr real nan = std::numeric_limits<real>::quiet_NaN();
    for (const auto& region : sample_regions<TypeParam>()) {
        EXPECT_TRUE(region.contains(region.centre()));
        EXPECT_FALSE(region.contains({infinity, region.centre()[1]}));
        EXPECT_FALSE(region.contains({region.centre()[0], -infinity}));
        EXPECT_FALSE(region.contains({infinity, infinity}));
        EXPECT_FALSE(region.contains({nan, region.centre()[1]}));
        EXPECT_FALSE(region.contains({region.centre()[0], nan}));
        const auto box = region.bounds();
        for (const real x : {box.low[0], box.high[0]}) {
            for (const real y : {box.low[1], box.high[1]}) {
                EXPECT_FALSE(region.contains({x, y})) << x << " " << y; // corners of the box
            }
        }
        const real beyond = box.high[0] + (box.high[0] - box.low[0]) / 256;
        EXPECT_FALSE(region.contains({beyond, region.centre()[1]}));
    }
}

// P5 and P3: broken engines end with engine_stuck or a point inside; no hang, no NaN.
TYPED_TEST(RegionRequirements, BrokenEnginesAreReportedOrHarmless) {
    for (const auto& region : sample_regions<TypeParam>()) {
        const auto try_engine = [&region](auto g) {
            try {
                EXPECT_TRUE(region.contains(region(g)));
            } catch (const leat::engine_stuck& e) {
                EXPECT_EQ(std::string(e.what()).rfind("leat::", 0), 0u) << e.what();
            }
        };
        try_engine(leat::constant{0});
        try_engine(leat::constant{~std::uint64_t{0}});
        try_engine(leat::constant32{0});
        try_engine(leat::constant32{~std::uint32_t{0}});
        for (int bit = 0; bit < 64; ++bit) {
            try_engine(leat::constant{std::uint64_t{1} << bit});
            try_engine(leat::constant{~(std::uint64_t{1} << bit)});
        }
    }
}

struct two_floats {
    float x, y;
};
struct two_doubles {
    two_doubles(double first, double second) : x(first), y(second) {}
    double x, y;
};

TYPED_TEST(RegionRequirements, DrawGivesTheSamePointAsAnotherType) {
    const auto region = sample_regions<TypeParam>().front();
    const auto same = [&region, this_test = source_of_this_test()]<class Vec>(auto first,
                                                                              auto second) {
        auto g = this_test.stream();
        const auto p = region(g);
        g.seek(0);
        const Vec v = region.template draw<Vec>(g);
        EXPECT_EQ(static_cast<float>(first(v)), static_cast<float>(p[0]));
        EXPECT_EQ(static_cast<float>(second(v)), static_cast<float>(p[1]));
    };
    const auto x = [](const auto& v) { return v.x; };
    const auto y = [](const auto& v) { return v.y; };
    const auto at_0 = [](const auto& v) { return v[0]; };
    const auto at_1 = [](const auto& v) { return v[1]; };
    same.template operator()<two_floats>(x, y);
    same.template operator()<two_doubles>(x, y);
    same.template operator()<std::array<double, 2>>(at_0, at_1);
    same.template operator()<std::array<float, 2>>(at_0, at_1);
    same.template operator()<std::vector<double>>(at_0, at_1);
    same.template operator()<std::pair<double, float>>([](const auto& v) { return v.first; },
                                                       [](const auto& v) { return v.second; });
    same.template operator()<std::complex<float>>([](const auto& v) { return v.real(); },
                                                  [](const auto& v) { return v.imag(); });
}

// P8: a region is a value, and a draw does not change it.
TYPED_TEST(RegionRequirements, IsAValueThatDrawsDoNotChange) {
    static_assert(std::is_trivially_copyable_v<TypeParam> && TypeParam::dimension == 2);
    static_assert(std::is_same_v<typename TypeParam::point_type,
                                 std::array<typename TypeParam::real_type, 2>>);
    const auto all = sample_regions<TypeParam>();
    const TypeParam copy = all[0];
    auto g = source_of_this_test().stream();
    const auto first = all[0](g);
    EXPECT_EQ(copy, all[0]);
    EXPECT_NE(copy, all[1]);
    g.seek(0);
    EXPECT_EQ(copy(g), first);
}

} // namespace
