// Reals as integers: exact sums of products, rounded once to a float or a double.
//
// Everything here is integer arithmetic, so it gives the same bits under any compiler flags, with
// subnormal numbers on or off, and in constant evaluation.

#ifndef LEAT_UNIFORM_DETAIL_EXACT_REAL_HPP
#define LEAT_UNIFORM_DETAIL_EXACT_REAL_HPP

#include "leat/core/wide_multiply.hpp"

#include <array>
#include <bit>
#include <cstdint>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// The layout of an IEEE 754 binary format.
template <class Real>
struct binary_format {
    using word = std::conditional_t<sizeof(Real) == 4, std::uint32_t, std::uint64_t>;
    static constexpr int digits = std::numeric_limits<Real>::digits;
    static constexpr int bias = std::numeric_limits<Real>::max_exponent - 1;
    static constexpr word fraction = (word{1} << (digits - 1)) - 1;
    static constexpr word sign = word{1} << (sizeof(Real) * 8 - 1);
};

/// A finite real as (-1)^negative * mantissa * 2^exponent, the mantissa odd or zero.
struct scaled_integer {
    std::uint64_t mantissa;
    int exponent;
    bool negative;

    /// Position of the leading bit: 2^top <= |value| < 2^(top + 1). Not for zero.
    [[nodiscard]] constexpr int top() const noexcept {
        return exponent + 63 - std::countl_zero(mantissa);
    }
};

template <class Real>
constexpr scaled_integer take_apart(Real x) noexcept {
    using format = binary_format<Real>;
    const auto bits = std::bit_cast<typename format::word>(x);
    const auto field = static_cast<int>((bits & ~format::sign) >> (format::digits - 1));
    std::uint64_t mantissa{bits & format::fraction};
    if (field != 0) {
        mantissa += std::uint64_t{format::fraction} + 1;
    }
    if (mantissa == 0) {
        return {0, 0, false};
    }
    const int zeros = std::countr_zero(mantissa);
    const int exponent = (field != 0 ? field : 1) - format::bias - (format::digits - 1);
    return {mantissa >> zeros, exponent + zeros, (bits & format::sign) != 0};
}

/// (-1)^negative * m * 2^exponent to the nearest Real, ties to even, subnormal results included.
/// m has its top bit set; bits lost below it are or-ed into its last.
template <class Real>
constexpr Real round_to(bool negative, std::uint64_t m, int exponent) noexcept {
    using format = binary_format<Real>;
    int field = exponent + 63 + format::bias;
    int dropped = 64 - format::digits;
    if (field < 1) {
        dropped += 1 - field;
        field = 1;
        if (dropped > 64) { // below half the smallest subnormal
            return negative ? -Real{0} : Real{0};
        }
    }
    // In two steps: all 64 bits may have to go.
    const std::uint64_t kept = m >> 1 >> (dropped - 1);
    const std::uint64_t rest = m << (64 - dropped);
    constexpr std::uint64_t half = std::uint64_t{1} << 63;
    const std::uint64_t up = static_cast<std::uint64_t>(rest > half) |
                             (static_cast<std::uint64_t>(rest == half) & kept & 1);
    // The leading bit of `kept`, or a carry out of it, adds itself to the exponent field.
    const std::uint64_t bits =
        (static_cast<std::uint64_t>(field - 1) << (format::digits - 1)) + kept + up;
    const auto word = static_cast<typename format::word>(bits);
    return std::bit_cast<Real>(
        static_cast<typename format::word>(negative ? word | format::sign : word));
}

/// A two's complement 128-bit integer times 2^exponent, to the nearest Real.
template <class Real>
constexpr Real round_to(word_pair v, int exponent) noexcept {
    const std::uint64_t negative = v.high >> 63;
    const std::uint64_t flip = 0 - negative;
    v = add({v.low ^ flip, v.high ^ flip}, {negative, 0});
    if (v.high == 0) {
        if (v.low == 0) {
            return Real{0};
        }
        v = {0, v.low};
        exponent -= 64;
    }
    const int zeros = std::countl_zero(v.high);
    const std::uint64_t top = (v.high << zeros) | (v.low >> 1 >> (63 - zeros));
    const std::uint64_t sticky = static_cast<std::uint64_t>((v.low << zeros) != 0);
    return round_to<Real>(negative != 0, top | sticky, exponent + 64 - zeros);
}

/// A sum of products, exact in 384 bits of two's complement.
class wide_sum {
public:
    /// Adds (-1)^negative * m * 2^shift.
    constexpr void add(word_pair m, int shift, bool negative) noexcept {
        const int first = shift / 64;
        const int bits = shift % 64;
        const std::array<std::uint64_t, 3> part{m.low << bits,
                                                (m.high << bits) | (m.low >> 1 >> (63 - bits)),
                                                m.high >> 1 >> (63 - bits)};
        const std::uint64_t flip = negative ? ~std::uint64_t{0} : 0;
        std::uint64_t carry = negative ? 1 : 0; // -x is ~x + 1
        for (int i = 0; i < size; ++i) {
            const bool inside = i >= first && i < first + 3;
            const std::uint64_t digit = inside ? part[static_cast<unsigned>(i - first)] : 0;
            carry = add_to(words_[static_cast<unsigned>(i)], digit ^ flip, carry);
        }
    }

    /// The sum times 2^exponent, to the nearest Real.
    template <class Real>
    [[nodiscard]] constexpr Real rounded(int exponent) const noexcept {
        std::array<std::uint64_t, size> magnitude = words_;
        const bool negative = words_.back() >> 63 != 0;
        if (negative) {
            std::uint64_t carry = 1;
            for (std::uint64_t& word : magnitude) {
                const std::uint64_t flipped = ~word;
                word = 0;
                carry = add_to(word, flipped, carry);
            }
        }
        unsigned leading = size - 1;
        while (leading > 0 && magnitude[leading] == 0) {
            --leading;
        }
        if (magnitude[leading] == 0) {
            return Real{0};
        }
        const int zeros = std::countl_zero(magnitude[leading]);
        std::uint64_t top = magnitude[leading] << zeros;
        if (leading > 0) {
            const std::uint64_t next = magnitude[leading - 1];
            bool lost = (next << zeros) != 0;
            for (unsigned i = 0; i + 1 < leading; ++i) {
                lost = lost || magnitude[i] != 0;
            }
            top |= (next >> 1 >> (63 - zeros)) | static_cast<std::uint64_t>(lost);
        }
        return round_to<Real>(negative, top, exponent + 64 * static_cast<int>(leading) - zeros);
    }

private:
    /// word += digit + carry; returns the carry out.
    static constexpr std::uint64_t add_to(std::uint64_t& word, std::uint64_t digit,
                                          std::uint64_t carry) noexcept {
        const std::uint64_t sum = digit + carry;
        word += sum;
        return static_cast<std::uint64_t>(sum < carry) | static_cast<std::uint64_t>(word < sum);
    }

    static constexpr int size = 6;
    std::array<std::uint64_t, size> words_{};
};

} // namespace leat::detail

#endif
