// Masses of counts in deviance form: for every size of count, without the differences of huge
// logarithms that cost a formula by log-gammas all its digits.
//
// The mass of a Poisson law at c is exp(-deviance(c, mean) - stirling_remainder(c)) / sqrt(2 pi c).
// Its logarithm, log_poisson_mass, is the one primitive here: a binomial or hypergeometric mass is
// a sum of such terms, one a cell of the table of counts. Each takes c - mean from its caller, who
// often knows the difference better than two large rounded numbers do.
//
// Arguments: counts >= 0 (real ones too), means > 0, finite. Errors: a few ulp of each function's
// value, so that a mass near its mode is right to about 1e-15 at any size.
// Source: C. Loader, Fast and accurate computation of binomial probabilities, 2000.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_DEVIANCE_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_DEVIANCE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/polynomial.hpp"

#include <cstdint>

namespace leat::detail {

/// ln c! - ((c + 1/2) ln c - c + ln(2 pi) / 2) for c = 1 to 9. The tests hold each against MPFR.
inline constexpr double small_stirling_remainders[9] = {
    0x1.4c071bcda0a5bp-4, 0x1.52a9b923ea649p-5, 0x1.c579a268d80b3p-6,
    0x1.54a2662fd78a9p-6, 0x1.10b4e513fcbedp-6, 0x1.c6b167bebdf36p-7,
    0x1.85d4d612e4a86p-7, 0x1.552805e7b3076p-7, 0x1.2f4871b12ab64p-7};

/// ln(2 pi c) / 2.
constexpr double half_log_two_pi_times(double c) noexcept {
    return (strict<double>(half_log_two_pi) + strict<double>(0.5) * natural_log(c)).value;
}

/// What Stirling's formula leaves of ln c!, for c > 0.
constexpr double stirling_remainder(double c) noexcept {
    using real = strict<double>;
    if (c >= 10) {
        const real inverse = real(1.0) / c;
        return (inverse * polynomial(stirling_series, (inverse * inverse).value)).value;
    }
    const auto whole = static_cast<int>(c);
    if (whole >= 1 && static_cast<double>(whole) == c) {
        return small_stirling_remainders[whole - 1];
    }
    const real formula = real(c) * natural_log(c) - c + half_log_two_pi_times(c);
    return (real(log_gamma(held(c + 1.0))) - formula).value;
}

/// c ln(c / mean) + mean - c, never negative but for rounding; `difference` is c - mean.
constexpr double deviance(double c, double mean, double difference) noexcept {
    using real = strict<double>;
    if (c == 0) {
        return mean;
    }
    const real v = real(difference) / (real(c) + mean);
    if (magnitude(v.value) < 0.1) {
        // ln(c / mean) = 2 (v + v^3 / 3 + v^5 / 5 + ...); what follows is below 2^-58 of the rest
        constexpr double odd_reciprocals[8] = {1.0 / 3,  1.0 / 5,  1.0 / 7,  1.0 / 9,
                                               1.0 / 11, 1.0 / 13, 1.0 / 15, 1.0 / 17};
        const real square = v * v;
        const real series = square * polynomial(odd_reciprocals, square.value);
        return (v * difference + real(2.0) * c * v * series).value;
    }
    const real quotient = real(c) / mean;
    const real log = quotient < 1e300 ? real(natural_log(quotient.value))
                                      : real(natural_log(c)) - natural_log(mean);
    return (real(c) * log - difference).value;
}

/// ln(mean^c e^-mean / c!); `difference` is c - mean.
constexpr double log_poisson_mass(double c, double mean, double difference) noexcept {
    using real = strict<double>;
    if (c == 0) {
        return -mean;
    }
    return (-(real(deviance(c, mean, difference)) + stirling_remainder(c)) -
            half_log_two_pi_times(c))
        .value;
}

/// The same for a mean equal to the count: what a fixed total contributes.
constexpr double log_poisson_mass_at_mean(double c) noexcept {
    using real = strict<double>;
    return c == 0 ? 0.0 : (real(0.0) - stirling_remainder(c) - half_log_two_pi_times(c)).value;
}

} // namespace leat::detail

#endif
