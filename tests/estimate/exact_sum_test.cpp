// exact_sum: against MPFR with enough bits for any sum of doubles; order, merging, ends, text.

#include "leat/engines/xoshiro.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/uniform/permute.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <bit>
#include <cstdint>
#include <limits>
#include <sstream>
#include <string>
#include <vector>

namespace {

using leat::exact_sum;

/// The sum, rounded once to nearest, by MPFR: 2200 bits hold any of them exactly.
double reference_sum(const std::vector<double>& values) {
    mpfr_t sum;
    mpfr_init2(sum, 2200);
    mpfr_set_zero(sum, 1);
    for (const double x : values) {
        mpfr_add_d(sum, sum, x, MPFR_RNDN);
    }
    const double nearest = mpfr_get_d(sum, MPFR_RNDN);
    mpfr_clear(sum);
    return nearest;
}

exact_sum sum_of(std::span<const double> values) {
    exact_sum sum;
    sum.add(values);
    return sum;
}

/// Finite doubles of either sign and any exponent from `least` to `most` (fields, 0 to 2046).
std::vector<double> doubles(leat::xoshiro256_plus_plus& g, std::size_t n, std::uint64_t least,
                            std::uint64_t most) {
    std::vector<double> x(n);
    for (double& value : x) {
        const std::uint64_t field = least + leat::below(most - least + 1, g);
        const std::uint64_t word = g();
        value = std::bit_cast<double>((word & 0x800FFFFFFFFFFFFFu) | field << 52);
    }
    return x;
}

TEST(ExactSum, RoundsOnceAsMpfrDoes) {
    leat::xoshiro256_plus_plus g{1};
    const std::uint64_t ranges[][2] = {{0, 2046}, {0, 0},     {0, 2},       {1000, 1100},
                                       {0, 80},   {500, 500}, {1990, 2040}, {1023, 1023}};
    for (const auto& range : ranges) {
        for (const std::size_t n : {1u, 2u, 3u, 10u, 100u}) {
            for (int i = 0; i < 100; ++i) {
                const std::vector<double> x = doubles(g, n, range[0], range[1]);
                const double expected = reference_sum(x);
                if (expected > std::numeric_limits<double>::max() ||
                    expected < std::numeric_limits<double>::lowest()) {
                    EXPECT_THROW((void)sum_of(x).value(), leat::invalid_parameter);
                } else {
                    ASSERT_EQ(std::bit_cast<std::uint64_t>(sum_of(x).value() + 0.0),
                              std::bit_cast<std::uint64_t>(expected + 0.0));
                }
            }
        }
    }
}

TEST(ExactSum, RoundsTiesToEvenAndWhatIsJustBesideThem) {
    const double half = 0x1p-53; // of the last place of 1
    const double speck = std::numeric_limits<double>::denorm_min();
    EXPECT_EQ(sum_of(std::vector{1.0, half}).value(), 1.0);
    EXPECT_EQ(sum_of(std::vector{1.0, half, speck}).value(), 1.0 + 0x1p-52);
    EXPECT_EQ(sum_of(std::vector{1.0, half, -speck}).value(), 1.0);
    EXPECT_EQ(sum_of(std::vector{1.0 + 0x1p-52, half}).value(), 1.0 + 0x1p-51);
    EXPECT_EQ(sum_of(std::vector{1.0 + 0x1p-52, half, -speck}).value(), 1.0 + 0x1p-52);
    EXPECT_EQ(sum_of(std::vector{-1.0, -half, -speck}).value(), -1.0 - 0x1p-52);
    EXPECT_EQ(sum_of(std::vector{2.0, -0x1p-53}).value(), 2.0); // a carry into the next exponent
    EXPECT_EQ(sum_of(std::vector{0x1p-1022, -speck}).value(), 0x1p-1022 - speck);
}

TEST(ExactSum, PassesTheLargestDoubleOnTheWay) {
    const double largest = std::numeric_limits<double>::max();
    exact_sum sum;
    for (int i = 0; i < 1000; ++i) {
        sum.add(largest);
    }
    EXPECT_THROW((void)sum.value(), leat::invalid_parameter);
    for (int i = 0; i < 999; ++i) {
        sum.add(-largest);
    }
    EXPECT_EQ(sum.value(), largest);
    exact_sum edge = sum; // half a last place more would round beyond
    edge.add(0x1p969);
    EXPECT_EQ(edge.value(), largest);
    edge.add(0x1p970);
    EXPECT_THROW((void)edge.value(), leat::invalid_parameter);
    edge.add(-0x1.8p970);
    EXPECT_EQ(edge.value(), largest);
}

TEST(ExactSum, DoesNotDependOnOrderOrMergingWhereAPlainSumDoes) {
    leat::xoshiro256_plus_plus g{2};
    std::vector<double> x = doubles(g, 1000, 1000, 1100);
    const exact_sum known = sum_of(x);
    double plain = 0;
    for (const double value : x) {
        plain += value;
    }
    bool plain_differs = false; // the planted fault: a sum that depends on the order
    for (int i = 0; i < 50; ++i) {
        leat::shuffle(x, g);
        const auto cut = leat::below(std::size_t{1001}, g);
        exact_sum sum = sum_of(std::span(x).subspan(cut));
        sum.merge(sum_of(std::span(x).first(cut)));
        EXPECT_EQ(sum, known);
        EXPECT_EQ(sum.value(), known.value());
        double again = 0;
        for (const double value : x) {
            again += value;
        }
        plain_differs = plain_differs || again != plain;
    }
    EXPECT_TRUE(plain_differs);
    EXPECT_EQ(known.count(), 1000u);
}

// All 53 bits set, and at each place within a limb: what a limb can gather is passed many times.
TEST(ExactSum, CarriesBeforeALimbIsFull) {
    constexpr std::uint64_t n = 50000;
    for (int place = 0; place < 32; ++place) {
        const double x = (1 - 0x1p-53) * static_cast<double>(std::uint64_t{1} << place);
        exact_sum up;
        exact_sum down;
        for (std::uint64_t i = 0; i < n; ++i) {
            up.add(x);
            down.add(-x);
        }
        exact_sum expected = sum_of(std::vector{x});
        for (int bit = 14; bit >= 0; --bit) { // n x by doubling
            expected.merge(expected);
            if ((n >> bit & 1u) != 0) {
                expected.add(x);
            }
        }
        ASSERT_EQ(up, expected) << place;
        ASSERT_EQ(down.value(), -up.value());
        up.merge(down);
        ASSERT_EQ(up.value(), 0);
    }
}

TEST(ExactSum, MergesItself) {
    exact_sum sum = sum_of(std::vector{1e300, -3.0, 1e-300});
    for (int i = 0; i < 60; ++i) {
        sum.merge(sum);
    }
    EXPECT_EQ(sum.count(), std::uint64_t{3} << 60);
    EXPECT_THROW((void)sum.value(), leat::invalid_parameter);
    exact_sum small = sum_of(std::vector{-0x1.921fb54442d18p-900});
    for (int i = 0; i < 63; ++i) {
        small.merge(small);
    }
    EXPECT_EQ(small.value(), -0x1.921fb54442d18p-837);
    EXPECT_THROW(small.merge(small), leat::invalid_parameter); // 2^64 values
    EXPECT_EQ(small.count(), std::uint64_t{1} << 63);
}

TEST(ExactSum, IsTheSameAtCompileTime) {
    constexpr auto work = [] {
        exact_sum sum;
        for (const double x : {1e308, 1.0, 0x1p-1074, -1e308, 0x1p-53}) {
            sum.add(x);
        }
        return sum;
    };
    static_assert(work().value() == 1 + 0x1p-52);
    EXPECT_EQ(work().value(), 1 + 0x1p-52);
    static_assert(exact_sum{}.value() == 0);
}

TEST(ExactSum, RefusesWhatIsNotFinite) {
    exact_sum sum = sum_of(std::vector{1.0});
    const exact_sum before = sum;
    const double infinite = std::numeric_limits<double>::infinity();
    for (const double x : {infinite, -infinite, std::numeric_limits<double>::quiet_NaN()}) {
        EXPECT_THROW(sum.add(x), leat::invalid_parameter);
    }
    EXPECT_EQ(sum, before);
    try {
        sum.add(infinite);
    } catch (const leat::error& e) {
        EXPECT_STREQ(e.what(), "leat::exact_sum: value = inf, must be finite");
    }
}

TEST(ExactSum, GoesThroughStateAndText) {
    leat::xoshiro256_plus_plus g{3};
    for (const double last : {1e300, -1e300}) {
        std::vector<double> x = doubles(g, 20, 0, 1900);
        x.push_back(last);
        const exact_sum sum = sum_of(x);
        exact_sum back(sum.state());
        EXPECT_EQ(back, sum);
        EXPECT_EQ(back.value(), reference_sum(x));
        back.add(-last); // and goes on
        x.push_back(-last);
        EXPECT_EQ(back.value(), reference_sum(x));

        std::stringstream text;
        text << sum;
        exact_sum read;
        text >> read;
        EXPECT_TRUE(text);
        EXPECT_EQ(read, sum);
    }
    std::istringstream garbage("3 1 2 4294967296");
    exact_sum sum = sum_of(std::vector{2.5});
    garbage >> sum;
    EXPECT_TRUE(garbage.fail());
    EXPECT_EQ(sum.value(), 2.5);
}

} // namespace
