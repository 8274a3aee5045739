// The disk: points uniform by area within a distance of a centre, in the plane.
//
//   leat::disk pond{{3, 4}, 2.5};       // centre, radius
//   auto [x, y] = pond(g);
//
// Method: rejection from the square about the disk, a published exact method (von Neumann 1951;
// Devroye, Non-Uniform Random Variate Generation, 1986, II.3). Measured one by one beside the other
// one, radius R sqrt(u) at a uniform angle: 8.3 ns a point against 11.2 from a stream, 5.7 against
// 8.0 from xoshiro256++ (g++ 12; clang 14: 9.4 to 10.0 and 6.6 to 7.8; bench/regions.cpp), so the
// faster was kept.
// Never take a uniform radius, nor one coordinate uniform and the other inside its chord: both
// crowd points together where the disk has little area.
//
// Words: two a trial, x first then y; a trial succeeds with probability pi/4, so 2.55 on average.
// Rounding: a trial is decided on the rounded point itself, so every point drawn is contained.
// Domain: centre and edge finite; radius at least 2^-960 (2^-100 for float), where subnormals would
// begin to matter, and at least 256 steps between neighbouring numbers at the edge, so that points
// can be uniform at all: {1e15, 0} with radius 1 is refused. Units: those of the centre.
// Errors: invalid_parameter; engine_stuck after 64 rejections (2^-142 for a sound engine).
// Not for: points on the circle itself, or a fixed spacing between points.

#ifndef LEAT_REGIONS_DISK_HPP
#define LEAT_REGIONS_DISK_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/square_trial.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <type_traits>

namespace leat {

/// The disk of points no further than `radius` from `centre`.
template <detail::portable_real Real = double>
class disk {
public:
    using real_type = Real;
    using point_type = std::array<Real, 2>;
    using bounds_type = region_bounds<Real, 2>;
    static constexpr std::size_t dimension = 2;

    /// Any arithmetic types; deduced as disk<double>.
    template <detail::arithmetic Size>
    constexpr disk(const std::type_identity_t<detail::point_argument<Real, 2>>& centre, Size radius)
        : centre_(centre.value), radius_(static_cast<Real>(radius)) {
        for (const Real c : centre_) {
            if (!detail::is_finite(c)) {
                detail::refuse("disk", "centre", c, "must be finite");
            }
        }
        if (!detail::is_size(radius_)) {
            detail::refuse("disk", "radius", radius_, detail::size_allowed<Real>);
        }
        for (std::size_t i = 0; i < 2; ++i) {
            bounds_.low[i] = (strict(centre_[i]) - radius_).value;
            bounds_.high[i] = (strict(centre_[i]) + radius_).value;
            if (!detail::is_finite(bounds_.low[i]) || !detail::is_finite(bounds_.high[i])) {
                detail::refuse("disk", "radius", radius_, "must leave the region's edge finite");
            }
            if (!detail::resolves(radius_, bounds_.low[i]) ||
                !detail::resolves(radius_, bounds_.high[i])) {
                detail::refuse("disk", "radius", radius_, detail::resolution_needed);
            }
        }
        step_ = (strict(radius_) * detail::signed_unit_step<Real>).value;
        scale_ = detail::power_of_two<Real>(1 - detail::exponent_of(radius_));
        const strict scaled = strict(radius_) * scale_;
        limit_ = (scaled * scaled).value;
        const bounds_type& b = bounds_;
        doubt_ = detail::doubtful_norms(
            radius_, detail::largest_exponent({b.low[0], b.low[1], b.high[0], b.high[1]}));
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        using square = detail::square_trial<Real>;
        for (int trial = 0; trial < 64; ++trial) {
            const square at(g);
            const std::uint64_t norm = at.norm();
            if (norm > square::circle + doubt_) {
                continue;
            }
            const strict x = strict(at.x()) * step_;
            const strict y = strict(at.y()) * step_;
            const point_type p{(centre_[0] + x).value, (centre_[1] + y).value};
            if (norm < square::circle - doubt_ || is_near(p)) {
                return p;
            }
        }
        detail::stuck("disk");
    }

    /// The same point as a Vec: anything that two coordinates in braces initialise.
    template <class Vec, random_words G>
    constexpr Vec draw(G& g) const {
        return detail::point_as<Vec>((*this)(g));
    }

    /// Whether p is in the disk, its edge included: it lies within bounds(), and
    /// dx * dx + dy * dy <= radius * radius, every operation rounded, scaled by a power of two.
    /// True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return bounds_.contains(p) && is_near(p);
    }

    /// The area, rounded; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::pi_times(radius_, radius_);
    }

    [[nodiscard]] constexpr bounds_type bounds() const noexcept { return bounds_; }
    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real radius() const noexcept { return radius_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "disk";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "radius"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, radius_);
    }

    friend constexpr bool operator==(const disk&, const disk&) = default;

private:
    using strict = detail::strict<Real>;

    // contains() but for the bounds, which no drawn point leaves: rounding keeps order.
    [[nodiscard]] constexpr bool is_near(const point_type& p) const noexcept {
        const strict x = (strict(p[0]) - centre_[0]) * scale_;
        const strict y = (strict(p[1]) - centre_[1]) * scale_;
        return x * x + y * y <= limit_;
    }

    point_type centre_;
    Real radius_;
    Real step_ = 0;           // radius over the steps of a signed unit
    Real scale_ = 0;          // the power of two that brings the radius into [2, 4)
    Real limit_ = 0;          // the scaled radius, squared
    std::uint64_t doubt_ = 0; // within this of the circle, is_near decides
    bounds_type bounds_{};
};

} // namespace leat

#endif
