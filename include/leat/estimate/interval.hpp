// An interval with the level at which it was made: what every estimate here returns.
//
// `level` is the share of repeated studies whose interval covers the true value, where the method's
// conditions hold; it is no probability about the one interval at hand. Levels lie in [0.001, 1);
// 0.95 where none is given.

#ifndef LEAT_ESTIMATE_INTERVAL_HPP
#define LEAT_ESTIMATE_INTERVAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/normal_quantile.hpp"

namespace leat {

/// A confidence interval, ends included.
struct interval {
    double lower = 0;    ///< the lower end
    double upper = 0;    ///< the upper end
    double level = 0.95; ///< the share of studies whose interval covers the true value

    /// Whether x lies in it, ends included.
    [[nodiscard]] constexpr bool contains(double x) const noexcept {
        return lower <= x && x <= upper;
    }
    /// Half the distance of the ends.
    [[nodiscard]] constexpr double half_width() const noexcept {
        return (detail::strict<double>(upper) * 0.5 - detail::strict<double>(lower) * 0.5).value;
    }
    /// Whether ends and level are the same.
    friend constexpr bool operator==(const interval&, const interval&) = default;
};

namespace detail {

/// level, unless it lies outside [0.001, 1): that is refused in the caller's name.
constexpr double level_or_refuse(const char* name, double level) {
    if (!(level >= 0.001 && level < 1)) {
        refuse(name, "level", level, "must be >= 0.001 and < 1");
    }
    return level;
}

/// What an interval leaves out at each end.
constexpr double tail_of(double level) noexcept {
    return ((strict<double>(1.0) - level) * 0.5).value;
}

/// The z with P(|Z| < z) = level for a standard normal Z.
constexpr double normal_point(double level) noexcept { return -normal_quantile(tail_of(level)); }

/// middle +- half.
constexpr interval around(double middle, double half, double level) noexcept {
    return {(strict<double>(middle) - half).value, (strict<double>(middle) + half).value, level};
}

} // namespace detail
} // namespace leat

#endif
