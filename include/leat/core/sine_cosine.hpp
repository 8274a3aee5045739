// Sine and cosine of an angle in turns, the same bits everywhere: no library function, no fused
// multiply-add, every operation rounded by itself.
//
// Turns, not radians: a uniform angle is a uniform number in [0, 1), and the reduction to the
// nearest of 128 table entries is exact. The rest, below 1/256 of a turn, goes through the series
// of sine and cosine and the addition theorem. Argument: |turns| < 2^40, and 0 or above 2^-900.
// Error, measured against MPFR in tests/core: at most 1.6 ulp each. Multiples of a quarter give
// exactly 0, 1 and -1.

#ifndef LEAT_CORE_SINE_COSINE_HPP
#define LEAT_CORE_SINE_COSINE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/sine_table.hpp" // by tests/reference/make_math_tables.py

#include <bit>
#include <cstdint>

namespace leat::detail {

/// The two coordinates of the point of the unit circle at an angle.
struct sine_and_cosine {
    double sine;
    double cosine;
};

/// sin and cos of 2 pi turns.
constexpr sine_and_cosine sine_cosine(double turns) noexcept {
    using real = strict<double>;
    constexpr double shift = 0x1.8p52; // adding it rounds to an integer, in the low bits
    const real shifted = real(turns) * 128.0 + shift;
    const auto step = std::bit_cast<std::uint64_t>(shifted.value) & 127u;
    const real rest = real(turns) - (shifted - shift) * 0x1p-7; // exact

    const two_part x = two_product(two_pi, rest.value);
    const real angle = x.high;
    const real angle_rest = real(x.low) + rest * two_pi_rest;
    const real square = angle * angle;
    const real sine_series =
        (real(-0x1.5555555555555p-3) +
         square * (real(0x1.1111111111111p-7) - square * 0x1.a01a01a01a01ap-13));
    const real sine = angle + (angle_rest + angle * square * sine_series); // to x^7 / 7!
    const real versine =
        square * (real(0.5) - square * (real(0x1.5555555555555p-5) -
                                        square * 0x1.6c16c16c16c17p-10)); // 1 - cos

    const sine_entry& s = sine_table[step];
    const sine_entry& c = sine_table[(step + 32) & 127u];
    const real to_sine = (real(s.rest) - real(s.value) * versine) + real(c.value) * sine;
    const real to_cosine = (real(c.rest) - real(c.value) * versine) - real(s.value) * sine;
    return {(real(s.value) + to_sine).value, (real(c.value) + to_cosine).value};
}

} // namespace leat::detail

#endif
