// The number theory of multiply-with-carry: residues, steps as products, periods.
//
// Let b = 2^w, the multipliers a_1, ..., a_r (a_r for the oldest word), m = a_r b^r + ... + a_1 b
// - 1. A state with the last words x_(n-1), ..., x_(n-r) and the carry c has the residue
//   y = c + sum over i of a_i (x_(n-i) + x_(n-i+1) b + ... + x_(n-1) b^(i-1)),   0 <= y <= m.
// All outputs to come are the digits of -y/m, expanded b-adically. So the next output x is the
// lowest digit of y, and a step takes y to (y + m x)/b, which is y / b modulo m. Only the two
// states that never change have y = 0 and y = m.
//
// Sources: Couture and L'Ecuyer, Math. Comp. 66(218), 1997, 591-607; Goresky and Klapper, ACM
// TOMACS 13(4), 2003, 310-321.

#ifndef LEAT_ENGINES_CARRY_ALGEBRA_HPP
#define LEAT_ENGINES_CARRY_ALGEBRA_HPP

#include "leat/core/element_order.hpp"
#include "leat/core/modular.hpp" // the order where m has one word
#include "leat/core/montgomery.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// A sum of products of words, below b^2, from which words are taken off at the low end.
template <class UInt>
class column_sum {
public:
    constexpr void add_word(UInt x) noexcept {
        if constexpr (sizeof(UInt) == 8) {
            total_ = add(total_, {x, 0});
        } else {
            total_ += x;
        }
    }
    constexpr void add_product(UInt x, UInt y) noexcept {
        if constexpr (sizeof(UInt) == 8) {
            total_ = add(total_, multiply_wide(x, y));
        } else {
            total_ += std::uint64_t{x} * y;
        }
    }
    constexpr UInt take_word() noexcept {
        if constexpr (sizeof(UInt) == 8) {
            const std::uint64_t low = total_.low;
            total_ = {total_.high, 0};
            return low;
        } else {
            const auto low = static_cast<UInt>(total_);
            total_ >>= std::numeric_limits<UInt>::digits;
            return low;
        }
    }

private:
    std::conditional_t<sizeof(UInt) == 8, word_pair, std::uint64_t> total_{};
};

/// The residues of multiply-with-carry with words of type UInt and the multipliers a, the one of
/// the oldest word first.
template <class UInt, UInt... a>
struct carry_algebra {
    static constexpr std::size_t lag = sizeof...(a);
    static constexpr int word_bits = std::numeric_limits<UInt>::digits;
    static constexpr std::size_t limbs = ((lag + 1) * word_bits + 63) / 64;

    using word_array = std::array<UInt, lag>;         // oldest first
    using residue = std::array<std::uint64_t, limbs>; // least significant word first
    using digit_array = std::array<UInt, lag + 1>;    // a residue to the base b, lowest first

    static constexpr word_array multipliers{a...};

    static constexpr wide_integer modulus() {
        wide_integer sum;
        for (const UInt multiplier : multipliers) {
            sum = (sum + multiplier) << word_bits;
        }
        return sum - 1;
    }

    /// The order of b modulo m; 0 where it is not known.
    static constexpr wide_integer order_of_base() {
        if constexpr (limbs == 1) {
            return multiplicative_order(std::uint64_t{1} << word_bits, modulus().word(0));
        } else {
            return element_order(field, base_form);
        }
    }

    static constexpr residue residue_of(const word_array& words, UInt carry) noexcept {
        const digit_array y = digits_of(words, carry);
        residue joined{};
        for (std::size_t i = 0; i <= lag; ++i) {
            joined[i * word_bits / 64] |= std::uint64_t{y[i]} << (i * word_bits % 64);
        }
        return joined;
    }

    /// The residue after `distance` steps from y, which must be below m.
    static constexpr residue steps_on(const residue& y, const wide_integer& distance) noexcept {
        return field.multiply(y, field.power_form(step_form, distance));
    }
    static constexpr residue lag_steps_back(const residue& y) noexcept {
        return field.multiply(y, lag_back_form);
    }

    /// The words, oldest first, and the carry of the state `lag` steps after the residue `start`.
    static constexpr word_array words_after(const residue& start, UInt& carry) noexcept {
        digit_array y{};
        for (std::size_t i = 0; i <= lag; ++i) {
            y[i] = static_cast<UInt>(start[i * word_bits / 64] >> (i * word_bits % 64));
        }
        word_array words{};
        for (UInt& word : words) {
            // (y + m x)/b, with x the lowest digit of y; m + 1 has the digits 0, a_1, ..., a_r.
            word = y[0];
            column_sum<UInt> sum;
            for (std::size_t i = 0; i < lag; ++i) {
                sum.add_word(y[i + 1]);
                sum.add_product(multipliers[lag - 1 - i], word);
                y[i] = sum.take_word();
            }
            y[lag] = sum.take_word();
        }
        // What the residue has beyond the words' share is the carry, and one digit holds it.
        carry = static_cast<UInt>(y[0] - digits_of(words, 0)[0]);
        return words;
    }

private:
    static constexpr digit_array digits_of(const word_array& words, UInt carry) noexcept {
        digit_array y{};
        column_sum<UInt> sum;
        sum.add_word(carry);
        for (std::size_t j = 0; j < lag; ++j) {
            for (std::size_t i = 0; i + j < lag; ++i) {
                sum.add_product(multipliers[i], words[i + j]);
            }
            y[j] = sum.take_word();
        }
        y[lag] = sum.take_word();
        return y;
    }

    static constexpr montgomery<limbs> field{low_words<limbs>(modulus())};
    /// Forms of (m + 1)/b, which is 1/b, a step; of b, a step back; of b^lag.
    static constexpr residue step_form =
        field.to_form(low_words<limbs>((modulus() + 1) >> static_cast<unsigned>(word_bits)));
    static constexpr residue base_form =
        field.to_form(low_words<limbs>(wide_integer::power_of_two(word_bits)));
    static constexpr residue lag_back_form = field.power_form(base_form, lag);
};

} // namespace leat::detail

#endif
