// Directions in space: unit vectors of the laws that transport and rendering codes draw from.
//
//   isotropic_direction<>{}                  any direction as likely as any other
//   direction_in_cone{axis, half_angle}      uniform by solid angle within an angle of an axis
//   lambert_direction{normal}                cosine-weighted in the hemisphere about a normal: what
//                                            a matt surface sends out (Lambert, Photometria, 1760)
//   von_mises_fisher{axis, concentration}    density proportional to e^(concentration cos t), t the
//                                            angle to the axis: the normal law of directions
//
// Each has `density(p)`, by solid angle: per steradian, at a unit vector p.
// Methods, all exact, all from one point of the unit disk: the cosine is uniform in a cone
// (Archimedes; Marsaglia, Ann. Math. Stat. 43, 1972); a uniform point of the disk lifted to the
// sphere is cosine-weighted (Malley's method: Shirley and Chiu, J. Graphics Tools 2(3), 1997; from
// memory); 1 - cos t of the von Mises-Fisher law is an exponential cut at 2 (Ulrich, Applied
// Statistics 33, 1984), here drawn by rejection, so that no logarithm ends its tail. Never take a
// uniform angle to the axis: it crowds directions about it.
//
// Words, all word64, float included: 2.55 on average; von_mises_fisher 1.03 / (1 - e^(-2c)) more
// for a concentration c from 1/2, and 2.03 2 c / (1 - e^(-2c)) below. Domain: axes finite, of any
// length but 0; half angle from 2^-44 (float: 2^-15) to pi (rounded up); concentration from 0 to
// 2^80 (float: 2^20). Rounding: length 1 within 6 ulp. Errors: invalid_parameter; engine_stuck.
// Not for other dimensions: sphere<N> has the uniform one.

#ifndef LEAT_REGIONS_DIRECTIONS_HPP
#define LEAT_REGIONS_DIRECTIONS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/regions/detail/axis_frame.hpp"
#include "leat/regions/detail/cap_angle.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {
namespace detail {

/// Unit vectors: what the laws of directions share.
template <class Derived, portable_real Real>
class direction_law {
public:
    using real_type = Real;
    using point_type = std::array<Real, 3>;
    static constexpr std::size_t dimension = 3;

    /// The same direction as a Vec: anything that three coordinates in braces initialise.
    template <class Vec, random_words G>
    constexpr Vec draw(G& g) const {
        return point_as<Vec>(static_cast<const Derived&>(*this)(g));
    }

    friend constexpr bool operator==(const direction_law&, const direction_law&) = default;

protected:
    using real = strict<double>;
    static constexpr double one_over_pi = 0x1.45f306dc9c883p-2;

    static constexpr point_type as_point(const std::array<double, 3>& v) noexcept {
        return {rounded<Real>(v[0]), rounded<Real>(v[1]), rounded<Real>(v[2])};
    }
    static constexpr std::array<double, 3> wide(const point_type& p) noexcept {
        return {double{p[0]}, double{p[1]}, double{p[2]}};
    }
};

} // namespace detail

/// Any direction as likely as any other.
template <detail::portable_real Real = double>
class isotropic_direction : public detail::direction_law<isotropic_direction<Real>, Real> {
    using base = detail::direction_law<isotropic_direction, Real>;

public:
    using typename base::point_type;

    /// A unit vector.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return base::as_point(detail::unit_sphere_point<3>(g, "isotropic_direction"));
    }

    /// 1 / (4 pi).
    [[nodiscard]] constexpr double density(const point_type&) const noexcept {
        return base::one_over_pi / 4;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "isotropic_direction";
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use();
    }

    friend constexpr bool operator==(const isotropic_direction&,
                                     const isotropic_direction&) = default;
};

/// Uniform by solid angle among the directions within `half_angle` of `axis`.
template <detail::portable_real Real = double>
class direction_in_cone : public detail::direction_law<direction_in_cone<Real>, Real> {
    using base = detail::direction_law<direction_in_cone, Real>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as direction_in_cone<double>.
    template <detail::arithmetic Angle>
    constexpr direction_in_cone(const std::type_identity_t<detail::point_argument<Real, 3>>& axis,
                                Angle half_angle)
        : frame_("direction_in_cone", "axis", axis.value),
          half_angle_(static_cast<Real>(half_angle)),
          angle_("direction_in_cone", half_angle_) {}

    /// A unit vector.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto disk = detail::unit_disk_point(g, "direction_in_cone");
        const auto [x, y, z] = detail::cap_point(disk, angle_.versine());
        return base::as_point(frame_.at(x, y, z));
    }

    /// One over the solid angle in the cone, 0 outside.
    [[nodiscard]] constexpr double density(const point_type& p) const noexcept {
        const bool inside = frame_.along(base::wide(p)) >= angle_.cosine();
        return inside ? (real(base::one_over_pi) / (real(2) * angle_.versine())).value : 0;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "direction_in_cone";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"axis", "half_angle"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(frame_.template given<Real>(), half_angle_);
    }

    friend constexpr bool operator==(const direction_in_cone&, const direction_in_cone&) = default;

