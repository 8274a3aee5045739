// Confidence intervals for a mean, and for the difference of two, from running moments.
//
//   leat::interval ci = leat::student_interval(moments, 0.95);
//
//   student_interval(m, level)      mean +- t s / sqrt(n), t of n - 1 degrees of freedom: exact for
//                                   independent normal values; for others good once n is large
//   normal_interval(m, level)       the same with the normal z in place of t: for large n
//   normal_interval(mean, se, level)  where the standard error is known
//   welch_interval(a, b, level)     mean of a less mean of b, two independent samples whose
//                                   variances may differ
//
// Coverage where values are skewed: too low while n is small. For exponential values the 95 %
// interval covers 90.1 % at n = 10, 92.8 % at 30, 94.3 % at 100 (measured, 10^5 studies each). For
// rare events (yes or no) use proportion_interval.hpp.
// Errors: invalid_parameter for a level outside [0.001, 1), and for fewer than two values. Where
// all values are alike the interval has no width: then the sample says nothing about its error.
// Bits: the same everywhere.
// Sources: "Student", Biometrika 6, 1908; B. L. Welch, Biometrika 34, 1947.
// Not for values that depend on each other: batch_means.hpp (one long run), paired_differences.hpp
// (two systems under the same random numbers).

#ifndef LEAT_ESTIMATE_MEAN_INTERVAL_HPP
#define LEAT_ESTIMATE_MEAN_INTERVAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/estimate/detail/student_point.hpp"
#include "leat/estimate/interval.hpp"
#include "leat/estimate/running_moments.hpp"

#include <cstdint>
#include <limits>

namespace leat {
namespace detail {

/// Refuses moments of fewer than two values in the caller's name.
constexpr void two_or_refuse(const char* name, const running_moments& m) {
    if (m.count() < 2) {
        refuse(name, "count", m.count(), "must be at least 2");
    }
}

} // namespace detail

/// The t with P(|T| < t) = level for a variable T of Student's law with k degrees of freedom, k >=
/// 1 and not necessarily whole: the factor of the standard error in an interval.
[[nodiscard]] constexpr double student_factor(double k, double level = 0.95) {
    detail::level_or_refuse("student_factor", level);
    if (!(k >= 1 && k <= std::numeric_limits<double>::max())) {
        detail::refuse("student_factor", "k", k, "must be finite and >= 1");
    }
    return detail::student_point(k, level);
}

/// The z with P(|Z| < z) = level for a standard normal Z.
[[nodiscard]] constexpr double normal_factor(double level = 0.95) {
    return detail::normal_point(detail::level_or_refuse("normal_factor", level));
}

/// Student's interval for the mean of independent values.
[[nodiscard]] constexpr interval student_interval(const running_moments& m, double level = 0.95) {
    detail::level_or_refuse("student_interval", level);
    detail::two_or_refuse("student_interval", m);
    const double t = detail::student_point(static_cast<double>(m.count() - 1), level);
    return detail::around(m.mean(), detail::held(t * m.standard_error()), level);
}

/// The normal interval for a mean whose standard error is known.
[[nodiscard]] constexpr interval normal_interval(double mean, double standard_error,
                                                 double level = 0.95) {
    detail::level_or_refuse("normal_interval", level);
    constexpr double largest = 0x1p900;
    if (!(mean >= -largest && mean <= largest)) {
        detail::refuse("normal_interval", "mean", mean, "must be at most 2^900 in size");
    }
    if (!(standard_error >= 0 && standard_error <= largest)) {
        detail::refuse("normal_interval", "standard_error", standard_error,
                       "must be >= 0 and at most 2^900");
    }
    return detail::around(mean, detail::held(detail::normal_point(level) * standard_error), level);
}

/// The normal interval for the mean of many independent values.
[[nodiscard]] constexpr interval normal_interval(const running_moments& m, double level = 0.95) {
    detail::level_or_refuse("normal_interval", level);
    detail::two_or_refuse("normal_interval", m);
    return normal_interval(m.mean(), m.standard_error(), level);
}

/// Welch's interval for the mean of `a` less the mean of `b`, independent of each other. Refused
/// where neither varies.
[[nodiscard]] constexpr interval welch_interval(const running_moments& a, const running_moments& b,
                                                double level = 0.95) {
    using real = detail::strict<double>;
    detail::level_or_refuse("welch_interval", level);
    detail::two_or_refuse("welch_interval", a);
    detail::two_or_refuse("welch_interval", b);
    const real of_a = real(a.variance()) / static_cast<double>(a.count());
    const real of_b = real(b.variance()) / static_cast<double>(b.count());
    const real both = of_a + of_b;
    if (both.value == 0) {
        detail::refuse("welch_interval", "variance", both.value, "must be > 0 in a or in b");
    }
    // The degrees of freedom, by shares of the variance, whose squares stay in range.
    const real share_a = of_a / both;
    const real share_b = of_b / both;
    const real k = real(1.0) / (share_a * share_a / static_cast<double>(a.count() - 1) +
                                share_b * share_b / static_cast<double>(b.count() - 1));
    const double t = detail::student_point(k.value < 1 ? 1.0 : k.value, level);
    return detail::around((real(a.mean()) - b.mean()).value,
                          (real(detail::square_root(both.value)) * t).value, level);
}

} // namespace leat

#endif
