// What the regions share: names of types, the box around them, points as another type, and the
// checks of sizes and places that their constructors make.
//
// Inside, a region works in double whatever its Real, and rounds a point once, at the end; the
// verdict of `contains` is on that rounded point. A solid draws again where rounding has put its
// point outside, which is as rare as points within a rounding of the edge.

#ifndef LEAT_REGIONS_DETAIL_REGION_BASE_HPP
#define LEAT_REGIONS_DETAIL_REGION_BASE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/point.hpp"

#include <array>
#include <cstddef>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// The base of `Derived`, a region of dimension M in a space of dimension N.
template <class Derived, portable_real Real, std::size_t N, std::size_t M = N>
class region_base {
public:
    using real_type = Real;
    using point_type = std::array<Real, N>;
    using bounds_type = region_bounds<Real, N>;
    /// The dimension of the space: the number of coordinates of a point.
    static constexpr std::size_t dimension = N;
    /// What measure() measures: 1 a length, 2 an area, 3 a volume.
    static constexpr std::size_t measured_dimension = M;

    /// The same point as a Vec: anything that its coordinates in braces initialise.
    template <class Vec, random_words G>
    constexpr Vec draw(G& g) const {
        return point_as<Vec>(static_cast<const Derived&>(*this)(g));
    }

    /// The box around the region.
    [[nodiscard]] constexpr bounds_type bounds() const noexcept { return bounds_; }

    friend constexpr bool operator==(const region_base&, const region_base&) = default;

protected:
    using real = strict<double>;
    using vector = std::array<double, N>;

    constexpr region_base() = default;

    /// A coordinate of a surface's point, kept from leaving the box by rounding.
    [[nodiscard]] constexpr Real within_bounds(std::size_t i, Real x) const noexcept {
        return x < bounds_.low[i] ? bounds_.low[i] : x > bounds_.high[i] ? bounds_.high[i] : x;
    }

    bounds_type bounds_{};
};

/// How many points that rounding put outside a solid are drawn anew. In the worst case, a high
/// dimension on the coarsest grid accepted, less than half of them are.
inline constexpr int rounding_trials = 128;

/// A computed coordinate as a Real. What would be subnormal is 0, in every mode of the processor.
template <portable_real Real>
constexpr Real rounded(strict<double> x) noexcept {
    return exponent_of(x.value) < std::numeric_limits<Real>::min_exponent - 1
               ? Real{0}
               : held(static_cast<Real>(x.value));
}

/// The measure as a Real. What does not fit is given as the largest number, or as the smallest
/// normal one.
template <portable_real Real>
constexpr Real saturated(scaled measure) noexcept {
    const double x = measure.value();
    if (x > double{std::numeric_limits<Real>::max()}) {
        return std::numeric_limits<Real>::max();
    }
    if (x < double{std::numeric_limits<Real>::min()}) {
        return std::numeric_limits<Real>::min();
    }
    return static_cast<Real>(x);
}

/// x^n.
constexpr scaled power(scaled x, std::size_t n) noexcept {
    scaled result{1, 0};
    for (std::size_t i = 0; i < n; ++i) {
        result = result * x;
        result = split(result.factor) * scaled{1, result.exponent}; // factor back to [1, 2)
    }
    return result;
}

template <portable_real Real, std::size_t N>
constexpr void require_point(const char* name, const char* parameter,
                             const std::array<Real, N>& p) {
    for (const Real x : p) {
        if (!is_finite(x)) {
            refuse(name, parameter, x, "must be finite");
        }
    }
}

template <portable_real Real>
constexpr void require_size(const char* name, const char* parameter, Real size) {
    if (!is_size(size)) {
        refuse(name, parameter, size, size_allowed<Real>);
    }
}

/// x as a Real, where it is one: for an edge.
template <portable_real Real>
constexpr Real edge_as(const char* name, const char* parameter, Real size, strict<double> x) {
    constexpr double most = double{std::numeric_limits<Real>::max()};
    if (!(x.value >= -most && x.value <= most)) {
        refuse(name, parameter, size, "must leave the region's edge finite");
    }
    return rounded<Real>(x);
}

/// Refuses a size that spans too few steps between neighbouring numbers at coordinate i's edges.
template <portable_real Real, std::size_t N>
constexpr void require_resolution(const char* name, const char* parameter, Real size,
                                  const region_bounds<Real, N>& box, std::size_t i) {
    if (!resolves(size, box.low[i]) || !resolves(size, box.high[i])) {
        refuse(name, parameter, size, resolution_needed);
    }
}

/// The box that reaches from a centre by `reach` to both sides, for a region of the size that the
/// parameter names.
template <portable_real Real, std::size_t N>
constexpr region_bounds<Real, N> box_about(const char* name, const char* parameter, Real size,
                                           const std::array<Real, N>& centre,
                                           const std::array<double, N>& reach) {
    region_bounds<Real, N> box{};
    for (std::size_t i = 0; i < N; ++i) {
        const strict<double> middle = double{centre[i]};
        box.low[i] = edge_as<Real>(name, parameter, size, middle - reach[i]);
        box.high[i] = edge_as<Real>(name, parameter, size, middle + reach[i]);
    }
    return box;
}

/// The same for a region as wide in all directions; its resolution is checked too.
template <portable_real Real, std::size_t N>
constexpr region_bounds<Real, N> cube_about(const char* name, const char* parameter, Real size,
                                            const std::array<Real, N>& centre) {
    require_point(name, "centre", centre);
    require_size(name, parameter, size);
    std::array<double, N> reach{};
    for (double& x : reach) {
        x = double{size};
    }
    const auto box = box_about(name, parameter, size, centre, reach);
    for (std::size_t i = 0; i < N; ++i) {
        require_resolution(name, parameter, size, box, i);
    }
    return box;
}

/// The power of two that brings a size into [2, 4), where squares keep far from the ends of the
/// range.
template <portable_real Real>
constexpr double scale_of(Real size) noexcept {
    return power_of_two<double>(1 - exponent_of(double{size}));
}

/// Makes a box reach as far as p.
template <portable_real Real, std::size_t N>
constexpr void extend(region_bounds<Real, N>& box, const std::array<Real, N>& p) noexcept {
    for (std::size_t i = 0; i < N; ++i) {
        box.low[i] = p[i] < box.low[i] ? p[i] : box.low[i];
        box.high[i] = p[i] > box.high[i] ? p[i] : box.high[i];
    }
}

/// The largest size of a coordinate in a box.
template <portable_real Real, std::size_t N>
constexpr double largest_coordinate(const region_bounds<Real, N>& box) noexcept {
    double largest = 0;
    for (std::size_t i = 0; i < N; ++i) {
        for (const double x : {double{box.low[i]}, double{box.high[i]}}) {
            const double size = x < 0 ? -x : x;
            largest = size > largest ? size : largest;
        }
    }
    return largest;
}

/// How far from a surface a point may be and still count as on it: 1e-12 of its size (float: 1e-6),
/// or where that is more eight steps between neighbouring numbers at its edge.
template <portable_real Real, std::size_t N>
constexpr double surface_tolerance(Real size, const region_bounds<Real, N>& box) noexcept {
    const double share = std::is_same_v<Real, double> ? 1e-12 : 1e-6;
    const double by_size = (strict<double>(double{size}) * share).value;
    const double by_steps = (strict<double>(largest_coordinate(box)) *
                             (8 * double{std::numeric_limits<Real>::epsilon()}))
                                .value;
    return by_size > by_steps ? by_size : by_steps;
}

} // namespace leat::detail

#endif
