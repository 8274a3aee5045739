// The square root, correctly rounded: the processor's instruction at run time, integer arithmetic
// in constant evaluation (where clang has no builtin).
//
// Argument: x >= 0 and finite, no subnormal number. Error: half an ulp (IEEE 754 demands it).

#ifndef LEAT_CORE_SQUARE_ROOT_HPP
#define LEAT_CORE_SQUARE_ROOT_HPP

#include "leat/core/barrier.hpp"

#include <bit>
#include <cstdint>
#include <type_traits>

#if defined(_MSC_VER) && !defined(__clang__)
#include <cmath> // sqrt, where there is no builtin: IEEE 754 fixes its result, other functions not
#endif

namespace leat::detail {

/// The square root digit by digit, two bits of the radicand at a time.
constexpr double square_root_by_integers(double x) noexcept {
    if (x == 0) {
        return x;
    }
    const std::uint64_t bits = std::bit_cast<std::uint64_t>(x);
    int exponent = static_cast<int>(bits >> 52) - 1023; // x = fraction * 2^(exponent - 52)
    std::uint64_t fraction = (bits & ((std::uint64_t{1} << 52) - 1)) | (std::uint64_t{1} << 52);
    if (exponent % 2 != 0) {
        fraction <<= 1;
        exponent -= 1;
    }
    // The root of fraction * 2^54 has 54 bits: 53 and one to round by.
    std::uint64_t root = 0;
    std::uint64_t remainder = 0;
    for (int shift = 106; shift >= 0; shift -= 2) {
        const std::uint64_t pair = shift >= 54 ? (fraction >> (shift - 54)) & 3 : 0;
        remainder = (remainder << 2) | pair;
        const std::uint64_t trial = (root << 2) | 1;
        root <<= 1;
        if (remainder >= trial) {
            remainder -= trial;
            root |= 1;
        }
    }
    // A root of a 53-bit number is never half way between two, so the last bit decides.
    const std::uint64_t rounded = (root + 1) >> 1; // 2^52 to 2^53, the latter carried by the sum
    return std::bit_cast<double>((static_cast<std::uint64_t>(exponent / 2 + 1022) << 52) + rounded);
}

/// The square root of x.
constexpr double square_root(double x) noexcept {
    if (std::is_constant_evaluated()) {
        return square_root_by_integers(x);
    }
#if defined(_MSC_VER) && !defined(__clang__)
    return std::sqrt(x);
#else
    return held(__builtin_sqrt(held(x)));
#endif
}

} // namespace leat::detail

#endif
