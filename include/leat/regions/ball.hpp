// The ball: points uniform by volume within a distance of a centre, in N dimensions.
//
//   leat::ball<3> drop{{0, 0, 1}, 2.5};      // centre, radius
//   leat::ball spray{{0, 0, 0, 0}, 1};       // the dimension follows from the centre
//
// Method: up to three dimensions rejection from the cube about it, above normals over the root of
// their squares and an exponential; both exact (sources in detail/unit_vectors.hpp). Never take a
// uniform radius, nor points of the cube brought to length.
//
// Words, all word64, float included: 5.73 on average for N = 3, 1.02 N + 1.03 for N > 3, for N = 2
// as the disk. Rounding: every point drawn is contained. Domain: centre and edge finite; radius at
// least 2^-960 (2^-100 for float) and at least 256 steps between neighbouring numbers at the edge.
// Units: those of the centre. Errors: invalid_parameter; engine_stuck after so many rejections that
// a sound engine has them below 2^-100.
// Not for points at the radius itself (sphere), nor for a hollow (shell).

#ifndef LEAT_REGIONS_BALL_HPP
#define LEAT_REGIONS_BALL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// The ball of points no further than `radius` from `centre`.
template <std::size_t N, detail::portable_real Real = double>
class ball : public detail::region_base<ball<N, Real>, Real, N> {
    static_assert(N >= 1);
    using base = detail::region_base<ball, Real, N>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as a ball of doubles.
    template <detail::arithmetic Size>
    constexpr ball(const std::type_identity_t<detail::point_argument<Real, N>>& centre, Size radius)
        : centre_(centre.value), radius_(static_cast<Real>(radius)) {
        this->bounds_ = detail::cube_about("ball", "radius", radius_, centre_);
        scale_ = detail::scale_of(radius_);
        const real scaled = real(double{radius_}) * scale_;
        limit_ = (scaled * scaled).value;
    }

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const auto offset = detail::unit_ball_point<N>(g, "ball");
            point_type p{};
            for (std::size_t i = 0; i < N; ++i) {
                p[i] =
                    detail::rounded<Real>(double{centre_[i]} + real(offset[i]) * double{radius_});
            }
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("ball");
    }

    /// Whether p is in the ball, its surface included: it lies within bounds(), and the squares of
    /// its distances from the centre add up to at most radius * radius, every operation rounded,
    /// scaled by a power of two. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        real sum = 0.0;
        for (std::size_t i = 0; i < N; ++i) {
            const real x = (real(double{p[i]}) - double{centre_[i]}) * scale_;
            sum = sum + x * x;
        }
        return sum <= limit_ && this->bounds_.contains(p);
    }

    /// The volume, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(detail::unit_ball_volume(N) *
                                       detail::power(detail::split(double{radius_}), N));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real radius() const noexcept { return radius_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "ball";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "radius"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, radius_);
    }

    friend constexpr bool operator==(const ball&, const ball&) = default;

private:
    using typename base::real;

    point_type centre_;
    Real radius_;
    double scale_ = 0; // the power of two that brings the radius into [2, 4)
    double limit_ = 0; // the scaled radius, squared
};

template <detail::arithmetic T, std::size_t N, detail::arithmetic Size>
ball(const T (&)[N], Size) -> ball<N, double>;

} // namespace leat

#endif
