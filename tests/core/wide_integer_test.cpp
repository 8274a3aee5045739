// Wide integers against Boost.Multiprecision, on random operands of all sizes and on edges.

#include "leat/core/errors.hpp"
#include "leat/core/wide_integer.hpp"

#include <boost/multiprecision/cpp_int.hpp>
#include <gtest/gtest.h>

#include <array>
#include <compare>
#include <cstdint>
#include <limits>
#include <random>
#include <string>
#include <string_view>
#include <vector>

namespace {

using boost::multiprecision::cpp_int;
using leat::wide_integer;

cpp_int outside(const wide_integer& x) {
    cpp_int value = 0;
    for (int i = wide_integer::digit_count / 2; i-- > 0;) {
        value = (value << 64) | x.word(i);
    }
    return value;
}

/// Operands of every size; many with long runs of ones or zeros, where carries and the corrections
/// of a long division (TAOCP vol. 2, 4.3.1, Algorithm D, steps D3 and D6) sit.
class operands {
public:
    wide_integer of_bits(unsigned bits) {
        wide_integer x;
        for (unsigned at = 0; at < bits; at += 32) {
            const std::uint32_t word = static_cast<std::uint32_t>(words_());
            const unsigned shape = static_cast<unsigned>(words_() % 4);
            const std::uint32_t digit = shape == 0   ? 0u
                                        : shape == 1 ? 0xFFFFFFFFu
                                        : shape == 2 ? 0x80000000u
                                                     : word;
            x = (x << 32) + digit;
        }
        return bits == 0 ? wide_integer{} : x >> ((32 - bits % 32) % 32);
    }
    unsigned below(unsigned n) { return static_cast<unsigned>(words_() % n); }

private:
    std::mt19937_64 words_{20261201};
};

TEST(wide_integer, adds_subtracts_and_compares_as_boost) {
    operands draw;
    for (int i = 0; i < 4000; ++i) {
        const wide_integer a = draw.of_bits(draw.below(1024));
        const wide_integer b = draw.of_bits(draw.below(1024));
        ASSERT_EQ(outside(a + b), outside(a) + outside(b));
        ASSERT_EQ(a < b, outside(a) < outside(b));
        ASSERT_EQ(a == b, outside(a) == outside(b));
        ASSERT_EQ((a <=> a), std::strong_ordering::equal);
        const wide_integer& larger = a < b ? b : a;
        const wide_integer& smaller = a < b ? a : b;
        ASSERT_EQ(outside(larger - smaller), outside(larger) - outside(smaller));
    }
}

TEST(wide_integer, multiplies_as_boost) {
    operands draw;
    for (int i = 0; i < 4000; ++i) {
        const unsigned bits = draw.below(1025);
        const wide_integer a = draw.of_bits(bits);
        const wide_integer b = draw.of_bits(draw.below(1024 - bits + 1));
        ASSERT_EQ(outside(a * b), outside(a) * outside(b));
    }
}

TEST(wide_integer, divides_as_boost) {
    operands draw;
    int compared = 0;
    for (int i = 0; i < 20000; ++i) {
        const wide_integer a = draw.of_bits(draw.below(1025));
        const wide_integer b = draw.of_bits(1 + draw.below(1024));
        if (b == 0) {
            continue;
        }
        ++compared;
        ASSERT_EQ(outside(a / b), outside(a) / outside(b));
        ASSERT_EQ(outside(a % b), outside(a) % outside(b));
    }
    EXPECT_GT(compared, 10000);
}

// The operands that need step D6, "add back", which random ones meet about once in 2^31: for base
// b = 2^32, from TAOCP vol. 2, 4.3.1, exercise 22 (from memory; checked against Boost here).
TEST(wide_integer, divides_where_the_estimate_is_one_too_large) {
    const wide_integer dividend{std::array<std::uint64_t, 2>{3, 0x7FFFFFFF80000000u}};
    const wide_integer divisor{std::array<std::uint64_t, 2>{1, 0x20000000u}};
    EXPECT_EQ(outside(dividend / divisor), outside(dividend) / outside(divisor));
    EXPECT_EQ(outside(dividend % divisor), outside(dividend) % outside(divisor));
    const wide_integer wide{std::array<std::uint64_t, 2>{0, 0x7FFFFFFF80000000u}};
    const wide_integer narrow{std::array<std::uint64_t, 2>{1, 0x80000000u}};
    EXPECT_EQ(outside(wide / narrow), outside(wide) / outside(narrow));
    EXPECT_EQ(outside(wide % narrow), outside(wide) % outside(narrow));
}

TEST(wide_integer, shifts_as_boost) {
    operands draw;
    for (int i = 0; i < 4000; ++i) {
        const unsigned bits = draw.below(1025);
        const wide_integer a = draw.of_bits(bits);
        const unsigned left = draw.below(1024 - bits + 1);
        const unsigned right = draw.below(1100);
        ASSERT_EQ(outside(a << left), outside(a) << left) << left;
        ASSERT_EQ(outside(a >> right), outside(a) >> right) << right;
    }
    EXPECT_EQ(wide_integer{} << 5000, wide_integer{});
    EXPECT_EQ(wide_integer{1} << 1023 >> 1023, wide_integer{1});
}

TEST(wide_integer, tells_bits_and_words_as_boost) {
    operands draw;
    for (int i = 0; i < 1000; ++i) {
        const wide_integer a = draw.of_bits(draw.below(1025));
        const cpp_int b = outside(a);
        ASSERT_EQ(a.bit_width(), b == 0 ? 0 : static_cast<int>(msb(b)) + 1);
        ASSERT_EQ(a.fits_word(), b <= std::numeric_limits<std::uint64_t>::max());
        const int k = static_cast<int>(draw.below(1100));
        ASSERT_EQ(a.bit(k), bit_test(b, static_cast<unsigned>(k))) << k;
    }
    EXPECT_EQ(wide_integer{7}.word(16), 0u);
    EXPECT_EQ(wide_integer{7}.word(1), 0u);
    EXPECT_EQ(static_cast<std::uint64_t>(wide_integer{~0ull}), ~0ull);
}

TEST(wide_integer, reads_decimal_text_as_boost) {
    operands draw;
    for (int i = 0; i < 500; ++i) {
        const wide_integer a = draw.of_bits(draw.below(1025));
        ASSERT_EQ(wide_integer{std::string_view{outside(a).str()}}, a);
    }
    EXPECT_EQ(wide_integer{std::string_view{"0000000000000000000000000000000042"}},
              wide_integer{42});
}

template <class Error, class Call>
std::string message_of(Call call) {
    try {
        call();
    } catch (const Error& error) {
        return error.what();
    }
    return "nothing thrown";
}

TEST(wide_integer, refuses_what_does_not_fit) {
    const wide_integer top = wide_integer::power_of_two(1023);
    const wide_integer all = (top - 1) + top;
    const std::string overflow = "leat::wide_integer: a result would not fit in 1024 bits";
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(all + 1); }), overflow);
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(top * 2); }), overflow);
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(all * all); }), overflow);
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(top << 1); }), overflow);
    EXPECT_EQ(
        message_of<leat::invalid_parameter>([&] { static_cast<void>(wide_integer{1} << 1024); }),
        overflow);
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(top - all); }),
              "leat::wide_integer: a difference would be negative");
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(top / wide_integer{}); }),
              "leat::wide_integer: division by zero");
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(top % wide_integer{}); }),
              "leat::wide_integer: division by zero");
    EXPECT_EQ(message_of<leat::invalid_parameter>([&] { static_cast<void>(wide_integer{} % 0); }),
              "leat::wide_integer: division by zero");
    EXPECT_EQ(message_of<leat::invalid_parameter>([] { static_cast<void>(wide_integer{-1}); }),
              "leat::wide_integer: value = -1, must not be negative");
    EXPECT_EQ(message_of<leat::invalid_parameter>(
                  [&] { static_cast<void>(static_cast<std::uint64_t>(top)); }),
              "leat::wide_integer: the value does not fit in 64 bits");
}

