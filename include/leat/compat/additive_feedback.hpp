// additive_feedback31: the additive feedback generator behind random(), and behind rand() on glibc.
//
//   r[i] = r[i - 3] + r[i - 31] mod 2^32,   of which the upper 31 bits are drawn
//
// and additive_feedback63, r[i] = r[i - 1] + r[i - 63], which is random() with 256 bytes of state.
//
// State     the last 31 (63) words r, oldest first. At least one must be odd: all even ones go
//           round a shorter cycle and are refused. No seed leads there (found by a walk over all
//           of them).
// Output    31 bits, 0 to 2^31 - 1: the word without its lowest bit.
// Period    2^31 (2^31 - 1), about 2^62; 2^31 (2^63 - 1) for the longer one.
// Jumps     powers of x modulo x^31 - x^28 - 1 (x^63 - x^62 - 1) over the integers modulo 2^32:
// some
//           ten microseconds for any distance.
// Seeding   additive_feedback31{seed} is srandom(seed), or srand(seed): the seed modulo 2^32, and 0
//           becomes 1; the first words are the seed times powers of 16807 modulo 2^31 - 1, in
//           signed arithmetic, and 310 (630) draws are thrown away. Without a seed it is 1, as
//           there. A seed sequence sets the words as it gives them; the oldest is made odd where
//           all are even.
// Text      the words in decimal, oldest first.
// Memory    31 (63) words and a place.
//
// Good for replaying results. Not for new work: three words that lie 3 and 31 draws apart add up,
// which some simulations see; only 2^32 sequences can be seeded; close seeds start from states in
// proportion. Never for keys or games.
//
// With 8, 32 or 64 bytes of state random() runs on 1, 7 or 15 words; these have no engine here, as
// some seeds would lead to the shorter cycle. Other systems' random() may start from other words.
//
// Sources: method: Knuth, TAOCP vol. 2, 3.2.2 (Mitchell and Moore; the trinomials are in its
// tables); the period: Brent, "On the periods of generalized Fibonacci recurrences", Math. Comp.
// 63(207), 1994; seeding: Park and Miller, CACM 31(10), 1988; start and word order as random() has
// them, pinned by the tests against the C library at run time.

#ifndef LEAT_COMPAT_ADDITIVE_FEEDBACK_HPP
#define LEAT_COMPAT_ADDITIVE_FEEDBACK_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat {

