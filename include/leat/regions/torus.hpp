// The torus, a surface: points uniform by area on a ring, in space, about an axis along z.
//
//   leat::torus ring{{0, 0, 0}, 2, 0.5};    // centre, radius of the ring, radius of the tube
//
// Method: the angle t in the tube has the density (1 + (minor/major) cos t) / (2 pi), the area of a
// strip of the ring. It comes without rejection: a uniform angle is kept with half of 1 +
// (minor/major) cos t as its probability, and else reflected, t to pi - t (exact, since the factors
// of the two add up to 2). Never take a uniform tube angle: it crowds points inside the ring.
// (Diaconis, Holmes and Shahshahani, Sampling from a manifold, 2013, have the density.)
//
// Words, all word64, float included: 6.09 on average: a circle's for the ring, a circle's for the
// tube, one for the reflection. Rounding: a point is within 8 ulp of the surface, an ulp being a
// step between neighbouring numbers at the edge or at the outer radius, whichever is larger.
// Domain: centre and edge finite; both radii at least 2^-960 (2^-100 for float), minor <= major,
// and minor at least 256 steps between neighbouring numbers at the edge. Errors: invalid_parameter;
// engine_stuck. Not for the solid.

#ifndef LEAT_REGIONS_TORUS_HPP
#define LEAT_REGIONS_TORUS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// The points at `minor` from a circle of radius `major` about `centre`, which lies in the plane of
/// x and y.
template <detail::portable_real Real = double>
class torus : public detail::region_base<torus<Real>, Real, 3, 2> {
    using base = detail::region_base<torus, Real, 3, 2>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as torus<double>.
    template <detail::arithmetic Major, detail::arithmetic Minor>
    constexpr torus(const std::type_identity_t<detail::point_argument<Real, 3>>& centre,
                    Major major, Minor minor)
        : centre_(centre.value),
          major_(static_cast<Real>(major)),
          minor_(static_cast<Real>(minor)) {
        detail::require_point("torus", "centre", centre_);
        detail::require_size("torus", "major", major_);
        detail::require_size("torus", "minor", minor_);
        if (!(minor_ <= major_)) {
            detail::refuse("torus", "minor", minor_, "must be at most major");
        }
        const double outer = (real(double{major_}) + double{minor_}).value;
        this->bounds_ = detail::box_about("torus", "major", major_, centre_,
                                          std::array<double, 3>{outer, outer, double{minor_}});
        for (std::size_t i = 0; i < 3; ++i) {
            detail::require_resolution("torus", "minor", minor_, this->bounds_, i);
        }
        if (!detail::resolves(minor_, major_)) { // an edge may lie near 0
            detail::refuse("torus", "minor", minor_, detail::resolution_needed);
        }
        scale_ = detail::scale_of(major_);
        tolerance_ = detail::held(detail::surface_tolerance(major_, this->bounds_) * scale_);
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto [cosine, sine] = detail::unit_circle_point(g, "torus");
        const auto [tube_cosine, tube_sine] = detail::unit_circle_point(g, "torus");
        const real u = unit(g);
        const real outward = tube_cosine;
        const real ratio = real(double{minor_}) / double{major_};
        const bool kept = u + u < real(1) + ratio * outward;
        const real distance =
            real(double{major_}) + real(double{minor_}) * (kept ? outward : -outward);
        const std::array<double, 3> offset{(distance * cosine).value, (distance * sine).value,
                                           (real(double{minor_}) * tube_sine).value};
        point_type p{};
        for (std::size_t i = 0; i < 3; ++i) {
            p[i] =
                this->within_bounds(i, detail::rounded<Real>(real(double{centre_[i]}) + offset[i]));
        }
        return p;
    }

    /// Whether p is on the torus: within bounds(), and its distance from the circle in the tube is
    /// minor, give or take 1e-12 of major (float: 1e-6), or eight steps between neighbouring
    /// numbers at the edge where that is more. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        std::array<double, 3> v{};
        for (std::size_t i = 0; i < 3; ++i) { // scaled first, for the difference may overflow
            v[i] = (real(double{p[i]}) * scale_ - real(double{centre_[i]}) * scale_).value;
        }
        const real from_ring = real(length(v[0], v[1])) - real(double{major_}) * scale_;
        const real off = real(length(from_ring.value, v[2])) - real(double{minor_}) * scale_;
        return -tolerance_ <= off.value && off.value <= tolerance_;
    }

    /// The area, within a few ulp (Pappus); saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(detail::scaled_pi * detail::scaled_pi * detail::split(4.0) *
                                       detail::split(double{major_}) *
                                       detail::split(double{minor_}));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real major() const noexcept { return major_; }
    [[nodiscard]] constexpr Real minor() const noexcept { return minor_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "torus";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "major", "minor"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, major_, minor_);
    }

    friend constexpr bool operator==(const torus&, const torus&) = default;

private:
    using typename base::real;

    static constexpr double length(double x, double y) noexcept {
        const real square = real(x) * x + real(y) * y;
        return square < 1e-200 ? 0 : detail::square_root(square.value); // no subnormal argument
    }

    point_type centre_;
    Real major_;
    Real minor_;
    double scale_ = 0; // the power of two that brings `major` into [2, 4)
    double tolerance_ = 0;
};

} // namespace leat

#endif
