// The cap: points uniform by area on the part of a sphere's surface within an angle of an axis, in
// space.
//
//   leat::cap polar{{0, 0, 0}, 6371, {0, 0, 1}, 0.4};    // centre, radius, axis, half angle
//
// Method: the height along the axis is uniform (Archimedes), the direction about it too; both come
// from one point of the unit disk, as in Marsaglia's method for the whole sphere (Ann. Math. Stat.
// 43, 1972). The height is taken from the top, so that small caps keep their resolution. Never take
// a uniform angle from the axis: it crowds points about the top.
//
// Words, all word64, float included: 2.55 on average. Rounding: a point is within 6 ulp of the
// sphere, an ulp being a step between neighbouring numbers at the edge or at the radius, whichever
// is larger. Domain: centre and edge of the sphere finite; radius at least 2^-960 (2^-100 for
// float); the axis finite, of any length but 0; half angle above 0 and at most pi (rounded up), and
// radius times half angle at least 256 steps between neighbouring numbers at the sphere's edge.
// Errors: invalid_parameter; engine_stuck. Not for the directions alone: direction_in_cone.

#ifndef LEAT_REGIONS_CAP_HPP
#define LEAT_REGIONS_CAP_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/axis_frame.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/cap_angle.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/spherical_surface.hpp"
#include "leat/regions/detail/unit_vectors.hpp"

#include <cstddef>
#include <type_traits>

namespace leat {

/// The points at `radius` from `centre`, in directions within `half_angle` of `axis`.
template <detail::portable_real Real = double>
class cap : public detail::region_base<cap<Real>, Real, 3, 2> {
    using base = detail::region_base<cap, Real, 3, 2>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as cap<double>.
    template <detail::arithmetic Size, detail::arithmetic Angle>
    constexpr cap(const std::type_identity_t<detail::point_argument<Real, 3>>& centre, Size radius,
                  const std::type_identity_t<detail::point_argument<Real, 3>>& axis,
                  Angle half_angle)
        : surface_("cap", centre.value, static_cast<Real>(radius)),
          frame_("cap", "axis", axis.value),
          half_angle_(static_cast<Real>(half_angle)),
          angle_("cap", half_angle_) {
        const real arc = real(double{surface_.radius()}) * double{half_angle_};
        if (half_angle_ < 1) {
            const auto size = detail::rounded<Real>(arc);
            for (std::size_t i = 0; i < 3; ++i) {
                detail::require_resolution("cap", "radius * half_angle", size, surface_.box(), i);
            }
            if (!detail::resolves(size, surface_.radius())) {
                detail::refuse("cap", "radius * half_angle", size, detail::resolution_needed);
            }
        }
        // The outermost direction of coordinate i, if not the axis of that coordinate itself, lies
        // on the rim: cos(t - a), t being the angle between the two axes.
        for (std::size_t i = 0; i < 3; ++i) {
            const real top = frame_.axis()[i];
            const real along = top * angle_.cosine();
            const real across = real(frame_.reach_across(i)) * angle_.sine();
            const double high = top >= angle_.cosine() ? 1.0 : (along + across).value;
            const double low = -top >= angle_.cosine() ? -1.0 : (along - across).value;
            this->bounds_.low[i] = surface_.coordinate(i, low);
            this->bounds_.high[i] = surface_.coordinate(i, high);
        }
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto [x, y, z] =
            detail::cap_point(detail::unit_disk_point(g, "cap"), angle_.versine());
        const auto direction = frame_.at(x, y, z);
        point_type p{};
        for (std::size_t i = 0; i < 3; ++i) {
            p[i] = this->within_bounds(i, surface_.coordinate(i, direction[i]));
        }
        return p;
    }

    /// Whether p is on the cap: within bounds(), its distance from the centre the radius, and from
    /// the axis at most (past the equator at least) that of the rim, give or take 1e-12 of the
    /// radius (float: 1e-6), or eight steps between neighbouring numbers at the edge where that is
    /// more. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p) || !surface_.contains(p)) {
            return false;
        }
        const auto v = surface_.from_centre(p);
        const double square = frame_.square_across(v);
        const double across = square < 1e-30 ? 0 : detail::square_root(square);
        const double height = frame_.along(v);
        const real rim = real(surface_.scaled_radius()) * angle_.sine();
        const double slack = surface_.scaled_tolerance();
        return angle_.cosine() >= 0 ? height >= -slack && real(across) <= rim + slack
                                    : height >= 0 || real(across) >= rim - slack;
    }

    /// The area, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        const detail::scaled radius = detail::split(double{surface_.radius()});
        return detail::saturated<Real>(detail::scaled_pi * detail::split(2.0) * radius * radius *
                                       detail::split(angle_.versine()));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return surface_.centre(); }
    [[nodiscard]] constexpr Real radius() const noexcept { return surface_.radius(); }
    [[nodiscard]] constexpr Real half_angle() const noexcept { return half_angle_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "cap";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "radius", "axis", "half_angle"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(surface_.centre(), surface_.radius(), frame_.template given<Real>(),
                   half_angle_);
    }

    friend constexpr bool operator==(const cap&, const cap&) = default;

private:
    using typename base::real;

    detail::spherical_surface<3, Real> surface_;
    detail::axis_frame frame_;
    Real half_angle_;
    detail::cap_angle angle_;
};

} // namespace leat

#endif
