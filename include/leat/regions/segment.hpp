// The segment: points uniform by length between two ends, in N dimensions.
//
//   leat::segment<3> cable{{0, 0, -10}, {40, 5, -12}};
//   leat::segment wall{{0, 0}, {3, 4}};      // the dimension follows from the ends
//
// Method: (1 - u) a + u b, which no difference of the ends overflows.
//
// Words: one word64 a point, float included. Rounding: each coordinate is within 2 ulp of the
// larger end's, and between the ends'. Domain: ends finite; the length at least 2^-960 (2^-100 for
// float) and at least 256 steps between neighbouring numbers at the ends, in every coordinate that
// changes along it. Errors: invalid_parameter. Not for points a fixed spacing apart.

#ifndef LEAT_REGIONS_SEGMENT_HPP
#define LEAT_REGIONS_SEGMENT_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/detail/line_piece.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/unit.hpp"

#include <cstddef>
#include <type_traits>

namespace leat {

/// The points between `a` and `b`.
template <std::size_t N, detail::portable_real Real = double>
class segment : public detail::region_base<segment<N, Real>, Real, N, 1> {
    static_assert(N >= 1);
    using base = detail::region_base<segment, Real, N, 1>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as a segment of doubles.
    constexpr segment(const std::type_identity_t<detail::point_argument<Real, N>>& a,
                      const std::type_identity_t<detail::point_argument<Real, N>>& b)
        : piece_{a.value, b.value} {
        detail::require_point("segment", "a", piece_.from);
        detail::require_point("segment", "b", piece_.to);
        if (piece_.from == piece_.to) {
            detail::refuse("segment", "length", Real{0}, detail::size_allowed<Real>);
        }
        const Real length = measure();
        detail::require_size("segment", "length", length);
        for (std::size_t i = 0; i < N; ++i) {
            const bool rises = piece_.from[i] < piece_.to[i];
            this->bounds_.low[i] = rises ? piece_.from[i] : piece_.to[i];
            this->bounds_.high[i] = rises ? piece_.to[i] : piece_.from[i];
            if (piece_.from[i] != piece_.to[i]) {
                detail::require_resolution("segment", "length", length, this->bounds_, i);
            }
        }
        scale_ = detail::scale_of(length);
        tolerance_ = detail::held(detail::surface_tolerance(length, this->bounds_) * scale_);
    }

    /// A point uniform by length.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return piece_.at(unit(g));
    }

    /// Whether p is on the segment: within bounds(), and at most 1e-12 of the length (float: 1e-6)
    /// from it, or eight steps between neighbouring numbers at the ends where that is more. True
    /// for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        return this->bounds_.contains(p) && piece_.is_near(p, scale_, tolerance_);
    }

    /// The length, within 2 ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(piece_.length());
    }

    /// One end.
    [[nodiscard]] constexpr point_type a() const noexcept { return piece_.from; }
    /// The other end.
    [[nodiscard]] constexpr point_type b() const noexcept { return piece_.to; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "segment";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"a", "b"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(piece_.from, piece_.to);
    }

    friend constexpr bool operator==(const segment&, const segment&) = default;

private:
    detail::line_piece<N, Real> piece_;
    double scale_ = 0; // the power of two that brings the length into [2, 4)
    double tolerance_ = 0;
};

template <detail::arithmetic A, detail::arithmetic B, std::size_t N>
segment(const A (&)[N], const B (&)[N]) -> segment<N, double>;

} // namespace leat

#endif
