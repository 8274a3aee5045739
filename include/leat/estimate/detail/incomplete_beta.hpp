// The incomplete beta function: the shares of a beta law below and above a point, and the point
// that has a given share on one side; the same bits everywhere.
//
// Domain: shapes a, b >= 1/2, up to 2^53; 0 < x < 1, given with y = 1 - x.
// Method: on the side of the mean the continued fraction of A. R. DiDonato and A. H. Morris,
// Algorithm 708, ACM TOMS 18, 1992 (from memory, pinned by the measurement), in which nothing
// cancels, evaluated forward (W. J. Lentz, Appl. Opt. 15, 1976), times the density in deviance
// form. Near the mean it takes some sqrt(a + b) terms, elsewhere few.
// Points by Newton's steps on logarithms.
// Error of the smaller share, measured against Boost.Math in tests/estimate: 3e-13 relative for
// a + b up to 2e6.

#ifndef LEAT_ESTIMATE_DETAIL_INCOMPLETE_BETA_HPP
#define LEAT_ESTIMATE_DETAIL_INCOMPLETE_BETA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/normal_quantile.hpp" // where to begin
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/beta_density.hpp"
#include "leat/distributions/detail/evaluate.hpp" // inverse, or_zero

#include <cstdint>

namespace leat::detail {

/// I_x(a, b) B(a, b) / (x^a y^b), for x up to the mean: `excess` = a y - b x >= 0.
constexpr double beta_fraction(double a, double b, double x, double y, double excess) noexcept {
    using real = strict<double>;
    // 1 / (beta_1 + alpha_2 / (beta_2 + alpha_3 / (beta_3 + ...))), by the ratios of successive
    // numerators and (inverted) denominators.
    const real first = real(excess) + 1.0;
    real value = real(a) * first / (real(a) + 1.0);
    real above = value;
    real below = 0.0;
    for (double n = 1; n < 1e9; n += 1) { // settled long before
        const real at = real(a) + (2 * n - 1);
        const real before = real(a) + (n - 1);
        const real weight = real(n) * (real(b) - n) * x;
        const real alpha = before / at * ((before + b) / at) * (weight * x);
        const real beta =
            weight / at + n + (real(a) + n) / (at + 2.0) * ((real(y) + 1.0) * n + first);
        below = real(1.0) / (alpha * below + beta);
        above = alpha / above + beta;
        const real change = above * below;
        value = value * change;
        if (magnitude((change - 1.0).value) <= 0x1p-52) {
            break;
        }
    }
    return (real(1.0) / value).value;
}

/// What lies on either side of a point, and the slope at it.
struct beta_shares {
    scaled below;  // I_x(a, b)
    scaled above;  // 1 - I_x(a, b)
    scaled kernel; // x^a y^b / B(a, b): the slope of `below` over ln(x / y)
};

/// 1 - p, for a share p that is at most about 2/3.
constexpr scaled rest_of(scaled p) noexcept { return split(held(1.0 - or_zero(p))); }

/// The shares of a beta law at x.
constexpr beta_shares beta_shares_at(double a, double b, double x, double y) noexcept {
    using real = strict<double>;
    const scaled kernel = beta_kernel(a, b, x, y);
    const two_part of_a = two_product(a, y);
    const two_part of_b = two_product(b, x);
    const real excess = (real(of_a.high) - of_b.high) + (real(of_a.low) - of_b.low);
    if (excess >= 0.0) {
        const scaled below = kernel * split(beta_fraction(a, b, x, y, excess.value));
        return {below, rest_of(below), kernel};
    }
    const scaled above = kernel * split(beta_fraction(b, a, y, x, (-excess).value));
    return {rest_of(above), above, kernel};
}

/// ln x.
constexpr double log_of(scaled x) noexcept {
    constexpr double log_two = 0x1.62e42fefa39efp-1;
    return (strict<double>(static_cast<double>(x.exponent)) * log_two + natural_log(x.factor))
        .value;
}

/// A step of Newton's method for ln x, which brings a share to a wanted one.
struct log_step {
    double step;  // to be added to ln x
    bool settled; // whether it is the last: the error after a step is of the order of its square
};

/// The step for a share that grows with x; `slope` is its slope over ln x.
constexpr log_step newton_log_step(scaled share, double wanted, scaled slope) noexcept {
    using real = strict<double>;
    const real missing = real(natural_log(wanted)) - log_of(share);
    const real step = missing * (share * inverse(slope)).value();
    // Either the logarithm is matched, or x has no finer place.
    return {step.value, magnitude(missing.value) < 0x1p-27 || magnitude(step.value) < 0x1p-51};
}

/// A point of a beta law, with what is left to 1.
struct beta_place {
    double x;
    double y;
};

/// The x that has the share `wanted` <= 1/2 of the beta law below it or, if `upper`, above it.
///
/// Both shares are log-concave in ln x, so that after its first step the method comes nearer from
/// one side only, and doubles its digits once it is near.
constexpr beta_place beta_point(double a, double b, double wanted, bool upper) noexcept {
    using real = strict<double>;
    if (a > b) { // look for the smaller of x and y
        const beta_place mirrored = beta_point(b, a, wanted, !upper);
        return {mirrored.y, mirrored.x};
    }
    // Begin where ln x would be if it were normal: its variance is about b / (a (a + b)).
    const real sum = real(a) + b;
    const double deviation = square_root((real(b) / sum / a).value);
    const real z = upper ? -normal_quantile(wanted) : normal_quantile(wanted);
    double x = (real(natural_exp((z * deviation).value)) * a / sum).value;
    x = x < 0.75 ? x : 0.75;
    for (int i = 0; i < 200; ++i) { // about five
        const real y = real(1.0) - x;
        const beta_shares shares = beta_shares_at(a, b, x, y.value);
        const scaled rise = shares.kernel * inverse(split(y.value)); // d below / d ln x
        const log_step newton = newton_log_step(upper ? shares.above : shares.below, wanted, rise);
        const double step = upper ? -newton.step : newton.step;
        // No step of more than a few standard deviations: far out the shares leave the range.
        const double longest = held(4.0 * deviation);
        const double taken = step > longest ? longest : step < -longest ? -longest : step;
        const double next = (real(x) * natural_exp(taken)).value;
        x = next < 1 ? next : ((real(x) + 1.0) * 0.5).value;
        if (newton.settled) {
            break;
        }
    }
    return {x, (real(1.0) - x).value};
}

} // namespace leat::detail

#endif
