// testing/engines.hpp: the engines return exactly what they say, and `scripted` counts.

#include "leat/testing/engines.hpp"

#include "leat/core/concepts.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"

#include <gtest/gtest.h>

#include <concepts>
#include <cstdint>
#include <random>
#include <string>
#include <vector>

namespace {

// ISO C++ [rand.req.urng]: usable wherever <random> asks for a generator.
static_assert(std::uniform_random_bit_generator<leat::testing::scripted>);
static_assert(std::uniform_random_bit_generator<leat::testing::all_ones32>);
static_assert(leat::random_words<leat::scripted> && leat::random_words<leat::scripted32> &&
              leat::random_words<leat::constant> && leat::random_words<leat::all_zeros> &&
              leat::random_words<leat::all_ones> && leat::random_words<leat::alternating>);
static_assert(leat::all_ones{}() == 0xFFFFFFFFFFFFFFFFu && leat::all_ones32{}() == 0xFFFFFFFFu);
static_assert(leat::all_zeros{}() == 0 && leat::constant{7}() == 7);
static_assert(std::same_as<leat::scripted, leat::testing::scripted>);

TEST(Scripted, ReturnsItsWordsInOrder) {
    leat::scripted g{3, 0, ~std::uint64_t{0}};
    EXPECT_EQ(g(), 3u);
    EXPECT_EQ(g(), 0u);
    EXPECT_EQ(g(), ~std::uint64_t{0});
    EXPECT_EQ(g.asked(), 3u);

    leat::scripted32 h{std::vector<std::uint32_t>{9, 8}};
    EXPECT_EQ(h(), 9u);
    EXPECT_EQ(h(), 8u);
}

TEST(Scripted, OneWordTooManyIsAnErrorThatSaysHowManyWereAskedFor) {
    leat::scripted g{1, 2};
    g();
    g();
    for (const char* const count : {"3", "4"}) {
        try {
            g();
            FAIL() << "the script ran past its end";
        } catch (const leat::stream_exhausted& e) {
            EXPECT_EQ(std::string(e.what()), std::string("leat::scripted: the script holds 2 "
                                                         "words, and ") +
                                                 count + " were asked for");
        }
    }
}

TEST(Scripted, AnEmptyScriptIsAnEngineThatMustNotBeDrawnFrom) {
    leat::scripted g{std::vector<std::uint64_t>{}};
    EXPECT_THROW(g(), leat::stream_exhausted);
}

TEST(Scripted, CopiesGoTheirOwnWay) {
    leat::scripted g{1, 2};
    leat::scripted copy = g;
    EXPECT_EQ(copy, g);
    copy();
    EXPECT_NE(copy, g);
    EXPECT_EQ(g(), 1u);
}

TEST(Constant, NeverChanges) {
    leat::constant g{42};
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(g(), 42u);
    }
}

TEST(WordForUnit, ScriptsUnitsAndIndices) {
    for (const double u : {0x1p-60, 0.1, 0.25, 0.5, 0.7, 1 - 0x1p-53}) {
        leat::scripted g{leat::word_for_unit(u), leat::word_for_unit(u)};
        EXPECT_NEAR(leat::unit(g), u, 0x1p-53);
        EXPECT_EQ(leat::below(8, g), static_cast<int>(8 * u)) << u;
    }
    EXPECT_THROW(static_cast<void>(leat::word_for_unit(0)), leat::invalid_parameter);
    EXPECT_THROW(static_cast<void>(leat::word_for_unit(1)), leat::invalid_parameter);
}

TEST(Alternating, ReturnsTwoWordsInTurn) {
    leat::alternating g;
    EXPECT_EQ(g(), 0u);
    EXPECT_EQ(g(), ~std::uint64_t{0});
    EXPECT_EQ(g(), 0u);
    leat::alternating32 h{5, 9};
    EXPECT_EQ(h(), 5u);
    EXPECT_EQ(h(), 9u);
    EXPECT_EQ(h(), 5u);
    EXPECT_EQ(h, (leat::alternating32{9, 5}));
}

} // namespace
