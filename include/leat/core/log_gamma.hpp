// The logarithm of the gamma function, the same bits everywhere.
//
// Method: on [1, 2] a polynomial times the factors of the two zeros; below by Gamma(x) =
// Gamma(x + 1) / x; up to 10 by the recurrence; above by Stirling's series to 1/x^17 (Abramowitz
// and Stegun, 6.1.15, 6.1.41). Argument: x > 0 and finite. Error, measured against MPFR in
// tests/core: at most 6 ulp (4 in [1, 2]). For moments of laws and set-up; a draw has faster ways.

#ifndef LEAT_CORE_LOG_GAMMA_HPP
#define LEAT_CORE_LOG_GAMMA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/log_gamma_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/core/logarithm.hpp"

#include <cstddef>

namespace leat::detail {

/// A polynomial by Horner's rule; the coefficients stand lowest degree first.
template <std::size_t Terms>
constexpr double polynomial(const double (&coefficients)[Terms], double x) noexcept {
    using real = strict<double>;
    real sum = coefficients[Terms - 1];
    for (std::size_t i = Terms - 1; i > 0; --i) {
        sum = sum * x + coefficients[i - 1];
    }
    return sum.value;
}

/// ln Gamma(x).
constexpr double log_gamma(double x) noexcept {
    using real = strict<double>;
    if (x >= 10) {
        const real inverse = real(1.0) / x;
        const real series = inverse * polynomial(stirling_series, (inverse * inverse).value);
        return ((real(x) - 0.5) * natural_log(x) - x + (real(half_log_two_pi) + series)).value;
    }
    // Down to [1, 2] step by step: x - 1 is exact there.
    real from = x < 1 ? real(x) + 1.0 : real(x);
    real factors = 1.0;
    while (from.value > 2) {
        from = from - 1.0;
        factors = factors * from;
    }
    const real middle =
        (from - 1.0) * (from - 2.0) * polynomial(log_gamma_middle, (from - 1.5).value);
    if (x < 1) {
        return (middle - natural_log(x)).value;
    }
    return (middle + natural_log(factors.value)).value;
}

} // namespace leat::detail

#endif
