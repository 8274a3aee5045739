// Engines from addresses, and how far apart streams are.

#include "leat/engines/philox.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/overlap.hpp"
#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <random>

namespace {

using leat::source;

constexpr source study{"source test"};

TEST(Source, OpensEnginesThatDifferByPathAndFromStreams) {
    auto a = study.engine<leat::xoshiro256_plus_plus>("arrivals", 7);
    auto same = study.engine<leat::xoshiro256_plus_plus>("arrivals", 7);
    auto other = study.engine<leat::xoshiro256_plus_plus>("arrivals", 8);
    EXPECT_EQ(a, same);
    EXPECT_FALSE(a == other);
    leat::stream s = study.stream("arrivals", 7);
    EXPECT_NE(a(), s());
}

TEST(Source, SetsTheWholeStateOfAnEngineFromTheStreamOfItsAddress) {
    // Specification: seeding.hpp. The state of xoshiro256++ is eight 32-bit words, low half first,
    // that is, the first four words of the stream of kind "engine".
    leat::detail::path_hash path(leat::detail::as_path_part("source test"));
    path.append(leat::detail::as_path_part("arrivals"));
    path.append(leat::detail::as_path_part(7));
    const auto place = path.place(leat::detail::path_kind::engine);
    leat::stream words(leat::stream_address{place.key, place.upper, 0});
    std::array<std::uint64_t, 4> state{};
    for (auto& w : state) {
        w = words();
    }
    EXPECT_EQ(study.engine<leat::xoshiro256_plus_plus>("arrivals", 7),
              leat::xoshiro256_plus_plus{state});
}

TEST(Source, GivesCounterEnginesKeyAndUpperCounter) {
    const auto a = study.engine<leat::philox4x32>("arrivals", 7);
    const auto b = study.engine<leat::philox4x32>("arrivals", 8);
    EXPECT_EQ(a.counter()[0], 0u);
    EXPECT_EQ(a.counter()[1], 0u);
    EXPECT_NE(a.counter()[2], b.counter()[2]); // siblings: one draw of 2^32 would be alike
    EXPECT_NE(a.key(), b.key());
    const auto wide = study.engine<leat::philox4x64>("arrivals", 7);
    EXPECT_EQ(wide.counter()[1], 0u);
    EXPECT_NE(wide.counter()[3], 0u);
}

TEST(Source, OpensEnginesOfTheStandardLibrary) {
    auto a = study.engine<std::mt19937_64>("old model");
    auto b = study.engine<std::mt19937_64>("old model");
    EXPECT_EQ(a(), b());
}

TEST(OverlapBound, IsTheOneOfTheDesign) {
    // n^2 / 2^129 for streams, n^2 L / 2^256 for engines of 256 bits: arithmetic.
    EXPECT_EQ(leat::overlap_bound(std::uint64_t{1} << 20, ~0ull), 0x1p-89);
    EXPECT_EQ(leat::overlap_bound<leat::xoshiro256_plus_plus>(1u << 20, std::uint64_t{1} << 40),
              0x1p-176);
    EXPECT_EQ(leat::overlap_bound<leat::philox4x32>(1u << 20, 1000), 0x1p-89);
    EXPECT_EQ(leat::overlap_bound<leat::philox4x64>(1u << 20, 1000), 0x1p-217);
    EXPECT_EQ(leat::overlap_bound(0, 0), 0.0);
    static_assert(leat::overlap_bound(2, 1) == 0x1p-127);
}

} // namespace
