// mrg32k3a: two linear recurrences of order three, combined.
//
//   x_n = 1403580 x_(n-2) -  810728 x_(n-3)  mod m1 = 2^32 - 209
//   y_n =  527612 y_(n-1) - 1370589 y_(n-3)  mod m2 = 2^32 - 22853
//   z_n = x_n - y_n mod m1, where 0 is given as m1
//
// State     s10, s11, s12, s20, s21, s22: the last three x and the last three y, each oldest first,
//           not all three 0; about 2^192 states.
// Output    the integer z, 1 to m1, as in the paper. The range is no power of two: take words,
//           integers and reals through leat's uniform/, or z / (m1 + 1) through `unit()`.
// Period    (m1^3 - 1)(m2^3 - 1)/2, about 2^191; the states fall into two cycles of that length.
// Jumps     powers of the companion matrices modulo m1 and m2: any distance in microseconds.
// Seeding   by one value: one splitmix64 output a word, modulo m1 or m2. By a seed sequence: one of
//           its words each, likewise. Three zeros in a row become 2^31, 0, 0. The state constructor
//           and text input refuse what the method forbids.
//
// Good for: results to be compared with published ones, and whatever asks for a method whose
// lattice has been searched for quality up to 45 dimensions. Weaknesses: slower than the word
// engines; 32-bit resolution of `unit()`; both parts are linear, so a state of small numbers (all
// ones, say) shows it in the first outputs. Not for secrets. One step an output.
//
// Source: L'Ecuyer, Operations Research 47(1), 1999, 159-164, Figure I. The paper multiplies by a
// printed norm, one rounding away from 1/(m1 + 1): `unit()` is the exact quotient, rounded once.
// Jumps: L'Ecuyer, CACM 33(10), 1990, 85-97.

#ifndef LEAT_ENGINES_COMBINED_RECURSIVE_HPP
#define LEAT_ENGINES_COMBINED_RECURSIVE_HPP

#include "leat/core/concepts.hpp" // seed sequences
#include "leat/core/errors.hpp"
#include "leat/core/exact_ratio.hpp" // unit()
#include "leat/core/text.hpp"        // << and >>
#include "leat/core/wide_integer.hpp"
#include "leat/engines/splitmix64.hpp" // seeding by one value

#include <array>
#include <cstddef>
#include <cstdint>
#include <iosfwd>

namespace leat {
namespace detail {

/// x_n = a x_(n-lag) - b x_(n-3) mod m: one part of the combination. `lag` is 1 or 2; m is below
/// 2^32 by at most 2^16, a and b are below 2^22.
template <std::uint32_t m, std::size_t lag, std::uint32_t a, std::uint32_t b>
struct third_order_recurrence {
    static_assert(lag == 1 || lag == 2);
    static_assert(m >= 0xFFFF0000u && a < (1u << 22) && b < (1u << 22));

    using triple = std::array<std::uint32_t, 3>; // of the sequence: oldest first

    static constexpr std::uint32_t modulus = m;

    /// The length of the sequence's cycle, for a primitive characteristic polynomial.
    static constexpr wide_integer period() {
        const wide_integer wide = m;
        return wide * wide * wide - 1;
    }

    static constexpr std::uint32_t next(const triple& s) noexcept {
        return static_cast<std::uint32_t>(
            (std::uint64_t{a} * s[3 - lag] + std::uint64_t{b} * (m - s[0])) % m);
    }

    static constexpr void step(triple& s) noexcept { s = {s[1], s[2], next(s)}; }

    /// Takes s `distance` steps on. The companion matrix M fulfils its own characteristic equation
    /// M^3 = a M^(3-lag) - b, so that M^n = p2 M^2 + p1 M + p0 with p = X^n modulo that polynomial:
    /// a quarter of the work of 3x3 products, and M, M^2 act on a state as one and two steps.
    static constexpr void advance(triple& s, const wide_integer& distance) {
        const wide_integer exponent = distance % period();
        triple p{1, 0, 0}; // coefficients, lowest degree first
        for (int i = exponent.bit_width(); i-- > 0;) {
            p = product(p, p);
            if (exponent.bit(i)) {
                p = reduced({0, p[0], p[1], p[2], 0});
            }
        }
        const triple s0 = s;
        for (std::uint32_t& x : s) {
            x = 0;
        }
        triple shifted = s0;
        for (const std::uint32_t coefficient : p) {
            for (std::size_t i = 0; i < 3; ++i) {
                s[i] = static_cast<std::uint32_t>(
                    (folded(std::uint64_t{coefficient} * shifted[i]) + s[i]) % m);
            }
            step(shifted);
        }
    }

private:
    /// Congruent to x modulo m, and below 2^49: 2^32 is 2^32 - m modulo m.
    static constexpr std::uint64_t folded(std::uint64_t x) noexcept {
        return (x >> 32) * (std::uint32_t{0} - m) + (x & 0xFFFFFFFFu);
    }

    /// A polynomial of degree 4 at most, modulo the characteristic one.
    static constexpr triple reduced(std::array<std::uint64_t, 5> c) noexcept {
        for (std::size_t k = 4; k >= 3; --k) {
            const std::uint64_t top = c[k] % m;
            c[k - lag] += a * top;
            c[k - 3] += b * (m - top);
        }
        triple p{};
        for (std::size_t k = 0; k < 3; ++k) {
            p[k] = static_cast<std::uint32_t>(c[k] % m);
        }
        return p;
    }

