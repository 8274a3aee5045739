// The cone, a solid: points uniform by volume in it, in space, its axis in any direction.
//
//   leat::cone heap{{0, 0, 0}, {0, 0, 1}, 6, 4};     // base centre, axis, radius, height
//
// The axis points from the base to the tip. Method: an exact map: the distance from the tip, of law
// t^3, is the largest of three uniforms, and the point of the disk there comes by rejection. Never
// take a uniform height.
//
// Words, all word64, float included: 5.55 on average, those of the disk first. Rounding: every
// point drawn is contained. Domain, units and errors: as cylinder. Not for the surface, nor for
// directions within an angle (direction_in_cone).

#ifndef LEAT_REGIONS_CONE_HPP
#define LEAT_REGIONS_CONE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/axial_solid.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"
#include "leat/uniform/unit.hpp"

#include <type_traits>

namespace leat {

/// The points between a disk and the tip at `height` above its centre.
template <detail::portable_real Real = double>
class cone : public detail::axial_solid<cone<Real>, Real> {
    using base = detail::axial_solid<cone, Real>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as cone<double>.
    template <detail::arithmetic Size, detail::arithmetic Height>
    constexpr cone(const std::type_identity_t<detail::point_argument<Real, 3>>& base_centre,
                   const std::type_identity_t<detail::point_argument<Real, 3>>& axis, Size radius,
                   Height height)
        : base("cone", base_centre.value, axis.value, static_cast<Real>(radius),
               static_cast<Real>(height), 0) {}

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const auto across = detail::unit_disk_point(g, "cone");
            const double u = unit(g);
            const double v = unit(g);
            const double w = unit(g);
            const double larger = u > v ? u : v;
            const real from_tip = larger > w ? larger : w; // in heights
            const real radius = this->scaled_radius() * from_tip;
            const point_type p = this->at(radius * across.x, radius * across.y,
                                          this->scaled_height() * (real(1) - from_tip));
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("cone");
    }

    /// Whether p is in the cone, its surface included: it lies within bounds(), its height h above
    /// the base is from 0 to `height`, and its distance from the axis at most radius * (1 - h /
    /// height), both squared, every operation rounded, scaled by a power of two. True for every
    /// point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        const auto [height, square] = this->place_of(p);
        const real radius =
            this->scaled_radius() * (real(1) - real(height) / this->scaled_height());
        return 0 <= height && real(height) <= this->scaled_height() &&
               real(square) <= radius * radius;
    }

    /// The volume, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        constexpr double third = 1.0 / 3;
        const detail::scaled radius = detail::split(double{this->radius()});
        return detail::saturated<Real>(detail::scaled_pi * detail::split(third) * radius * radius *
                                       detail::split(double{this->height()}));
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "cone";

    friend constexpr bool operator==(const cone&, const cone&) = default;

private:
    using typename base::real;
};

} // namespace leat

#endif
