// The logarithm of the gamma function, the same bits everywhere.
//
// Method: on [1, 2] a polynomial times the factors of the two zeros; below by Gamma(x) =
// Gamma(x + 1) / x; up to 10 by the recurrence; above by Stirling's series to 1/x^17 (Abramowitz
// and Stegun, 6.1.15, 6.1.41). Argument: x > 0 and finite. Error, measured against MPFR in
// tests/core: at most 6 ulp. Above 2.55e305 the value itself passes the largest double: infinity.
// For moments of laws and set-up; a draw has faster ways.

#ifndef LEAT_CORE_LOG_GAMMA_HPP
#define LEAT_CORE_LOG_GAMMA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/log_gamma_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/core/logarithm.hpp"
#include "leat/core/polynomial.hpp"

namespace leat::detail {

/// ln Gamma(x).
constexpr double log_gamma(double x) noexcept {
    using real = strict<double>;
    if (x >= 10) {
        const real inverse = real(1.0) / x;
        const real series = inverse * polynomial(stirling_series, (inverse * inverse).value);
        return ((real(x) - 0.5) * natural_log(x) - x + (real(half_log_two_pi) + series)).value;
    }
    // Down (or by one up) to 1 + above in [1, 2]; every step is exact.
    real above = x < 1 ? real(x) : real(x) - 1.0;
    real factors = x < 1 ? real(x) : real(1.0);
    while (above.value > 1) {
        factors = factors * above;
        above = above - 1.0;
    }
    const real middle = above * (above - 1.0) * polynomial(log_gamma_middle, (above - 0.5).value);
    const real shift = natural_log(factors.value);
    return (x < 1 ? middle - shift : middle + shift).value;
}

} // namespace leat::detail

#endif
