// The ellipsoid: points uniform by volume inside it, in space, its axes along the coordinates.
//
//   leat::ellipsoid earth{{0, 0, 0}, {6378.1, 6378.1, 6356.8}};      // centre, semi-axes
//
// Method: a point of the unit ball, stretched by the semi-axes and moved: a linear map, so that
// uniform stays uniform (Rubinstein, Simulation and the Monte Carlo Method, 1981, 2.5). Turned by
// an affine_image. Never stretch the points of the sphere and take them for uniform by area on the
// surface: they are not.
//
// Words, all word64, float included: 5.73 on average. Rounding: every point drawn is contained.
// Domain: centre and edge finite; semi-axes at least 2^-960 (2^-100 for float), and each at least
// 256 steps between neighbouring numbers at the edge in its direction. Units of all: those of the
// centre. Errors: invalid_parameter; engine_stuck.

#ifndef LEAT_REGIONS_ELLIPSOID_HPP
#define LEAT_REGIONS_ELLIPSOID_HPP

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

/// The ellipsoid with three semi-axes about a centre.
template <detail::portable_real Real = double>
class ellipsoid : public detail::region_base<ellipsoid<Real>, Real, 3> {
    using base = detail::region_base<ellipsoid, Real, 3>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as ellipsoid<double>.
    constexpr ellipsoid(const std::type_identity_t<detail::point_argument<Real, 3>>& centre,
                        const std::type_identity_t<detail::point_argument<Real, 3>>& semi_axes)
        : centre_(centre.value), semi_(semi_axes.value) {
        detail::require_point("ellipsoid", "centre", centre_);
        for (std::size_t i = 0; i < 3; ++i) {
            const Real semi = semi_[i];
            detail::require_size("ellipsoid", "semi_axes", semi);
            scale_[i] = detail::scale_of(semi);
            inverse_[i] = (real(1) / (real(double{semi}) * scale_[i])).value;
            const real middle = double{centre_[i]};
            this->bounds_.low[i] =
                detail::edge_as<Real>("ellipsoid", "semi_axes", semi, middle - double{semi});
            this->bounds_.high[i] =
                detail::edge_as<Real>("ellipsoid", "semi_axes", semi, middle + double{semi});
            detail::require_resolution("ellipsoid", "semi_axes", semi, this->bounds_, i);
        }
    }

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const auto offset = detail::unit_ball_point<3>(g, "ellipsoid");
            point_type p{};
            for (std::size_t i = 0; i < 3; ++i) {
                p[i] =
                    detail::rounded<Real>(double{centre_[i]} + real(offset[i]) * double{semi_[i]});
            }
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("ellipsoid");
    }

    /// Whether p is in the ellipsoid, its surface included: it lies within bounds(), and the
    /// squares of its coordinates over the semi-axes add up to at most 1, every operation rounded.
    /// True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        real sum = 0.0;
        for (std::size_t i = 0; i < 3; ++i) {
            const real x = (real(double{p[i]}) - double{centre_[i]}) * scale_[i] * inverse_[i];
            sum = sum + x * x;
        }
        return sum <= 1.0 && this->bounds_.contains(p);
    }

    /// The volume, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        detail::scaled volume = detail::unit_ball_volume(3);
        for (const Real semi : semi_) {
            volume = volume * detail::split(double{semi});
        }
        return detail::saturated<Real>(volume);
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    /// The semi-axes along x, y and z.
    [[nodiscard]] constexpr point_type semi_axes() const noexcept { return semi_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "ellipsoid";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "semi_axes"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, semi_);
    }

    friend constexpr bool operator==(const ellipsoid&, const ellipsoid&) = default;

private:
    using typename base::real;

    point_type centre_;
    point_type semi_;
    std::array<double, 3> scale_{};   // powers of two that bring the semi-axes into [2, 4)
    std::array<double, 3> inverse_{}; // one over the scaled semi-axes
};

} // namespace leat

#endif
