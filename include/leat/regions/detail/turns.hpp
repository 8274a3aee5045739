// Angles of users, in radians, as the turns that core/sine_cosine.hpp takes.

#ifndef LEAT_REGIONS_DETAIL_TURNS_HPP
#define LEAT_REGIONS_DETAIL_TURNS_HPP

#include "leat/core/barrier.hpp"
#include "leat/regions/detail/extent.hpp"

namespace leat::detail {

/// radians / (2 pi), rounded; below 2^-100, which no region with a resolution of its own can show,
/// it is 0.
constexpr double turns_of(double radians) noexcept {
    constexpr double turns_per_radian = 0x1.45f306dc9c883p-3;
    const double turns = held(radians * turns_per_radian);
    return exponent_of(turns) < -100 ? 0 : turns;
}

} // namespace leat::detail

#endif
