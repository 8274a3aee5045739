// Parts of a normal law's mass, in forms that cancel nowhere: what truncated_normal answers for its
// density, cumulative chance and quantile with. Unit: one standard deviation; masses are in units
// of the density at the point they start from.
//
// Error: about 1e-14 relative, at any distance from the mean and any width.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_NORMAL_MASS_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_NORMAL_MASS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_function.hpp"
#include "leat/core/exponential.hpp"
#include "leat/distributions/detail/evaluate.hpp" // or_zero
#include "leat/distributions/detail/quadrature.hpp"

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// The density at a + v over that at a: exp(-v (a + v / 2)), a >= 0 and v >= 0.
constexpr double normal_fall(double a, double v) noexcept {
    using real = strict<double>;
    return or_zero(exp_scaled((-(real(v) * (real(v) * 0.5 + a))).value));
}

/// The integral of normal_fall(a, s) over s from 0 to v; a and v up to 2^400.
constexpr double normal_mass(double a, double v) noexcept {
    using real = strict<double>;
    if (real(v) * (real(v) * 0.5 + a) > 0.5) {
        constexpr double root_half = 0x1.6a09e667f3bcdp-1; // sqrt(1/2)
        constexpr double half_root = 0x1.40d931ff62706p0;  // sqrt(pi / 2)
        const real far = erfc_scaled((real(root_half) * (real(a) + v)).value);
        const real near = erfc_scaled((real(root_half) * a).value);
        return (real(half_root) * (near - far * normal_fall(a, v))).value;
    }
    if (v == 0) {
        return 0;
    }
    const real mean = mean_on_unit([&](double t) { return normal_fall(a, held(v * t)); });
    return (mean * v).value;
}

/// The least double x from `first` to `last` with cumulative(x) >= p, else `last`: by bisection of
/// the doubles in order, so at most 64 evaluations whatever the range.
template <class Cumulative>
constexpr double quantile_by_bisection(double first, double last, double p,
                                       const Cumulative& cumulative) {
    constexpr std::int64_t lowest = std::numeric_limits<std::int64_t>::min();
    const auto rank = [](double x) {
        const auto bits = std::bit_cast<std::int64_t>(x);
        return bits < 0 ? lowest - bits : bits;
    };
    std::int64_t below = rank(first);
    std::int64_t above = rank(last);
    const auto number = [](std::int64_t r) {
        return std::bit_cast<double>(r < 0 ? lowest - r : r);
    };
    while (below < above) {
        const std::int64_t middle = (below >> 1) + (above >> 1) + (below & above & 1);
        if (cumulative(number(middle)) < p) {
            below = middle + 1;
        } else {
            above = middle;
        }
    }
    return number(above);
}

} // namespace leat::detail

#endif
