// uniform_integer and below: exactly unbiased, by range and not by type.
//
// References: complete enumeration of words (an outcome is unbiased when equally many words give
// it); ISO C++ [rand.req.dist]; exact moments (n^2 - 1) / 12 of the discrete uniform law.

#include "leat/uniform/uniform_integer.hpp"

#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <limits>
#include <locale>
#include <random>
#include <sstream>
#include <string>
#include <type_traits>
#include <vector>

namespace {

struct rejected {};

/// What one word gives: an outcome below n, or a rejection.
template <class Word>
int outcome(Word word, Word n) {
    bool first = true;
    const auto once = [&] {
        if (!first) {
            throw rejected{};
        }
        first = false;
        return word;
    };
    try {
        return leat::detail::multiply_shift<Word>(n, once, "test");
    } catch (const rejected&) {
        return -1;
    }
}

/// Goes through every word: each outcome must have equally many, and less than half be rejected.
template <class Word>
void enumerate(unsigned n) {
    constexpr unsigned words = 1u << std::numeric_limits<Word>::digits;
    std::vector<unsigned> count(n, 0);
    unsigned refused = 0;
    for (unsigned w = 0; w < words; ++w) {
        const int i = outcome<Word>(static_cast<Word>(w), static_cast<Word>(n));
        if (i < 0) {
            ++refused;
        } else {
            ASSERT_LT(static_cast<unsigned>(i), n);
            ++count[static_cast<unsigned>(i)];
        }
    }
    for (const unsigned c : count) {
        ASSERT_EQ(c, words / n) << "n = " << n;
    }
    ASSERT_EQ(refused, words % n);
    ASSERT_LT(2 * refused, words);
}

TEST(UniformInteger, EveryWordOf8BitsEveryRange) {
    for (unsigned n = 1; n <= 255; ++n) {
        enumerate<std::uint8_t>(n);
    }
}

TEST(UniformInteger, EveryWordOf16BitsManyRanges) {
    for (const unsigned n :
         {1u,   2u,    3u,     5u,     6u,     7u,     10u,    52u,    100u,   255u,  256u,
          257u, 1000u, 21845u, 21846u, 32767u, 32768u, 32769u, 43691u, 65534u, 65535u}) {
        enumerate<std::uint16_t>(n);
    }
}

TEST(UniformInteger, TheEnumerationFindsABiasedMethod) {
    // The planted fault: multiply and shift without rejection; and a remainder.
    std::vector<unsigned> scaled(6, 0);
    std::vector<unsigned> remainder(6, 0);
    for (unsigned w = 0; w < 256; ++w) {
        ++scaled[w * 6 / 256];
        ++remainder[w % 6];
    }
    EXPECT_NE(scaled, std::vector<unsigned>(6, 256 / 6));
    EXPECT_NE(remainder, std::vector<unsigned>(6, 256 / 6));
}

TEST(UniformInteger, WordsOf32And64BitsAtTheEdgeOfRejection) {
    // By the method word w gives floor(w n / 2^W), but is rejected if w n mod 2^W < 2^W mod n.
    // For n = 6 and W = 32 (2^32 mod 6 = 4): 0x2AAAAAAB n = 2^32 + 2 is rejected,
    // 0x2AAAAAAA n = 2^32 - 4 gives 0; 0x80000000 n = 3 2^32 + 0 is rejected,
    // 0x80000001 n = 3 2^32 + 6 gives 3.
    leat::scripted g{0x2AAAAAABull << 32, 0x2AAAAAAAull << 32, 0x80000000ull << 32,
                     0x80000001ull << 32};
    const leat::uniform_integer die{1, 6};
    EXPECT_EQ(die(g), 1 + 0);
    EXPECT_EQ(g.asked(), 2u);
    EXPECT_EQ(die(g), 1 + 3);
    EXPECT_EQ(g.asked(), 4u);
    // For n = 6 2^40 and W = 64 (2^64 mod n = 4 2^40): 0x2AAAAB n = 2^64 + 2 2^40 is
    // rejected; 0x2AAAAC n = 2^64 + 8 2^40 gives 1.
    leat::scripted h{0x2AAAAB, 0x2AAAAC, 0x2AAAAA};
    EXPECT_EQ(leat::below(std::uint64_t{6} << 40, h), 1u);
    EXPECT_EQ(h.asked(), 2u);
    EXPECT_EQ(leat::below(std::uint64_t{6} << 40, h), 0u);
}

TEST(UniformInteger, RangesUpTo32BitsTakeAWord32AndWiderOnesAWord64) {
    leat::scripted32 g{5, 6, 7, 8, 9};
    const leat::uniform_integer<std::uint64_t> all32{10, 10 + 0xFFFFFFFFull};
    EXPECT_EQ(all32(g), 15u);
    EXPECT_EQ(g.asked(), 1u);
    const leat::uniform_integer<std::uint64_t> all64{0, std::numeric_limits<std::uint64_t>::max()};
    EXPECT_EQ(all64(g), 0x0000000700000006u);
    EXPECT_EQ(g.asked(), 3u);
    const leat::uniform_integer<std::uint64_t> wide{0, 0x1FFFFFFFFull};
    EXPECT_EQ(wide(g), 9ull * 0x200000000u >> 32); // the word 0x0000000900000008
    EXPECT_EQ(g.asked(), 5u);
}

template <class A, class B>
void same_draws(int lo, int hi) {
    std::mt19937_64 g(3);
    std::mt19937_64 h(3);
    const leat::uniform_integer<A> a(static_cast<A>(lo), static_cast<A>(hi));
    const leat::uniform_integer<B> b(static_cast<B>(lo), static_cast<B>(hi));
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(static_cast<long long>(a(g)), static_cast<long long>(b(h)));
    }
    EXPECT_EQ(g, h);
}