TEST(wide_integer, refuses_text_that_is_no_number) {
    for (const char* const text : {"", " 1", "1 ", "-1", "+1", "0x10", "1e3", "12a", "1,000"}) {
        const std::string message = message_of<leat::malformed_text>(
            [&] { static_cast<void>(wide_integer{std::string_view{text}}); });
        EXPECT_EQ(
            message.rfind("leat::wide_integer: text = \"" + std::string(text) + "\", must be", 0),
            0u)
            << message;
    }
    const cpp_int limit = cpp_int{1} << 1024;
    EXPECT_EQ(outside(wide_integer{std::string_view{cpp_int{limit - 1}.str()}}), limit - 1);
    EXPECT_NE(message_of<leat::malformed_text>(
                  [&] { static_cast<void>(wide_integer{std::string_view{limit.str()}}); }),
              "nothing thrown");
}

// One function at compile time and at run time.
constexpr wide_integer calculation() {
    const wide_integer a{
        std::string_view{"123456789012345678901234567890123456789012345678901234567890"}};
    const wide_integer b = (a * a + 17) / (a >> 3);
    return (b << 64) % (a - 5);
}

TEST(wide_integer, works_in_constant_evaluation) {
    static constexpr wide_integer at_compile_time = calculation();
    EXPECT_EQ(at_compile_time, calculation());
    const cpp_int a{"123456789012345678901234567890123456789012345678901234567890"};
    const cpp_int b = (a * a + 17) / (a >> 3);
    EXPECT_EQ(outside(at_compile_time), (b << 64) % (a - 5));
    static_assert(leat::pow2(128).exponent == 128);
}

} // namespace
