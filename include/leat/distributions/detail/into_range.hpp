// The last step of a draw: from the double it was computed in to the law's type and support.
//
// A result below the smallest normal number of the type is given as that number, one above the
// largest finite number as that: no draw is infinite, subnormal, or 0 where the law excludes 0.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_INTO_RANGE_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_INTO_RANGE_HPP

#include "leat/core/concepts.hpp"

#include <bit>
#include <cstdint>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// True where x lies between the smallest and the largest normal number, so that its conversion
/// neither overflows nor gives a subnormal number.
template <portable_real Real>
constexpr bool well_inside(double x) noexcept {
    return x > static_cast<double>(std::numeric_limits<Real>::min()) &&
           x < static_cast<double>(std::numeric_limits<Real>::max());
}

/// The end of the range that x is at or beyond; its sign is kept.
template <portable_real Real>
[[gnu::cold, gnu::noinline]] constexpr Real end_of_range(double x) noexcept {
    const Real sign = (std::bit_cast<std::uint64_t>(x) >> 63) != 0 ? Real{-1} : Real{1};
    return sign *
           (x > 1 || x < -1 ? std::numeric_limits<Real>::max() : std::numeric_limits<Real>::min());
}

/// x > 0 (or the 0 or infinity that it came out as), among the positive normal numbers.
template <portable_real Real>
constexpr Real into_positive(double x) noexcept {
    if (well_inside<Real>(x)) [[likely]] {
        return static_cast<Real>(x);
    }
    return end_of_range<Real>(x);
}

/// x of either sign, among the normal numbers. No branch on the sign: it is a coin toss. One
/// comparison of bits does what two of magnitudes would: the hottest line of a normal draw.
template <portable_real Real>
constexpr Real into_signed(double x) noexcept {
    constexpr auto doubled_bits = [](double y) { return std::bit_cast<std::uint64_t>(y) << 1; };
    constexpr auto least = doubled_bits(static_cast<double>(std::numeric_limits<Real>::min()));
    constexpr auto most = doubled_bits(static_cast<double>(std::numeric_limits<Real>::max()));
    if (doubled_bits(x) - (least + 2) < most - (least + 2)) [[likely]] {
        return static_cast<Real>(x);
    }
    return end_of_range<Real>(x);
}

/// The least normal number above x, which is not NaN and below infinity.
template <portable_real Real>
constexpr Real normal_above(Real x) noexcept {
    using word = std::conditional_t<sizeof(Real) == 8, std::uint64_t, std::uint32_t>;
    constexpr Real least = std::numeric_limits<Real>::min();
    if (x > -least && x < least) { // 0 and the subnormal numbers
        return least;
    }
    const word bits = std::bit_cast<word>(x);
    const Real next = std::bit_cast<Real>(x < 0 ? word(bits - 1) : word(bits + 1));
    return next > -least && next < least ? least : next;
}

} // namespace leat::detail

#endif
