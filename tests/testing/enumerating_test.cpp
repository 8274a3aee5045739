// testing/enumerating.hpp: every case once, and what can be counted with it.

#include "leat/testing/enumerating.hpp"

#include "leat/core/concepts.hpp"
#include "leat/uniform/permute.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <map>
#include <random>
#include <set>
#include <string>
#include <utility>
#include <vector>

namespace {

static_assert(leat::random_words<leat::enumerating<1, 1>>);
static_assert(std::uniform_random_bit_generator<leat::enumerating<32, 1>>);
static_assert(leat::enumerating<32, 1>::max() == 0xFFFFFFFFu);
static_assert(leat::enumerating_high<1, 1>::max() == ~std::uint64_t{0});
static_assert(leat::enumerating<3, 5>::cases() == 32768);

TEST(Enumerating, GoesThroughEveryCombinationOnceAndStartsAgain) {
    leat::enumerating<2, 3> g;
    std::set<std::vector<std::uint32_t>> seen;
    int cases = 0;
    do {
        std::vector<std::uint32_t> words;
        for (int i = 0; i < 3; ++i) {
            words.push_back(g());
            EXPECT_LE(words.back(), g.max());
        }
        seen.insert(words);
        ++cases;
    } while (g.next_case());
    EXPECT_EQ(cases, 64);
    EXPECT_EQ(seen.size(), 64u);
    EXPECT_EQ(g, (leat::enumerating<2, 3>{}));
}

TEST(Enumerating, OneWordTooManyIsAnErrorThatLeavesTheCase) {
    leat::enumerating<4, 2> g;
    g();
    g();
    try {
        g();
        FAIL() << "the case ran past its end";
    } catch (const leat::stream_exhausted& e) {
        EXPECT_STREQ(e.what(), "leat::enumerating: a case has 2 words, and one more was asked for");
    }
    EXPECT_EQ(g.drawn(), 2);
    EXPECT_TRUE(g.next_case());
    EXPECT_EQ(g.drawn(), 0);
    EXPECT_EQ(g(), 1u);
}

// The faults that are counted here are common practice; the numbers follow from 256 = 42 * 6 + 4.
TEST(Enumerating, CountsABiasAndItsAbsence) {
    leat::enumerating<8, 1> g;
    std::array<int, 6> by_remainder{};
    std::array<int, 6> by_rejection{};
    int undecided = 0;
    do {
        ++by_remainder[g() % 6];
    } while (g.next_case());
    do {
        try {
            std::uint32_t word = g();
            while (word >= 252) {
                word = g();
            }
            ++by_rejection[word % 6];
        } catch (const leat::stream_exhausted&) {
            ++undecided;
        }
    } while (g.next_case());
    EXPECT_EQ(by_remainder, (std::array{43, 43, 43, 43, 42, 42}));
    EXPECT_EQ(by_rejection, (std::array{42, 42, 42, 42, 42, 42}));
    EXPECT_EQ(undecided, 4);
}

// ISO C++ [rand.dist.uni.int]: all values alike, from any engine that goes by its min() and max().
TEST(Enumerating, TheStandardsIntegersAreUnbiased) {
    leat::enumerating<6, 2> g;
    std::map<int, int> times;
    do {
        try {
            ++times[std::uniform_int_distribution<int>{1, 5}(g)];
        } catch (const leat::stream_exhausted&) {
        }
    } while (g.next_case());
    EXPECT_EQ(times.size(), 5u);
    for (const auto& [value, count] : times) {
        EXPECT_EQ(count, times[1]) << value;
    }
}

TEST(EnumeratingHigh, GivesTheMiddlesOfEqualParts) {
    leat::enumerating_high<2, 1> g;
    const std::array<double, 4> middles{0.125, 0.375, 0.625, 0.875};
    for (const double middle : middles) {
        EXPECT_NEAR(leat::unit(g), middle, 1e-15);
        g.next_case();
    }
}

TEST(EnumeratingHigh, CountsLeatsSamplers) {
    leat::enumerating_high<12, 1> one;
    std::map<int, int> rolls;
    do {
        ++rolls[leat::uniform_integer{1, 6}(one)];
    } while (one.next_case());
    ASSERT_EQ(rolls.size(), 6u);
    for (const auto& [value, count] : rolls) {
        EXPECT_NEAR(count, 4096 / 6.0, 1) << value; // an equal share, to within one word
    }

    leat::enumerating_high<8, 2> two;
    std::map<std::string, int> orders;
    do {
        std::string cards = "abc";
        leat::shuffle(cards, two);
        ++orders[cards];
    } while (two.next_case());
    ASSERT_EQ(orders.size(), 6u);
    for (const auto& [order, count] : orders) {
        EXPECT_NEAR(count, 65536 / 6.0, 256) << order; // within 2^-8 of the whole
    }
}

} // namespace
