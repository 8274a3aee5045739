// The xorshift engines: three shifts and three exclusive ors a word.
//
// Sources: Marsaglia, Xorshift RNGs, J. Stat. Software 8(14), 2003 (xorshift32, xorshift64,
// xorshift128); Vigna, An experimental exploration of Marsaglia's xorshift generators, scrambled,
// ACM TOMS 42(4), 2016 (xorshift64_star); Vigna, Further scramblings of Marsaglia's xorshift
// generators, J. Comput. Appl. Math. 315, 2017 (xorshift128_plus).
//
//   engine            words  state  period     least word  drawn
//   xorshift32        32     1 x 32 2^32 - 1   1           the state after the step
//   xorshift64        64     1 x 64 2^64 - 1   1           the state after the step
//   xorshift128       32     4 x 32 2^128 - 1  0           the last word after the step
//   xorshift64_star   64     1 x 64 2^64 - 1   1           the state after the step, times a
//   constant xorshift128_plus  64     2 x 64 2^128 - 1  0           the sum of the words before the
//   step
//
// A word that is the state, or the state times an odd constant, is never 0: min() says so, and the
// engines draw each of the other words exactly once a period.
//
// Seeds, seed sequences, text and errors: see linear_engine.hpp. The one-word engines take their
// state as the seed. xorshift128_plus exists with two parameter sets and two output conventions:
// this is (23, 18, 5) with the word taken before the step.
//
// Good for: reproducing work that used them, teaching, tiny state.
// Known weaknesses (Panneton and L'Ecuyer, TOMACS 15(4), 2005; Vigna 2016, 2017):
//   xorshift32, xorshift64 and xorshift128 are linear over GF(2): every bit fails tests of matrix
//   rank and linear complexity. A state with few bits set yields many words with few bits set, and
//   close seeds start alike; draw a few dozen words first.
//   xorshift64_star: the lowest bits are linear, and 64 bits of state are too few for long runs
//   (keep below 2^32 words); no word ever repeats within a period.
//   xorshift128_plus: the lowest bit is linear, the next few nearly so.
// When not: for new work take xoshiro256_plus_plus or leat::stream. Never for keys or tokens.

#ifndef LEAT_ENGINES_XORSHIFT_HPP
#define LEAT_ENGINES_XORSHIFT_HPP

#include "leat/engines/linear_engine.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat {

namespace detail {

struct xorshift32_method {
    static constexpr const char* name = "xorshift32";
    using linear_step = xorshift32_method;
    using word = std::uint32_t;
    static constexpr std::size_t words = 1;
    static constexpr std::uint64_t default_seed = 2463534242; // the paper's
    static constexpr word smallest = 1;

    static constexpr void step(std::array<word, words>& s) noexcept {
        s[0] ^= s[0] << 13;
        s[0] ^= s[0] >> 17;
        s[0] ^= s[0] << 5;
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        step(s);
        return s[0];
    }
};

struct xorshift64_method {
    static constexpr const char* name = "xorshift64";
    using linear_step = xorshift64_method;
    using word = std::uint64_t;
    static constexpr std::size_t words = 1;
    static constexpr std::uint64_t default_seed = 88172645463325252; // the paper's
    static constexpr word smallest = 1;

    static constexpr void step(std::array<word, words>& s) noexcept {
        s[0] ^= s[0] << 13;
        s[0] ^= s[0] >> 7;
        s[0] ^= s[0] << 17;
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        step(s);
        return s[0];
    }
};

struct xorshift128_method {
    static constexpr const char* name = "xorshift128";
    using linear_step = xorshift128_method;
    using word = std::uint32_t;
    static constexpr std::size_t words = 4; // x, y, z, w
    static constexpr std::uint64_t default_seed = 1;
    static constexpr word smallest = 0;

    static constexpr void step(std::array<word, words>& s) noexcept {
        const word t = s[0] ^ (s[0] << 11);
        s[0] = s[1];
        s[1] = s[2];
        s[2] = s[3];
        s[3] = s[3] ^ (s[3] >> 19) ^ t ^ (t >> 8);
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        step(s);
        return s[3];
    }
};

struct xorshift64_star_method {
    static constexpr const char* name = "xorshift64_star";
    using linear_step = xorshift64_star_method;
    using word = std::uint64_t;
    static constexpr std::size_t words = 1;
    static constexpr std::uint64_t default_seed = 88172645463325252; // of xorshift64's paper
    static constexpr word smallest = 1;

    static constexpr void step(std::array<word, words>& s) noexcept {
        s[0] ^= s[0] >> 12;
        s[0] ^= s[0] << 25;
        s[0] ^= s[0] >> 27;
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        step(s);
        return s[0] * 2685821657736338717u;
    }
};

struct xorshift128_plus_method {
    static constexpr const char* name = "xorshift128_plus";
    using linear_step = xorshift128_plus_method;
    using word = std::uint64_t;
    static constexpr std::size_t words = 2;
    static constexpr std::uint64_t default_seed = 1;
    static constexpr word smallest = 0;

    static constexpr void step(std::array<word, words>& s) noexcept {
        const word x = s[0] ^ (s[0] << 23);
        const word y = s[1];
        s[0] = y;
        s[1] = x ^ y ^ (x >> 18) ^ (y >> 5);
    }
    static constexpr word draw(std::array<word, words>& s) noexcept {
        const word drawn = s[0] + s[1];
        step(s);
        return drawn;
    }
};

} // namespace detail

/// xorshift32, shifts (13, 17, 5).
using xorshift32 = linear_engine<detail::xorshift32_method>;

/// xorshift64, shifts (13, 7, 17).
using xorshift64 = linear_engine<detail::xorshift64_method>;

/// xorshift128, shifts (11, 8, 19), four words of 32 bits.
using xorshift128 = linear_engine<detail::xorshift128_method>;

/// xorshift64*, shifts (12, 25, 27), times 2685821657736338717.
using xorshift64_star = linear_engine<detail::xorshift64_star_method>;

/// xorshift128+, shifts (23, 18, 5).
using xorshift128_plus = linear_engine<detail::xorshift128_plus_method>;

} // namespace leat

#endif
