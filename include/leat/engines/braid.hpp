// xoshiro256_braid: sixteen lanes of xoshiro256++ drawn in turn, the engine for filling arrays.
//
// Lane k is lane 0 jumped by k * 2^252 steps, and draw n comes from lane n mod 16. Sixteen equal,
// independent steps are what vector units want; a draw by itself costs about as much as one of
// xoshiro256_plus_plus. No published jump (2^128, 2^192) leads from lane to lane.
//
// Since 16 * 2^252 = 2^256, which is 1 modulo the lanes' period 2^256 - 1, the lane that follows
// lane 15 is lane 0 one step on: every draw is 2^252 steps after the one before it, also where the
// lanes come round. So
//   - the braid is one sequence, that of xoshiro256++ read 2^252 steps at a time; its period is
//     2^256 - 1, and whole periods of it hold every word as often as xoshiro256++ does;
//   - the four words of the lane to be drawn next are its whole state: state(), == and text use
//     them, and which lane it was does not matter;
//   - starting at the state() of one braid gives that braid's sequence.
//
// Source: Blackman and Vigna, ACM TOMS 47(4), 2021 (xoshiro256++ and its jumps); the braid is
// leat's own. State 256 bits (four words, not all zero), held as 64 words. Any word can be drawn.
// Seeds, seed sequences, text and errors are those of xoshiro256_plus_plus, which make lane 0; see
// linear_engine.hpp. Opening one takes 15 lane jumps, some microseconds.
//
// Known weaknesses: those of xoshiro256++; a state of mostly zero bits makes only one lane poor,
// since a jump mixes it, and seeding does not lead there.
// When not: for many short sequences (opening costs more than drawing: take leat::stream); for
// keys or tokens.

#ifndef LEAT_ENGINES_BRAID_HPP
#define LEAT_ENGINES_BRAID_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/gf2.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/engines/kernels/braid.hpp"
#include "leat/engines/xoshiro.hpp"

#include <array>
#include <bit> // rotl
#include <cstddef>
#include <cstdint>
#include <iosfwd>
#include <span>
#include <type_traits>

namespace leat {

namespace detail {

inline constexpr std::uint32_t braid_lanes = 16;

/// Word w of lane k stands at 16 w + k: equal words of all lanes side by side.
using braid_state = std::array<std::uint64_t, 4 * braid_lanes>;

/// xoshiro256's step on all lanes.
struct braid_step {
    static constexpr void step(braid_state& s) noexcept {
        for (std::size_t k = 0; k < braid_lanes; ++k) {
            const std::uint64_t t = s[16 + k] << 17;
            s[32 + k] ^= s[k];
            s[48 + k] ^= s[16 + k];
            s[16 + k] ^= s[32 + k];
            s[k] ^= s[48 + k];
            s[32 + k] ^= t;
            s[48 + k] = std::rotl(s[48 + k], 45);
        }
    }
};

/// The word that lane k draws.
constexpr std::uint64_t braid_word(const braid_state& s, std::size_t k) noexcept {
    return std::rotl(s[k] + s[48 + k], 23) + s[k];
}

/// Draws whole rounds: 16 words each, from lane 0 to lane 15. By the portable code: constant
/// evaluation, and what kernels are tested against.
constexpr void braid_rounds_portably(braid_state& state, std::uint64_t* out,
                                     std::size_t rounds) noexcept {
    braid_state s = state; // a copy cannot alias the output
    for (; rounds > 0; --rounds) {
        for (std::size_t k = 0; k < braid_lanes; ++k) {
            out[k] = braid_word(s, k);
        }
        out += braid_lanes;
        braid_step::step(s);
    }
    state = s;
}

/// The same by the fastest way there is.
constexpr void braid_rounds(braid_state& state, std::uint64_t* out, std::size_t rounds) noexcept {
#if LEAT_VECTOR_KERNELS
    if (!std::is_constant_evaluated()) {
        braid_rounds_by_vectors(state.data(), out, rounds);
        return;
    }
#endif
    braid_rounds_portably(state, out, rounds);
}

/// x^(2^252) modulo the characteristic polynomial of xoshiro256: its 16th power is x, which no
/// other residue has. Written out, so that opening a braid does not compile the derivation.
inline constexpr std::array<std::uint64_t, 4> braid_lane_jump{
    0x39da610606e0e771, 0x4566a69758dd856d, 0x1c60396a2c51aa0b, 0xf418b6ce5a857da3};

} // namespace detail

/// Sixteen lanes of xoshiro256++, 2^252 steps apart.
class xoshiro256_braid {
public:
    using result_type = std::uint64_t;
    /// The four words of the lane to be drawn next.
    using state_type = xoshiro256_plus_plus::state_type;

