// The two-sided point of Student's law: the t with P(|T| < t) = level; the same bits everywhere.
//
// Domain: k >= 1 degrees of freedom, which need not be whole; 0.001 <= level < 1.
// Method: up to 2^14 degrees Newton's steps on logarithms through the incomplete beta function,
// beyond the expansion about the normal point (M. Abramowitz and I. A. Stegun, Handbook of
// Mathematical Functions, 26.7.5), whose first term left out is there below 1e-15. Error, measured
// against Boost.Math in tests/estimate: 2e-13 relative.

#ifndef LEAT_ESTIMATE_DETAIL_STUDENT_POINT_HPP
#define LEAT_ESTIMATE_DETAIL_STUDENT_POINT_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/estimate/detail/incomplete_beta.hpp"
#include "leat/estimate/interval.hpp" // normal_point

namespace leat::detail {

/// The expansion about the normal point z: good to double precision from 2^14 degrees on.
constexpr double student_point_from_normal(double k, double z) noexcept {
    using real = strict<double>;
    const real s = real(z) * z;
    const real r = real(1.0) / k;
    const real first = (s + 1.0) / 4.0;
    const real second = ((s * 5.0 + 16.0) * s + 3.0) / 96.0;
    const real third = (((s * 3.0 + 19.0) * s + 17.0) * s - 15.0) / 384.0;
    const real fourth = ((((s * 79.0 + 776.0) * s + 1482.0) * s - 1920.0) * s - 945.0) / 92160.0;
    return (real(z) * (r * (first + r * (second + r * (third + r * fourth))) + 1.0)).value;
}

/// The t with P(|T| < t) = level, for k degrees of freedom.
constexpr double student_point(double k, double level) noexcept {
    using real = strict<double>;
    const double z = normal_point(level);
    if (k >= 0x1p14) {
        return student_point_from_normal(k, z);
    }
    const bool by_centre = level < 0.5; // fit the smaller of what lies within and without
    const double wanted = by_centre ? level : (real(1.0) - level).value;
    double t = z;
    for (int i = 0; i < 100; ++i) { // about five
        // t^2 / k has the law of odds of a beta of 1/2 and k/2; its kernel is t times the density.
        const real odds = real(t) * t / k;
        const real outer = real(1.0) / (odds + 1.0);
        const beta_shares shares =
            beta_shares_at(0.5, (real(k) * 0.5).value, (odds * outer).value, outer.value);
        const scaled rise = shares.kernel * scaled{1.0, 1}; // d P(|T| < t) / d ln t
        const log_step newton =
            newton_log_step(by_centre ? shares.below : shares.above, wanted, rise);
        t = (real(t) * natural_exp(by_centre ? newton.step : -newton.step)).value;
        if (newton.settled) {
            break;
        }
    }
    return t;
}

} // namespace leat::detail

#endif
