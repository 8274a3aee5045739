// xoroshiro128++: 64-bit words from 128 bits of state.
//
// Source: Blackman and Vigna, Scrambled linear pseudorandom number generators, ACM TOMS 47(4),
// 2021; constants 17 in the output, 49, 21, 28 in the step.
//
// Period 2^128 - 1, state 128 bits (two words, not all zero). Any word can be drawn, 0 included;
// the word is made of the state before the step.
// Seeds, seed sequences, text and errors: see linear_engine.hpp.
//
// Good for: programs that keep many engines and count bytes; 2^32 blocks of 2^96 words.
// Known weaknesses: none in the words themselves; the state under them is linear over GF(2), and
// neighbouring states stay close for a few words.
// When not: for very many engines seeded at random: n of them, L words each, overlap with a
// probability of about n^2 L / 2^128 (see leat::overlap_bound); for keys or tokens.

#ifndef LEAT_ENGINES_XOROSHIRO_HPP
#define LEAT_ENGINES_XOROSHIRO_HPP

#include "leat/engines/linear_engine.hpp"

#include <array>
#include <bit> // rotl
#include <cstddef>
#include <cstdint>

namespace leat {

namespace detail {

struct xoroshiro128_plus_plus_method {
    static constexpr const char* name = "xoroshiro128_plus_plus";
    using linear_step = xoroshiro128_plus_plus_method;
    using word = std::uint64_t;
    static constexpr std::size_t words = 2;
    static constexpr std::uint64_t default_seed = 1;
    static constexpr word smallest = 0;

    static constexpr void step(std::array<word, words>& s) noexcept {
        s[1] ^= s[0];
        s[0] = std::rotl(s[0], 49) ^ s[1] ^ (s[1] << 21);
        s[1] = std::rotl(s[1], 28);
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        const word drawn = std::rotl(s[0] + s[1], 17) + s[0];
        step(s);
        return drawn;
    }
};

} // namespace detail

/// xoroshiro128++: rotl(s0 + s1, 17) + s0.
using xoroshiro128_plus_plus = linear_engine<detail::xoroshiro128_plus_plus_method>;

} // namespace leat

#endif
