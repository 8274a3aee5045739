// philox4x32 and philox4x64: counter-based engines, a keyed bijection of four words, 10 rounds.
//
// State     a key of two words, a counter of four (word 0 least significant), and the place of the
//           next output in the counter's block of four; every value allowed. state() gives them in
//           this order, seven words. 32-bit words for philox4x32, 64-bit words for philox4x64.
// Output    the words of block(key, counter), block(key, counter + 1), ...
// Period    4 * 2^128 and 4 * 2^256 words, for every key.
// Jumps     addition: discard and any distance are O(1).
// Seeding   as ISO C++26 [rand.eng.philox]: one number goes, modulo 2^w, to key word 0, a seed
//           sequence fills the key (32-bit words, low first); the counter starts at 0. So one
//           number reaches 2^32 sequences of philox4x32, a seed sequence 2^64.
//
// Good for addressing: any word of any key is there at once, so that streams, cells or particles
// can each have a key or a range of counters, and need no state. No statistical weakness is known
// at 10 rounds. Not a cipher: the rounds are fewer than secrecy needs. Where only speed counts,
// xoshiro256_plus_plus is faster word by word.
//
// Source: Salmon, Moraes, Dror and Shaw, "Parallel random numbers: as easy as 1, 2, 3", SC11, 2011;
// the sequence is that of ISO C++26 philox4x32 and philox4x64, whose set_counter takes the words in
// reversed order.

#ifndef LEAT_ENGINES_PHILOX_HPP
#define LEAT_ENGINES_PHILOX_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/engines/counter_leap.hpp" // leap(n): every n-th draw

#include <array>
#include <concepts>
#include <cstdint>

namespace leat {

namespace detail {

/// The multipliers and key increments of SC11, table 2.
template <class UInt>
struct philox_constants;

template <>
struct philox_constants<std::uint32_t> {
    static constexpr const char* name = "philox4x32";
    static constexpr std::array<std::uint32_t, 2> multipliers{0xD2511F53u, 0xCD9E8D57u};
    static constexpr std::array<std::uint32_t, 2> increments{0x9E3779B9u, 0xBB67AE85u};
};

template <>
struct philox_constants<std::uint64_t> {
    static constexpr const char* name = "philox4x64";
    static constexpr std::array<std::uint64_t, 2> multipliers{0xD2E7470EE14C6C93u,
                                                              0xCA5A826395121157u};
    static constexpr std::array<std::uint64_t, 2> increments{0x9E3779B97F4A7C15u,
                                                             0xBB67AE8584CAA73Bu};
};

} // namespace detail

/// Four words a block from a key of two and a counter of four. See the head of this file.
template <class UInt>
class philox4 {
    static_assert(std::same_as<UInt, std::uint32_t> || std::same_as<UInt, std::uint64_t>);
    using constants = detail::philox_constants<UInt>;
    static constexpr int word_bits = 8 * static_cast<int>(sizeof(UInt));

public:
    using result_type = UInt;
    using key_type = std::array<UInt, 2>;     ///< word 0 least significant
    using counter_type = std::array<UInt, 4>; ///< word 0 least significant
    using state_type = std::array<UInt, 7>;   ///< key, counter, place in the block
    /// The name under which it is saved.
    static constexpr const char* engine_name = constants::name;
    static constexpr std::uint64_t default_seed = 20111115;
    static constexpr int state_bits = 2 * word_bits; ///< the key; seeding sets the counter to 0

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return static_cast<UInt>(~UInt{0}); }
    static constexpr wide_integer period() {
        return wide_integer::power_of_two(static_cast<unsigned>(4 * word_bits + 2));
    }

    /// The bijection itself: four words from key and counter, without any engine.
    template <int rounds = 10>
    static constexpr counter_type block(key_type key, counter_type x) noexcept {
        for (int round = 0; round < rounds; ++round) {
            if (round > 0) {
                key[0] = static_cast<UInt>(key[0] + constants::increments[0]);
                key[1] = static_cast<UInt>(key[1] + constants::increments[1]);
            }
            const halves p = multiply(constants::multipliers[0], x[0]);
            const halves q = multiply(constants::multipliers[1], x[2]);
            x = {static_cast<UInt>(q.high ^ x[1] ^ key[0]), q.low,
                 static_cast<UInt>(p.high ^ x[3] ^ key[1]), p.low};
        }
        return x;
    }

    constexpr philox4() noexcept = default;
    /// Key word 0 from the seed modulo 2^w, key word 1 and counter zero.
    constexpr explicit philox4(std::uint64_t seed) noexcept : key_{static_cast<UInt>(seed), 0} {}
    template <detail::seed_sequence_for<philox4> Sequence>
    constexpr explicit philox4(Sequence& q) {
        seed(q);
    }
    /// From key and counter; the first draw is word 0 of their block.
    constexpr philox4(const key_type& key, const counter_type& counter) noexcept
        : key_(key), counter_(counter) {}
    /// From the full state: key, counter, place in the block (0 to 3).
    constexpr explicit philox4(const state_type& s)
        : philox4(key_type{s[0], s[1]}, counter_type{s[2], s[3], s[4], s[5]}) {
        if (s[6] > 3) {
            detail::refuse(constants::name, "place", s[6], "must be 0, 1, 2 or 3");
        }
        place_ = static_cast<std::uint32_t>(s[6]);
        refill();
    }

