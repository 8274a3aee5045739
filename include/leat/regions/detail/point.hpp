// Points going in and out of regions: constructor arguments, and the caller's own vector types.

#ifndef LEAT_REGIONS_DETAIL_POINT_HPP
#define LEAT_REGIONS_DETAIL_POINT_HPP

#include "leat/core/concepts.hpp"

#include <array>
#include <cstddef>
#include <type_traits>
#include <utility> // index_sequence

namespace leat::detail {

template <class T>
concept arithmetic = std::is_arithmetic_v<T>;

/// A point as a constructor takes it: `{0, 0}` or a std::array, of any arithmetic type. Converting
/// here, and not at the call, is what lets a disk<double> be made from int variables in braces.
template <portable_real Real, std::size_t N>
struct point_argument {
    std::array<Real, N> value;

    template <arithmetic... Coordinates>
    requires(sizeof...(Coordinates) == N) constexpr point_argument(Coordinates... x) noexcept
        : value{static_cast<Real>(x)...} {}

    template <arithmetic T>
    constexpr point_argument(const std::array<T, N>& p) noexcept : value{} {
        for (std::size_t i = 0; i < N; ++i) {
            value[i] = static_cast<Real>(p[i]);
        }
    }

    constexpr point_argument(const std::array<Real, N>& p) noexcept : value(p) {} // for {{x, y}}
};

/// One coordinate on its way into a user's type; it becomes the arithmetic type asked for.
template <class Real>
struct coordinate {
    Real value;

    template <arithmetic T>
    constexpr operator T() const noexcept { // implicit: fills members and parameters
        return static_cast<T>(value);
    }
};

template <class>
inline constexpr bool never = false;

template <class Vec, class Real, std::size_t N, std::size_t... I>
constexpr Vec point_as(const std::array<Real, N>& p, std::index_sequence<I...>) {
    if constexpr (requires { Vec{p[I]...}; }) {
        return Vec{p[I]...};
    } else if constexpr (requires { Vec{coordinate<Real>{p[I]}...}; }) {
        return Vec{coordinate<Real>{p[I]}...};
    } else {
        static_assert(never<Vec>, "leat: draw<Vec>(g) needs a Vec that the coordinates of a point "
                                  "in braces initialise, as in Vec{x, y}");
    }
}

/// The point as a Vec: anything that N coordinates in braces initialise, narrower ones included.
template <class Vec, class Real, std::size_t N>
constexpr Vec point_as(const std::array<Real, N>& p) {
    return point_as<Vec>(p, std::make_index_sequence<N>{});
}

} // namespace leat::detail

#endif
