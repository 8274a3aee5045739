// exact_sum: more additions than its limbs can gather without a carry.

#include "leat/estimate/exact_sum.hpp"

#include <gtest/gtest.h>

#include <cstdint>

TEST(ExactSumAtLength, CarriesBeforeALimbIsFull) {
    // All 53 bits set: x n = n - n 2^-53, and twice 2^30 additions pass the carry twice.
    constexpr double x = 1 - 0x1p-53;
    constexpr std::uint64_t n = (std::uint64_t{1} << 31) + 5;
    leat::exact_sum up;
    leat::exact_sum down;
    for (std::uint64_t i = 0; i < n; ++i) {
        up.add(x);
        down.add(-x);
    }
    leat::exact_sum expected;
    expected.add(0x1p31 + 5);
    expected.add(-(0x1p31 + 5) * 0x1p-53);
    EXPECT_EQ(up.state().limbs, expected.state().limbs);
    EXPECT_EQ(up.count(), n);
    EXPECT_EQ(down.value(), -up.value());
    up.merge(down);
    EXPECT_EQ(up.value(), 0);
}
