// Checks uniform against a + (b - a) u in exact arithmetic, over adversarial intervals and words.
//
// The reference is GNU MPFR at 2400 bits, where a + (b - a) u is exact for any doubles a, b and u;
// its conversion to double or float is correctly rounded, subnormal numbers included (MPFR manual,
// mpfr_get_d). The words have few bits set or unset, so that ties abound.

#ifndef LEAT_TESTS_UNIFORM_EXACT_POINT_HPP
#define LEAT_TESTS_UNIFORM_EXACT_POINT_HPP

#include "leat/testing/engines.hpp"
#include "leat/uniform/open_interval.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <random>
#include <type_traits>
#include <utility>

namespace exact_point {

using leat::ends;

class reference {
public:
    reference() {
        for (auto* x : {a_, b_, u_}) {
            mpfr_init2(x, 2400);
        }
    }
    reference(const reference&) = delete;
    ~reference() {
        for (auto* x : {a_, b_, u_}) {
            mpfr_clear(x);
        }
    }
    template <class Real>
    Real point(Real a, Real b, Real u) {
        mpfr_set_d(a_, double{a}, MPFR_RNDN);
        mpfr_set_d(b_, double{b}, MPFR_RNDN);
        mpfr_set_d(u_, double{u}, MPFR_RNDN);
        int inexact = mpfr_sub(b_, b_, a_, MPFR_RNDN);
        inexact |= mpfr_mul(b_, b_, u_, MPFR_RNDN);
        inexact |= mpfr_add(b_, b_, a_, MPFR_RNDN);
        EXPECT_EQ(inexact, 0) << "the reference must be exact";
        if constexpr (std::is_same_v<Real, float>) {
            return mpfr_get_flt(b_, MPFR_RNDN);
        } else {
            return mpfr_get_d(b_, MPFR_RNDN);
        }
    }

private:
    mpfr_t a_, b_, u_;
};

constexpr bool lower_in(ends e) { return e == ends::closed_open || e == ends::closed; }
constexpr bool upper_in(ends e) { return e == ends::open_closed || e == ends::closed; }

template <class Real, ends Ends>
bool has_room(Real a, Real b) {
    const double least = std::is_same_v<Real, float> ? 0x1p-100 : 0x1p-960;
    return a < b && (double{b} / 2 - double{a} / 2 >= least / 2) &&
           (Ends != ends::open || std::nextafter(a, b) != b);
}

/// Words with long runs of equal bits, then some with none.
inline std::uint64_t adversarial_word(std::mt19937_64& g) {
    const std::uint64_t r = g();
    const auto i = static_cast<unsigned>(r & 63);
    const auto j = static_cast<unsigned>((r >> 6) & 63);
    switch ((r >> 12) % 6) {
    case 0:
        return std::uint64_t{1} << i;
    case 1:
        return (std::uint64_t{1} << i) | (std::uint64_t{1} << j);
    case 2:
        return ~((std::uint64_t{1} << i) | (std::uint64_t{1} << j));
    case 3:
        return (~std::uint64_t{0} << i) ^ (std::uint64_t{1} << j);
    case 4:
        return g() >> i;
    default:
        return g();
    }
}

/// Any finite real: short or long mantissas, the exponent near `centre` or anywhere.
template <class Real>
Real adversarial_real(std::mt19937_64& g, int centre) {
    const std::uint64_t r = g();
    const int digits = std::numeric_limits<Real>::digits;
    const auto length = 1 + static_cast<int>((r >> 8) % static_cast<unsigned>(digits));
    auto mantissa = static_cast<Real>(adversarial_word(g) >> (64 - length));
    int exponent = centre + static_cast<int>((r >> 16) % 9) - 4 - length;
    if ((r & 7) == 0) {
        const int low = std::numeric_limits<Real>::min_exponent - digits - 2;
        const int high = std::numeric_limits<Real>::max_exponent;
        exponent = low + static_cast<int>((r >> 20) % static_cast<unsigned>(high - low));
    }
    mantissa = std::ldexp(mantissa, exponent);
    if (!std::isfinite(mantissa)) {
        mantissa = std::numeric_limits<Real>::max();
    }
    return (r & 128) != 0 ? -mantissa : mantissa;
}

template <class Real, ends Ends>
void check_point(reference& exact, Real a, Real b, std::uint64_t word) {
    const leat::uniform<Real, Ends> law(a, b);
    leat::constant g{word};
    const Real got = law(g);
    const Real u = leat::unit<Real, Ends>(g);
    Real want = exact.point(a, b, u);
    if (!lower_in(Ends) && want == a) {
        want = std::nextafter(a, b);
    }
    if (!upper_in(Ends) && want == b) {
        want = std::nextafter(b, a);
    }
    ASSERT_EQ(got, want) << std::hexfloat << "a " << a << " b " << b << " u " << u << " ends "
                         << static_cast<int>(Ends);
}

template <class Real, ends Ends>
void sweep(int count, unsigned seed) {
    reference exact;
    std::mt19937_64 g(seed);
    // Each interval meets four words.
    for (int done = 0; done < count;) {
        const int low = std::numeric_limits<Real>::min_exponent;
        const int high = std::numeric_limits<Real>::max_exponent;
        const int centre =
            (g() & 3) != 0 ? 0 : low + static_cast<int>(g() % static_cast<unsigned>(high - low));
        Real a = adversarial_real<Real>(g, centre);
        Real b = adversarial_real<Real>(g, centre);
        if ((g() & 7) == 0) { // a few steps wide
            b = a;
            for (auto i = g() % 5; i < 5; ++i) {
                b = std::nextafter(b, std::numeric_limits<Real>::max());
            }
        } else if ((g() & 15) == 0) {
            b = 0;
        } else if ((g() & 15) == 0) {
            a = 0;
        }
        if (b < a) {
            std::swap(a, b);
        }
        if (!has_room<Real, Ends>(a, b)) {
            continue;
        }
        for (int i = 0; i < 4; ++i, ++done) {
            check_point<Real, Ends>(exact, a, b, adversarial_word(g));
            if (testing::Test::HasFatalFailure()) {
                return;
            }
        }
    }
}

} // namespace exact_point

#endif
