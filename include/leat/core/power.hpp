// Powers x^y of a positive x, the same bits everywhere.
//
// Method: e^(y ln x), the logarithm and its product with y carried as two doubles.
// Argument: x positive and finite, y any double but NaN; x^y saturates at the smallest normal and
// the largest finite number; 1 to an infinite power is 1, as in IEEE 754. Error, measured against
// MPFR in tests/core: at most 0.51 ulp.

#ifndef LEAT_CORE_POWER_HPP
#define LEAT_CORE_POWER_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // two_part, magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"

namespace leat::detail {

/// x^y with an exponent of its own: exact in range for any product with doubles that is in range.
constexpr scaled power_scaled(double x, double y) noexcept {
    using real = strict<double>;
    const two_part log = log_parts(x);
    // The leading halves have 26 bits each, so their product is exact.
    const double log_high = shortened(log.high, 27);
    const double y_high = shortened(y, 27);
    const double high = held(y_high * log_high);
    if (!(magnitude(high) < 2000)) {
        return exp_scaled(log.high == 0 ? 0.0 : high); // 0 times infinity is no number
    }
    if (magnitude(high) < 0x1p-60) { // nothing below may become subnormal
        return {1.0, 0};
    }
    const real log_low = (real(log.high) - log_high) + log.low;
    const real low = (real(y) - y_high) * log_high + real(y) * log_low;
    return exp_scaled(high, low.value);
}

/// x^y, saturating.
constexpr double power(double x, double y) noexcept { return power_scaled(x, y).value(); }

} // namespace leat::detail

#endif
