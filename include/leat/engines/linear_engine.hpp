// The engine behind the xorshift, xoroshiro and xoshiro families, all parts but the method itself.
//
// The state is an array of words, and one step is a linear map of its bits over GF(2). All states
// but zero lie on one cycle, so the period is 2^n - 1 for n bits of state. What is drawn is a
// function of the state, before or after the step, as the method's paper has it.
//
// A method is a class with
//   name               the engine's name, for messages
//   word, words        the word type and how many make the state
//   default_seed       the seed of a default-constructed engine
//   smallest           the least word that is ever drawn
//   linear_step        the class that has the step, which methods may share
//   step(state)        one step
//   draw(state)        one step, and the word that belongs to it
// Everything is constexpr.
//
// Seeds. With one word of state the seed is the state; zero, or a value that does not fit the word,
// is refused. With more, each word of state takes one output of splitmix64, the upper half of it
// where words have 32 bits. A seed sequence is read as ISO's mersenne_twister_engine reads it
// (ISO C++ [rand.eng.mers]): ceil(w/32) numbers a word, low first, and 2^(w-1) in the first word
// where all would be zero. A state of zeros is refused.
//
// Text: the words of the state in decimal, in the paper's order.
//
// Jumps take x^d modulo the characteristic polynomial, which is derived from the engine's own bits
// when a jump is first compiled, and apply it to the state. Short distances are walked.

#ifndef LEAT_ENGINES_LINEAR_ENGINE_HPP
#define LEAT_ENGINES_LINEAR_ENGINE_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/gf2.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/engines/splitmix64.hpp" // expands one seed to many words

#include <array>
#include <cstddef>
#include <cstdint>
#include <iosfwd>

namespace leat {

namespace detail {

/// The ring of polynomials modulo the characteristic polynomial of a step.
template <class Step>
constexpr auto derive_characteristic() noexcept {
    using word = typename Step::word;
    constexpr auto recurrence = [] {
        std::array<word, Step::words> state{word{1}};
        return shortest_recurrence<word, Step::words>([&state] {
            const bool bit = (state[0] & 1u) != 0;
            Step::step(state);
            return bit;
        });
    }();
    // One state bit follows a recurrence that divides the characteristic polynomial; of full order,
    // it is that polynomial.
    static_assert(recurrence.order == gf2_ring<word, Step::words>::degree,
                  "the lowest state bit does not see the whole state");
    return gf2_ring<word, Step::words>{recurrence.low};
}

/// Evaluated at compile time, and only where something jumps.
template <class Step>
inline constexpr auto characteristic = derive_characteristic<Step>();

/// p(T) applied to a state: the sum of T^i state over the non-zero coefficients i of p.
template <class Step, class Word, std::size_t Size, std::size_t Words>
constexpr std::array<Word, Words> apply_polynomial(const std::array<Word, Size>& p,
                                                   std::array<Word, Words> state) noexcept {
    std::array<Word, Words> total{};
    // Pointers, since calls of operator[] would use up the compilers' limit of constant evaluation.
    Word* const sum = total.data();
    const Word* const term = state.data();
    for (const Word coefficients : p) {
        for (int i = 0; i < 8 * static_cast<int>(sizeof(Word)); ++i) {
            if ((coefficients >> i & 1u) != 0) {
                for (std::size_t j = 0; j < Words; ++j) {
                    sum[j] ^= term[j];
                }
            }
            Step::step(state);
        }
    }
    return total;
}

} // namespace detail

/// An engine whose step is linear over GF(2); see the aliases in xorshift.hpp, xoroshiro.hpp and
/// xoshiro.hpp.
template <class Method>
class linear_engine {
    using word = typename Method::word;

public:
    using result_type = word;
    /// The state's words in the paper's order.
    using state_type = std::array<word, Method::words>;

    /// The name under which it is saved.
    static constexpr const char* engine_name = Method::name;
    static constexpr std::uint64_t default_seed = Method::default_seed;
    /// The bits of a word.
    static constexpr int word_bits = 8 * static_cast<int>(sizeof(word));
    static constexpr int state_bits = word_bits * static_cast<int>(Method::words);

