// unit: the mappings of words onto the unit interval (promise P3: open means open).
//
// References: the defining formula, checked by exact arithmetic on every pattern of a float, and
// with GNU MPFR for double.

#include "leat/uniform/unit.hpp"

#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <cmath>
#include <cstdint>
#include <random>
#include <type_traits>

namespace {

using leat::ends;
using leat::detail::unit_of;

constexpr std::uint64_t ones = ~std::uint64_t{0};

// The corner values that the design names.
static_assert(leat::detail::open_unit(0) == 0x1p-53);
static_assert(leat::detail::open_unit(ones) == 1 - 0x1p-53);
static_assert(unit_of<double, ends::closed_open>(0) == 0);
static_assert(unit_of<double, ends::closed_open>(ones) == 1 - 0x1p-53);
static_assert(unit_of<double, ends::open_closed>(0) == 0x1p-53);
static_assert(unit_of<double, ends::open_closed>(ones) == 1);
static_assert(unit_of<double, ends::closed>(0) == 0 && unit_of<double, ends::closed>(ones) == 1);
static_assert(unit_of<float, ends::open>(0) == 0x1p-24f);
static_assert(unit_of<float, ends::open>(ones) == 1 - 0x1p-24f);
static_assert(unit_of<float, ends::closed_open>(ones) == 1 - 0x1p-24f);
static_assert(unit_of<float, ends::open_closed>(0) == 0x1p-24f);
static_assert(unit_of<float, ends::closed>(ones) == 1);

TEST(Unit, EveryFloatIsTheFormulasValue) {
    for (std::uint32_t k = 0; k < (1u << 23); ++k) {
        // Low bits that are not part of k must not matter.
        const std::uint64_t word = std::uint64_t{k} << 41 | (k % 2 == 0 ? 0 : (1ull << 41) - 1);
        const double want = (k + 0.5) / 8388608.0; // 2^23: exact in double
        const float got = unit_of<float, ends::open>(word);
        ASSERT_EQ(double{got}, want);
        ASSERT_TRUE(got > 0 && got < 1);
        // Symmetric about 1/2.
        ASSERT_EQ(1 - got, (unit_of<float, ends::open>(~word)));
    }
    for (std::uint32_t k = 0; k < (1u << 24); ++k) {
        const std::uint64_t word = std::uint64_t{k} << 40 | (k % 2 == 0 ? 0 : (1ull << 40) - 1);
        ASSERT_EQ(double(unit_of<float, ends::closed_open>(word)), k / 16777216.0);
        ASSERT_EQ(double(unit_of<float, ends::open_closed>(word)), (k + 1.0) / 16777216.0);
        // Nearest to k / (2^24 - 1): no neighbour is nearer. The products are exact in double.
        const float got = unit_of<float, ends::closed>(word);
        const double error = std::abs(double{got} * 16777215.0 - k);
        ASSERT_LE(error, std::abs(double{std::nextafter(got, 2.0f)} * 16777215.0 - k));
        ASSERT_LE(error, std::abs(double{std::nextafter(got, -1.0f)} * 16777215.0 - k));
        ASSERT_TRUE(got >= 0 && got <= 1);
    }
}

TEST(Unit, DoublesAreTheFormulasValues) {
    mpfr_t x;
    mpfr_t d;
    mpfr_init2(x, 64);
    mpfr_init2(d, 64);
    std::mt19937_64 g(11);
    for (int i = 0; i < 200000; ++i) {
        const std::uint64_t word = i % 2 == 0 ? g() : g() >> (g() % 64);
        const std::uint64_t k52 = word >> 12;
        const std::uint64_t k53 = word >> 11;
        mpfr_set_ui(x, k52, MPFR_RNDN);
        mpfr_set_d(d, 0.5, MPFR_RNDN);
        mpfr_add(x, x, d, MPFR_RNDN);
        mpfr_div_2ui(x, x, 52, MPFR_RNDN);
        const double open = unit_of<double, ends::open>(word);
        ASSERT_EQ(mpfr_cmp_d(x, open), 0); // exactly
        ASSERT_TRUE(open > 0 && open < 1);
        mpfr_set_ui(x, k53, MPFR_RNDN);
        mpfr_div_2ui(x, x, 53, MPFR_RNDN);
        ASSERT_EQ(mpfr_cmp_d(x, unit_of<double, ends::closed_open>(word)), 0);
        mpfr_set_ui(x, k53 + 1, MPFR_RNDN);
        mpfr_div_2ui(x, x, 53, MPFR_RNDN);
        ASSERT_EQ(mpfr_cmp_d(x, unit_of<double, ends::open_closed>(word)), 0);
        mpfr_t quotient; // of 53 bits: the division is correctly rounded to a double
        mpfr_init2(quotient, 53);
        mpfr_set_ui(x, k53, MPFR_RNDN);
        mpfr_set_ui(d, (std::uint64_t{1} << 53) - 1, MPFR_RNDN);
        mpfr_div(quotient, x, d, MPFR_RNDN);
        ASSERT_EQ(mpfr_cmp_d(quotient, unit_of<double, ends::closed>(word)), 0);
        mpfr_clear(quotient);
    }
    mpfr_clear(x);
    mpfr_clear(d);
}

/// Whether a mapping stays inside (0, 1) on the words that are worst for it.
template <class Mapping>
bool stays_inside(Mapping mapping) {
    bool inside = true;
    for (int shift = 0; shift < 64; ++shift) {
        for (const std::uint64_t word : {std::uint64_t{1} << shift, ones << shift, ones >> shift,
                                         ~(std::uint64_t{1} << shift), std::uint64_t{0}}) {
            const double u = mapping(word);
            inside = inside && u > 0 && u < 1;
        }
    }
    return inside;
}

TEST(Unit, TheCheckOfOpenEndsFindsTheMappingOf53Bits) {
    EXPECT_TRUE(stays_inside([](std::uint64_t w) { return leat::detail::open_unit(w); }));
    EXPECT_TRUE(stays_inside([](std::uint64_t w) { return unit_of<float, ends::open>(w); }));
    // The planted faults: half a step more than the format has bits for rounds to 1, ...
    EXPECT_FALSE(stays_inside(
        [](std::uint64_t w) { return (static_cast<double>(w >> 11) + 0.5) * 0x1p-53; }));
    // ... 64 bits scaled do so too, and without the half there is 0.
    EXPECT_FALSE(stays_inside([](std::uint64_t w) { return static_cast<double>(w) * 0x1p-64; }));
    EXPECT_FALSE(
        stays_inside([](std::uint64_t w) { return static_cast<double>(w >> 12) * 0x1p-52; }));
    EXPECT_FALSE(stays_inside(
        [](std::uint64_t w) { return double{(static_cast<float>(w >> 40) + 0.5f) * 0x1p-24f}; }));
}

TEST(Unit, DrawsOneWordAndTheUpperBitsCount) {
    leat::scripted g{0x8000000000000000, 0x8000000000000000, ones, 0};
    EXPECT_EQ(leat::unit(g), 0.5 + 0x1p-53);
    EXPECT_EQ(leat::unit<float>(g), 0.5f + 0x1p-24f);
    EXPECT_EQ((leat::unit<double, ends::open_closed>(g)), 1.0);
    EXPECT_EQ((leat::unit<float, ends::closed_open>(g)), 0.0f);
    EXPECT_EQ(g.asked(), 4u);

    // A 32-bit engine: two words a double, low first, one a float.
    leat::scripted32 h{0, 0x80000000, 0x80000000};
    EXPECT_EQ(leat::unit(h), 0.5 + 0x1p-53);
    EXPECT_EQ(leat::unit<float>(h), 0.5f + 0x1p-24f);
    EXPECT_EQ(h.asked(), 3u);
    static_assert(std::is_same_v<decltype(leat::unit(h)), double>);
    static_assert(std::is_same_v<decltype(leat::unit<float>(h)), float>);
}

} // namespace
