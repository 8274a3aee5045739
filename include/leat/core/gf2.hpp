// Polynomials over GF(2): what jumps and step counts of xorshift-like engines are made of.
//
// One step of such an engine is a linear map T of its state bits, so T^d = (x^d mod P)(T), where P
// is the characteristic polynomial of T (Haramoto, Matsumoto, Nishimura, Panneton and L'Ecuyer,
// INFORMS J. Comput. 20(3), 2008). `gf2_ring` computes modulo P; `shortest_recurrence` finds P from
// the engine's own bits (Massey, IEEE Trans. Inf. Theory 15(1), 1969), so that nobody has to
// believe a table.
//
// A residue is an array of words, the coefficient of x^0 in the lowest bit of the first word. The
// degree of P is the number of bits of that array: engines leave no bit of their state unused.

#ifndef LEAT_CORE_GF2_HPP
#define LEAT_CORE_GF2_HPP

#include "leat/core/wide_integer.hpp" // distances

#include <array>
#include <bit>
#include <concepts>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// GF(2)[x] modulo a polynomial x^n + low(x), n being the number of bits of `Size` words.
template <std::unsigned_integral Word, std::size_t Size>
class gf2_ring {
public:
    using residue = std::array<Word, Size>;
    static constexpr int word_bits = 8 * static_cast<int>(sizeof(Word));
    static constexpr int degree = word_bits * static_cast<int>(Size);

    /// From the modulus without its leading term.
    constexpr explicit gf2_ring(const residue& low) noexcept : low_(low) {
        // multiples_[16 j + v] = v(x) * x^(n + 4 j), for all v of 4 bits.
        residue power = low;
        for (std::size_t j = 0; j < multiples_.size(); j += 16) {
            for (std::size_t bit = 1; bit < 16; bit *= 2) {
                for (std::size_t v = 0; v < bit; ++v) {
                    multiples_[j + bit + v] = sum(multiples_[j + v], power);
                }
                power = times_x(power);
            }
        }
    }

    /// The modulus without its leading term.
    [[nodiscard]] constexpr const residue& low() const noexcept { return low_; }

    static constexpr residue one() noexcept { return residue{Word{1}}; }

    static constexpr residue sum(residue a, const residue& b) noexcept {
        for (std::size_t i = 0; i < Size; ++i) {
            a[i] ^= b[i];
        }
        return a;
    }

    [[nodiscard]] constexpr residue times_x(residue a) const noexcept {
        const Word carry = a[Size - 1] >> (word_bits - 1);
        for (std::size_t i = Size - 1; i > 0; --i) {
            a[i] = a[i] << 1 | a[i - 1] >> (word_bits - 1);
        }
        a[0] <<= 1;
        for (std::size_t i = 0; i < Size; ++i) {
            a[i] ^= low_[i] & (Word{0} - carry);
        }
        return a;
    }

    /// a * b, by Horner's rule on the bits of b.
    [[nodiscard]] constexpr residue product(const residue& a, const residue& b) const noexcept {
        residue r{};
        for (int i = degree; i-- > 0;) {
            r = times_x(r);
            const Word mask = Word{0} - bit(b, i);
            for (std::size_t j = 0; j < Size; ++j) {
                r[j] ^= a[j] & mask;
            }
        }
        return r;
    }

    /// a^2. Squaring over GF(2) puts a zero between any two coefficients; the upper half of the
    /// result is then folded down, one word at a time, four coefficients a table entry.
    [[nodiscard]] constexpr residue square(const residue& a) const noexcept {
        std::array<Word, 2 * Size> wide{};
        for (std::size_t i = 0; i < Size; ++i) {
            wide[2 * i] = spread(a[i]);
            wide[2 * i + 1] = spread(a[i] >> (word_bits / 2));
        }
        residue r{};
        for (std::size_t i = 0; i < Size; ++i) {
            r[i] = wide[Size + i];
        }
        // r * x^n + the lower half, by Horner's rule on the words of the lower half.
        for (std::size_t i = Size; i-- > 0;) {
            const Word out = r[Size - 1];
            for (std::size_t j = Size - 1; j > 0; --j) {
                r[j] = r[j - 1];
            }
            r[0] = wide[i];
            for (std::size_t j = 0; j < 2 * sizeof(Word); ++j) {
                const auto v = static_cast<std::size_t>(out >> (4 * j) & 15u);
                const residue& multiple = multiples_[16 * j + v];
                for (std::size_t k = 0; k < Size; ++k) {
                    r[k] ^= multiple[k];
                }
            }
        }
        return r;
    }

