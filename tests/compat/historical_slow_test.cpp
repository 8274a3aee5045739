// No seed leads random() to a state of even words, which would go round a shorter cycle: the reason
// why additive_feedback31 may refuse such states and still take every seed.
//
// The seeding is x -> 16807 x mod 2^31 - 1 from the seed, 31 words in all. The first word is the
// seed as it is, be it negative; the other 30 follow each other on the one cycle of that map (16807
// is a primitive root: Park and Miller, CACM 31(10), 1988), or are all 0 where the seed is 2^31 - 1
// or its negative, both odd. So it is enough that nowhere on the cycle 30 even values follow each
// other.

#include "leat/engines/lehmer.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cstdint>

namespace {

TEST(AdditiveFeedback, NoSeedGivesEvenWordsOnly) {
    constexpr std::uint64_t cycle = 2147483646;
    leat::minimal_standard x{1};
    int run = 0;
    int longest = 0;
    for (std::uint64_t i = 0; i < cycle + 64; ++i) { // on past the start: a run may lie across it
        run = x() % 2 == 0 ? run + 1 : 0;
        longest = std::max(longest, run);
    }
    EXPECT_LT(longest, 30);
    EXPECT_EQ(longest, 28); // as expected of 2^31 coin tosses: a longest run of about 30
    // The walk is the whole cycle: 64 steps past its length it stands on the 64th value.
    leat::minimal_standard again{1};
    again.discard(64);
    EXPECT_EQ(x.state(), again.state());
}

} // namespace
