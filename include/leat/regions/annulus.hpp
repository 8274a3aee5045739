// The annulus: points uniform by area between two circles about one centre, in the plane.
//
//   leat::annulus moat{{0, 0}, 20, 25};      // centre, inner radius, outer radius
//
// Method: the better of two exact rejections, by the thickness (detail/spherical_shell.hpp). Never
// take a uniform radius: it crowds points at the inner side.
//
// Words, all word64, float included: where inner <= outer / 2, 2.55 over 1 - (inner / outer)^2 on
// average; else two for a radius, over the share accepted, (1 + inner / outer) / 2, and 2.55 for
// its direction. Rounding: every point drawn is contained. Domain: as disk; inner 0, or at least
// 2^-960 (2^-100 for float); inner < outer; their difference at least 256 steps between
// neighbouring numbers at the edge. Units: those of the centre. Errors: invalid_parameter;
// engine_stuck.

#ifndef LEAT_REGIONS_ANNULUS_HPP
#define LEAT_REGIONS_ANNULUS_HPP

#include "leat/core/concepts.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/spherical_shell.hpp"

#include <type_traits>

namespace leat {

/// The points of the plane from `inner` to `outer` away from `centre`.
template <detail::portable_real Real = double>
class annulus : public detail::spherical_shell<annulus<Real>, 2, Real> {
    using base = detail::spherical_shell<annulus, 2, Real>;

public:
    /// Any arithmetic types; deduced as annulus<double>.
    template <detail::arithmetic Inner, detail::arithmetic Outer>
    constexpr annulus(const std::type_identity_t<detail::point_argument<Real, 2>>& centre,
                      Inner inner, Outer outer)
        : base(centre.value, static_cast<Real>(inner), static_cast<Real>(outer)) {}

    /// The name under which it is saved.
    static constexpr const char* class_name = "annulus";

    friend constexpr bool operator==(const annulus&, const annulus&) = default;

private:
    friend base;
    static constexpr const char* name_ = "annulus";
};

} // namespace leat

#endif
