// The simplex: points uniform by volume between N + 1 corners, in N dimensions; and by its own name
// the tetrahedron.
//
//   leat::simplex<4> shares;                                // x_i > 0, their sum below 1
//   leat::simplex<3> wedge{corners};                        // std::array of 4 points
//   leat::tetrahedron cell{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}};
//
// Method: the spacings of N sorted uniforms, uniform in the unit simplex (Devroye, Non-Uniform
// Random Variate Generation, 1986, V.2.2), as weights of the edges from the first corner. Never
// divide N + 1 uniforms by their sum: that crowds points at the middle.
//
// Words: N word64, float included. Time grows as N^2: for a hundred dimensions and more take
// exponentials over their sum. Rounding: every point drawn is contained. Domain: corners finite;
// half the width in each coordinate at least 2^-960 (2^-100 for float) and 256 steps between
// neighbouring numbers; the corners not so nearly in one plane that rounding would spoil it. A
// coordinate below 2^-400 of the largest counts as 0. Units: those of the corners. Errors:
// invalid_parameter; engine_stuck.

#ifndef LEAT_REGIONS_SIMPLEX_HPP
#define LEAT_REGIONS_SIMPLEX_HPP

#include "leat/core/concepts.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/simplex_shape.hpp"

#include <array>
#include <cstddef>
#include <optional>
#include <type_traits>

namespace leat {

/// The points between N + 1 corners; without corners those with x_i > 0 and a sum below 1.
template <std::size_t N, detail::portable_real Real = double>
class simplex : public detail::region_base<simplex<N, Real>, Real, N> {
    static_assert(N >= 1);
    using base = detail::region_base<simplex, Real, N>;

public:
    using typename base::point_type;
    using corners_type = std::array<point_type, N + 1>; ///< in any order

    /// The unit simplex; its faces do not belong to it.
    constexpr simplex() noexcept { this->bounds_ = shape_.box(); }
    /// Its faces belong to it.
    constexpr explicit simplex(const corners_type& corners) : shape_("simplex", corners) {
        this->bounds_ = shape_.box();
    }

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return shape_.draw(g, "simplex");
    }

    /// Whether p is in the simplex: it lies within bounds(), and its weights of the corners,
    /// computed in rounded arithmetic, are not below 0. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return shape_.contains(p);
    }

    /// The volume, within a few N ulp for a simplex that is not flat; saturated where it does not
    /// fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept { return shape_.measure(); }

    [[nodiscard]] constexpr const corners_type& corners() const noexcept {
        return shape_.corners();
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "simplex";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"corners"};
    /// Calls use with what the constructor took, which is nothing for the unit simplex.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(shape_.is_open() ? std::nullopt : std::optional<corners_type>(corners()));
    }
    /// From those arguments.
    static constexpr simplex from_arguments(const std::optional<corners_type>& corners) {
        return corners ? simplex(*corners) : simplex();
    }

    friend constexpr bool operator==(const simplex&, const simplex&) = default;

private:
    detail::simplex_shape<N, Real> shape_;
};

/// The points between four corners in space, in any order.
template <detail::portable_real Real = double>
class tetrahedron : public detail::region_base<tetrahedron<Real>, Real, 3> {
    using base = detail::region_base<tetrahedron, Real, 3>;
    using corner = std::type_identity_t<detail::point_argument<Real, 3>>;

public:
    using typename base::point_type;

    /// Of any arithmetic types; deduced as tetrahedron<double>.
    constexpr tetrahedron(const corner& a, const corner& b, const corner& c, const corner& d)
        : shape_("tetrahedron", {a.value, b.value, c.value, d.value}) {
        this->bounds_ = shape_.box();
    }

    /// A point uniform by volume.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return shape_.draw(g, "tetrahedron");
    }

    /// As simplex::contains, the faces included.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return shape_.contains(p);
    }

    /// The volume, as simplex::measure.
    [[nodiscard]] constexpr Real measure() const noexcept { return shape_.measure(); }

    [[nodiscard]] constexpr const std::array<point_type, 4>& corners() const noexcept {
        return shape_.corners();
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "tetrahedron";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"a", "b", "c", "d"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(corners()[0], corners()[1], corners()[2], corners()[3]);
    }

    friend constexpr bool operator==(const tetrahedron&, const tetrahedron&) = default;

private:
    detail::simplex_shape<3, Real> shape_;
};

} // namespace leat

#endif
