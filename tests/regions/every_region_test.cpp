// What every region must do, whatever its shape: the samples of support/region_list.hpp.

#include "support/region_list.hpp"
#include "support/seeds.hpp"

#include "leat/engines/lehmer.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <string>
#include <type_traits>

namespace {

using leat_test::source_of_this_test;

template <std::size_t N, class Real>
std::string text_of(const std::array<Real, N>& p) {
    std::string text;
    for (const Real x : p) {
        text += " " + testing::PrintToString(x);
    }
    return text;
}

// P4: a region contains every point it draws, and so do its bounds; also where rounding is coarse.
// The points of many draws come near the bounds on all sides, so that those are not merely large.
struct draws_inside {
    leat::source source = source_of_this_test();

    template <class Region>
    void operator()(const char* name, const Region& region) const {
        SCOPED_TRACE(name);
        constexpr std::size_t n = Region::dimension;
        auto g = source.stream(name);
        const auto box = region.bounds();
        auto low = box.high;
        auto high = box.low;
        for (int i = 0; i < 4000; ++i) {
            const auto p = region(g);
            ASSERT_TRUE(region.contains(p)) << text_of(p);
            ASSERT_TRUE(box.contains(p)) << text_of(p);
            for (std::size_t j = 0; j < n; ++j) {
                low[j] = std::min(low[j], p[j]);
                high[j] = std::max(high[j], p[j]);
            }
        }
        for (std::size_t j = 0; j < n; ++j) {
            const double width = 0.5 * double{box.high[j]} - 0.5 * double{box.low[j]};
            const double reached = 0.5 * double{high[j]} - 0.5 * double{low[j]};
            EXPECT_GE(reached, (n > 2 ? 0.5 : 0.75) * width) << "coordinate " << j;
        }
    }
};

TEST(EveryFlatRegion, ContainsEveryPointDrawn) { leat_test::each_flat_region(draws_inside{}); }
TEST(EveryRoundRegion, ContainsEveryPointDrawn) { leat_test::each_round_region(draws_inside{}); }
TEST(EveryCorneredRegion, ContainsEveryPointDrawn) {
    leat_test::each_cornered_region(draws_inside{});
}

// P5, P3 and P8: other engines serve, broken ones end with engine_stuck or a point inside; nothing
// infinite or NaN is contained; a draw changes nothing, and gives the same as another type.
struct behaves {
    leat::source source = source_of_this_test();

    template <class Region>
    void operator()(const char* name, const Region& region) const {
        SCOPED_TRACE(name);
        using real = typename Region::real_type;
        using point = typename Region::point_type;
        constexpr std::size_t n = Region::dimension;
        static_assert(std::is_same_v<point, std::array<real, n>>);
        static_assert(Region::measured_dimension <= n && Region::measured_dimension >= 1);

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
        for (int bit = 0; bit < 64; bit += 3) {
            try_engine(leat::constant{std::uint64_t{1} << bit});
            try_engine(leat::constant{~(std::uint64_t{1} << bit)});
        }
        leat::minimal_standard lehmer{1};
        for (int i = 0; i < 20; ++i) {
            EXPECT_TRUE(region.contains(region(lehmer)));
        }

        const Region copy = region;
        auto g = source.stream(name);
        const point p = region(g);
        EXPECT_EQ(copy, region);
        g.seek(0);
        EXPECT_EQ(copy(g), p);
        g.seek(0);
        EXPECT_EQ((region.template draw<std::array<real, n>>(g)), p);
        for (std::size_t i = 0; i < n; ++i) {
            for (const real bad :
                 {std::numeric_limits<real>::infinity(), -std::numeric_limits<real>::infinity(),
                  std::numeric_limits<real>::quiet_NaN()}) {
                point q = p;
                q[i] = bad;
                EXPECT_FALSE(region.contains(q)) << text_of(q);
            }
            point beyond = p;
            beyond[i] =
                std::nextafter(region.bounds().high[i], std::numeric_limits<real>::infinity());
            EXPECT_FALSE(region.contains(beyond)) << text_of(beyond);
        }
        EXPECT_GT(region.measure(), 0);
        EXPECT_LE(region.measure(), std::numeric_limits<real>::max());
    }
};

TEST(EveryFlatRegion, BehavesWithAnyEngine) { leat_test::each_flat_region(behaves{}); }
TEST(EveryRoundRegion, BehavesWithAnyEngine) { leat_test::each_round_region(behaves{}); }
TEST(EveryCorneredRegion, BehavesWithAnyEngine) { leat_test::each_cornered_region(behaves{}); }

} // namespace