private:
    using typename base::real;

    detail::axis_frame frame_;
    Real half_angle_;
    detail::cap_angle angle_;
};

/// Cosine-weighted in the hemisphere about `normal`.
template <detail::portable_real Real = double>
class lambert_direction : public detail::direction_law<lambert_direction<Real>, Real> {
    using base = detail::direction_law<lambert_direction, Real>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as lambert_direction<double>.
    explicit constexpr lambert_direction(
        const std::type_identity_t<detail::point_argument<Real, 3>>& normal)
        : frame_("lambert_direction", "normal", normal.value) {}

    /// A unit vector.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto disk = detail::unit_disk_point(g, "lambert_direction");
        const double height = detail::square_root((real(1) - disk.square).value);
        return base::as_point(frame_.at(disk.x, disk.y, height));
    }

    /// cos t / pi, t being the angle to the normal; 0 below the surface.
    [[nodiscard]] constexpr double density(const point_type& p) const noexcept {
        const real cosine = frame_.along(base::wide(p));
        return cosine > 0.0 ? (cosine * base::one_over_pi).value : 0;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "lambert_direction";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"normal"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(frame_.template given<Real>());
    }

    friend constexpr bool operator==(const lambert_direction&, const lambert_direction&) = default;

private:
    using typename base::real;

    detail::axis_frame frame_;
};

/// The law of von Mises and Fisher about `axis`; concentration 0 is isotropic.
template <detail::portable_real Real = double>
class von_mises_fisher : public detail::direction_law<von_mises_fisher<Real>, Real> {
    using base = detail::direction_law<von_mises_fisher, Real>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as von_mises_fisher<double>.
    template <detail::arithmetic Concentration>
    constexpr von_mises_fisher(const std::type_identity_t<detail::point_argument<Real, 3>>& axis,
                               Concentration concentration)
        : frame_("von_mises_fisher", "axis", axis.value),
          concentration_(static_cast<Real>(concentration)) {
        constexpr bool wide = std::is_same_v<Real, double>;
        if (!(concentration_ >= 0 && concentration_ <= Real(wide ? 0x1p80 : 0x1p20))) {
            detail::refuse("von_mises_fisher", "concentration", concentration_,
                           wide ? "must be from 0 to 2^80" : "must be from 0 to 2^20");
        }
    }

    /// A unit vector.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const real drop = height_below_top(g); // 1 - cos t
        const auto [x, y] = detail::unit_circle_point(g, "von_mises_fisher");
        const real across = detail::square_root((drop * (real(2) - drop)).value);
        return base::as_point(
            frame_.at((across * x).value, (across * y).value, (real(1) - drop).value));
    }

    /// c e^(-c (1 - cos t)) / (2 pi (1 - e^(-2c))), t being the angle to the axis.
    [[nodiscard]] constexpr double density(const point_type& p) const noexcept {
        const real c = double{concentration_};
        if (c < 0x1p-60) {
            return base::one_over_pi / 4;
        }
        real square = 0.0; // of the distance between the ends of the two vectors: 2 (1 - cos t)
        for (std::size_t i = 0; i < 3; ++i) {
            const real off = real(double{p[i]}) - frame_.axis()[i];
            square = square + off * off;
        }
        const real height = detail::natural_exp((-c * square * 0.5).value);
        const real share = -detail::exp_minus_one((c * -2.0).value);
        return (c * height * base::one_over_pi / (share + share)).value;
    }

    [[nodiscard]] constexpr Real concentration() const noexcept { return concentration_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "von_mises_fisher";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"axis", "concentration"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(frame_.template given<Real>(), concentration_);
    }

    friend constexpr bool operator==(const von_mises_fisher&, const von_mises_fisher&) = default;

private:
    using typename base::real;

    // An exponential of that rate, cut at 2. From 1/2 on, those above 2 are rejected (at most 37
    // %); below, a uniform height is accepted with the probability e^(-c height).
    template <class G>
    constexpr double height_below_top(G& g) const {
        const real c = double{concentration_};
        for (int trial = 0; trial < 128; ++trial) { // 0.37^128 < 2^-183
            if (c >= 0.5) {
                const real drop = real(detail::standard_exponential(g)) / c;
                if (drop < 2.0) {
                    return drop.value;
                }
            } else {
                const real drop = real(2) * unit(g);
                if (real(detail::standard_exponential(g)) > c * drop) {
                    return drop.value;
                }
            }
        }
        detail::stuck("von_mises_fisher");
    }

    detail::axis_frame frame_;
    Real concentration_;
};

} // namespace leat

#endif
