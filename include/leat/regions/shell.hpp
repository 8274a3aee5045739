// The shell: points uniform by volume between two distances from a centre, in N dimensions.
//
//   leat::shell<3> mantle{{0, 0, 0}, 3480, 6371};      // centre, inner radius, outer radius
//
// Method: the better of two exact rejections, by the thickness (detail/spherical_shell.hpp). Never
// take a uniform radius: it crowds points at the inner side.
//
// Words, all word64, float included: a thick shell takes those of the ball over 1 - (inner /
// outer)^N; one thinner than outer / N two for a radius, over the share accepted (at least 63 %),
// and those of the sphere. Rounding: every point drawn is contained. Domain: as ball; inner 0, or
// at least 2^-960 (2^-100 for float); inner < outer; their difference at least 256 steps between
// neighbouring numbers at the edge. Units: those of the centre. Errors: invalid_parameter;
// engine_stuck.

#ifndef LEAT_REGIONS_SHELL_HPP
#define LEAT_REGIONS_SHELL_HPP

#include "leat/core/concepts.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/spherical_shell.hpp"

#include <cstddef>
#include <type_traits>

namespace leat {

/// The points from `inner` to `outer` away from `centre`.
template <std::size_t N, detail::portable_real Real = double>
class shell : public detail::spherical_shell<shell<N, Real>, N, Real> {
    static_assert(N >= 2);
    using base = detail::spherical_shell<shell, N, Real>;

public:
    /// Any arithmetic types; deduced as a shell of doubles.
    template <detail::arithmetic Inner, detail::arithmetic Outer>
    constexpr shell(const std::type_identity_t<detail::point_argument<Real, N>>& centre,
                    Inner inner, Outer outer)
        : base(centre.value, static_cast<Real>(inner), static_cast<Real>(outer)) {}

    /// The name under which it is saved.
    static constexpr const char* class_name = "shell";

    friend constexpr bool operator==(const shell&, const shell&) = default;

private:
    friend base;
    static constexpr const char* name_ = "shell";
};

template <detail::arithmetic T, std::size_t N, detail::arithmetic Inner, detail::arithmetic Outer>
shell(const T (&)[N], Inner, Outer) -> shell<N, double>;

} // namespace leat

#endif
