// What the members density, cumulative and quantile of the laws share.
//
// All of them take and return double, also for float laws. An argument that is NaN is refused, and
// so is a chance p outside the open interval (0, 1). Outside the support a density is 0 and the
// cumulative chance 0 or 1. A density or chance below the smallest normal number is given as 0, one
// above the largest finite number as that.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_EVALUATE_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_EVALUATE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp" // finite

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// x, unless it is NaN: that is refused in the law's name.
constexpr double number_or_refuse(const char* law_name, double x) {
    if (!(x <= std::numeric_limits<double>::infinity())) {
        refuse(law_name, "x", x, "must not be NaN");
    }
    return x;
}

/// p, unless it lies outside the open interval (0, 1): that is refused in the law's name.
constexpr double chance_or_refuse(const char* law_name, double p) {
    if (!(p > 0 && p < 1)) {
        refuse(law_name, "p", p, "must be > 0 and < 1");
    }
    return p;
}

/// The double nearest to x, but 0 where that would be subnormal.
constexpr double or_zero(scaled x) noexcept {
    const std::int64_t field =
        static_cast<std::int64_t>(std::bit_cast<std::uint64_t>(x.factor) >> 52) + x.exponent;
    return field < 1 ? 0.0 : x.value();
}

/// 1 / x.
constexpr scaled inverse(scaled x) noexcept { return {held(1.0 / x.factor), -x.exponent}; }

/// a b for finite a, b >= 0, saturating instead of subnormal or infinite.
constexpr double product(double a, double b) noexcept {
    return a == 0 || b == 0 ? 0.0 : (split(a) * split(b)).value();
}

/// a / b for finite a >= 0, b > 0, saturating instead of subnormal or infinite.
constexpr double quotient(double a, double b) noexcept {
    return a == 0 ? 0.0 : (split(a) * inverse(split(b))).value();
}

/// A quantile, kept among the normal numbers as draws are; 0 stays 0.
constexpr double kept_normal(double x) noexcept { return x == 0 ? x : into_signed<double>(x); }

/// (x - location) / scale, also where the difference alone would overflow.
constexpr double standardised(double x, double location, double scale) noexcept {
    using real = strict<double>;
    const real difference = real(x) - location;
    if (finite(difference.value) || !finite(x)) {
        return (difference / scale).value;
    }
    return ((real(x) * 0.5 - real(location) * 0.5) / scale * 2.0).value;
}

/// The least positive normal double x with f(x) >= p, for an increasing f: by bisection over the
/// bits, so that 62 steps find it whatever its size; the largest double if there is none.
template <class Function>
constexpr double least_reaching(double p, Function f) {
    auto low = std::bit_cast<std::uint64_t>(std::numeric_limits<double>::min());
    auto high = std::bit_cast<std::uint64_t>(std::numeric_limits<double>::max());
    while (low < high) {
        const std::uint64_t middle = low + (high - low) / 2;
        if (f(std::bit_cast<double>(middle)) >= p) {
            high = middle;
        } else {
            low = middle + 1;
        }
    }
    return std::bit_cast<double>(low);
}

} // namespace leat::detail

#endif
