// The rotation: a uniform rotation of space, every orientation of a body as likely as any other.
//
//   leat::rotation tumble;
//   const auto q = tumble(g);                         // a unit quaternion {w, x, y, z}
//   const auto v = leat::rotation<>::apply(q, {0, 0, 1});
//
// Uniform by the only measure that no rotation changes (Haar's). Method: K. Shoemake, Uniform
// random rotations, Graphics Gems III, 1992: two circles, of radius sqrt(1 - u) and sqrt(u), which
// together are a point uniform on the unit sphere in four dimensions. The radius and the two angles
// are taken from two points of the disk (Marsaglia, Ann. Math. Stat. 43, 1972), a fifth faster than
// the sines and cosines of uniform angles (11.8 against 14.4 ns; g++ 12, xoshiro256++). q and -q
// are the same rotation; both come. Never take three uniform Euler angles, nor a uniform angle
// about a uniform axis: the angle has the law (t - sin t) / pi on 0 <= t <= pi.
//
// Words, all word64, float included: 5.09 on average. A quaternion has length 1 within 4 ulp.
// Errors: engine_stuck. Not for small random turns (that is another law), nor for a direction alone
// (sphere).

#ifndef LEAT_REGIONS_ROTATION_HPP
#define LEAT_REGIONS_ROTATION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// All rotations about the origin, as unit quaternions.
template <detail::portable_real Real = double>
class rotation : public detail::region_base<rotation<Real>, Real, 4, 3> {
    using base = detail::region_base<rotation, Real, 4, 3>;

public:
    using typename base::point_type;

    constexpr rotation() noexcept { this->bounds_ = {{-1, -1, -1, -1}, {1, 1, 1, 1}}; }

    /// A uniform rotation: a unit quaternion {w, x, y, z}.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto q = detail::unit_sphere_point<4>(g, "rotation");
        point_type p{};
        for (std::size_t i = 0; i < 4; ++i) {
            p[i] = this->within_bounds(i, detail::rounded<Real>(q[i]));
        }
        return p;
    }

    /// Whether q has length 1, within 1e-12 (float: 1e-6). True for every quaternion drawn.
    [[nodiscard]] constexpr bool contains(const point_type& q) const noexcept {
        constexpr double tolerance = std::is_same_v<Real, double> ? 1e-12 : 1e-6;
        real square = 0.0;
        for (const Real x : q) {
            square = square + real(double{x}) * double{x};
        }
        // |q|^2 - 1 = (|q| - 1)(|q| + 1)
        return this->bounds_.contains(q) && square >= 1 - 2 * tolerance &&
               square <= 1 + 2 * tolerance;
    }

    /// 2 pi^2, the content of the sphere of unit quaternions, which holds each rotation twice.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return static_cast<Real>(0x1.3bd3cc9be45dep+4);
    }

    /// The vector that the rotation q makes of v. Takes unit quaternions, of any sampler.
    [[nodiscard]] static constexpr std::array<Real, 3>
    apply(const point_type& q, const std::array<Real, 3>& v) noexcept {
        const std::array<double, 3> axis{double{q[1]}, double{q[2]}, double{q[3]}};
        const std::array<double, 3> wide{double{v[0]}, double{v[1]}, double{v[2]}};
        const auto once = cross(axis, wide); // v + 2 w (axis x v) + 2 axis x (axis x v)
        const auto twice = cross(axis, once);
        std::array<Real, 3> turned{};
        for (std::size_t i = 0; i < 3; ++i) {
            const real change = real(double{q[0]}) * once[i] + twice[i];
            turned[i] = detail::rounded<Real>(real(wide[i]) + (change + change));
        }
        return turned;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "rotation";
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use();
    }

    friend constexpr bool operator==(const rotation&, const rotation&) = default;

private:
    using typename base::real;

    static constexpr std::array<double, 3> cross(const std::array<double, 3>& a,
                                                 const std::array<double, 3>& b) noexcept {
        std::array<double, 3> c{};
        for (std::size_t i = 0; i < 3; ++i) {
            const std::size_t j = (i + 1) % 3;
            const std::size_t k = (i + 2) % 3;
            c[i] = (real(a[j]) * b[k] - real(a[k]) * b[j]).value;
        }
        return c;
    }
};

} // namespace leat

#endif