    /// a^exponent.
    [[nodiscard]] constexpr residue power(const residue& a, std::uint64_t exponent) const noexcept {
        residue r = one();
        for (int i = static_cast<int>(std::bit_width(exponent)); i-- > 0;) {
            r = square(r);
            if ((exponent >> i & 1u) != 0) {
                r = product(r, a);
            }
        }
        return r;
    }

    /// x^exponent, for an exponent of any size.
    [[nodiscard]] constexpr residue power_of_x(const wide_integer& exponent) const noexcept {
        residue r = one();
        for (int i = exponent.bit_width(); i-- > 0;) {
            r = square(r);
            if (exponent.bit(i)) {
                r = times_x(r);
            }
        }
        return r;
    }

    /// The coefficient of x^i.
    static constexpr Word bit(const residue& a, int i) noexcept {
        return a[static_cast<std::size_t>(i / word_bits)] >> (i % word_bits) & Word{1};
    }

private:
    /// The lower half of a word with a zero after every bit.
    static constexpr Word spread(Word word) noexcept {
        std::uint64_t x = word;
        if constexpr (word_bits == 64) {
            x &= 0xFFFFFFFFu;
            x = (x | x << 16) & 0x0000FFFF0000FFFFu;
        } else {
            static_assert(word_bits == 32, "words of 32 or 64 bits");
            x &= 0xFFFFu;
        }
        x = (x | x << 8) & 0x00FF00FF00FF00FFu;
        x = (x | x << 4) & 0x0F0F0F0F0F0F0F0Fu;
        x = (x | x << 2) & 0x3333333333333333u;
        x = (x | x << 1) & 0x5555555555555555u;
        return static_cast<Word>(x);
    }

    residue low_;
    std::array<residue, 32 * sizeof(Word)> multiples_{};
};

/// The shortest linear recurrence of a bit sequence: s_i = sum of c_j s_(i-j), j = 1..order.
template <std::unsigned_integral Word, std::size_t Size>
struct gf2_recurrence {
    int order;
    /// Where `order` is the number of bits of the array: its characteristic polynomial
    /// x^order + low(x).
    std::array<Word, Size> low;
};

/// The shortest recurrence that generates the first 2n bits given by `next_bit()`, where n is the
/// number of bits of `Size` words and the order is known to be at most n (Berlekamp-Massey).
template <std::unsigned_integral Word, std::size_t Size, class NextBit>
constexpr gf2_recurrence<Word, Size> shortest_recurrence(NextBit next_bit) noexcept {
    constexpr int word_bits = gf2_ring<Word, Size>::word_bits;
    constexpr int n = gf2_ring<Word, Size>::degree;
    const auto push = [](std::array<Word, Size>& words, Word low_bit) {
        for (std::size_t i = 0; i < Size; ++i) {
            const Word out = words[i] >> (word_bits - 1);
            words[i] = words[i] << 1 | low_bit;
            low_bit = out;
        }
    };
    // Bit j - 1 of each array belongs to x^j; the constant terms are implied: 1 in the connection
    // polynomial, 0 in the correction.
    std::array<Word, Size> connection{};
    std::array<Word, Size> correction{Word{1}};
    std::array<Word, Size> recent{}; // bit j - 1 is s_(i-j)
    int order = 0;
    for (int i = 0; i < 2 * n; ++i) {
        const Word bit = next_bit() ? Word{1} : Word{0};
        Word overlap = 0;
        for (std::size_t j = 0; j < Size; ++j) {
            overlap ^= connection[j] & recent[j];
        }
        const bool wrong = (std::popcount(overlap) & 1) != static_cast<int>(bit);
        if (wrong) {
            const std::array<Word, Size> before = connection;
            for (std::size_t j = 0; j < Size; ++j) {
                connection[j] ^= correction[j];
            }
            if (2 * order <= i) {
                order = i + 1 - order;
                correction = before;
                push(correction, 1); // x times the old connection polynomial, whose x^0 is 1
            } else {
                push(correction, 0);
            }
        } else {
            push(correction, 0);
        }
        push(recent, bit);
    }
    // The characteristic polynomial is the connection polynomial read backwards.
    std::array<Word, Size> low{};
    for (int k = 0; k < n; ++k) {
        low[static_cast<std::size_t>(k / word_bits)] |=
            gf2_ring<Word, Size>::bit(connection, n - 1 - k) << (k % word_bits);
    }
    return {order, low};
}

} // namespace leat::detail

#endif
