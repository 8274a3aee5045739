// The cylinder, a solid: points uniform by volume in it, in space, its axis in any direction.
//
//   leat::cylinder tank{{0, 0, 0}, {0, 0, 1}, 6, 14};     // base centre, axis, radius, height
//
// Method: an exact map: a point of the disk by rejection, a uniform height. Never take a uniform
// distance from the axis.
//
// Words, all word64, float included: 3.55 on average, those of the disk first. Rounding: every
// point drawn is contained. Domain: base centre and edges finite; the axis finite, of any length
// but 0; radius and height at least 2^-960 (2^-100 for float), neither more than 2^400 times the
// other, and each at least 256 steps between neighbouring numbers at the edges of the coordinates
// that it shows in. Errors: invalid_parameter; engine_stuck. Not for the surface.

#ifndef LEAT_REGIONS_CYLINDER_HPP
#define LEAT_REGIONS_CYLINDER_HPP

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

/// The points within `radius` of the axis, up to `height` above the base.
template <detail::portable_real Real = double>
class cylinder : public detail::axial_solid<cylinder<Real>, Real> {
    using base = detail::axial_solid<cylinder, Real>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as cylinder<double>.
    template <detail::arithmetic Size, detail::arithmetic Height>
    constexpr cylinder(const std::type_identity_t<detail::point_argument<Real, 3>>& base_centre,
                       const std::type_identity_t<detail::point_argument<Real, 3>>& axis,
                       Size radius, Height height)
        : base("cylinder", base_centre.value, axis.value, static_cast<Real>(radius),
               static_cast<Real>(height), 1) {}

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const auto across = detail::unit_disk_point(g, "cylinder");
            const double along = unit(g);
            const point_type p =
                this->at(this->scaled_radius() * across.x, this->scaled_radius() * across.y,
                         this->scaled_height() * along);
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("cylinder");
    }

    /// Whether p is in the cylinder, its surface included: it lies within bounds(), its height
    /// above the base is from 0 to `height`, and the square of its distance from the axis at most
    /// radius * radius, every operation rounded, scaled by a power of two. True for every point
    /// drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        const auto [height, square] = this->place_of(p);
        return 0 <= height && real(height) <= this->scaled_height() &&
               real(square) <= this->scaled_radius() * this->scaled_radius();
    }

    /// The volume, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        const detail::scaled radius = detail::split(double{this->radius()});
        return detail::saturated<Real>(detail::scaled_pi * radius * radius *
                                       detail::split(double{this->height()}));
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "cylinder";

    friend constexpr bool operator==(const cylinder&, const cylinder&) = default;

private:
    using typename base::real;
};

} // namespace leat

#endif