    constexpr void seed() noexcept { *this = philox4{}; }
    constexpr void seed(std::uint64_t seed) noexcept { *this = philox4{seed}; }
    template <detail::seed_sequence_for<philox4> Sequence>
    constexpr void seed(Sequence& q) {
        constexpr std::size_t parts = sizeof(UInt) / 4;
        std::array<std::uint32_t, 2 * parts> words{};
        q.generate(words.data(), words.data() + words.size());
        key_type key{};
        for (std::size_t i = 0; i < words.size(); ++i) {
            key[i / parts] =
                static_cast<UInt>(key[i / parts] | UInt{words[i]} << (32 * (i % parts)));
        }
        *this = philox4{key, {}};
    }

    constexpr result_type operator()() noexcept {
        if (place_ == 0) {
            block_ = block(key_, counter_);
        }
        const UInt x = block_[place_];
        if (++place_ == 4) {
            place_ = 0;
            add_blocks(1);
        }
        return x;
    }

    constexpr void discard(unsigned long long n) noexcept {
        const std::uint64_t words = n;
        move_on(static_cast<std::uint32_t>(words & 3u), words >> 2);
    }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) noexcept {
        const wide_integer blocks = distance >> 2;
        counter_type upper{}; // the blocks beyond the lowest 64 bits
        for (std::size_t i = 0; i < 4; ++i) {
            const int bit = static_cast<int>(i) * word_bits;
            upper[i] = bit < 64 ? UInt{0} : static_cast<UInt>(blocks.word(bit / 64) >> (bit % 64));
        }
        add(upper);
        move_on(static_cast<std::uint32_t>(distance.word(0) & 3u), blocks.word(0));
    }

    /// An engine of every n-th draw, beginning with the next one. See streams/split.hpp.
    [[nodiscard]] constexpr counter_leap<philox4> leap(std::uint64_t n) const {
        return counter_leap{*this, n};
    }

    [[nodiscard]] constexpr key_type key() const noexcept { return key_; }
    /// The counter of the block that holds the next draw.
    [[nodiscard]] constexpr counter_type counter() const noexcept { return counter_; }
    /// The place of the next draw in its block: 0, 1, 2 or 3.
    [[nodiscard]] constexpr int place() const noexcept { return static_cast<int>(place_); }
    /// ISO C++26: moves to the first word of a block; the counter's most significant word first.
    constexpr void set_counter(const counter_type& reversed) noexcept {
        counter_ = {reversed[3], reversed[2], reversed[1], reversed[0]};
        place_ = 0;
    }
    [[nodiscard]] constexpr state_type state() const noexcept {
        return {key_[0],
                key_[1],
                counter_[0],
                counter_[1],
                counter_[2],
                counter_[3],
                static_cast<UInt>(place_)};
    }

    /// Equal when all draws to come are equal by construction: the buffered block follows from the
    /// rest, and is not compared.
    friend constexpr bool operator==(const philox4& a, const philox4& b) noexcept {
        return a.key_ == b.key_ && a.counter_ == b.counter_ && a.place_ == b.place_;
    }

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const philox4& e) {
        detail::write_words(os, e.state());
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        philox4& e) {
        state_type words{};
        for (std::size_t i = 0; i < words.size(); ++i) {
            std::uint64_t x = 0;
            if (!detail::read_unsigned(is, i == 6 ? 3 : max(), x)) {
                return is;
            }
            words[i] = static_cast<UInt>(x);
        }
        e = philox4{words};
        return is;
    }

private:
    struct halves {
        UInt low;
        UInt high;
    };
    static constexpr halves multiply(UInt a, UInt b) noexcept {
        if constexpr (word_bits == 32) {
            const std::uint64_t product = std::uint64_t{a} * b;
            return {static_cast<UInt>(product), static_cast<UInt>(product >> 32)};
        } else {
            const detail::word_pair product = detail::multiply_wide(a, b);
            return {product.low, product.high};
        }
    }

    /// Adds to the counter, modulo its range.
    constexpr void add(const counter_type& n) noexcept {
        UInt carry = 0;
        for (std::size_t i = 0; i < 4; ++i) {
            const UInt partial = static_cast<UInt>(counter_[i] + n[i]);
            const UInt sum = static_cast<UInt>(partial + carry);
            carry = static_cast<UInt>((partial < n[i] ? 1 : 0) | (sum < partial ? 1 : 0));
            counter_[i] = sum;
        }
    }
    constexpr void add_blocks(std::uint64_t n) noexcept {
        if constexpr (word_bits == 32) {
            add({static_cast<UInt>(n), static_cast<UInt>(n >> 32), 0, 0});
        } else {
            add({n, 0, 0, 0});
        }
    }
    constexpr void move_on(std::uint32_t words, std::uint64_t blocks) noexcept {
        const std::uint32_t place = place_ + words;
        place_ = place & 3u;
        add_blocks(blocks);
        add_blocks(place >> 2);
        refill();
    }
    /// A draw at place 0 computes its block itself; at any other place the block must be there.
    constexpr void refill() noexcept {
        if (place_ != 0) {
            block_ = block(key_, counter_);
        }
    }

    key_type key_{static_cast<UInt>(default_seed), 0};
    counter_type counter_{};
    counter_type block_{};
    std::uint32_t place_ = 0;
};

/// The 32-bit engine of ISO C++26, and the one under leat::stream.
using philox4x32 = philox4<std::uint32_t>;
/// The 64-bit engine of ISO C++26.
using philox4x64 = philox4<std::uint64_t>;

} // namespace leat

#endif
