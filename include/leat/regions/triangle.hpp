// The triangle: points uniform by area between three corners, in the plane.
//
//   leat::triangle sail{{0, 0}, {4, 0}, {1, 3}};      // the corners, in either sense
//
// Method: a point of the parallelogram of two sides, folded onto the triangle along its diagonal
// (G. Turk, Generating random points in triangles, Graphics Gems, 1990). No root, no rejection.
// Never take two uniforms and the rest to one as weights brought to a sum of 1: that crowds points
// at the middle.
//
// Words: two word64, float included. Rounding: every point drawn is contained. Domain: corners
// finite; each coordinate 0, or at least 2^-400 of the largest; the half widths at least 2^-960
// (2^-100 for float) and 256 steps between neighbouring numbers; and an area so large that rounding
// does not spoil it: corners on a line are refused. Units: those of the corners. Errors:
// invalid_parameter. Not for a triangle in space (triangle_mesh).

#ifndef LEAT_REGIONS_TRIANGLE_HPP
#define LEAT_REGIONS_TRIANGLE_HPP

#include "leat/core/concepts.hpp"
#include "leat/regions/detail/orientation.hpp"
#include "leat/regions/detail/plane_triangle.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// The points between three corners.
template <detail::portable_real Real = double>
class triangle : public detail::region_base<triangle<Real>, Real, 2> {
    using base = detail::region_base<triangle, Real, 2>;
    using corner = std::type_identity_t<detail::point_argument<Real, 2>>;

public:
    using typename base::point_type;

    /// Of any arithmetic types; deduced as triangle<double>.
    constexpr triangle(const corner& a, const corner& b, const corner& c)
        : corners_{a.value, b.value, c.value} {
        this->bounds_ = {a.value, a.value};
        for (const point_type& p : corners_) {
            detail::require_point("triangle", "corner", p);
            detail::extend(this->bounds_, p);
        }
        detail::require_plane_size("triangle", this->bounds_);
        frame_ = detail::plane_frame<Real>(this->bounds_);
        for (const point_type& p : corners_) {
            detail::require_kept("triangle", "corner", frame_, p);
        }
        inside_ = {frame_(a.value), frame_(b.value), frame_(c.value)};
        doubled_area_ = detail::doubled_area(inside_.a, inside_.b, inside_.c);
        if (doubled_area_ < 0) {
            inside_ = {inside_.a, inside_.c, inside_.b};
            doubled_area_ = -doubled_area_;
        }
        detail::require_area("triangle", frame_, this->bounds_, doubled_area_);
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return inside_.draw(frame_, g);
    }

    /// Whether p is in the triangle, its sides included: exact, but that a coordinate of p below
    /// 2^-400 of the triangle's largest counts as 0. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return this->bounds_.contains(p) && inside_.contains(frame_(p));
    }

    /// The area, within 2^-30 of itself where it is that of a needle, else within a few ulp;
    /// saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(frame_.half_area(doubled_area_));
    }

    [[nodiscard]] constexpr const std::array<point_type, 3>& corners() const noexcept {
        return corners_;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "triangle";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"a", "b", "c"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(corners_[0], corners_[1], corners_[2]);
    }

    friend constexpr bool operator==(const triangle&, const triangle&) = default;

private:
    std::array<point_type, 3> corners_;
    detail::plane_frame<Real> frame_{};
    detail::plane_triangle inside_{};
    double doubled_area_ = 0;
};

} // namespace leat

#endif
