// The sphere, a surface: points uniform by area at a distance from a centre, in a space of N
// dimensions. N = 2 is the circle.
//
//   leat::sphere<3> hull{{0, 0, 1}, 2.5};        // centre, radius
//   leat::sphere ring{{0, 0}, 1};                // the dimension follows from the centre
//
// Methods, all exact: von Neumann 1951 on the circle, Marsaglia 1972 in three and four dimensions,
// normals brought to length above (detail/unit_vectors.hpp). Never take a uniform polar angle,
// nor points of the cube brought to length.
//
// Words, all word64, float included: 2.55 on average for N = 2 and 3, 5.09 for N = 4, 1.02 N above.
// Rounding: a point is within N / 2 + 4 ulp of the sphere, an ulp being a step between neighbouring
// numbers at the edge or at the radius, whichever is larger. Domain, units and errors: as ball.
// Not for directions alone: see directions.hpp, which has laws that are not uniform as well.

#ifndef LEAT_REGIONS_SPHERE_HPP
#define LEAT_REGIONS_SPHERE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/spherical_surface.hpp"
#include "leat/regions/detail/unit_vectors.hpp"

#include <cstddef>
#include <type_traits>

namespace leat {

/// The points at `radius` from `centre`.
template <std::size_t N, detail::portable_real Real = double>
class sphere : public detail::region_base<sphere<N, Real>, Real, N, N - 1> {
    static_assert(N >= 2, "leat::sphere<1> would be two points");
    using base = detail::region_base<sphere, Real, N, N - 1>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as a sphere of doubles.
    template <detail::arithmetic Size>
    constexpr sphere(const std::type_identity_t<detail::point_argument<Real, N>>& centre,
                     Size radius)
        : surface_("sphere", centre.value, static_cast<Real>(radius)) {
        this->bounds_ = surface_.box();
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const auto direction = detail::unit_sphere_point<N>(g, "sphere");
        point_type p{};
        for (std::size_t i = 0; i < N; ++i) {
            p[i] = this->within_bounds(i, surface_.coordinate(i, direction[i]));
        }
        return p;
    }

    /// Whether p is on the sphere: within bounds(), and its distance from the centre is the radius
    /// give or take 1e-12 of it (float: 1e-6), or eight steps between neighbouring numbers at the
    /// edge where that is more. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return this->bounds_.contains(p) && surface_.contains(p);
    }

    /// The area (for N = 2 the length), within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(
            detail::unit_ball_volume(N) * detail::split(static_cast<double>(N)) *
            detail::power(detail::split(double{surface_.radius()}), N - 1));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return surface_.centre(); }
    [[nodiscard]] constexpr Real radius() const noexcept { return surface_.radius(); }

    /// The name under which it is saved.
    static constexpr const char* class_name = "sphere";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "radius"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(surface_.centre(), surface_.radius());
    }

    friend constexpr bool operator==(const sphere&, const sphere&) = default;

private:
    detail::spherical_surface<N, Real> surface_;
};

template <detail::arithmetic T, std::size_t N, detail::arithmetic Size>
sphere(const T (&)[N], Size) -> sphere<N, double>;

} // namespace leat

#endif