    /// The name under which it is saved.
    static constexpr const char* engine_name = "xoshiro256_braid";
    static constexpr std::uint64_t default_seed = xoshiro256_plus_plus::default_seed;
    static constexpr int state_bits = xoshiro256_plus_plus::state_bits;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }
    /// 2^256 - 1, in draws; see above for why the lanes do not make it longer.
    static constexpr wide_integer period() { return xoshiro256_plus_plus::period(); }

    constexpr xoshiro256_braid() : xoshiro256_braid(default_seed) {}
    /// From one number: lane 0 is xoshiro256_plus_plus{value}.
    constexpr explicit xoshiro256_braid(std::uint64_t value)
        : xoshiro256_braid(xoshiro256_plus_plus{value}.state()) {}
    /// From a seed sequence: lane 0 is xoshiro256_plus_plus{sequence}. It is never refused.
    template <detail::seed_sequence_for<xoshiro256_braid> Sequence>
    constexpr explicit xoshiro256_braid(Sequence& sequence)
        : xoshiro256_braid(xoshiro256_plus_plus{sequence}.state()) {}
    /// From the state of the lane to be drawn first; all zeros are refused.
    constexpr explicit xoshiro256_braid(const state_type& first) {
        if (first == state_type{}) {
            detail::refuse("xoshiro256_braid", "state", 0, "must not be all zeros");
        }
        state_type lane = first;
        for (std::size_t k = 0; k < detail::braid_lanes; ++k) {
            if (k > 0) {
                lane = detail::apply_polynomial<detail::xoshiro256_step>(detail::braid_lane_jump,
                                                                         lane);
            }
            for (std::size_t w = 0; w < lane.size(); ++w) {
                lanes_[16 * w + k] = lane[w];
            }
        }
    }

    constexpr void seed() { seed(default_seed); }
    constexpr void seed(std::uint64_t value) { *this = xoshiro256_braid{value}; }
    template <detail::seed_sequence_for<xoshiro256_braid> Sequence>
    constexpr void seed(Sequence& sequence) {
        *this = xoshiro256_braid{sequence};
    }

    constexpr result_type operator()() noexcept {
        const result_type drawn = detail::braid_word(lanes_, next_);
        if (++next_ == detail::braid_lanes) {
            detail::braid_step::step(lanes_);
            next_ = 0;
        }
        return drawn;
    }

    /// Writes the words that drawing one by one would give, and leaves the engine where that would.
    constexpr void draw_into(std::span<std::uint64_t> out) noexcept {
        std::size_t i = 0;
        while (next_ != 0 && i < out.size()) {
            out[i++] = (*this)();
        }
        const std::size_t rounds = (out.size() - i) / detail::braid_lanes;
        detail::braid_rounds(lanes_, out.data() + i, rounds);
        i += rounds * detail::braid_lanes;
        while (i < out.size()) {
            out[i++] = (*this)();
        }
    }

    /// Skips n words, in O(log n). Like advance a template, so that only a program that jumps
    /// compiles the derivation of xoshiro256's characteristic polynomial.
    template <class Step = detail::xoshiro256_step>
    constexpr void discard(unsigned long long n) {
        advance<Step>(wide_integer{n});
    }

    /// Skips any number of words, below the period or not, in time logarithmic in it: whole rounds
    /// by a jump of all lanes, the rest by moving on among them.
    template <class Step = detail::xoshiro256_step>
    constexpr void advance(const wide_integer& distance) {
        const wide_integer rounds = distance >> 4;
        // A jump costs about as much as this many rounds.
        constexpr std::uint64_t short_walk = 512;
        if (rounds.fits_word() && rounds.word(0) < short_walk) {
            for (std::uint64_t i = rounds.word(0); i > 0; --i) {
                detail::braid_step::step(lanes_);
            }
        } else {
            lanes_ = detail::apply_polynomial<detail::braid_step>(
                detail::characteristic<Step>.power_of_x(rounds), lanes_);
        }
        next_ += static_cast<std::uint32_t>(distance.word(0) & 15u);
        if (next_ >= detail::braid_lanes) {
            next_ -= detail::braid_lanes;
            detail::braid_step::step(lanes_);
        }
    }

    /// The words that the constructor takes: those of the lane to be drawn next.
    [[nodiscard]] constexpr state_type state() const noexcept {
        return {lanes_[next_], lanes_[16 + next_], lanes_[32 + next_], lanes_[48 + next_]};
    }

    /// Equal where all words to come are equal.
    friend constexpr bool operator==(const xoshiro256_braid& a,
                                     const xoshiro256_braid& b) noexcept {
        return a.state() == b.state();
    }

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const xoshiro256_braid& engine) {
        return os << xoshiro256_plus_plus{engine.state()};
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        xoshiro256_braid& engine) {
        xoshiro256_plus_plus lane;
        if (is >> lane) {
            engine = xoshiro256_braid{lane.state()};
        }
        return is;
    }

private:
    detail::braid_state lanes_{};
    std::uint32_t next_ = 0; // the lane to be drawn next
};

} // namespace leat

#endif
