// What sphere and cap share: a surface at a radius about a centre.

#ifndef LEAT_REGIONS_DETAIL_SPHERICAL_SURFACE_HPP
#define LEAT_REGIONS_DETAIL_SPHERICAL_SURFACE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

/// The points at `radius` from `centre`.
template <std::size_t N, portable_real Real>
class spherical_surface {
public:
    using point_type = std::array<Real, N>;

    constexpr spherical_surface(const char* name, const point_type& centre, Real radius)
        : centre_(centre), radius_(radius) {
        box_ = cube_about(name, "radius", radius_, centre_);
        scale_ = scale_of(radius_);
        scaled_radius_ = held(double{radius_} * scale_);
        tolerance_ = held(surface_tolerance(radius_, box_) * scale_);
    }

    /// The box around all of the sphere.
    [[nodiscard]] constexpr const region_bounds<Real, N>& box() const noexcept { return box_; }

    /// Coordinate i of the point in a direction, whose coordinate i is `x`.
    [[nodiscard]] constexpr Real coordinate(std::size_t i, double x) const noexcept {
        return rounded<Real>(double{centre_[i]} + real(x) * double{radius_});
    }

    /// Whether p, in the box, is at the radius, within the tolerance.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        const double off = distance(p) - scaled_radius_;
        return -tolerance_ <= off && off <= tolerance_;
    }

    /// The vector from the centre, in a unit that makes the radius 2 to 4.
    [[nodiscard]] constexpr std::array<double, N> from_centre(const point_type& p) const noexcept {
        std::array<double, N> v{};
        for (std::size_t i = 0; i < N; ++i) {
            v[i] = ((real(double{p[i]}) - double{centre_[i]}) * scale_).value;
        }
        return v;
    }

    [[nodiscard]] constexpr double scaled_radius() const noexcept { return scaled_radius_; }
    [[nodiscard]] constexpr double scaled_tolerance() const noexcept { return tolerance_; }
    [[nodiscard]] constexpr const point_type& centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real radius() const noexcept { return radius_; }

    friend constexpr bool operator==(const spherical_surface&, const spherical_surface&) = default;

private:
    using real = strict<double>;

    [[nodiscard]] constexpr double distance(const point_type& p) const noexcept {
        real sum = 0.0;
        for (const double x : from_centre(p)) {
            sum = sum + real(x) * x;
        }
        return sum < 1e-30 ? 0 : square_root(sum.value); // no subnormal argument
    }

    point_type centre_;
    Real radius_;
    double scale_ = 0; // the power of two that brings the radius into [2, 4)
    double scaled_radius_ = 0;
    double tolerance_ = 0;
    region_bounds<Real, N> box_{};
};

} // namespace leat::detail

#endif