TEST(UniformInteger, TheTypeDoesNotMatter) {
    same_draws<std::int8_t, std::int64_t>(-100, 100);
    same_draws<std::uint8_t, int>(0, 255);
    same_draws<short, unsigned long long>(1, 30000);
    same_draws<long, std::uint32_t>(0, 2147483647);
}

TEST(UniformInteger, FullRangesOfEveryType) {
    const auto check = [](auto smallest) {
        using type = decltype(smallest);
        const leat::uniform_integer<type> all(std::numeric_limits<type>::min(),
                                              std::numeric_limits<type>::max());
        leat::constant low{0};
        leat::constant high{~std::uint64_t{0}};
        // Full ranges of less than 32 bits divide 2^32, so that no word is rejected.
        EXPECT_EQ(all(low), std::numeric_limits<type>::min());
        EXPECT_EQ(all(high), std::numeric_limits<type>::max());
        const leat::uniform_integer<type> one(5, 5);
        EXPECT_EQ(one(high), 5);
    };
    check(static_cast<signed char>(0));
    check(static_cast<unsigned char>(0));
    check(static_cast<short>(0));
    check(static_cast<unsigned short>(0));
    check(0);
    check(0u);
    check(0l);
    check(0ul);
    check(0ll);
    check(0ull);
}

TEST(UniformInteger, BelowHasTheTypeOfItsArgument) {
    std::mt19937 g;
    static_assert(std::is_same_v<decltype(leat::below(6, g)), int>);
    static_assert(std::is_same_v<decltype(leat::below(std::uint8_t{6}, g)), std::uint8_t>);
    std::vector<int> seen(6, 0);
    for (int i = 0; i < 600; ++i) {
        ++seen.at(static_cast<std::size_t>(leat::below(6, g)));
    }
    for (const int s : seen) {
        EXPECT_GT(s, 0);
    }
    EXPECT_EQ(leat::below(1, g), 0);
}

// ISO C++ [rand.req.dist].
using law = leat::uniform_integer<int>;
static_assert(std::is_same_v<law::result_type, int>);
static_assert(std::is_same_v<law::param_type::distribution_type, law>);
static_assert(std::is_same_v<decltype(leat::uniform_integer{1, 6}), law>);
static_assert(
    std::is_same_v<decltype(leat::uniform_integer{1u, 6u}), leat::uniform_integer<unsigned>>);
static_assert(
    std::is_same_v<decltype(leat::uniform_integer{law::param_type{.lo = 1, .hi = 6}}), law>);
static_assert(law{}.lo() == 0 && law{}.hi() == std::numeric_limits<int>::max());
static_assert(law{2, 9}.min() == 2 && law{2, 9}.max() == 9 &&
              law{2, 9}.param() == law::param_type{2, 9});
static_assert(law{1, 6} == law{1, 6} && law{1, 6} != law{1, 7});
static_assert(law{1, 6}.mean() == 3.5 && law{-7, 7}.mean() == 0 && law{-2, -1}.mean() == -1.5);
static_assert(law{1, 6}.variance() == 35.0 / 12 && law{4, 4}.variance() == 0);
static_assert(leat::uniform_integer<std::int64_t>{std::numeric_limits<std::int64_t>::min(),
                                                  std::numeric_limits<std::int64_t>::max()}
                  .mean() == -0.5);

