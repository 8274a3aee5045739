// Multiply-with-carry: x_n + b c_n = a_r x_(n-r) + ... + a_1 x_(n-1) + c_(n-1), with words x below
// b = 2^w and a carry c below a_1 + ... + a_r. The output is x_n, all of 0 to b - 1.
//
// State: r words and a carry. Each engine is a Lehmer generator in disguise: with
// m = a_r b^r + ... + a_1 b - 1, every state has a residue y below m, whose lowest word is the next
// output, and a step multiplies y by (m + 1)/b, the inverse of b, modulo m. This gives the jumps
// (`discard`, `advance`: a modular power) and the period: the order of b modulo m, which is
// (m - 1)/2 where m and (m - 1)/2 are prime ("safe prime"), as for the three aliases:
// about 2^158 (mwc_lag4_32), 2^63 (mwc_lag1_32), 2^127 (mwc_lag1_64). With a composite m some
// cycles are shorter than `period()`.
//
// Transient states. With more than one word, several states may share a residue; just one of them
// lies on the cycle and is recurrent, the others lead into the cycle within r steps and are never
// met again. A state given by the user may be transient (`is_recurrent()` tells); a seeded one
// never is: it is moved to the recurrent state of its residue, which gives the same outputs.
//
// Seeding by one value: one splitmix64 output a word, oldest first (its upper w bits), and one for
// the carry, modulo the sum of the multipliers. By a seed sequence: ceil(w / 32) of its 32-bit
// words for each word, and for the carry, low first, likewise. The two states that never change
// (all words and the carry 0; all of them at their greatest) become usable by setting the oldest
// word to 2^(w-1); the state constructor and text input refuse them.
//
// Good for: simple, fast, long sequences whose algebra is fully known; mwc_lag4_32 for studies,
// the lag-1 engines for old results and small state. Weaknesses:
// - the lattice of the equivalent Lehmer generator: x_n - a_1 x_(n-1) - ... - a_r x_(n-r) is near a
//   multiple of b, so r + 1 successive outputs lie on planes at most 1/sqrt(1 + sum a_i^2) apart:
//   harmless with large multipliers, not with small ones;
// - with lag 1 and a near b, x_n - (b - a) x_(n+1) - x_(n+2) is near a multiple of b as well: so
//   triples lie on planes about 1/9631 (mwc_lag1_32) and 1/742 (mwc_lag1_64) apart, however good
//   the pairs are. Do not use lag 1 where three or more successive outputs make a point;
// - a state of few one bits (all words 0 and a small carry) gives small numbers for some outputs;
// - a word's chance departs from 2^-w by up to about b/m: only small analogues show it.
// Not for secrets. One word an output.
//
// Errors: a carry not below the sum of the multipliers, and the two fixed points. Multipliers with
// a sum above b, an oldest one of 0, or a state above 512 bits do not compile. `period()` does not
// compile where it cannot be derived (core/element_order.hpp says when); everything else does.
//
// Sources: Marsaglia, posted notes of 1994 and 1999; Couture and L'Ecuyer, Math. Comp. 66(218),
// 1997, 591-607 (equivalence, periods, lattice); Goresky and Klapper, ACM TOMACS 13(4), 2003,
// 310-321 (fractions b-adically expanded, transient states).

#ifndef LEAT_ENGINES_MULTIPLY_WITH_CARRY_HPP
#define LEAT_ENGINES_MULTIPLY_WITH_CARRY_HPP

#include "leat/core/concepts.hpp" // seed sequences
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp" // << and >>
#include "leat/core/wide_integer.hpp"
#include "leat/engines/carry_algebra.hpp" // residues, jumps, periods
#include "leat/engines/splitmix64.hpp"    // seeding by one value

#include <array>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <iosfwd>
#include <limits>

namespace leat {

/// Multiply-with-carry with words of type UInt and the multipliers a, the one of the oldest word
/// first.
template <class UInt, UInt... a>
class multiply_with_carry {
    static_assert(std::same_as<UInt, std::uint8_t> || std::same_as<UInt, std::uint16_t> ||
                      std::same_as<UInt, std::uint32_t> || std::same_as<UInt, std::uint64_t>,
                  "leat::multiply_with_carry: the word must be std::uint8_t, 16, 32 or 64");
    static_assert(sizeof...(a) > 0, "leat::multiply_with_carry: give at least one multiplier");

    static constexpr int word_bits = std::numeric_limits<UInt>::digits;
    using algebra = detail::carry_algebra<UInt, a...>;
    using word_array = std::array<UInt, sizeof...(a)>;

public:
    using result_type = UInt;

    /// The number of words before the carry.
    static constexpr std::size_t lag = sizeof...(a);
    /// The multipliers, that of the oldest word first.
    static constexpr word_array multipliers{a...};

