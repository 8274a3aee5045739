// compat::rand() in one thread: what each function draws, that old code can call it unchanged, and
// that it is unbiased where the habits are not. Several threads: tests/threads/rand_test.cpp.
//
// What is drawn is checked against leat::stream and the samplers, which have tests of their own;
// the range checks of rand_max are ISO C's (ISO/IEC 9899:2018, 7.22.2).

#include "leat/compat/rand.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"
#include "support/statistics.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <cstdlib>
#include <limits>
#include <string>
#include <type_traits>

namespace {

namespace compat = leat::compat;

/// The stream of the thread without a number, which all tests here are.
leat::stream stream_of(const leat::source& study) { return study.stream("compat.rand"); }

// "in the range 0 to RAND_MAX", an int, RAND_MAX at least 32767.
TEST(CompatRand, GivesIntegersAsCDoes) {
    static_assert(std::is_same_v<decltype(compat::rand()), int>);
    static_assert(compat::rand_max >= 32767 && compat::rand_max <= std::numeric_limits<int>::max());
    compat::srand(3);
    int all_ones = compat::rand_max;
    int any_one = 0;
    for (int i = 0; i < 1000; ++i) {
        const int x = compat::rand();
        ASSERT_GE(x, 0);
        ASSERT_LE(x, compat::rand_max);
        all_ones &= x;
        any_one |= x;
    }
    EXPECT_EQ(all_ones, 0); // each of the 31 bits is 0 at times, and 1: a chance of 2^-994 to fail
    EXPECT_EQ(any_one, compat::rand_max);
}

// The expressions of old code compile unchanged, without a warning, and mean what they meant.
TEST(CompatRand, FitsTheExpressionsOfOldCode) {
    using compat::rand;
    using compat::srand;
    srand(12345u);
    for (int i = 0; i < 1000; ++i) {
        const double half_open = rand() / (compat::rand_max + 1.0);
        ASSERT_GE(half_open, 0);
        ASSERT_LT(half_open, 1);
        const int face = 1 + rand() % 6;
        ASSERT_GE(face, 1);
        ASSERT_LE(face, 6);
        ASSERT_LE(rand() / static_cast<double>(compat::rand_max), 1);
    }
}

// Frozen: which words, and what is made of them.
TEST(CompatRand, DrawsFromTheStreamItNames) {
    compat::srand(20261201);
    leat::stream s = stream_of(leat::source{20261201});
    const leat::uniform real{-2.0, 5.0};
    const leat::uniform_integer range{-3, 3};
    const leat::bernoulli event{0.3};
    for (int i = 0; i < 100; ++i) {
        ASSERT_EQ(compat::rand(), static_cast<int>(s() >> 33));
        ASSERT_EQ(compat::rand_unit(), leat::unit(s));
        ASSERT_EQ(compat::rand_real(-2, 5), real(s));
        ASSERT_EQ(compat::rand_below(std::uint64_t{1} << 40),
                  leat::below(std::uint64_t{1} << 40, s));
        ASSERT_EQ(compat::rand_between(-3, 3), range(s));
        ASSERT_EQ(compat::rand_chance(0.3), event(s));
        ASSERT_EQ(compat::rand_stream()(), s());
    }
}

// Our golden values, as tests/golden: they change only with the major version.
TEST(CompatRand, IsFrozen) {
    compat::srand(42);
    EXPECT_EQ(compat::rand(), 1801351451);
    EXPECT_EQ(compat::rand(), 928493248);
    EXPECT_EQ(compat::rand(), 1873962710);
}

TEST(CompatRand, SeedsAnew) {
    compat::srand(7);
    const std::array first{compat::rand(), compat::rand(), compat::rand()};
    compat::srand(8);
    EXPECT_NE(compat::rand(), first[0]);
    compat::srand(7);
    for (const int x : first) {
        EXPECT_EQ(compat::rand(), x);
    }
    // One seed whatever its type; a text; a part of a study.
    compat::srand(7ull);
    EXPECT_EQ(compat::rand(), first[0]);
    compat::srand(leat::source{7});
    EXPECT_EQ(compat::rand(), first[0]);
    compat::srand("7");
    EXPECT_NE(compat::rand(), first[0]);
    compat::srand(leat::source{7}.branch("old part", 2));
    EXPECT_EQ(compat::rand_stream().address().key,
              stream_of(leat::source{7}.branch("old part", 2)).address().key);
    compat::srand(-7); // a negative seed is another one, not a large one
    EXPECT_NE(compat::rand(), first[0]);
}

// "If rand is called before any calls to srand have been made, the same sequence shall be generated
// as when srand is first called with a seed value of 1." In a process of its own.
TEST(CompatRandDeathTest, UnseededIsSeededByOne) {
    GTEST_FLAG_SET(death_test_style, "threadsafe"); // runs this test alone, in a new process
    EXPECT_EXIT(
        {
            const int first = compat::rand();
            const int second = compat::rand();
            compat::srand(1);
            const bool same = compat::rand() == first && compat::rand() == second;
            std::_Exit(same ? 0 : 1);
        },
        testing::ExitedWithCode(0), "");
}

template <class Call>
std::string refusal_of(Call call) {
    try {
        call();
    } catch (const leat::invalid_parameter& refusal) {
        return refusal.what();
    }
    return "not refused";
}

TEST(CompatRand, RefusesAndDrawsNothing) {
    compat::srand(5);
    EXPECT_EQ(refusal_of([] { compat::rand_below(0); }), "leat::below: n = 0, must be at least 1");
    EXPECT_EQ(refusal_of([] { compat::rand_between(2, 1); }),
              "leat::uniform_integer: hi = 1, must not be below lo");
    EXPECT_EQ(refusal_of([] { compat::rand_real(1, 1); }), "leat::uniform: b = 1, must be above a");
    EXPECT_NE(refusal_of([] { compat::rand_chance(1.5); }).find("p = 1.5, must"),
              std::string::npos);
    EXPECT_EQ(refusal_of([] { compat::rand_thread(-1); }),
              "leat::compat::rand_thread: i = -1, must not be negative");
    EXPECT_EQ(compat::rand_stream().position(), 0u);
}

/// Values 0 .. 3 x 2^29 - 1 counted by thirds: the range for which % is at its worst, as some
/// values have two of the 2^31 words and others one.
template <class Draw>
leat_test::outcome thirds(const char* what, Draw draw) {
    std::array<std::uint64_t, 3> counts{};
    for (int i = 0; i < 30000; ++i) {
        ++counts[static_cast<std::size_t>(draw() / (1 << 29))];
    }
    return leat_test::chi_square_test(what, counts);
}

TEST(CompatRand, IsUnbiasedWhereTheRemainderIsNot) {
    compat::srand(leat_test::source_of_this_test());
    constexpr int n = 3 * (1 << 29);
    leat_test::check(thirds("rand_below", [] { return compat::rand_below(n); }));
    leat_test::check(thirds("rand_between", [] { return compat::rand_between(10, n + 9) - 10; }));
    EXPECT_TRUE(leat_test::is_rejected({thirds("remainder", [] { return compat::rand() % n; })}));
}

} // namespace
