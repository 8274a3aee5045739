// The natural logarithm, and ln(1 + x), the same bits everywhere: no library function, no fused
// multiply-add, every operation rounded by itself.
//
// Method: x = 2^k z, z in [0.7, 1.41); a table gives a short reciprocal c of the middle of z's
// interval (one of 128) and -ln c, so that ln x = k ln 2 - ln c + ln(1 + r), where r = c z - 1
// comes out exactly as two doubles; a polynomial does the rest (P. T. P. Tang, Table-driven
// implementation of the logarithm function in IEEE floating-point arithmetic, ACM TOMS 16(4),
// 1990). Argument: x positive and finite, subnormal numbers included; anything else is the caller's
// error. Error, measured against MPFR in tests/core: natural_log at most 0.501 ulp, log_parts at
// most 2^-65 relative, log_one_plus at most 1 ulp.

#ifndef LEAT_CORE_LOGARITHM_HPP
#define LEAT_CORE_LOGARITHM_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/logarithm_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/core/scaled.hpp"          // split takes subnormal numbers apart

#include <bit>
#include <cstdint>

namespace leat::detail {

/// x with its lowest `count` fraction bits cleared.
constexpr double shortened(double x, int count) noexcept {
    return std::bit_cast<double>(std::bit_cast<std::uint64_t>(x) >> count << count);
}

/// ln x as a sum of two doubles, the second below an ulp of the first.
constexpr two_part log_parts(double x) noexcept {
    using real = strict<double>;
    const scaled parts = split(x); // the factor in [1, 2)
    const std::uint64_t bits = std::bit_cast<std::uint64_t>(parts.factor);
    const std::uint64_t from_first = bits - log_first;
    // z is the factor or half of it; one exponent step is 2^52 in the bits.
    const std::uint64_t halve = from_first >> 52;
    const double z = std::bit_cast<double>(bits - (halve << 52));
    const logarithm_entry& entry = logarithm_table[(from_first >> 45) & 127];
    const real k = static_cast<double>(parts.exponent + static_cast<std::int64_t>(halve));

    // r = c z - 1: c has 13 bits, so both products are exact, and so is the difference. Where it is
    // smaller than the second product, the sum has few bits and is exact: no order need be asked.
    const double z_high = shortened(z, 21);
    const two_part r = ordered_two_sum((real(z_high) * entry.reciprocal - 1.0).value,
                                       ((real(z) - z_high) * entry.reciprocal).value);
    const real r1 = r.high;

    // The large terms, each sum with its error: (k ln 2 - ln c) + r - r^2 / 2.
    const two_part first =
        ordered_two_sum((k * log_two_high + entry.high).value, r.high); // left: exact
    const real r_high = shortened(r.high, 27);
    const real half_square = r_high * r_high * 0.5; // exact
    const real half_square_rest = (r1 - r_high) * (r1 + r_high) * 0.5;
    const two_part second = ordered_two_sum(first.high, -half_square.value);

    const real square = r1 * r1;
    const auto& p = log_polynomial;
    const real cubic = r1 * square *
                       ((real(p[0]) + r1 * p[1]) +
                        square * ((real(p[2]) + r1 * p[3]) + square * (real(p[4]) + r1 * p[5])));
    const real low = (k * log_two_low + entry.low) + (real(first.low) + second.low) +
                     ((real(r.low) - real(r.low) * r1) - half_square_rest) + cubic;
    return ordered_two_sum(second.high, low.value);
}

/// ln x.
constexpr double natural_log(double x) noexcept { return log_parts(x).high; }

/// ln(1 + x), right also where x is small; x > -1 and finite.
constexpr double log_one_plus(double x) noexcept {
    using real = strict<double>;
    if (magnitude(x) < 0x1p-54) {
        return x;
    }
    const two_part sum = two_sum(1.0, x);
    // ln(u + e) = ln u + e / u + ..., the square of e / u being below 2^-106.
    const two_part log = log_parts(sum.high);
    return (real(log.high) + (real(log.low) + real(sum.low) / sum.high)).value;
}

} // namespace leat::detail

#endif