    static_assert(multipliers[0] != 0,
                  "leat::multiply_with_carry: the oldest word's multiplier must not be 0");
    static_assert((wide_integer{a} + ...) <= wide_integer::power_of_two(word_bits),
                  "leat::multiply_with_carry: the sum of the multipliers must be at most 2^w");
    static_assert((lag + 1) * word_bits <= 512,
                  "leat::multiply_with_carry: the words and the carry must fit in 512 bits");

    /// The greatest carry: the sum of the multipliers less 1.
    static constexpr UInt greatest_carry = static_cast<UInt>((a + ...) - 1);
    /// The name under which it is saved.
    static constexpr const char* engine_name = "multiply_with_carry";
    /// The parameters that belong to its name.
    static constexpr UInt engine_parameters[] = {a...};
    static constexpr std::uint64_t default_seed = 1;

    /// The words, oldest first, then the carry.
    using state_type = std::array<UInt, lag + 1>;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return std::numeric_limits<UInt>::max(); }

    /// m = a_r b^r + ... + a_1 b - 1, the modulus of the equivalent Lehmer generator.
    static constexpr wide_integer modulus() { return algebra::modulus(); }

    /// Whole bits that the recurrent states fill, where a millionth part short of 2^k counts as
    /// 2^k.
    static constexpr int state_bits = (modulus() + (modulus() >> 20)).bit_width() - 1;

    /// The order of 2^w modulo m: after so many steps every recurrent state comes back, and where m
    /// is prime none comes back earlier.
    static constexpr wide_integer period() {
        constexpr wide_integer order = algebra::order_of_base();
        static_assert(order != 0,
                      "leat::multiply_with_carry: the period cannot be derived from these "
                      "multipliers; discard and advance work without it");
        return order;
    }

    constexpr multiply_with_carry() : multiply_with_carry(default_seed) {}
    /// From any number; see the head of this file.
    constexpr explicit multiply_with_carry(std::uint64_t value) { seed(value); }
    template <detail::seed_sequence_for<multiply_with_carry> Sequence>
    constexpr explicit multiply_with_carry(Sequence& sequence) {
        seed(sequence);
    }
    /// From the words, oldest first, and the carry.
    constexpr explicit multiply_with_carry(const word_array& words, UInt carry)
        : words_(words), carry_(carry) {
        if (carry > greatest_carry) {
            detail::refuse("multiply_with_carry", "carry", std::uint64_t{carry},
                           "must be below the sum of the multipliers");
        }
        if (all_equal(0, 0)) {
            detail::refuse("multiply_with_carry", "words", 0,
                           "must not all be 0 where the carry is 0: that state never changes");
        }
        if (all_equal(max(), greatest_carry)) {
            detail::refuse("multiply_with_carry", "words", std::uint64_t{max()},
                           "must not all be the greatest word where the carry is the greatest too: "
                           "that state never changes");
        }
    }
    /// From what `state()` gives.
    constexpr explicit multiply_with_carry(const state_type& state)
        : multiply_with_carry(words_of(state), state[lag]) {}

    constexpr void seed() { seed(default_seed); }
    constexpr void seed(std::uint64_t value) {
        splitmix64 expand{value};
        for (UInt& word : words_) {
            word = static_cast<UInt>(expand() >> (64 - word_bits));
        }
        carry_ = below_sum(expand());
        make_recurrent();
    }
    template <detail::seed_sequence_for<multiply_with_carry> Sequence>
    constexpr void seed(Sequence& sequence) {
        constexpr std::size_t parts = (word_bits + 31) / 32;
        std::array<std::uint32_t, parts*(lag + 1)> drawn{};
        sequence.generate(drawn.begin(), drawn.end());
        const auto joined = [&drawn](std::size_t i) {
            std::uint64_t value = drawn[parts * i];
            if constexpr (parts == 2) {
                value |= std::uint64_t{drawn[parts * i + 1]} << 32;
            }
            return value;
        };
        for (std::size_t i = 0; i < lag; ++i) {
            words_[i] = static_cast<UInt>(joined(i));
        }
        carry_ = below_sum(joined(lag));
        make_recurrent();
    }

    constexpr result_type operator()() noexcept {
        // What the last step made comes last into the sum: it is what the processor waits for.
        detail::column_sum<UInt> sum;
        for (std::size_t i = 0; i + 1 < lag; ++i) {
            sum.add_product(multipliers[i], words_[i]);
            words_[i] = words_[i + 1];
        }
        sum.add_word(carry_);
        sum.add_product(multipliers[lag - 1], words_[lag - 1]);
        words_[lag - 1] = sum.take_word();
        carry_ = sum.take_word();
        return words_[lag - 1];
    }

    constexpr void discard(unsigned long long n) { advance(n); }

