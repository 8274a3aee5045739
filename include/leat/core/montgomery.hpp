// Arithmetic modulo a fixed odd number of a few 64-bit words, in constant evaluation too.
//
// Montgomery's form replaces each division by the modulus with shifts: with R = 2^(64 N), a residue
// x is kept as x R mod m, and a product costs about 2 N^2 word products, whatever the modulus.
// No heap, and no time beyond that of the plain operations; not constant-time, so not for secrets.
//
// Sources: Montgomery, Math. Comp. 44(170), 1985, 519-521; the word order is the "coarsely
// integrated operand scanning" of Koc, Acar and Kaliski, IEEE Micro 16(3), 1996, 26-33.

#ifndef LEAT_CORE_MONTGOMERY_HPP
#define LEAT_CORE_MONTGOMERY_HPP

#include "leat/core/wide_integer.hpp"  // exponents, and values in and out
#include "leat/core/wide_multiply.hpp" // products of words

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// The residues modulo an odd m, 1 < m < 2^(64 N). Functions named `..._form` take or give residues
/// in Montgomery's form; every residue given to one must be below m.
template <std::size_t N>
class montgomery {
public:
    using residue = std::array<std::uint64_t, N>; // least significant word first

    constexpr explicit montgomery(const residue& modulus) noexcept
        : modulus_(modulus), inverse_(negated_inverse(modulus[0])) {
        // R mod m and R^2 mod m by doubling: slow, but m is known at compile time as a rule.
        residue x{1};
        for (std::size_t i = 0; i < 2 * 64 * N; ++i) {
            if (i == 64 * N) {
                one_ = x;
            }
            x = doubled(x);
        }
        square_ = x;
    }

    [[nodiscard]] constexpr const residue& modulus() const noexcept { return modulus_; }
    /// The form of 1.
    [[nodiscard]] constexpr const residue& one() const noexcept { return one_; }
    [[nodiscard]] constexpr residue to_form(const residue& x) const noexcept {
        return multiply(x, square_);
    }
    [[nodiscard]] constexpr residue from_form(const residue& x) const noexcept {
        return multiply(x, residue{1});
    }

    /// a b / R mod m: the form of the product where both are forms; the plain product where one is.
    [[nodiscard]] constexpr residue multiply(const residue& a, const residue& b) const noexcept {
        // Pointers, since each operator[] of std::array counts against a compiler's limit on the
        // steps of a constant evaluation.
        residue product{};
        std::uint64_t* const t = product.data();
        const std::uint64_t* const x = a.data();
        const std::uint64_t* const m = modulus_.data();
        std::uint64_t above = 0; // t and above stay below 2 m
        for (const std::uint64_t y : b) {
            std::uint64_t carry = 0;
            for (std::size_t j = 0; j < N; ++j) {
                const word_pair p = multiply_add_wide(x[j], y, t[j], carry);
                t[j] = p.low;
                carry = p.high;
            }
            const std::uint64_t top = above + carry;
            const std::uint64_t over = top < carry ? 1 : 0;
            const std::uint64_t q = t[0] * inverse_; // makes the lowest word vanish
            carry = multiply_add_wide(q, m[0], t[0], 0).high;
            for (std::size_t j = 1; j < N; ++j) {
                const word_pair p = multiply_add_wide(q, m[j], t[j], carry);
                t[j - 1] = p.low;
                carry = p.high;
            }
            t[N - 1] = top + carry;
            above = over + (t[N - 1] < carry ? 1 : 0);
        }
        return reduced(product, above);
    }

    /// The form of base^exponent, from the form of the base.
    [[nodiscard]] constexpr residue power_form(const residue& base,
                                               const wide_integer& exponent) const noexcept {
        residue x = one_;
        for (int i = exponent.bit_width(); i-- > 0;) {
            x = multiply(x, x);
            if (exponent.bit(i)) {
                x = multiply(x, base);
            }
        }
        return x;
    }

private:
    /// -1/m mod 2^64, by Newton's iteration: each step doubles the right low bits, from 3.
    static constexpr std::uint64_t negated_inverse(std::uint64_t m) noexcept {
        std::uint64_t x = m;
        for (int bits = 3; bits < 64; bits *= 2) {
            x *= 2 - m * x;
        }
        return std::uint64_t{0} - x;
    }

    /// t + above R, less m where that is not negative; given a value below 2 m.
    [[nodiscard]] constexpr residue reduced(const residue& t, std::uint64_t above) const noexcept {
        residue less{};
        std::uint64_t borrow = 0;
        for (std::size_t i = 0; i < N; ++i) {
            const std::uint64_t d = t[i] - modulus_[i];
            less[i] = d - borrow;
            borrow = (t[i] < modulus_[i] ? 1u : 0u) | (d < borrow ? 1u : 0u);
        }
        return above < borrow ? t : less;
    }

    [[nodiscard]] constexpr residue doubled(const residue& x) const noexcept {
        residue t{};
        std::uint64_t above = 0;
        for (std::size_t i = 0; i < N; ++i) {
            t[i] = x[i] << 1 | above;
            above = x[i] >> 63;
        }
        return reduced(t, above);
    }

    residue modulus_;
    std::uint64_t inverse_; // -1/m mod 2^64
    residue one_{};         // R mod m
    residue square_{};      // R^2 mod m
};

} // namespace leat::detail

#endif
