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

namespace leat::detail {

/// x > 0 (or the 0 or infinity that it came out as), among the positive normal numbers.
template <portable_real Real>
constexpr Real into_positive(double x) noexcept {
    constexpr Real smallest = std::numeric_limits<Real>::min();
    constexpr Real largest = std::numeric_limits<Real>::max();
    // Compared before the conversion, which then neither overflows nor gives a subnormal number.
    if (x > static_cast<double>(smallest) && x < static_cast<double>(largest)) [[likely]] {
        return static_cast<Real>(x);
    }
    return x > 1 ? largest : smallest;
}

/// x of either sign, among the normal numbers.
template <portable_real Real>
constexpr Real into_signed(double x) noexcept {
    constexpr std::uint64_t sign = std::uint64_t{1} << 63;
    constexpr auto smallest = static_cast<double>(std::numeric_limits<Real>::min());
    constexpr auto largest = static_cast<double>(std::numeric_limits<Real>::max());
    const std::uint64_t bits = std::bit_cast<std::uint64_t>(x);
    const double size = std::bit_cast<double>(bits & ~sign);
    if (size > smallest && size < largest) [[likely]] {
        return static_cast<Real>(x); // no branch on the sign, which no processor could predict
    }
    return (bits & sign) != 0 ? -into_positive<Real>(size) : into_positive<Real>(size);
}

} // namespace leat::detail

#endif
