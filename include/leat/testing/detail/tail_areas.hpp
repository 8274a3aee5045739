// Tail areas of the laws that tests of fit refer to: Student's t, chi-squared, and the
// Kolmogorov-Smirnov distance. The same bits everywhere, so that a test decides alike everywhere.
//
//   student_t_beyond      P(|T| >= |t|), by the incomplete beta function of leat's estimates
//   chi_squared_tails     P(X <= x) and P(X >= x), by the series and the continued fraction of the
//                         incomplete gamma function
//   kolmogorov_beyond     min(1, 2 P(D+ >= d)) of n samples; never below P(D >= d), where one of
//                         the one-sided distances D+ and D- must reach d. As both seldom do, it is
//                         too large by a factor of at most 1.02 where p is below 1/2, and of 1 +
//                         (p/2)^3 where p is below 1/4. P(D+ >= d) itself is exact.
//
// Error, measured against GSL and Boost.Math in tests/testing: 1e-12 relative up to 10^6 degrees of
// freedom, down to areas of 1e-300; below the smallest normal number the result is 0.
// Work: about the root of the degrees of freedom; for the distance 0.2 microseconds a sample.
// Sources: Abramowitz and Stegun, 6.5.29, 6.5.31; W. J. Lentz, Applied Optics 15, 1976 (how
// to evaluate a continued fraction); Z. W. Birnbaum and F. H. Tingey, Ann. Math. Stat. 22, 1951,
// eq. (3.0), its terms written as binomial masses.

#ifndef LEAT_TESTING_DETAIL_TAIL_AREAS_HPP
#define LEAT_TESTING_DETAIL_TAIL_AREAS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/evaluate.hpp" // or_zero, product
#include "leat/distributions/detail/law.hpp"      // finite
#include "leat/estimate/detail/incomplete_beta.hpp"

#include <cstdint>

namespace leat::testing::detail {

using real = leat::detail::strict<double>;

/// The areas on both sides of a point.
struct tail_areas {
    double below;
    double above;
};

/// Of the chi-squared law with `degrees` > 0, at x >= 0.
constexpr tail_areas chi_squared_tails(double x, double degrees) {
    if (!(x > 0)) {
        return {0, 1};
    }
    if (!leat::detail::finite(x)) {
        return {1, 0};
    }
    constexpr double negligible = 0x1p-53;
    constexpr int most_terms = 100'000'000; // the loops end long before, after about sqrt(degrees)
    const real a = real(degrees) * 0.5;
    const real z = real(x) * 0.5;
    // z^a e^-z / Gamma(a)
    const double front = leat::detail::product(chi_squared<double>{degrees}.density(x), x);
    if (z < a + 1.0) {
        real term = real(1.0) / a;
        real sum = term;
        for (int n = 1; n < most_terms && term.value > sum.value * negligible; ++n) {
            term = term * z / (a + static_cast<double>(n));
            sum = sum + term;
        }
        const double below = leat::detail::product(front, sum.value);
        return {below, (real(1.0) - below).value};
    }
    // 1 / (b0 + a1 / (b1 + a2 / (b2 + ...))) by the ratios of successive denominators and
    // numerators, both held inverted. By induction the n-th of either is at least n + 1 + z - a.
    const real first = z - a + 1.0;
    real denominators = real(1.0) / first;
    real numerators = 0.0;
    real value = denominators;
    for (int n = 1; n < most_terms; ++n) {
        const real k = static_cast<double>(n);
        const real above = k * (a - k);
        const real beside = first + k * 2.0;
        denominators = real(1.0) / (beside + above * denominators);
        numerators = beside + above * numerators;
        const real factor = numerators * denominators;
        numerators = real(1.0) / numerators;
        value = value * factor;
        if (leat::detail::magnitude((factor - 1.0).value) <= 2 * negligible) {
            break;
        }
    }
    const double above = leat::detail::product(front, value.value);
    return {(real(1.0) - above).value, above};
}

/// P(|T| >= |t|) for Student's t with `degrees` >= 1.
constexpr double student_t_beyond(double t, double degrees) {
    const real size = leat::detail::magnitude(t);
    if (size.value < 0x1p-100) {
        return 1;
    }
    if (size.value > 0x1p400) { // the square would leave the range
        return 0;
    }
    // What lies below k / (k + t^2) in a beta law of k/2 and 1/2.
    const real square = size * size;
    const real sum = real(degrees) + square;
    const auto shares = leat::detail::beta_shares_at(
        (real(degrees) * 0.5).value, 0.5, (real(degrees) / sum).value, (square / sum).value);
    return leat::detail::or_zero(shares.below);
}

/// A bound for P(D >= reach / n), D the distance of n samples from their distribution function; see
/// above.
constexpr double kolmogorov_beyond(double reach, std::uint64_t n) {
    namespace d = leat::detail;
    const auto size = static_cast<double>(n);
    if (reach <= 0.5) { // nothing is nearer
        return 1;
    }
    const double total = d::log_poisson_mass_at_mean(size);
    real sum = 0.0;
    for (std::uint64_t j = 0; j < n; ++j) {
        const auto below = static_cast<double>(j);
        const double above = size - below;
        const real left = real(above) - reach;
        if (!(left.value > 0)) {
            break;
        }
        // j of n samples below a point whose distribution function is (j + reach) / n.
        const real mean = real(below) + reach;
        const real log_mass = real(d::log_poisson_mass(below, mean.value, -reach)) +
                              d::log_poisson_mass(above, left.value, reach) - total;
        if (log_mass < -700.0) { // beside the others it is nothing, and its share may be subnormal
            continue;
        }
        sum = sum + real(d::natural_exp(log_mass.value)) * reach / mean;
    }
    return sum.value < 0.5 ? (sum * 2.0).value : 1.0;
}

} // namespace leat::testing::detail

#endif
