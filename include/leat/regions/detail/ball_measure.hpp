// The volume of balls and shells in any dimension.

#ifndef LEAT_REGIONS_DETAIL_BALL_MEASURE_HPP
#define LEAT_REGIONS_DETAIL_BALL_MEASURE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <cstddef>

namespace leat::detail {

/// pi as a factor of a measure.
inline constexpr scaled scaled_pi{0x1.921fb54442d18p+0, 1};

/// The volume of the unit ball in n dimensions: V(n) = V(n - 2) 2 pi / n, V(0) = 1, V(1) = 2 (any
/// integral calculus). Within n / 2 roundings.
constexpr scaled unit_ball_volume(std::size_t n) noexcept {
    scaled volume = split(n % 2 == 0 ? 1.0 : 2.0);
    for (std::size_t i = n % 2 + 2; i <= n; i += 2) {
        const double factor = held(0x1.921fb54442d18p+2 / static_cast<double>(i)); // 2 pi / i
        volume = volume * split(factor);
        volume = split(volume.factor) * scaled{1, volume.exponent};
    }
    return volume;
}

/// (outer^n - inner^n) / (outer - inner), over outer^(n-1): the sum of the powers of inner / outer
/// below n. Without the difference, which would lose the digits of a thin shell.
constexpr double sum_of_powers(double ratio, std::size_t n) noexcept {
    strict<double> sum = 0.0;
    for (std::size_t i = 0; i < n; ++i) {
        sum = sum * ratio + 1.0;
    }
    return sum.value;
}

} // namespace leat::detail

#endif