/// r[i] = r[i - short_lag] + r[i - long_lag] mod 2^32. See the head of this file.
template <std::size_t long_lag, std::size_t short_lag>
class additive_feedback {
    static_assert((long_lag == 31 && short_lag == 3) || (long_lag == 63 && short_lag == 1),
                  "leat::additive_feedback: the lags must be 31 and 3, or 63 and 1");

public:
    using result_type = std::uint32_t;
    using state_type = std::array<std::uint32_t, long_lag>; ///< oldest first
    /// The name under which it is saved.
    static constexpr const char* engine_name =
        long_lag == 31 ? "additive_feedback31" : "additive_feedback63";
    static constexpr std::uint64_t default_seed = 1;
    static constexpr int state_bits = 32 * static_cast<int>(long_lag);

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return 0x7FFFFFFF; }
    static constexpr wide_integer period() {
        return (wide_integer::power_of_two(long_lag) - 1) << 31;
    }

    constexpr additive_feedback() noexcept { seed(); }
    /// As srandom(seed).
    constexpr explicit additive_feedback(std::uint64_t seed) noexcept { this->seed(seed); }
    /// From the last words, oldest first; refused where all are even.
    constexpr explicit additive_feedback(const state_type& state) : words_(state) {
        if (!has_odd(state)) {
            detail::refuse(name, "lowest bit of every word", 0, "must be 1 in at least one");
        }
    }
    template <detail::seed_sequence_for<additive_feedback> Sequence>
    constexpr explicit additive_feedback(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { seed(default_seed); }
    constexpr void seed(std::uint64_t seed) noexcept {
        // The oldest word is the one that the first sum would overwrite, `short_lag` places on.
        std::int32_t word = static_cast<std::int32_t>(static_cast<std::uint32_t>(seed));
        word = word == 0 ? 1 : word;
        for (std::size_t i = 0; i < long_lag; ++i) {
            words_[(i + long_lag - short_lag) % long_lag] = static_cast<std::uint32_t>(word);
            word = times_16807(word);
        }
        oldest_ = 0;
        for (std::size_t i = 0; i < 10 * long_lag; ++i) {
            (*this)();
        }
    }
    template <detail::seed_sequence_for<additive_feedback> Sequence>
    constexpr void seed(Sequence& q) {
        state_type words{};
        q.generate(words.data(), words.data() + words.size());
        if (!has_odd(words)) {
            words[0] |= 1u;
        }
        words_ = words;
        oldest_ = 0;
    }

    /// As random().
    constexpr result_type operator()() noexcept {
        const std::uint32_t recent =
            words_[oldest_ < short_lag ? oldest_ + long_lag - short_lag : oldest_ - short_lag];
        const std::uint32_t sum = words_[oldest_] += recent;
        oldest_ = oldest_ + 1 == long_lag ? 0 : oldest_ + 1;
        return sum >> 1;
    }

    constexpr void discard(unsigned long long n) { advance(n); }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) {
        constexpr std::uint64_t short_walk = 8192; // steps that take no longer than a power
        if (distance < short_walk) {
            for (std::uint64_t n = distance.word(0); n > 0; --n) {
                (*this)();
            }
            return;
        }
        const state_type p = power_of_x(distance % period());
        // r[i + n] is the sum of p[j] r[i + j]: the words of the next 2 long_lag - 1 places are
        // needed.
        std::array<std::uint32_t, 2 * long_lag - 1> row{};
        const state_type start = state();
        for (std::size_t i = 0; i < row.size(); ++i) {
            row[i] = i < long_lag ? start[i] : row[i - short_lag] + row[i - long_lag];
        }
        for (std::size_t i = 0; i < long_lag; ++i) {
            std::uint32_t sum = 0;
            for (std::size_t j = 0; j < long_lag; ++j) {
                sum += p[j] * row[i + j];
            }
            words_[i] = sum;
        }
        oldest_ = 0;
    }

    [[nodiscard]] constexpr state_type state() const noexcept {
        state_type words{};
        for (std::size_t i = 0; i < long_lag; ++i) {
            words[i] = words_[(oldest_ + i) % long_lag];
        }
        return words;
    }

    /// Whether the words are the same; where they stand in memory does not count.
    friend constexpr bool operator==(const additive_feedback& a,
                                     const additive_feedback& b) noexcept {
        return a.state() == b.state();
    }

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const additive_feedback& e) {
        detail::write_words(os, e.state());
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        additive_feedback& e) {
        state_type words{};
        if (!detail::read_words(is, words)) {
            return is;
        }
        if (has_odd(words)) {
            e.words_ = words;
            e.oldest_ = 0;
        } else {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
        }
        return is;
    }

private:
    static constexpr const char* name =
        long_lag == 31 ? "additive_feedback31" : "additive_feedback63";

    static constexpr bool has_odd(const state_type& words) noexcept {
        std::uint32_t any = 0;
        for (const std::uint32_t word : words) {
            any |= word;
        }
        return (any & 1u) != 0;
    }

    /// 16807 x mod 2^31 - 1 by Schrage's division (ACM TOMS 5(2), 1979), with the signs that C
    /// gives it: a negative x, from a seed of 2^31 and above, is no residue, but goes to one.
    static constexpr std::int32_t times_16807(std::int32_t x) noexcept {
        const std::int32_t y = 16807 * (x % 127773) - 2836 * (x / 127773);
        return y < 0 ? y + 2147483647 : y;
    }

    /// x^n modulo x^long_lag - x^(long_lag - short_lag) - 1 and 2^32; coefficients, lowest degree
    /// first.
    static constexpr state_type power_of_x(const wide_integer& n) noexcept {
        state_type p{1};
        for (int i = n.bit_width(); i-- > 0;) {
            std::array<std::uint32_t, 2 * long_lag - 1> square{};
            for (std::size_t j = 0; j < long_lag; ++j) {
                const std::uint32_t factor = p[j];
                square[2 * j] += factor * factor;
                for (std::size_t k = 0; k < j; ++k) {
                    square[j + k] += 2 * factor * p[k];
                }
            }
            for (std::size_t degree = 2 * long_lag - 2; degree >= long_lag; --degree) {
                square[degree - short_lag] += square[degree];
                square[degree - long_lag] += square[degree];
            }
            for (std::size_t j = 0; j < long_lag; ++j) {
                p[j] = square[j];
            }
            if (n.bit(i)) {
                const std::uint32_t top = p[long_lag - 1];
                for (std::size_t j = long_lag - 1; j > 0; --j) {
                    p[j] = p[j - 1];
                }
                p[0] = top;
                p[long_lag - short_lag] += top;
            }
        }
        return p;
    }

    state_type words_{};
    std::uint32_t oldest_ = 0; // the place of r[i - long_lag]
};

/// random(), and rand() on glibc.
using additive_feedback31 = additive_feedback<31, 3>;
/// random() with 256 bytes of state.
using additive_feedback63 = additive_feedback<63, 1>;

} // namespace leat

#endif
