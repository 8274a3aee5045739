// The sum of the first n terms k^-s, and what its integral is made of: the ground of `zipf`.
//
// power_integral(x, s) is the integral of t^-s from 1 to x: ln x for s = 1, (x^(1 - s) - 1) /
// (1 - s) else, computed so that the two meet. harmonic(n, s) is the sum by its first 31 terms and,
// for the rest, Euler's and Maclaurin's formula with five terms: right to 1e-14 of itself for every
// s >= -2 and n.
// Source: Abramowitz and Stegun, 23.1.30.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_ZIPF_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_ZIPF_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/power.hpp"

namespace leat::detail {

/// The integral of t^-s from 1 to x.
constexpr double power_integral(double x, double s) noexcept {
    using real = strict<double>;
    const real log = natural_log(x);
    const real y = (real(1.0) - s) * log;
    if (magnitude(y.value) < 0x1p-30) { // (e^y - 1) / y = 1 + y / 2 + ...
        return (log * (real(1.0) + y * 0.5)).value;
    }
    return (log * (real(exp_minus_one(y.value)) / y)).value;
}

/// The x whose power_integral is `value`; the largest double where none has it.
constexpr double power_integral_inverse(double value, double s) noexcept {
    using real = strict<double>;
    const real t = (real(1.0) - s) * value;
    if (magnitude(t.value) < 0x1p-30) { // ln(1 + t) / t = 1 - t / 2 + ...
        return natural_exp((real(value) * (real(1.0) - t * 0.5)).value);
    }
    // Where the integral up to infinity is finite, rounding may reach or pass it.
    constexpr double least = -0x1.fffffffffffffp-1;
    const double within = t.value < least ? least : t.value;
    return natural_exp((real(log_one_plus(within)) / (real(1.0) - s)).value);
}

/// The sum of k^-s for k = 1 .. n, n >= 1.
constexpr double harmonic(double n, double s) noexcept {
    using real = strict<double>;
    constexpr double start = 32;
    real sum = 0.0;
    const double direct = n < start ? n : start - 1;
    for (double k = direct; k >= 1; k -= 1) { // small terms first
        sum = sum + power(k, -s);
    }
    if (n < start) {
        return sum.value;
    }
    // With f = t^-s: integral + (f(a) + f(b)) / 2 + the sum over j of B_2j / (2j)! times the
    // (2j - 1)th derivative's difference; that derivative is -s (s + 1) ... (s + 2j - 2) f /
    // t^(2j-1).
    constexpr double bernoulli_over_factorial[5] = {1.0 / 12, -1.0 / 720, 1.0 / 30240,
                                                    -1.0 / 1209600, 1.0 / 47900160};
    const real at_start = power(start, -s);
    const real at_n = power(n, -s);
    real derivative_start = -(real(s) / start) * at_start;
    real derivative_n = -(real(s) / n) * at_n;
    real corrections = 0.0;
    for (int j = 0; j < 5; ++j) {
        corrections =
            corrections + real(bernoulli_over_factorial[j]) * (derivative_n - derivative_start);
        const real order = static_cast<double>(2 * j + 1);
        const real factors = (real(s) + order) * (real(s) + order + 1.0);
        derivative_start = derivative_start * (factors / (start * start));
        derivative_n = derivative_n * (factors / n / n);
    }
    // The integral from 32 to n, as 32^(1 - s) times that from 1 to n / 32.
    const real integral = at_start * start * power_integral((real(n) / start).value, s);
    return (sum + (integral + ((at_start + at_n) * 0.5 + corrections))).value;
}

} // namespace leat::detail

#endif