constexpr int drawn_at_compile_time() {
    leat::constant g{0x123456789ABCDEF0};
    const law die{1, 6};
    return die(g);
}
static_assert(drawn_at_compile_time() == 1 + 0x12345678 / (0xFFFFFFFF / 6 + 1));

TEST(UniformInteger, AParameterSetDrawsLikeItsOwnLaw) {
    std::mt19937_64 g(1);
    std::mt19937_64 h(1);
    law changing;
    const law fixed{-3, 11};
    for (int i = 0; i < 100; ++i) {
        ASSERT_EQ(changing(g, fixed.param()), fixed(h));
    }
    EXPECT_EQ(changing, law{});
    changing.param(fixed.param());
    EXPECT_EQ(changing, fixed);
    changing.reset();
    EXPECT_EQ(changing, fixed);
}

template <class Action>
std::string refusal(Action action) {
    try {
        action();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "accepted";
}

TEST(UniformInteger, RefusesEmptyRanges) {
    EXPECT_EQ(refusal([] { (void)law(6, 1); }),
              "leat::uniform_integer: hi = 1, must not be below lo");
    EXPECT_EQ(
        refusal([] { (void)leat::uniform_integer<std::uint64_t>(~0ull, 18446744073709551614u); }),
        "leat::uniform_integer: hi = 18446744073709551614, must not be below lo");
    law die{1, 6};
    EXPECT_EQ(refusal([&] {
                  die.param({3, 2});
              }),
              "leat::uniform_integer: hi = 2, must not be below lo");
    EXPECT_EQ(die, (law{1, 6}));
    leat::constant g{1};
    EXPECT_EQ(refusal([&] { (void)leat::below(0u, g); }), "leat::below: n = 0, must be at least 1");
    EXPECT_EQ(refusal([&] { (void)leat::below(-4, g); }),
              "leat::below: n = -4, must be at least 1");
}

TEST(UniformInteger, AConstantEngineIsStuckNotHung) {
    leat::all_zeros g; // 0 is the first word to be rejected
    const law die{1, 6};
    try {
        (void)die(g);
        FAIL() << "not stuck";
    } catch (const leat::engine_stuck& e) {
        EXPECT_EQ(std::string(e.what()).rfind("leat::uniform_integer: ", 0), 0u);
    }
    EXPECT_THROW((void)leat::below(6, g), leat::engine_stuck);
    EXPECT_THROW((void)leat::below((std::uint64_t{1} << 63) + 1, g), leat::engine_stuck);
    leat::all_ones h;
    EXPECT_EQ(die(h), 6);
    EXPECT_EQ(leat::below(std::uint64_t{10000000000}, h), 9999999999u);
}

/// A locale that groups digits, as many do.
struct grouping : std::numpunct<char> {
    char do_thousands_sep() const override { return '.'; }
    std::string do_grouping() const override { return "\3"; }
};

TEST(UniformInteger, TextReturnsTheSameLawInAnyLocale) {
    std::stringstream text;
    text.imbue(std::locale(text.getloc(), new grouping));
    text << std::hex << std::showpos;
    using wide = leat::uniform_integer<std::int64_t>;
    const wide all(std::numeric_limits<std::int64_t>::min(),
                   std::numeric_limits<std::int64_t>::max());
    text << all;
    EXPECT_EQ(text.str(), "-9223372036854775808 9223372036854775807");
    wide back;
    text >> back;
    EXPECT_TRUE(static_cast<bool>(text));
    EXPECT_EQ(back, all);

    std::wstringstream wtext;
    wtext << law{-3, 4};
    law wback;
    wtext >> wback;
    EXPECT_EQ(wback, (law{-3, 4}));
}

TEST(UniformInteger, GarbageSetsFailbitAndChangesNothing) {
    for (const char* const bad : {"", "x", "1", "1 x", "5 4", "- 3 4", "--3 4", "1 2147483648",
                                  "-2147483649 1", "1e3 5", "1.5 2"}) {
        std::istringstream text(bad);
        law die{1, 6};
        text >> die;
        EXPECT_TRUE(text.fail()) << bad;
        EXPECT_EQ(die, (law{1, 6})) << bad;
    }
    std::istringstream negative("-1 4");
    leat::uniform_integer<unsigned> plain{1, 6};
    negative >> plain;
    EXPECT_TRUE(negative.fail());
    EXPECT_EQ(plain.lo(), 1u);
}

} // namespace
