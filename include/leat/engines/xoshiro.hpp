// The xoshiro256 engines: 64-bit words from 256 bits of state.
//
// Source: Blackman and Vigna, Scrambled linear pseudorandom number generators, ACM TOMS 47(4),
// 2021. The three engines share one linear step and differ in how a word is made of the state
// (before the step), so their states may be compared and jump alike.
//
// Period 2^256 - 1, state 256 bits (four words, not all zero). Any word can be drawn, 0 included.
// Seeds, seed sequences, text and errors: see linear_engine.hpp.
//
// Good for: the everyday engine of a simulation (xoshiro256_plus_plus; xoshiro256_star_star is its
// equal). Large enough for 2^64 blocks of 2^192 words: leat::jump(engine, pow2(192)).
// Known weaknesses:
//   xoshiro256_plus has linear low bits (the lowest three have low linear complexity): for doubles
//   made of the upper 53 bits only, never for the lowest bits or for x % n.
//   The other two have no known failure. The multiplier of `**` can be undone, which turns it back
//   into a linear sequence; that takes a deliberate test.
//   A state of mostly zero bits takes a few dozen words to recover; seeding does not lead there.
// When not: for keys, tokens or anything an adversary must not guess. For one sequence per entity
// take leat::stream.

#ifndef LEAT_ENGINES_XOSHIRO_HPP
#define LEAT_ENGINES_XOSHIRO_HPP

#include "leat/engines/linear_engine.hpp"

#include <array>
#include <bit> // rotl
#include <cstddef>
#include <cstdint>

namespace leat {

namespace detail {

/// What the three xoshiro256 engines have in common.
struct xoshiro256_step {
    using linear_step = xoshiro256_step;
    using word = std::uint64_t;
    static constexpr std::size_t words = 4;
    static constexpr std::uint64_t default_seed = 1;
    static constexpr word smallest = 0;

    static constexpr void step(std::array<word, words>& s) noexcept {
        auto& [s0, s1, s2, s3] = s; // fewer calls than s[i], which count in constant evaluation
        const word t = s1 << 17;
        s2 ^= s0;
        s3 ^= s1;
        s1 ^= s2;
        s0 ^= s3;
        s2 ^= t;
        s3 = std::rotl(s3, 45);
    }
};

struct xoshiro256_plus_plus_method : xoshiro256_step {
    static constexpr const char* name = "xoshiro256_plus_plus";
    static constexpr word draw(std::array<word, words>& s) noexcept {
        const word drawn = std::rotl(s[0] + s[3], 23) + s[0];
        step(s);
        return drawn;
    }
};

struct xoshiro256_plus_method : xoshiro256_step {
    static constexpr const char* name = "xoshiro256_plus";
    static constexpr word draw(std::array<word, words>& s) noexcept {
        const word drawn = s[0] + s[3];
        step(s);
        return drawn;
    }
};

struct xoshiro256_star_star_method : xoshiro256_step {
    static constexpr const char* name = "xoshiro256_star_star";
    static constexpr word draw(std::array<word, words>& s) noexcept {
        const word drawn = std::rotl(s[1] * 5, 7) * 9;
        step(s);
        return drawn;
    }
};

} // namespace detail

/// xoshiro256++: rotl(s0 + s3, 23) + s0. The engine to take when in doubt.
using xoshiro256_plus_plus = linear_engine<detail::xoshiro256_plus_plus_method>;

/// xoshiro256+: s0 + s3. The fastest; its lowest bits are linear.
using xoshiro256_plus = linear_engine<detail::xoshiro256_plus_method>;

/// xoshiro256**: rotl(s1 * 5, 7) * 9.
using xoshiro256_star_star = linear_engine<detail::xoshiro256_star_star_method>;

} // namespace leat

#endif
