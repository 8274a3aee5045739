// Numbers to and from iostreams, in hostile locales and flags. ISO C++ [rand.req.eng] asks that
// what
// << writes >> restores, with fmtflags dec and the classic locale; leat's promise is: with any.

#include "leat/core/text.hpp"

#include <gtest/gtest.h>

#include <bit>
#include <cstdint>
#include <iomanip>
#include <limits>
#include <locale>
#include <random>
#include <sstream>
#include <string>
#include <vector>

namespace {

using leat::detail::read_real;
using leat::detail::read_unsigned;
using leat::detail::write_char;
using leat::detail::write_real;
using leat::detail::write_unsigned;

/// Facets that would wreck careless number formatting.
template <class Char>
struct grouping : std::numpunct<Char> {
protected:
    Char do_thousands_sep() const override { return static_cast<Char>('.'); }
    Char do_decimal_point() const override { return static_cast<Char>(','); }
    std::string do_grouping() const override { return "\3"; }
};

template <class Char, class Stream>
void make_hostile(Stream& stream) {
    stream.imbue(std::locale{std::locale::classic(), new grouping<Char>});
    stream << std::hex << std::showbase << std::uppercase << std::setfill(static_cast<Char>('*'))
           << std::setw(30) << std::left;
}

std::vector<std::uint64_t> samples() {
    std::vector<std::uint64_t> words{0,
                                     1,
                                     9,
                                     10,
                                     999,
                                     1000,
                                     4294967295,
                                     4294967296,
                                     9999999999999999999u,
                                     10000000000000000000u,
                                     18446744073709551614u,
                                     18446744073709551615u};
    std::mt19937_64 draw{20261201};
    for (int i = 0; i < 200; ++i) {
        words.push_back(draw() >> (draw() % 64));
    }
    return words;
}

template <class Char>
void expect_words_there_and_back() {
    std::basic_stringstream<Char> stream;
    make_hostile<Char>(stream);
    std::string expected;
    for (const std::uint64_t x : samples()) {
        write_unsigned(stream, x);
        write_char(stream, ' ');
        expected += std::to_string(x) + ' ';
    }
    const std::basic_string<Char> text = stream.str();
    EXPECT_EQ(text, (std::basic_string<Char>(expected.begin(), expected.end())));
    for (const std::uint64_t x : samples()) {
        std::uint64_t read = 0;
        ASSERT_TRUE(read_unsigned(stream, std::numeric_limits<std::uint64_t>::max(), read));
        ASSERT_EQ(read, x);
    }
    EXPECT_TRUE(stream.good());
}

TEST(text, takes_words_there_and_back_in_any_locale) {
    expect_words_there_and_back<char>();
    expect_words_there_and_back<wchar_t>();
}

template <class Char>
void expect_reals_there_and_back() {
    std::basic_stringstream<Char> stream;
    make_hostile<Char>(stream);
    for (const std::uint64_t bits : samples()) { // every pattern: subnormals, infinities, NaN too
        write_real(stream, std::bit_cast<double>(bits));
        write_char(stream, ' ');
    }
    for (const std::uint64_t bits : samples()) {
        double x = 0.0;
        ASSERT_TRUE(read_real(stream, x));
        ASSERT_EQ(std::bit_cast<std::uint64_t>(x), bits);
    }
}

TEST(text, takes_reals_there_and_back_to_the_bit) {
    expect_reals_there_and_back<char>();
    expect_reals_there_and_back<wchar_t>();
    std::ostringstream os;
    write_real(os, 1.0);
    EXPECT_EQ(os.str(), "x3ff0000000000000"); // IEEE 754 binary64: biased exponent 1023, fraction 0
}

TEST(text, reads_up_to_the_end_without_failing) {
    std::istringstream is{"  \t\n\r42"};
    std::uint64_t x = 0;
    EXPECT_TRUE(read_unsigned(is, 100, x));
    EXPECT_EQ(x, 42u);
    EXPECT_FALSE(is.fail());
    EXPECT_TRUE(is.eof());
}

TEST(text, refuses_words_that_are_none_or_too_large) {
    for (const char* const text : {"", "   ", "x", "-1", "+1", ".5", "abc"}) {
        std::istringstream is{text};
        std::uint64_t x = 7;
        EXPECT_FALSE(read_unsigned(is, 1000, x)) << text;
        EXPECT_TRUE(is.fail()) << text;
        EXPECT_EQ(x, 7u) << text;
    }
    for (const std::uint64_t max :
         {std::uint64_t{0}, std::uint64_t{5}, std::uint64_t{9}, std::uint64_t{10},
          std::uint64_t{255}, std::uint64_t{4294967295}, std::uint64_t{9223372036854775807},
          std::numeric_limits<std::uint64_t>::max() - 1}) {
        std::istringstream fits{std::to_string(max)};
        std::uint64_t x = 7;
        EXPECT_TRUE(read_unsigned(fits, max, x)) << max;
        EXPECT_EQ(x, max);
        std::istringstream over{std::to_string(max + 1)};
        x = 7;
        EXPECT_FALSE(read_unsigned(over, max, x)) << max;
        EXPECT_EQ(x, 7u);
        std::istringstream longer{std::to_string(max) + "0"};
        EXPECT_EQ(read_unsigned(longer, max, x), max == 0) << max;
    }
    std::istringstream huge{"18446744073709551616"}; // 2^64
    std::uint64_t x = 7;
    EXPECT_FALSE(read_unsigned(huge, std::numeric_limits<std::uint64_t>::max(), x));
    EXPECT_EQ(x, 7u);
}

TEST(text, refuses_reals_that_are_none) {
    for (const char* const text : {"", "1.5", "3ff0000000000000", "x3ff000000000000",
                                   "x3ff000000000000g", "X3ff0000000000000"}) {
        std::istringstream is{text};
        double x = 7.0;
        EXPECT_FALSE(read_real(is, x)) << text;
        EXPECT_TRUE(is.fail()) << text;
        EXPECT_EQ(x, 7.0) << text;
    }
}

TEST(text, leaves_a_failed_stream_alone) {
    std::istringstream is{"12 13"};
    is.setstate(std::ios_base::failbit);
    std::uint64_t x = 7;
    EXPECT_FALSE(read_unsigned(is, 100, x));
    EXPECT_EQ(x, 7u);
    is.clear();
    EXPECT_TRUE(read_unsigned(is, 100, x));
    EXPECT_EQ(x, 12u);
}

} // namespace
