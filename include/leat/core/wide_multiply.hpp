// The full product of two 64-bit words, with and without a 128-bit integer type.

#ifndef LEAT_CORE_WIDE_MULTIPLY_HPP
#define LEAT_CORE_WIDE_MULTIPLY_HPP

#include <cstdint>

namespace leat::detail {

/// A 128-bit value as two words.
struct word_pair {
    std::uint64_t low;
    std::uint64_t high;

    friend constexpr bool operator==(const word_pair&, const word_pair&) = default;
};

/// a * b from four 32-bit products (Knuth, TAOCP vol. 2, 4.3.1, Algorithm M). Correct everywhere.
constexpr word_pair multiply_wide_portable(std::uint64_t a, std::uint64_t b) noexcept {
    constexpr std::uint64_t half = 0xFFFFFFFFu;
    const std::uint64_t a0 = a & half;
    const std::uint64_t a1 = a >> 32;
    const std::uint64_t b0 = b & half;
    const std::uint64_t b1 = b >> 32;
    const std::uint64_t p00 = a0 * b0;
    const std::uint64_t p01 = a0 * b1;
    const std::uint64_t p10 = a1 * b0;
    const std::uint64_t p11 = a1 * b1;
    const std::uint64_t middle = (p00 >> 32) + (p01 & half) + (p10 & half);
    return {(middle << 32) | (p00 & half), p11 + (p01 >> 32) + (p10 >> 32) + (middle >> 32)};
}

/// a * b, by the compiler's 128-bit type where there is one.
constexpr word_pair multiply_wide(std::uint64_t a, std::uint64_t b) noexcept {
#if defined(__SIZEOF_INT128__)
    __extension__ using wide = unsigned __int128;
    const wide product = static_cast<wide>(a) * b;
    return {static_cast<std::uint64_t>(product), static_cast<std::uint64_t>(product >> 64)};
#else
    return multiply_wide_portable(a, b);
#endif
}

/// The sum of two pairs, modulo 2^128.
constexpr word_pair add(word_pair a, word_pair b) noexcept {
    const std::uint64_t low = a.low + b.low;
    return {low, a.high + b.high + (low < a.low ? 1u : 0u)};
}

/// a * b + c + d, which never exceeds two words: the step of multiple-word products.
constexpr word_pair multiply_add_wide(std::uint64_t a, std::uint64_t b, std::uint64_t c,
                                      std::uint64_t d) noexcept {
#if defined(__SIZEOF_INT128__)
    __extension__ using wide = unsigned __int128;
    const wide sum = static_cast<wide>(a) * b + c + d;
    return {static_cast<std::uint64_t>(sum), static_cast<std::uint64_t>(sum >> 64)};
#else
    return add(add(multiply_wide(a, b), {c, 0}), {d, 0});
#endif
}

/// The product of two pairs, modulo 2^128.
constexpr word_pair multiply(word_pair a, word_pair b) noexcept {
    word_pair product = multiply_wide(a.low, b.low);
    product.high += a.low * b.high + a.high * b.low;
    return product;
}

} // namespace leat::detail

#endif
