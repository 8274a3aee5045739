// The moments of a standard normal variate kept inside an interval, by quadrature over the part of
// the interval where its density counts. What truncated_normal's mean and variance are made of.
//
// Everything in standard deviations. A piece is given with its place, so that the caller can go
// back to the law's own units without losing the digits of a narrow or a far interval.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_TRUNCATED_NORMAL_PIECES_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_TRUNCATED_NORMAL_PIECES_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/quadrature.hpp"

namespace leat::detail {

/// What lies between `from` and `from` + `length`, its moments on the scale where that is [0, 1].
struct normal_piece {
    double from;
    double length;
    moments on_unit;
};

/// Between a and b, a < 0 < b: beyond 14 sd nothing counts.
constexpr normal_piece middle_piece(double a, double b) noexcept {
    using real = strict<double>;
    const real from = a < -14 ? -14.0 : a;
    const real to = b > 14 ? 14.0 : b;
    const moments m = moments_on_unit([&](double t) {
        const real x = from + (to - from) * t;
        return natural_exp((x * x * -0.5).value);
    });
    return {from.value, (to - from).value, m};
}

/// From `distance` >= 0 on, which counts as 0, as far as `width`, up to where the density has
/// fallen by e^-80.
constexpr normal_piece far_piece(double distance, double width) noexcept {
    using real = strict<double>;
    const real a = distance > 0x1p200 ? 0x1p200 : distance;
    const real reach = real(160.0) / (a + square_root((a * a + 160.0).value));
    const real to = width < reach.value ? real(width) : reach;
    const moments m = moments_on_unit([&](double t) {
        const real x = to * t;
        return natural_exp((-(x * (x * 0.5 + a))).value);
    });
    return {0, to.value, m};
}

} // namespace leat::detail

#endif