    /// Does `distance` steps, in a time that grows with its logarithm; exact from transient states
    /// too.
    constexpr void advance(const wide_integer& distance) {
        if (distance < lag) {
            for (std::uint64_t n = distance.word(0); n > 0; --n) {
                (*this)();
            }
            return;
        }
        // The residue goes to `lag` steps before the end; those steps make the words anew.
        follow(algebra::steps_on(algebra::residue_of(words_, carry_), distance - lag));
    }

    /// Whether the state lies on a cycle: only then does a step back exist.
    [[nodiscard]] constexpr bool is_recurrent() const {
        multiply_with_carry same_residue = *this;
        same_residue.become_recurrent(algebra::residue_of(words_, carry_));
        return same_residue == *this;
    }

    /// The state of the equivalent Lehmer generator, 1 to m - 1: its lowest word is the next
    /// output.
    [[nodiscard]] constexpr wide_integer residue() const {
        return wide_integer{algebra::residue_of(words_, carry_)};
    }
    /// The recurrent state of a residue.
    static constexpr multiply_with_carry from_residue(const wide_integer& y) {
        if (y == 0 || y >= modulus()) {
            detail::refuse("multiply_with_carry",
                           "the residue must be above 0 and below the modulus");
        }
        multiply_with_carry engine;
        engine.become_recurrent(detail::low_words<algebra::limbs>(y));
        return engine;
    }

    /// The words, oldest first, then the carry.
    [[nodiscard]] constexpr state_type state() const noexcept {
        state_type all{};
        for (std::size_t i = 0; i < lag; ++i) {
            all[i] = words_[i];
        }
        all[lag] = carry_;
        return all;
    }

    friend constexpr bool operator==(const multiply_with_carry&,
                                     const multiply_with_carry&) = default;

    /// Writes the words, oldest first, and the carry.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const multiply_with_carry& engine) {
        for (const UInt word : engine.words_) {
            detail::write_unsigned(os, word);
            detail::write_char(os, ' ');
        }
        detail::write_unsigned(os, engine.carry_);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        multiply_with_carry& engine) {
        multiply_with_carry copy = engine;
        std::uint64_t value = 0;
        for (UInt& word : copy.words_) {
            if (!detail::read_unsigned(is, max(), value)) {
                return is;
            }
            word = static_cast<UInt>(value);
        }
        if (!detail::read_unsigned(is, greatest_carry, value)) {
            return is;
        }
        copy.carry_ = static_cast<UInt>(value);
        if (copy.is_fixed()) {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
        } else {
            engine = copy;
        }
        return is;
    }

private:
    static constexpr word_array words_of(const state_type& state) noexcept {
        word_array words{};
        for (std::size_t i = 0; i < lag; ++i) {
            words[i] = state[i];
        }
        return words;
    }
    static constexpr UInt below_sum(std::uint64_t x) noexcept {
        if constexpr (greatest_carry == std::numeric_limits<std::uint64_t>::max()) {
            return x;
        } else {
            return static_cast<UInt>(x % (std::uint64_t{greatest_carry} + 1));
        }
    }
    [[nodiscard]] constexpr bool all_equal(UInt word, UInt carry) const noexcept {
        for (const UInt x : words_) {
            if (x != word) {
                return false;
            }
        }
        return carry_ == carry;
    }
    [[nodiscard]] constexpr bool is_fixed() const noexcept {
        return all_equal(0, 0) || all_equal(max(), greatest_carry);
    }

    /// Makes this the state `lag` steps after the residue y.
    constexpr void follow(const typename algebra::residue& y) noexcept {
        words_ = algebra::words_after(y, carry_);
    }
    constexpr void become_recurrent(const typename algebra::residue& y) noexcept {
        follow(algebra::lag_steps_back(y));
    }
    constexpr void make_recurrent() noexcept {
        if (is_fixed()) {
            words_[0] = static_cast<UInt>(UInt{1} << (word_bits - 1));
        }
        become_recurrent(algebra::residue_of(words_, carry_));
    }

    word_array words_{}; // oldest first
    UInt carry_ = 0;
};

/// Four words of 32 bits and a carry; period about 2^158. Marsaglia 1994.
using mwc_lag4_32 = multiply_with_carry<std::uint32_t, 2111111111, 1492, 1776, 5115>;

/// One word of 32 bits and a carry; period about 2^63. For old results and small state: too short,
/// and its lattice too coarse, for large studies.
using mwc_lag1_32 = multiply_with_carry<std::uint32_t, 4294957665>;

/// One word of 64 bits and a carry; period about 2^127. The multiplier is the largest a for which
/// a 2^64 - 1 is a safe prime.
using mwc_lag1_64 = multiply_with_carry<std::uint64_t, 18446744073709550874u>;

} // namespace leat

#endif
