// A positive real whose exponent has a word of its own: products may pass the range of double on
// the way, as long as the end result does not. Where it does, the result saturates.
//
// Used where a law multiplies parameters and powers of very different size. Not for zero, negative
// numbers, infinities or NaN.

#ifndef LEAT_CORE_SCALED_HPP
#define LEAT_CORE_SCALED_HPP

#include "leat/core/barrier.hpp"

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// factor * 2^exponent, the factor a positive normal double.
struct scaled {
    double factor;
    std::int64_t exponent;

    /// The nearest double, but never 0, subnormal or infinite: what is below the smallest normal
    /// number gives that number, what is above the largest finite one gives that.
    [[nodiscard]] constexpr double value() const noexcept {
        constexpr std::uint64_t fraction = (std::uint64_t{1} << 52) - 1;
        const std::uint64_t bits = std::bit_cast<std::uint64_t>(factor);
        const std::int64_t field = static_cast<std::int64_t>(bits >> 52) + exponent;
        if (field > 2046) {
            return std::numeric_limits<double>::max();
        }
        if (field < 1) {
            return std::numeric_limits<double>::min();
        }
        return std::bit_cast<double>((bits & fraction) | (static_cast<std::uint64_t>(field) << 52));
    }
};

/// x > 0 with its factor in [1, 2). By integers alone, so that a subnormal x is taken apart
/// whatever the processor's flush-to-zero mode.
constexpr scaled split(double x) noexcept {
    constexpr std::uint64_t fraction = (std::uint64_t{1} << 52) - 1;
    constexpr std::uint64_t one = std::uint64_t{1023} << 52;
    std::uint64_t bits = std::bit_cast<std::uint64_t>(x);
    std::int64_t exponent = 0;
    if (bits < fraction + 1) { // subnormal: shift the leading 1 into its place
        const int shift = std::countl_zero(bits) - 11;
        bits <<= shift;
        exponent = 1 - shift;
    } else {
        exponent = static_cast<std::int64_t>(bits >> 52);
    }
    return {std::bit_cast<double>((bits & fraction) | one), exponent - 1023};
}

/// The product. Factors from `split` and of powers lie near [1, 2), so a hundred may be multiplied
/// before the factor itself could leave the range.
constexpr scaled operator*(scaled a, scaled b) noexcept {
    return {held(a.factor * b.factor), a.exponent + b.exponent};
}

} // namespace leat::detail

#endif
