// The whole cycle of xorshift32, word by word: some seconds.

#include "leat/engines/xorshift.hpp"

#include <gtest/gtest.h>

#include <cstdint>

namespace {

// Marsaglia 2003: the period is 2^32 - 1, so that every word but 0 is drawn exactly once.
TEST(xorshift_slow, draws_every_word_but_zero_once) {
    leat::xorshift32 engine{1};
    std::uint64_t draws = 0;
    bool zero = false;
    std::uint32_t drawn = 0;
    do {
        drawn = engine();
        zero = zero || drawn == 0;
        ++draws;
    } while (drawn != 1 && draws <= 0xFFFFFFFFu);
    EXPECT_FALSE(zero);
    EXPECT_EQ(leat::wide_integer{draws}, leat::xorshift32::period());
}

} // namespace
