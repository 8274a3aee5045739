// Uniform words from any engine: exactly 64, or 32, unbiased bits a call.
//
// What one call consumes. Let R be the number of values the engine can return.
// - R = 2^64: one word; `word32` takes its upper half.
// - R = 2^w: ceil(64 / w) words (for `word32` ceil(32 / w)). They are laid end to end, the first
//   drawn the least significant, and the upper 64 (32) bits of the row are kept: an engine's weak
//   bits are its low ones.
// - R no power of two (Lehmer, xorshift, a die): n words d0, d1, ... are read as one number
//   V = d0 + d1 R + d2 R^2 + ..., uniform below R^n. V is rejected at or above the largest
//   multiple of 2^64 (2^32) in that range, else reduced modulo 2^64 (2^32). n is the smallest for
//   which at most one V in eight is rejected: a minimal standard Lehmer word (R = 2^31 - 2) costs
//   three steps a `word64` and two a `word32`; a six-sided die 26 rolls and 13.
// Exact in every case, provided that the engine's words are independent and uniform.
//
// Throws engine_stuck after 34 rejections in a row (a chance of at most 2^-102).
// Source: J. von Neumann, Various techniques used in connection with random digits, NBS Applied
// Mathematics Series 12, 1951 (rejection to a multiple).
// Not for a few bits at a time: what a call does not use of its words is lost.

#ifndef LEAT_UNIFORM_WORDS_HPP
#define LEAT_UNIFORM_WORDS_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/wide_multiply.hpp"

#include <bit>
#include <cstdint>

namespace leat {
namespace detail {

/// How `Width` bits are made from the words of G: known at compile time.
template <class G, int Width>
class word_plan {
    static_assert(Width == 8 || Width == 16 || Width == 32 || Width == 64);

public:
    static constexpr std::uint64_t lowest{G::min()};
    /// R - 1, which fits where R may not.
    static constexpr std::uint64_t span = std::uint64_t{G::max()} - lowest;
    static constexpr bool binary = (span & (span + 1)) == 0;
    /// The bits of one word, where the range is binary.
    static constexpr int word_bits = std::popcount(span);
    static constexpr std::uint64_t mask = ~std::uint64_t{0} >> (64 - Width);

    /// floor(x / 2^Width), for x below 2^(Width + 64).
    static constexpr std::uint64_t multiples(word_pair x) noexcept {
        if constexpr (Width == 64) {
            return x.high;
        } else {
            return (x.low >> Width) | (x.high << (64 - Width));
        }
    }

private:
    struct mixed_radix {
        int words;
        std::uint64_t limit; // V is accepted when multiples(V) is below
    };
    static constexpr mixed_radix smallest_radix() noexcept {
        word_pair power{span + 1, 0};
        for (int n = 1;; ++n) {
            // R^n = q 2^Width + r: the rejected share r / R^n is at most 1/8 when 7 r <= q 2^Width.
            const std::uint64_t q = multiples(power);
            const word_pair seven_r = multiply_wide(power.low & mask, 7);
            const std::uint64_t whole = multiples(seven_r);
            if (whole < q || (whole == q && (seven_r.low & mask) == 0)) {
                return {n, q};
            }
            power = multiply(power, word_pair{span + 1, 0});
        }
    }
    static constexpr mixed_radix radix() noexcept {
        if constexpr (binary) {
            return {(Width + word_bits - 1) / word_bits, 0};
        } else {
            return smallest_radix();
        }
    }

public:
    /// Words of G in one trial, and for a binary range in all.
    static constexpr int words = radix().words;
    static constexpr std::uint64_t limit = radix().limit;
};

/// Uniform below 2^Width, by the rules at the head of this file.
template <int Width, random_words G>
constexpr std::uint64_t draw_bits(G& g) {
    using plan = word_plan<G, Width>;
    if constexpr (plan::binary) {
        constexpr int dropped = plan::words * plan::word_bits - Width;
        const std::uint64_t first = std::uint64_t{g()} - plan::lowest;
        std::uint64_t bits = first >> dropped;
        for (int i = 1; i < plan::words; ++i) {
            const std::uint64_t next = std::uint64_t{g()} - plan::lowest;
            bits |= next << (i * plan::word_bits - dropped);
        }
        return bits;
    } else {
        constexpr word_pair range{plan::span + 1, 0};
        for (int trial = 0; trial < 34; ++trial) {
            word_pair v{std::uint64_t{g()} - plan::lowest, 0};
            word_pair place = range;
            for (int i = 1; i < plan::words; ++i) {
                const std::uint64_t digit = std::uint64_t{g()} - plan::lowest;
                v = add(v, multiply(place, word_pair{digit, 0}));
                place = multiply(place, range);
            }
            if (plan::multiples(v) < plan::limit) {
                return v.low & plan::mask;
            }
        }
        stuck(Width == 64 ? "word64" : Width == 32 ? "word32" : "draw_bits");
    }
}

} // namespace detail

/// 64 unbiased bits from any engine: one word of a 64-bit engine, two of a 32-bit one, more where
/// the range is narrower or no power of two.
template <random_words G>
constexpr std::uint64_t word64(G& g) {
    return detail::draw_bits<64>(g);
}

/// 32 unbiased bits from any engine: one word of a 32-bit engine, the upper half of a 64-bit one.
template <random_words G>
constexpr std::uint32_t word32(G& g) {
    return static_cast<std::uint32_t>(detail::draw_bits<32>(g));
}

} // namespace leat

#endif