    static constexpr triple product(const triple& p, const triple& q) noexcept {
        std::array<std::uint64_t, 5> c{};
        for (std::size_t i = 0; i < 3; ++i) {
            for (std::size_t j = 0; j < 3; ++j) {
                c[i + j] += folded(std::uint64_t{p[i]} * q[j]);
            }
        }
        return reduced(c);
    }
};

} // namespace detail

/// L'Ecuyer's combined multiple recursive generator. See the head of this file.
class mrg32k3a {
    using first = detail::third_order_recurrence<4294967087, 2, 1403580, 810728>;
    using second = detail::third_order_recurrence<4294944443, 1, 527612, 1370589>;

public:
    using result_type = std::uint32_t;
    /// s10, s11, s12, s20, s21, s22.
    using state_type = std::array<std::uint32_t, 6>;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "mrg32k3a";
    static constexpr std::uint64_t default_seed = 12345;
    /// Whole bits that the states fill.
    static constexpr int state_bits = 191;

    static constexpr result_type min() noexcept { return 1; }
    static constexpr result_type max() noexcept { return first::modulus; }
    static constexpr wide_integer period() { return first::period() * second::period() >> 1; }

    constexpr mrg32k3a() noexcept { seed(); }
    /// From any number; see the head of this file.
    constexpr explicit mrg32k3a(std::uint64_t value) noexcept { seed(value); }
    template <detail::seed_sequence_for<mrg32k3a> Sequence>
    constexpr explicit mrg32k3a(Sequence& sequence) {
        seed(sequence);
    }
    /// From the six words, in the paper's order.
    constexpr explicit mrg32k3a(const state_type& state)
        : first_(first_of(state)), second_(second_of(state)) {
        constexpr std::array<const char*, 6> names{"s10", "s11", "s12", "s20", "s21", "s22"};
        for (std::size_t i = 0; i < 6; ++i) {
            if (state[i] >= modulus_of(i)) {
                detail::refuse("mrg32k3a", names[i], state[i],
                               i < 3 ? "must be below 4294967087" : "must be below 4294944443");
            }
        }
        if (all_zero(first_)) {
            detail::refuse("mrg32k3a", "s10, s11, s12", 0, "must not all three be 0");
        }
        if (all_zero(second_)) {
            detail::refuse("mrg32k3a", "s20, s21, s22", 0, "must not all three be 0");
        }
    }

    constexpr void seed() noexcept { seed(default_seed); }
    constexpr void seed(std::uint64_t value) noexcept {
        splitmix64 expand{value};
        for (std::uint32_t& x : first_) {
            x = static_cast<std::uint32_t>(expand() % first::modulus);
        }
        for (std::uint32_t& y : second_) {
            y = static_cast<std::uint32_t>(expand() % second::modulus);
        }
        leave_zero();
    }
    template <detail::seed_sequence_for<mrg32k3a> Sequence>
    constexpr void seed(Sequence& sequence) {
        state_type words{};
        sequence.generate(words.begin(), words.end());
        for (std::size_t i = 0; i < 6; ++i) {
            words[i] %= modulus_of(i);
        }
        first_ = first_of(words);
        second_ = second_of(words);
        leave_zero();
    }

    constexpr result_type operator()() noexcept {
        first::step(first_);
        second::step(second_);
        const std::uint32_t x = first_[2];
        const std::uint32_t y = second_[2];
        return x > y ? x - y : x + (first::modulus - y);
    }
    /// The paper's real mapping: draws z and returns z / (m1 + 1), rounded once, in (0, 1).
    constexpr double unit() noexcept {
        const result_type z = (*this)();
        return detail::exact_ratio(z, std::uint64_t{first::modulus} + 1);
    }

    constexpr void discard(unsigned long long n) { advance(n); }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) {
        constexpr std::uint64_t short_walk = 128; // steps that take no longer than a power
        if (distance < short_walk) {
            for (std::uint64_t n = distance.word(0); n > 0; --n) {
                (*this)();
            }
            return;
        }
        first::advance(first_, distance);
        second::advance(second_, distance);
    }

    [[nodiscard]] constexpr state_type state() const noexcept {
        return {first_[0], first_[1], first_[2], second_[0], second_[1], second_[2]};
    }

    friend constexpr bool operator==(const mrg32k3a&, const mrg32k3a&) = default;

    /// Writes the six words, in the paper's order.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const mrg32k3a& engine) {
        detail::write_words(os, engine.state());
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        mrg32k3a& engine) {
        state_type words{};
        for (std::size_t i = 0; i < 6; ++i) {
            std::uint64_t word = 0;
            if (!detail::read_unsigned(is, modulus_of(i) - 1, word)) {
                return is;
            }
            words[i] = static_cast<std::uint32_t>(word);
        }
        if (all_zero(first_of(words)) || all_zero(second_of(words))) {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
        } else {
            engine.first_ = first_of(words);
            engine.second_ = second_of(words);
        }
        return is;
    }

private:
    using triple = std::array<std::uint32_t, 3>;

    static constexpr std::uint32_t modulus_of(std::size_t i) noexcept {
        return i < 3 ? first::modulus : second::modulus;
    }
    static constexpr triple first_of(const state_type& s) noexcept { return {s[0], s[1], s[2]}; }
    static constexpr triple second_of(const state_type& s) noexcept { return {s[3], s[4], s[5]}; }
    static constexpr bool all_zero(const triple& s) noexcept {
        return s[0] == 0 && s[1] == 0 && s[2] == 0;
    }
    /// As ISO C++ maps an all-zero state.
    constexpr void leave_zero() noexcept {
        for (triple* const part : {&first_, &second_}) {
            if (all_zero(*part)) {
                (*part)[0] = 0x80000000u;
            }
        }
    }

    triple first_{};
    triple second_{};
};

} // namespace leat

#endif
