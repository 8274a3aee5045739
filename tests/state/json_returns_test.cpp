// Every engine, stream, address, source, law and region returns from JSON to the bit, in the frozen
// form of tests/golden/documents.json.

#include "state/json_report.hpp"
#include "support/engine_list.hpp"
#include "support/sampler_list.hpp"

#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <limits>
#include <string>
#include <vector>

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
    leat::limited leaps = leat::leapfrog(leat::minimal_standard{5}, 2, 7);
    leaps();
    expect_returns(frozen, "leapfrog", any(leaps));
    expect_returns(frozen, "leapfrog, 128 bits", any(leat::leapfrog(leat::lehmer128{5}, 2, 7)));
    expect_returns(frozen, "leapfrog, counter", any(leat::leapfrog(leat::philox4x64{5}, 2, 7)));
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
    visit("uniform", leat::uniform{0, 0.3});
    visit("uniform [)", leat::uniform<double, leat::ends::closed_open>{1, 2});
    visit("uniform (]", leat::uniform<double, leat::ends::open_closed>{-3, -1});
    visit("float uniform []", leat::uniform<float, leat::ends::closed>{100, 100.5F});
    visit("int8 all", leat::uniform_integer<std::int8_t>{-128, 127});
    visit("int 1..6", leat::uniform_integer{1, 6});
    visit("int64 all",
          leat::uniform_integer<std::int64_t>{std::numeric_limits<std::int64_t>::min(),
                                              std::numeric_limits<std::int64_t>::max()});
    visit("uint64", leat::uniform_integer<std::uint64_t>{9, (1ULL << 63) + 9});
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
    each_further_law(visit);
    EXPECT_GE(frozen.types(), 54u);
}

/// A predicate for `rejection`: without members, so that it needs no form.
struct signs_differ {
    bool operator()(const std::array<double, 2>& p) const { return p[0] * p[1] < 0; }
    friend bool operator==(const signs_differ&, const signs_differ&) = default;
};

/// A region of each kind. (The many of region_list.hpp would only compile longer: what is saved are
/// arguments, and those are numbers.)
template <class Visit>
void each_region_kind(Visit visit) {
    using namespace leat;
    visit("segment", segment{{0, 0}, {3, 4}});
    visit("polyline", polyline<2>{{{0, 0}, {1, 0}, {1, 1}, {-3, 2}}});
    visit("box", box{{0, 0}, {1, 1}});
    visit("float box", box<3, float>{{0, 0, -4}, {60, 12.1F, 0}});
    visit("disk", disk{{3, 4}, 2.5});
    visit("float disk", disk<float>{{3, 4}, 0.1F});
    visit("annulus", annulus{{3, -4}, 0.1, 5});
    visit("sector", sector{{3, -4}, 2, 0.5, 6});
    visit("ellipse", ellipse{{0, 0}, 8.5, 3.2, 0.4});
    visit("ellipse_by_rejection", ellipse_by_rejection{{0, 0}, 8.5, 3.2, 0.4});
    visit("ball", ball<3>{{0, 0, 1e-300}, 1});
    visit("sphere", sphere<4>{{0, 0, 0, -0.0}, 1});
    visit("shell", shell{{0, 0, 0}, 1, 2});
    visit("ellipsoid", ellipsoid{{1, 2, 3}, {1e300, 0.5, 1}});
    visit("cap", cap{{1, 2, 3}, 2, {1, -2, 0.5}, 2.5}); // the axis as given, not of length 1
    visit("float cap", cap<float>{{0, 0, 0}, 1, {0, 3, 1}, 0.5});
    visit("cylinder", cylinder{{1, 2, 3}, {1, -2, 0.5}, 0.1, 20});
    visit("cone", cone{{0, 0, 0}, {0, 0, -5}, 1e100, 1e-10});
    visit("torus", torus{{1, 2, 3}, 1, 1});
    visit("rotation", rotation{});
    visit("triangle", triangle{{0, 0}, {1, 3}, {4, 0}});
    visit("tetrahedron", tetrahedron{{1e100, 0, 0}, {0, 1, 0}, {0, 0, 1e-10}, {0, 0, 0}});
    visit("simplex", simplex<3>{});
    visit("simplex of corners", simplex<3>{{{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}}}});
    const std::vector<std::array<double, 2>> square{{0, 0}, {0, 4}, {4, 4}, {4, 0}};
    visit("polygon with a hole", polygon{square, {{{1, 1}, {2, 1}, {2, 3}}}});
    visit("polygon", polygon{square});
    visit("triangle_mesh", triangle_mesh<>{{{0, 0, 0}, {1, 2, 3}, {1, 0, 1}}, {{0, 1, 2}}});
    visit("affine_image", affine_image{disk{{0, 0}, 1}, {{{3, 1}, {0, -2}}}, {1, 1}});
    visit("rejection", rejection{disk{{0, 0}, 1}, signs_differ{}, 1.5707963267948966});
    visit("without", without{box{{0, 0}, {4, 4}}, disk{{2, 2}, 1}});
    visit("either", either{disk{{-5, 0}, 1}, box{{0, 0}, {1, 2}},
                           without{box{{2, 0}, {6, 4}}, disk{{4, 2}, 1}, 12.858407346410207}});
    visit("isotropic_direction", isotropic_direction{});
    visit("direction_in_cone", direction_in_cone{{1, 2, 3}, 0.5});
    visit("lambert_direction", lambert_direction{{1, 2, 3}});
    visit("von_mises_fisher", von_mises_fisher{{1, 2, 3}, 20});
}

TEST(JsonReturns, Regions) {
    leat_test::frozen_documents frozen;
    each_region_kind(
        [&](const char* name, const auto& region) { expect_returns(frozen, name, any(region)); });
    EXPECT_EQ(frozen.types(), 33u);
}

} // namespace
