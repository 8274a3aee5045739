// What cylinder and cone share: a disk for a base, an axis that stands upright on it, a height.

#ifndef LEAT_REGIONS_DETAIL_AXIAL_SOLID_HPP
#define LEAT_REGIONS_DETAIL_AXIAL_SOLID_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/detail/axis_frame.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

/// The base of `Derived`, a solid about an axis in space.
template <class Derived, portable_real Real>
class axial_solid : public region_base<Derived, Real, 3> {
    using base = region_base<Derived, Real, 3>;

public:
    using typename base::point_type;

    /// The centre of the base.
    [[nodiscard]] constexpr point_type base_centre() const noexcept { return base_; }
    [[nodiscard]] constexpr Real radius() const noexcept { return radius_; }
    [[nodiscard]] constexpr Real height() const noexcept { return height_; }
    /// The direction from the base to the top, of length 1.
    [[nodiscard]] constexpr point_type axis() const noexcept {
        point_type a{};
        for (std::size_t i = 0; i < 3; ++i) {
            a[i] = rounded<Real>(frame_.axis()[i]);
        }
        return a;
    }

    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"base_centre", "axis", "radius", "height"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(base_, frame_.template given<Real>(), radius_, height_);
    }

    friend constexpr bool operator==(const axial_solid&, const axial_solid&) = default;

protected:
    using typename base::real;

    /// `top_radius` is 1 where the top is as wide as the base, 0 where it is a point.
    constexpr axial_solid(const char* name, const point_type& base_centre, const point_type& axis,
                          Real radius, Real height, double top_radius)
        : base_(base_centre), frame_(name, "axis", axis), radius_(radius), height_(height) {
        require_point(name, "base", base_);
        require_size(name, "radius", radius_);
        require_size(name, "height", height_);
        const int ratio = exponent_of(double{height_}) - exponent_of(double{radius_});
        if (ratio < -400 || ratio > 400) {
            refuse(name, "height", height_, "must be from 2^-400 to 2^400 times the radius");
        }
        const Real size = radius_ > height_ ? radius_ : height_;
        scale_ = scale_of(size);
        unscale_ = power_of_two<double>(exponent_of(double{size}) - 1);
        scaled_radius_ = held(double{radius_} * scale_);
        scaled_height_ = held(double{height_} * scale_);
        for (std::size_t i = 0; i < 3; ++i) {
            const double across = frame_.reach_across(i);
            const real bottom = double{base_[i]};
            const real top = bottom + real(double{height_}) * frame_.axis()[i];
            const real reach = real(double{radius_}) * across;
            const real low = least(bottom - reach, top - reach * top_radius);
            const real high = -least(-(bottom + reach), -(top + reach * top_radius));
            this->bounds_.low[i] = edge_as<Real>(name, "radius", radius_, low);
            this->bounds_.high[i] = edge_as<Real>(name, "radius", radius_, high);
            if (across != 0) { // else the radius does not show in this coordinate
                require_resolution(name, "radius", radius_, this->bounds_, i);
            }
            if (frame_.axis()[i] != 0) {
                require_resolution(name, "height", height_, this->bounds_, i);
            }
        }
    }

    /// The point with these scaled coordinates: two across the axis, one along it.
    [[nodiscard]] constexpr point_type at(real x, real y, real z) const noexcept {
        const auto offset = frame_.at(x.value, y.value, z.value);
        point_type p{};
        for (std::size_t i = 0; i < 3; ++i) {
            p[i] = rounded<Real>(double{base_[i]} + real(offset[i]) * unscale_);
        }
        return p;
    }

    /// Where p is to the axis: its scaled height, and the square of its scaled distance.
    struct place {
        double height;
        double square;
    };
    [[nodiscard]] constexpr place place_of(const point_type& p) const noexcept {
        std::array<double, 3> v{};
        for (std::size_t i = 0; i < 3; ++i) { // scaled first, for the difference may overflow
            v[i] = (real(double{p[i]}) * scale_ - real(double{base_[i]}) * scale_).value;
        }
        return {frame_.along(v), frame_.square_across(v)};
    }

    [[nodiscard]] constexpr real scaled_radius() const noexcept { return scaled_radius_; }
    [[nodiscard]] constexpr real scaled_height() const noexcept { return scaled_height_; }

private:
    static constexpr real least(real a, real b) noexcept { return b < a ? b : a; }

    point_type base_;
    axis_frame frame_;
    Real radius_;
    Real height_;
    double scale_ = 0; // the power of two that brings the larger of the two into [2, 4)
    double unscale_ = 0;
    double scaled_radius_ = 0;
    double scaled_height_ = 0;
};

} // namespace leat::detail

#endif
