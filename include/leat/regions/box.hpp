// The box: points uniform by length, area or volume between two corners, in N dimensions; its sides
// are parallel to the axes.
//
//   leat::box<3> hold{{0, 0, -4}, {60, 12, 0}};      // low corner, high corner
//   leat::box field{{0, 0}, {100, 50}};              // the dimension follows from the corners
//
// Method: each coordinate is `uniform` (uniform/open_interval.hpp), its ends left out, which no
// difference of corners overflows. Turned or sheared by an affine_image.
//
// Words: one a coordinate, in their order; word64, or word32 for float. Domain: corners finite;
// each side at least 2^-960 (2^-100 for float) and at least 256 steps between neighbouring numbers
// at its ends. Errors: invalid_parameter. Not for a grid of cells (uniform_integer).

#ifndef LEAT_REGIONS_BOX_HPP
#define LEAT_REGIONS_BOX_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/open_interval.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// The points between the corners `low` and `high`.
template <std::size_t N, detail::portable_real Real = double>
class box : public detail::region_base<box<N, Real>, Real, N> {
    static_assert(N >= 1);
    using base = detail::region_base<box, Real, N>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as a box of doubles.
    constexpr box(const std::type_identity_t<detail::point_argument<Real, N>>& low,
                  const std::type_identity_t<detail::point_argument<Real, N>>& high) {
        detail::require_point("box", "low", low.value);
        detail::require_point("box", "high", high.value);
        this->bounds_ = {low.value, high.value};
        for (std::size_t i = 0; i < N; ++i) {
            const Real a = low.value[i];
            const Real b = high.value[i];
            if (!(a < b)) {
                detail::refuse("box", "high", b, "must be above low in every coordinate");
            }
            const Real half = (strict(b) * Real{0.5} - strict(a) * Real{0.5}).value;
            if (detail::exponent_of(half) < detail::smallest_size_exponent<Real> - 1) {
                detail::refuse("box", "high - low", (strict(b) - a).value,
                               detail::size_allowed<Real>);
            }
            const Real edge = Real{0.5} * (-a > b ? a : b); // the larger end in size
            if (!detail::resolves(half, edge)) {
                detail::refuse("box", "high - low", (strict(b) - a).value,
                               detail::resolution_needed);
            }
            sides_[i] = uniform<Real>(a, b);
        }
    }

    /// A point uniform by measure.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        point_type p{};
        for (std::size_t i = 0; i < N; ++i) {
            p[i] = sides_[i](g);
        }
        return p;
    }

    /// Whether p lies between the corners, all sides included. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return this->bounds_.contains(p);
    }

    /// The length, area or volume, within N ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        detail::scaled product{1, 0};
        for (std::size_t i = 0; i < N; ++i) {
            const detail::strict<double> half = 0.5;
            const auto side =
                half * double{this->bounds_.high[i]} - half * double{this->bounds_.low[i]};
            product = product * detail::split(side.value);
            product = detail::split(product.factor) * detail::scaled{1, product.exponent + 1};
        }
        return detail::saturated<Real>(product);
    }

    [[nodiscard]] constexpr point_type low() const noexcept { return this->bounds_.low; }
    [[nodiscard]] constexpr point_type high() const noexcept { return this->bounds_.high; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "box";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"low", "high"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(this->bounds_.low, this->bounds_.high);
    }

    friend constexpr bool operator==(const box&, const box&) = default;

private:
    using strict = detail::strict<Real>;

    std::array<uniform<Real>, N> sides_{};
};

template <detail::arithmetic A, detail::arithmetic B, std::size_t N>
box(const A (&)[N], const B (&)[N]) -> box<N, double>;

} // namespace leat

#endif