    static constexpr result_type min() noexcept { return Method::smallest; }
    static constexpr result_type max() noexcept { return ~word{0}; }
    /// 2^state_bits - 1.
    static constexpr wide_integer period() {
        return wide_integer::power_of_two(state_bits) - wide_integer{1};
    }

    constexpr linear_engine() : linear_engine(default_seed) {}
    /// From one number; see above.
    constexpr explicit linear_engine(std::uint64_t value) { seed(value); }
    /// From a seed sequence, which is never refused.
    template <detail::seed_sequence_for<linear_engine> Sequence>
    constexpr explicit linear_engine(Sequence& sequence) {
        seed(sequence);
    }
    /// From the full state; all zeros are refused.
    constexpr explicit linear_engine(const state_type& state) : state_(state) {
        if (state == state_type{}) {
            detail::refuse(Method::name, "state", 0, "must not be all zeros");
        }
    }

    constexpr void seed() { seed(default_seed); }
    constexpr void seed(std::uint64_t value) {
        if constexpr (Method::words == 1) {
            if (value == 0 || value > max()) {
                detail::refuse(Method::name, "seed", value,
                               word_bits == 32 ? "must be 1 to 4294967295" : "must not be 0");
            }
            state_[0] = static_cast<word>(value);
        } else {
            splitmix64 source{value};
            state_type state{};
            for (word& w : state) {
                w = static_cast<word>(source() >> (64 - word_bits));
            }
            *this = linear_engine{state};
        }
    }
    template <detail::seed_sequence_for<linear_engine> Sequence>
    constexpr void seed(Sequence& sequence) {
        std::array<std::uint32_t, Method::words * sizeof(word) / 4> numbers{};
        sequence.generate(numbers.data(), numbers.data() + numbers.size());
        state_type state{};
        for (std::size_t i = 0; i < Method::words; ++i) {
            if constexpr (word_bits == 32) {
                state[i] = numbers[i];
            } else {
                state[i] = numbers[2 * i] | std::uint64_t{numbers[2 * i + 1]} << 32;
            }
        }
        if (state == state_type{}) {
            state[0] = word{1} << (word_bits - 1);
        }
        state_ = state;
    }

    constexpr result_type operator()() noexcept { return Method::draw(state_); }

    /// Skips n words, in O(log n).
    constexpr void discard(unsigned long long n) { advance(wide_integer{n}); }

    /// Skips any number of words, below the period or not, in time logarithmic in it.
    constexpr void advance(const wide_integer& distance) {
        // A jump costs about as much as this many steps.
        constexpr std::uint64_t short_walk = 8 * std::uint64_t{state_bits};
        if (distance.fits_word() && distance.word(0) < short_walk) {
            for (std::uint64_t i = distance.word(0); i > 0; --i) {
                Method::step(state_);
            }
        } else {
            using step = typename Method::linear_step;
            state_ = detail::apply_polynomial<step>(
                detail::characteristic<step>.power_of_x(distance), state_);
        }
    }

    /// The words that the constructor takes.
    [[nodiscard]] constexpr state_type state() const noexcept { return state_; }

    friend constexpr bool operator==(const linear_engine&, const linear_engine&) = default;

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const linear_engine& engine) {
        for (std::size_t i = 0; i < Method::words; ++i) {
            if (i > 0) {
                detail::write_char(os, ' ');
            }
            detail::write_unsigned(os, engine.state_[i]);
        }
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        linear_engine& engine) {
        state_type state{};
        for (word& w : state) {
            std::uint64_t value = 0;
            if (!detail::read_unsigned(is, max(), value)) {
                return is;
            }
            w = static_cast<word>(value);
        }
        if (state == state_type{}) {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
            return is;
        }
        engine.state_ = state;
        return is;
    }

private:
    state_type state_{};
};

} // namespace leat

#endif
