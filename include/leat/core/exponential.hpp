// The exponential function, and e^x - 1, the same bits everywhere: no library function, no fused
// multiply-add, every operation rounded by itself.
//
// Method: x = (128 m + j) ln 2 / 128 + r with |r| <= ln 2 / 256, so that e^x = 2^m 2^(j/128) e^r, a
// table of 128 entries and six terms of the series of e^r (P. T. P. Tang, Table-driven
// implementation of the exponential function in IEEE floating-point arithmetic, ACM TOMS 15(2),
// 1989). Argument: any double but NaN. Error, measured against MPFR in tests/core: natural_exp at
// most 0.51 ulp, exp_minus_one at most 2 ulp. Saturates: below the smallest normal number the
// result is that number, above the largest finite one it is that one; never 0, subnormal or
// infinite.

#ifndef LEAT_CORE_EXPONENTIAL_HPP
#define LEAT_CORE_EXPONENTIAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp"        // magnitude
#include "leat/core/exponential_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/core/scaled.hpp"

#include <bit>
#include <cstdint>

namespace leat::detail {

/// e^x as 2^exponent * value * (1 + growth), the growth small and value a table entry.
struct exp_pieces {
    double value;
    double growth;
    std::int64_t exponent;
};

/// The pieces of e^(x + rest), |x| < 2000 and the rest at most 2^-24 of x in size.
constexpr exp_pieces exp_in_pieces(double x, double rest) noexcept {
    using real = strict<double>;
    // Adding and taking away 1.5 * 2^52 rounds to an integer, which then stands in the low bits.
    constexpr double shift = 0x1.8p52;
    const real shifted = real(x) * steps_per_log + shift;
    const real steps = shifted - shift;
    const auto step = static_cast<std::int64_t>(std::bit_cast<std::uint64_t>(shifted.value) -
                                                std::bit_cast<std::uint64_t>(shift));
    // steps * log_step_high is exact (19 and 34 bits), and so is the first difference.
    const real r = (real(x) - steps * log_step_high) - (steps * log_step_low - rest);
    const real square = r * r;
    const real series =
        square * ((real(0.5) + r * 0x1.5555555555555p-3) +
                  square * ((real(0x1.5555555555555p-5) + r * 0x1.1111111111111p-7) +
                            square * 0x1.6c16c16c16c17p-10)); // 1/2! to 1/6!
    const power_of_two_entry& entry = power_of_two_table[step & 127];
    return {entry.value, (r + (series + entry.rest)).value, step >> 7};
}

/// e^(x + rest) with an exponent of its own; |rest| at most 2^-24 |x|. Beyond |x| = 2000 (where the
/// product with any double is out of range) the exponent is put far out.
constexpr scaled exp_scaled(double x, double rest = 0) noexcept {
    if (!(x < 2000)) {
        return {1.0, std::int64_t{1} << 20};
    }
    if (!(x > -2000)) {
        return {1.0, -(std::int64_t{1} << 20)};
    }
    using real = strict<double>;
    const exp_pieces e = exp_in_pieces(x, rest);
    return {(real(e.value) + real(e.value) * e.growth).value, e.exponent};
}

/// e^x, saturating (see above).
constexpr double natural_exp(double x) noexcept { return exp_scaled(x).value(); }

/// e^x - 1, right also where x is small. Saturates above; 0 for x = 0.
constexpr double exp_minus_one(double x) noexcept {
    using real = strict<double>;
    if (magnitude(x) < 0x1p-54) {
        return x;
    }
    if (x < -40) {
        return -1;
    }
    if (x > 40) { // the 1 is below half an ulp
        return natural_exp(x);
    }
    const exp_pieces e = exp_in_pieces(x, 0);
    const double power = scaled{e.value, e.exponent}.value();
    return ((real(power) - 1.0) + real(power) * e.growth).value;
}

} // namespace leat::detail

#endif
