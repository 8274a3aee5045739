// SipHash-2-4 with a 128-bit result, over a message of whole 64-bit words.
//
// Source: Aumasson and Bernstein, SipHash: a fast short-input PRF, INDOCRYPT 2012; the 128-bit
// result is that of the authors' reference code. A word stands for eight bytes, the least
// significant first, on every machine. The state is a value: a prefix hashed once can be continued
// in many ways.
//
// Here it spreads addresses; it is keyed with a public constant and keeps no secret.

#ifndef LEAT_CORE_SIPHASH_HPP
#define LEAT_CORE_SIPHASH_HPP

#include "leat/core/wide_multiply.hpp" // word_pair

#include <array>
#include <bit>
#include <cstdint>
#include <string_view>

namespace leat::detail {

/// A running SipHash-2-4-128: absorb words, then finish.
class siphash {
public:
    /// Starts under the 128-bit key (k0 holds its first eight bytes).
    constexpr siphash(std::uint64_t k0, std::uint64_t k1) noexcept
        : v0_(k0 ^ 0x736f6d6570736575u),
          v1_(k1 ^ 0x646f72616e646f6du ^ 0xeeu),
          v2_(k0 ^ 0x6c7967656e657261u),
          v3_(k1 ^ 0x7465646279746573u) {}

    /// Appends eight bytes.
    constexpr void absorb(std::uint64_t word) noexcept {
        compress(word);
        ++words_;
    }

    /// Appends a text: 3 and its length as a word, then eight bytes a word, the first one lowest.
    constexpr void absorb_text(std::string_view text) noexcept {
        absorb(3 + 256 * std::uint64_t{text.size()});
        std::uint64_t word = 0;
        unsigned filled = 0;
        for (const char c : text) {
            word |= std::uint64_t{static_cast<unsigned char>(c)} << (8 * filled);
            if (++filled == 8) {
                absorb(word);
                word = 0;
                filled = 0;
            }
        }
        if (filled != 0) {
            absorb(word);
        }
    }

    /// The hash of all words so far; the state itself is left as it is.
    [[nodiscard]] constexpr word_pair finish() const noexcept {
        siphash s = *this;
        s.compress((words_ * 8) << 56); // the last block holds the length modulo 256
        s.v2_ ^= 0xeeu;
        s.rounds(4);
        const std::uint64_t low = s.v0_ ^ s.v1_ ^ s.v2_ ^ s.v3_;
        s.v1_ ^= 0xddu;
        s.rounds(4);
        return {low, s.v0_ ^ s.v1_ ^ s.v2_ ^ s.v3_};
    }

    /// The running state: the authors' v0 to v3, and the words absorbed.
    [[nodiscard]] constexpr std::array<std::uint64_t, 5> state() const noexcept {
        return {v0_, v1_, v2_, v3_, words_};
    }
    /// Goes on from a state.
    constexpr explicit siphash(const std::array<std::uint64_t, 5>& state) noexcept
        : v0_(state[0]), v1_(state[1]), v2_(state[2]), v3_(state[3]), words_(state[4]) {}

    friend constexpr bool operator==(const siphash&, const siphash&) = default;

private:
    constexpr void compress(std::uint64_t word) noexcept {
        v3_ ^= word;
        rounds(2);
        v0_ ^= word;
    }

    constexpr void rounds(int count) noexcept {
        for (int i = 0; i < count; ++i) {
            v0_ += v1_;
            v1_ = std::rotl(v1_, 13) ^ v0_;
            v0_ = std::rotl(v0_, 32);
            v2_ += v3_;
            v3_ = std::rotl(v3_, 16) ^ v2_;
            v0_ += v3_;
            v3_ = std::rotl(v3_, 21) ^ v0_;
            v2_ += v1_;
            v1_ = std::rotl(v1_, 17) ^ v2_;
            v2_ = std::rotl(v2_, 32);
        }
    }

    std::uint64_t v0_;
    std::uint64_t v1_;
    std::uint64_t v2_;
    std::uint64_t v3_;
    std::uint64_t words_ = 0;
};

} // namespace leat::detail

#endif
