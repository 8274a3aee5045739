// Products of words: the portable path against the compiler's and against Boost.Multiprecision.

#include "leat/core/wide_multiply.hpp"

#include <boost/multiprecision/cpp_int.hpp>
#include <gtest/gtest.h>

#include <cstdint>
#include <random>
#include <vector>

namespace {

using boost::multiprecision::cpp_int;
using leat::detail::word_pair;

cpp_int value(word_pair p) { return (cpp_int{p.high} << 64) | p.low; }

/// Words at the edges of 32-bit halves, and random ones.
std::vector<std::uint64_t> operands() {
    std::vector<std::uint64_t> words{0,
                                     1,
                                     2,
                                     0xFFFFFFFFu,
                                     0x100000000u,
                                     0x100000001u,
                                     0x7FFFFFFFFFFFFFFFu,
                                     0x8000000000000000u,
                                     0xFFFFFFFF00000000u,
                                     0xFFFFFFFFFFFFFFFEu,
                                     0xFFFFFFFFFFFFFFFFu};
    std::mt19937_64 draw{20261201};
    for (int i = 0; i < 60; ++i) {
        words.push_back(draw() >> (i % 3 == 0 ? draw() % 64 : 0));
    }
    return words;
}

TEST(wide_multiply, is_exact_by_both_paths) {
    for (const std::uint64_t a : operands()) {
        for (const std::uint64_t b : operands()) {
            const cpp_int exact = cpp_int{a} * b;
            ASSERT_EQ(value(leat::detail::multiply_wide(a, b)), exact) << a << ' ' << b;
            ASSERT_EQ(value(leat::detail::multiply_wide_portable(a, b)), exact) << a << ' ' << b;
        }
    }
}

TEST(wide_multiply, adds_two_words_without_overflow) {
    constexpr std::uint64_t most = 0xFFFFFFFFFFFFFFFFu;
    for (const std::uint64_t a : operands()) {
        for (const std::uint64_t c : operands()) {
            ASSERT_EQ(value(leat::detail::multiply_add_wide(a, c, a, c)), cpp_int{a} * c + a + c);
            ASSERT_EQ(value(leat::detail::multiply_add_wide(a, most, most, c)),
                      cpp_int{a} * most + most + c);
        }
    }
    EXPECT_EQ(leat::detail::multiply_add_wide(most, most, most, most), (word_pair{most, most}));
}

TEST(wide_multiply, works_modulo_2_to_the_128) {
    const cpp_int modulus = cpp_int{1} << 128;
    std::mt19937_64 draw{20261202};
    const std::vector<std::uint64_t> words = operands();
    for (int i = 0; i < 5000; ++i) {
        const word_pair a{words[draw() % words.size()], words[draw() % words.size()]};
        const word_pair b{words[draw() % words.size()], words[draw() % words.size()]};
        ASSERT_EQ(value(leat::detail::add(a, b)), (value(a) + value(b)) % modulus);
        ASSERT_EQ(value(leat::detail::multiply(a, b)), value(a) * value(b) % modulus);
    }
}

static_assert(leat::detail::multiply_wide(0xFFFFFFFFFFFFFFFFu, 0xFFFFFFFFFFFFFFFFu) ==
              word_pair{1, 0xFFFFFFFFFFFFFFFEu}); // (2^64 - 1)^2 = 2^128 - 2^65 + 1
static_assert(leat::detail::multiply_wide_portable(0xFFFFFFFFFFFFFFFFu, 0xFFFFFFFFFFFFFFFFu) ==
              word_pair{1, 0xFFFFFFFFFFFFFFFEu});

} // namespace
