// Every engine, stream, address, source, law and region returns from JSON to the bit, in the frozen
// form of tests/golden/documents.json.

#include "state/json_report.hpp"
#include "support/engine_list.hpp"
#include "support/region_list.hpp"
#include "support/sampler_list.hpp"

#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <limits>
#include <string>

namespace {

using leat_test::any;
using leat_test::expect_returns;

/// Engines that were drawn from, so that a place in a block or a table shows.
template <class... Engines>
void expect_engines_return(leat_test::frozen_documents& frozen, ::testing::Types<Engines...>*) {
    const auto one = [&](auto engine) {
        for (int i = 0; i < 3; ++i) {
            expect_returns(frozen, "engine after draws: " + std::to_string(i), any(engine));
            engine();
        }
    };
    (one(Engines{}), ...);
}

TEST(JsonReturns, EnginesStreamsAndSources) {
    leat_test::frozen_documents frozen;
    expect_engines_return(frozen, static_cast<leat_test::engines*>(nullptr));
    leat::limited block = leat::block(leat::philox4x32{7}, 5, leat::pow2(70));
    block();
    expect_returns(frozen, "limited", any(block));
    expect_returns(frozen, "source", any(leat::source{"skerry"}.branch("wind", -3)));
    expect_returns(frozen, "source without an index", any(leat::source{20261201}.branch("a", "b")));
    leat::stream s = leat::source{20261201}.stream("pump", 3);
    s.seek(37);
    s.limit(100000);
    expect_returns(frozen, "stream", any(s));
    expect_returns(frozen, "stream_address", any(s.address()));
    leat::thin_stream thin = leat::source{20261201}.thin_stream("pump", 3);
    thin();
    expect_returns(frozen, "thin_stream", any(thin));
    EXPECT_GE(frozen.types(), 30u);
}

/// Counts and others that the list of samplers lacks, and parameters at the ends of what a law
/// takes.
template <class Visit>
void each_further_law(Visit visit) {
    visit("bernoulli", leat::bernoulli{0.3});
    visit("binomial", leat::binomial{100, 0.3});
    visit("binomial of 8 bits", leat::binomial<std::uint8_t>{100, 0.8});
    visit("geometric", leat::geometric{0.1});
    visit("hypergeometric", leat::hypergeometric{100, 30, 10});
    visit("negative_binomial", leat::negative_binomial{2.5, 0.2});
    visit("poisson", leat::poisson{4});
    visit("poisson of int", leat::poisson<int>{4});
    visit("zipf", leat::zipf{1.1, 1000});
    visit("zipf past 2^53", leat::zipf{1.5, std::numeric_limits<std::int64_t>::max()});
    visit("zipf at 2^53", leat::zipf{1.5, std::int64_t{1} << 53});
    visit("zipf at 2^53 + 1", leat::zipf{1.5, (std::int64_t{1} << 53) + 1});
    visit("normal at the ends",
          leat::normal{-std::numeric_limits<double>::max(), std::numeric_limits<double>::max()});
    visit("normal at the other ends",
          leat::normal{-0.0, std::numeric_limits<double>::denorm_min()});
    visit("normal of many digits", leat::normal{0.1 + 0.2, 1.0 / 3});
    visit("normal<float> of many digits", leat::normal<float>{0.1F, 1.0F / 3});
    visit("truncated_normal without ends",
          leat::truncated_normal{0, 1, -std::numeric_limits<double>::infinity(),
                                 std::numeric_limits<double>::infinity()});
    visit("multinomial of int", leat::multinomial<int>(10, {1, 2}));
    visit("empirical of one", leat::empirical({7.25}));
}

TEST(JsonReturns, Laws) {
    leat_test::frozen_documents frozen;
    const auto visit = [&](const char* name, const auto& law) {
        expect_returns(frozen, name, any(law));
    };
    leat_test::each_law(visit);
    leat_test::each_uniform_sampler(visit);
    each_further_law(visit);
    EXPECT_GE(frozen.types(), 60u);
}

TEST(JsonReturns, Regions) {
    leat_test::frozen_documents frozen;
    const auto visit = [&](const char* name, const auto& region) {
        expect_returns(frozen, name, any(region));
    };
    visit("disk", leat::disk{{3, 4}, 2.5});
    visit("float disk", leat::disk<float>{{3, 4}, 2.5F});
    visit("ellipse", leat::ellipse{{0, 0}, 8.5, 3.2, 0.4});
    visit("float ellipse", leat::ellipse<float>{{0, 0}, 8.5F, 3.2F, 0.4F});
    visit("ellipse_by_rejection", leat::ellipse_by_rejection{{0, 0}, 8.5, 3.2, 0.4});
    visit("isotropic_direction", leat::isotropic_direction{});
    visit("direction_in_cone", leat::direction_in_cone{{1, 2, 3}, 0.5});
    visit("lambert_direction", leat::lambert_direction{{1, 2, 3}});
    visit("von_mises_fisher", leat::von_mises_fisher{{1, 2, 3}, 20});
    leat_test::each_region_sample(visit);
    EXPECT_GE(frozen.types(), 60u);
}

} // namespace
