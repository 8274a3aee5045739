// Sizes of regions over the whole range of exponents: powers of two, resolution, areas.
//
// Regions scale by powers of two, which is exact, so that squares neither overflow nor underflow.

#ifndef LEAT_REGIONS_DETAIL_EXTENT_HPP
#define LEAT_REGIONS_DETAIL_EXTENT_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/square_trial.hpp"

#include <bit>
#include <cstdint>
#include <initializer_list>
#include <limits>
#include <type_traits>

namespace leat::detail {

template <class Real>
struct real_layout {
    using word = std::conditional_t<std::is_same_v<Real, double>, std::uint64_t, std::uint32_t>;
    static constexpr int fraction_bits = std::numeric_limits<Real>::digits - 1;
    static constexpr int bias = std::numeric_limits<Real>::max_exponent - 1;
};

/// e where 2^e <= |x| < 2^(e+1); below all others for zero and subnormals, above for inf and NaN.
template <portable_real Real>
constexpr int exponent_of(Real x) noexcept {
    using layout = real_layout<Real>;
    const auto bits = std::bit_cast<typename layout::word>(x);
    return static_cast<int>((bits << 1) >> (layout::fraction_bits + 1)) - layout::bias;
}

/// 2^e, for an e in the range of normal numbers.
template <portable_real Real>
constexpr Real power_of_two(int e) noexcept {
    using layout = real_layout<Real>;
    return std::bit_cast<Real>(static_cast<typename layout::word>(
        static_cast<typename layout::word>(e + layout::bias) << layout::fraction_bits));
}

template <portable_real Real>
constexpr bool is_finite(Real x) noexcept {
    return exponent_of(x) <= real_layout<Real>::bias;
}

/// The smallest size of a region is 2^this: below, coordinates of its points would be subnormal.
template <portable_real Real>
inline constexpr int smallest_size_exponent = std::is_same_v<Real, double> ? -960 : -100;

template <portable_real Real>
constexpr bool is_size(Real x) noexcept {
    return x > 0 && is_finite(x) && exponent_of(x) >= smallest_size_exponent<Real>;
}

template <portable_real Real>
inline constexpr const char* size_allowed =
    std::is_same_v<Real, double> ? "must be finite and at least 2^-960"
                                 : "must be finite and at least 2^-100";

/// Whether `size` spans at least 2^8 steps between neighbouring numbers of the magnitude of x.
/// With fewer, the points would lie on a grid so coarse that they could not pass as uniform.
template <portable_real Real>
constexpr bool resolves(Real size, Real x) noexcept {
    return exponent_of(size) >= exponent_of(x) - real_layout<Real>::fraction_bits + 8;
}

inline constexpr const char* resolution_needed =
    "must be at least 256 steps between neighbouring numbers at the region's edge; place the "
    "region nearer to the origin";

/// The exponent of the largest of some numbers.
template <portable_real Real>
constexpr int largest_exponent(std::initializer_list<Real> numbers) noexcept {
    int largest = exponent_of(Real{0});
    for (const Real x : numbers) {
        largest = exponent_of(x) > largest ? exponent_of(x) : largest;
    }
    return largest;
}

/// How far from the circle the norm of a square_trial may be for rounding to change the verdict,
/// the region being `size` wide and its coordinates at the edge up to 2^edge. A point moves by at
/// most 16 roundings of such a coordinate: d <= 16 * 2^(edge - fraction_bits) / size, and its norm
/// by less than 4 d.
template <portable_real Real>
constexpr std::uint64_t doubtful_norms(Real size, int edge) noexcept {
    const int d = 4 + edge - real_layout<Real>::fraction_bits - exponent_of(size); // at most -4
    const int bits = 62 + 2 + d;
    return square_trial<Real>::error + (bits < 0 ? 1 : std::uint64_t{1} << bits);
}

/// pi * a * b, for sizes a and b. What does not fit in Real is given as its largest number, or as
/// its smallest normal one.
template <portable_real Real>
constexpr Real pi_times(Real a, Real b) noexcept {
    const double area = (split(double{a}) * split(double{b}) * split(0x1.921fb54442d18p+1)).value();
    if (area > double{std::numeric_limits<Real>::max()}) {
        return std::numeric_limits<Real>::max();
    }
    if (area < double{std::numeric_limits<Real>::min()}) {
        return std::numeric_limits<Real>::min();
    }
    return static_cast<Real>(area);
}

} // namespace leat::detail

#endif
