// The box around a region: what its `bounds()` returns.
//
// The sides are parallel to the axes. Every point that the region draws or contains lies between
// `low` and `high`, coordinate by coordinate, both ends included.

#ifndef LEAT_REGIONS_BOUNDS_HPP
#define LEAT_REGIONS_BOUNDS_HPP

#include <array>
#include <cstddef>

namespace leat {

/// The corners of a box that a region fits in.
template <class Real, std::size_t N>
struct region_bounds {
    std::array<Real, N> low;  ///< the least coordinates
    std::array<Real, N> high; ///< the greatest

    friend constexpr bool operator==(const region_bounds&, const region_bounds&) = default;

    /// Whether p lies between the corners; false where a coordinate is NaN.
    [[nodiscard]] constexpr bool contains(const std::array<Real, N>& p) const noexcept {
        for (std::size_t i = 0; i < N; ++i) {
            if (!(low[i] <= p[i] && p[i] <= high[i])) {
                return false;
            }
        }
        return true;
    }
};

} // namespace leat

#endif
