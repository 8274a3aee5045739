// lehmer128: x -> a x mod 2^128, of which the upper 64 bits are drawn. Small and fast.
//
// State     128 bits, odd; an even state is refused. state() gives {low word, high word}.
// Output    the upper 64 bits of the state after the step.
// Period    2^126: a is 5 modulo 8, so the odd states fall into two cycles, told apart by the
//           second lowest bit, which no step changes.
// Jumps     a^n by binary powers, a fraction of a microsecond.
// Seeding   lehmer128{word} takes the word as the state itself, so it must be odd; with the upper
//           half zero the first draws of small seeds are in proportion: prefer a seed sequence or a
//           mixed word. A seed sequence gives four 32-bit words, low first; the lowest bit is set.
//
// Good for long runs where speed counts and one sequence, or blocks of it, is all that is needed.
// Weaknesses: a lattice (in 64-bit outputs far too fine for the usual uses), states in proportion
// stay in proportion, and two states that agree in their low bits agree there for ever; only the
// upper half, which is drawn, is good. Do not seed workers by consecutive words: cut blocks.
//
// Source: L'Ecuyer, "Tables of linear congruential generators of different sizes and good lattice
// structure", Math. Comp. 68(225), 1999, table for m = 2^128, c = 0.

#ifndef LEAT_ENGINES_LEHMER128_HPP
#define LEAT_ENGINES_LEHMER128_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"

#include <array>
#include <cstdint>

namespace leat {

/// Every n-th draw of lehmer128: the same method, with a^n as its multiplier.
class lehmer128_leap {
public:
    using result_type = std::uint64_t;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "lehmer128_leap";

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }

    /// `first` is the state whose upper half is the first draw.
    constexpr lehmer128_leap(detail::word_pair first, detail::word_pair multiplier) noexcept
        : next_(first), multiplier_(multiplier) {}

    constexpr result_type operator()() noexcept {
        const std::uint64_t x = next_.high;
        next_ = detail::multiply(multiplier_, next_);
        return x;
    }

    /// One to be read into.
    static constexpr lehmer128_leap for_reading() noexcept { return {{1, 0}, {1, 0}}; }

    friend constexpr bool operator==(const lehmer128_leap&, const lehmer128_leap&) = default;

    /// Writes the state and the multiplier, each low word first.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const lehmer128_leap& e) {
        detail::write_words(os,
                            std::array<std::uint64_t, 4>{e.next_.low, e.next_.high,
                                                         e.multiplier_.low, e.multiplier_.high});
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        lehmer128_leap& e) {
        std::array<std::uint64_t, 4> words{};
        if (detail::read_words(is, words)) {
            if ((words[0] & words[2] & 1u) == 0) { // both are odd
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            } else {
                e = {{words[0], words[1]}, {words[2], words[3]}};
            }
        }
        return is;
    }

private:
    detail::word_pair next_;
    detail::word_pair multiplier_;
};

/// x -> a x mod 2^128, upper half drawn. See the head of this file.
class lehmer128 {
public:
    using result_type = std::uint64_t;
    using state_type = std::array<std::uint64_t, 2>; ///< low word, high word
    /// The name under which it is saved.
    static constexpr const char* engine_name = "lehmer128";
    static constexpr std::uint64_t default_seed = 1;
    static constexpr int state_bits = 128; ///< the lowest of them always one
    /// 0x12e15e35b500f16e2e714eb2b37916a5, low word first.
    static constexpr state_type multiplier{0x2E714EB2B37916A5u, 0x12E15E35B500F16Eu};

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }
    static constexpr wide_integer period() { return wide_integer::power_of_two(126); }

    constexpr lehmer128() noexcept = default;
    /// From the state itself, below 2^64; an even one is refused.
    constexpr explicit lehmer128(std::uint64_t seed) : x_{checked("seed", seed), 0} {}
    /// From the state, low word first; an even one is refused.
    constexpr explicit lehmer128(const state_type& state)
        : x_{checked("low word of the state", state[0]), state[1]} {}
    template <detail::seed_sequence_for<lehmer128> Sequence>
    constexpr explicit lehmer128(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { *this = lehmer128{}; }
    constexpr void seed(std::uint64_t seed) { *this = lehmer128{seed}; }
    template <detail::seed_sequence_for<lehmer128> Sequence>
    constexpr void seed(Sequence& q) {
        std::array<std::uint32_t, 4> words{};
        q.generate(words.data(), words.data() + words.size());
        x_.low = words[0] | std::uint64_t{words[1]} << 32 | 1u;
        x_.high = words[2] | std::uint64_t{words[3]} << 32;
    }

    constexpr result_type operator()() noexcept {
        x_ = detail::multiply(step_, x_);
        return x_.high;
    }

    constexpr void discard(unsigned long long n) noexcept {
        x_ = detail::multiply(power(step_, {n, 0}), x_);
    }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) noexcept {
        // 2^126 divides 2^128, so that the lower two words decide.
        x_ = detail::multiply(power(step_, {distance.word(0), distance.word(1)}), x_);
    }

    /// An engine of every n-th draw, beginning with the next one. See streams/split.hpp.
    [[nodiscard]] constexpr lehmer128_leap leap(std::uint64_t n) const noexcept {
        return {detail::multiply(step_, x_), power(step_, {n, 0})};
    }

    [[nodiscard]] constexpr state_type state() const noexcept { return {x_.low, x_.high}; }

    friend constexpr bool operator==(const lehmer128&, const lehmer128&) = default;

    /// Low word, then high word.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const lehmer128& e) {
        detail::write_unsigned(os, e.x_.low);
        detail::write_char(os, ' ');
        detail::write_unsigned(os, e.x_.high);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        lehmer128& e) {
        detail::word_pair x{};
        if (detail::read_unsigned(is, max(), x.low) && detail::read_unsigned(is, max(), x.high)) {
            if ((x.low & 1u) == 0) {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            } else {
                e.x_ = x;
            }
        }
        return is;
    }

private:
    static constexpr detail::word_pair step_{multiplier[0], multiplier[1]};

    static constexpr std::uint64_t checked(const char* parameter, std::uint64_t low) {
        if ((low & 1u) == 0) {
            detail::refuse("lehmer128", parameter, low, "must be odd");
        }
        return low;
    }
    static constexpr detail::word_pair power(detail::word_pair base,
                                             detail::word_pair exponent) noexcept {
        detail::word_pair result{1, 0};
        while (exponent.low != 0 || exponent.high != 0) {
            if ((exponent.low & 1u) != 0) {
                result = detail::multiply(result, base);
            }
            base = detail::multiply(base, base);
            exponent = {exponent.low >> 1 | exponent.high << 63, exponent.high >> 1};
        }
        return result;
    }

    detail::word_pair x_{default_seed, 0};
};

} // namespace leat

#endif
