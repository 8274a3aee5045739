// What triangle and polygon share: a frame in which the arithmetic of the plane is exact, and a
// triangle in it with a point for every two words.

#ifndef LEAT_REGIONS_DETAIL_PLANE_TRIANGLE_HPP
#define LEAT_REGIONS_DETAIL_PLANE_TRIANGLE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/orientation.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <limits>

namespace leat::detail {

/// Points times the power of two that brings the largest coordinate of a box into [2, 4). What is
/// below 2^-400 of that is 0 there: exact arithmetic needs an end somewhere.
template <portable_real Real>
class plane_frame {
public:
    using point_type = std::array<Real, 2>;

    constexpr plane_frame() noexcept = default;
    explicit constexpr plane_frame(const region_bounds<Real, 2>& box) noexcept
        : exponent_(exponent_of(largest_coordinate(box)) - 1),
          in_(power_of_two<double>(-exponent_)),
          out_(power_of_two<double>(exponent_)) {}

    /// Whether the frame keeps every bit of a coordinate.
    [[nodiscard]] constexpr bool keeps(Real x) const noexcept {
        return x == 0 || exponent_of(double{x}) - exponent_ >= -400;
    }
    [[nodiscard]] constexpr plane_point operator()(const point_type& p) const noexcept {
        return {keeps(p[0]) ? held(double{p[0]} * in_) : 0.0,
                keeps(p[1]) ? held(double{p[1]} * in_) : 0.0};
    }
    [[nodiscard]] constexpr point_type back(const plane_point& q) const noexcept {
        return {back(q[0]), back(q[1])};
    }
    /// Half of an area of which twice is known in the frame.
    [[nodiscard]] constexpr scaled half_area(double doubled) const noexcept {
        scaled area = split(doubled);
        area.exponent += 2 * exponent_ - 1;
        return area;
    }

    friend constexpr bool operator==(const plane_frame&, const plane_frame&) = default;

private:
    [[nodiscard]] constexpr Real back(double x) const noexcept {
        return exponent_of(x) < -400 || exponent_of(x) + exponent_ < -1022
                   ? Real{0}
                   : rounded<Real>(held(x * out_));
    }

    int exponent_ = 0;
    double in_ = 1;
    double out_ = 1;
};

/// A triangle in a frame, its corners counterclockwise.
struct plane_triangle {
    plane_point a;
    plane_point b;
    plane_point c;

    /// The point a + u (b - a) + v (c - a), (u, v) being the unit square's point folded along its
    /// diagonal: the parallelogram's other half falls onto this one.
    [[nodiscard]] constexpr plane_point at(double u, double v) const noexcept {
        using real = strict<double>;
        const real fold = u + v > 1 ? 1.0 : 0.0;    // exact, as the differences: steps of 2^-53
        const real x = magnitude((fold - u).value); // u or 1 - u, without a branch
        const real y = magnitude((fold - v).value);
        return {(a[0] + (x * (real(b[0]) - a[0]) + y * (real(c[0]) - a[0]))).value,
                (a[1] + (x * (real(b[1]) - a[1]) + y * (real(c[1]) - a[1]))).value};
    }

    /// Whether q is in the triangle, its sides included: exact.
    [[nodiscard]] constexpr bool contains(const plane_point& q) const noexcept {
        return turn(a, b, q) >= 0 && turn(b, c, q) >= 0 && turn(c, a, q) >= 0;
    }

    /// A uniform point. Where rounding puts it outside it is drawn anew. A sliver of a larger
    /// region, so thin that hardly a number lies in it, may end as its corner a.
    template <portable_real Real, random_words G>
    [[nodiscard]] constexpr std::array<Real, 2> draw(const plane_frame<Real>& frame, G& g) const {
        for (int trial = 0; trial < rounding_trials; ++trial) {
            const double u = unit(g);
            const double v = unit(g);
            const std::array<Real, 2> p = frame.back(at(u, v));
            if (contains(frame(p))) {
                return p;
            }
        }
        return frame.back(a);
    }

    friend constexpr bool operator==(const plane_triangle&, const plane_triangle&) = default;
};

/// Refuses a vertex with a coordinate that is too small beside the box to be kept.
template <portable_real Real>
constexpr void require_kept(const char* name, const char* parameter, const plane_frame<Real>& frame,
                            const std::array<Real, 2>& p) {
    for (const Real x : p) {
        if (!frame.keeps(x)) {
            refuse(name, parameter, x, "must be 0 or at least 2^-400 of the largest coordinate");
        }
    }
}

/// Refuses a box too small for its place: the shape's half width in x or in y.
template <portable_real Real>
constexpr void require_plane_size(const char* name, const region_bounds<Real, 2>& box) {
    for (std::size_t i = 0; i < 2; ++i) {
        const strict<double> half = 0.5;
        const auto width = rounded<Real>(half * double{box.high[i]} - half * double{box.low[i]});
        require_size(name, "half width", width);
        require_resolution(name, "half width", width, box, i);
    }
}

/// Refuses a shape so thin that its points could not be told apart: twice its area in the frame
/// must be at least 256 of the strips by which rounding moves its outline.
template <portable_real Real>
constexpr void require_area(const char* name, const plane_frame<Real>& frame,
                            const region_bounds<Real, 2>& box, double doubled) {
    using real = strict<double>;
    const plane_point low = frame(box.low);
    const plane_point high = frame(box.high);
    const auto step = [&](std::size_t i) {
        const double one = magnitude(low[i]);
        const double other = magnitude(high[i]);
        return real(one > other ? one : other) * double{std::numeric_limits<Real>::epsilon()};
    };
    const real strips = step(0) * (real(high[1]) - low[1]) + step(1) * (real(high[0]) - low[0]);
    if (!(doubled >= (strips * 256.0).value)) {
        refuse(name, "the area is too small beside the coordinates for points in it to be told "
                     "apart; place the region nearer to the origin, or make it thicker");
    }
}

} // namespace leat::detail

#endif
