// x / m as a double, rounded once to nearest (ties to even), from integers alone.
//
// For the real mappings that methods publish for themselves (x / m of a Lehmer engine). Because no
// floating-point operation takes part, engines keep compiling under any flags, and give the same
// bits under all of them.

#ifndef LEAT_CORE_EXACT_RATIO_HPP
#define LEAT_CORE_EXACT_RATIO_HPP

#include "leat/core/modular.hpp"

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// x / m rounded to nearest, for 0 < x < m.
constexpr double exact_ratio(std::uint64_t x, std::uint64_t m) noexcept {
    static_assert(std::numeric_limits<double>::is_iec559 &&
                  std::numeric_limits<double>::digits == 53);
    // Both are scaled so that m has its top bit set and x lies in [m/2, m): then the quotient
    // q = floor(2^64 x / m) has exactly 64 bits, and x / m = q / 2^(64 + exponent), nearly.
    const int scale = std::countl_zero(m);
    m <<= scale;
    x <<= scale;
    int exponent = std::countl_zero(x);
    if (x << exponent >= m) {
        --exponent;
    }
    const auto [q, rest] = divide_wide({0, x << exponent}, m);
    std::uint64_t mantissa = q >> 11;
    const std::uint64_t below = q & 0x7FFu;
    const bool tie = below == 0x400u && rest == 0;
    if (tie ? (mantissa & 1u) != 0 : below >= 0x400u) {
        ++mantissa;
    }
    // The mantissa's top bit adds one to the exponent field, and a carry out of it one more.
    return std::bit_cast<double>((static_cast<std::uint64_t>(1021 - exponent) << 52) + mantissa);
}

} // namespace leat::detail

#endif
