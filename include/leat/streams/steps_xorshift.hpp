// steps_between for xorshift32 and xorshift64: how many steps lead from one state to another.
//
// A state maps to a polynomial such that a step multiplies by x modulo the characteristic
// polynomial, so the distance is a discrete logarithm in GF(2^32) or GF(2^64). The orders of these
// groups have small prime factors only (2^64 - 1 = 3 * 5 * 17 * 257 * 641 * 65537 * 6700417), so
// Pohlig and Hellman's method (IEEE Trans. Inf. Theory 24(1), 1978) with baby and giant steps
// (Shanks 1971) takes about a millisecond or two for 64 bits, some 10 KiB of stack and no heap.
//
// All states lie on one cycle, so there always is a distance; the optional is for the sake of the
// engines that have more cycles. Why no other engine of the family is here: 2^128 - 1 and
// 2^256 - 1 have prime factors far too large.

#ifndef LEAT_STREAMS_STEPS_XORSHIFT_HPP
#define LEAT_STREAMS_STEPS_XORSHIFT_HPP

#include "leat/core/gf2.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/engines/xorshift.hpp"

#include <array>
#include <bit>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <optional>

namespace leat {

namespace detail {

/// Discrete logarithms to one base, looked up among its first 512 powers.
template <class Word>
class baby_steps {
public:
    static constexpr std::uint64_t most = 512;

    /// The powers base^0 to base^(count - 1), all different.
    constexpr baby_steps(const gf2_ring<Word, 1>& ring, Word base, std::uint64_t count) noexcept {
        Word power = 1;
        for (std::uint64_t i = 0; i < count; ++i) {
            std::uint32_t slot = first_slot(power);
            while (keys_[slot] != 0) {
                slot = (slot + 1) % slots;
            }
            keys_[slot] = power;
            exponents_[slot] = static_cast<std::uint16_t>(i);
            power = ring.product({power}, {base})[0];
        }
    }

    /// The exponent of a power, or `most` where it is not among them.
    [[nodiscard]] constexpr std::uint64_t find(Word power) const noexcept {
        for (std::uint32_t slot = first_slot(power); keys_[slot] != 0; slot = (slot + 1) % slots) {
            if (keys_[slot] == power) {
                return exponents_[slot];
            }
        }
        return most;
    }

private:
    static constexpr std::uint32_t slots = 1024; // twice `most`
    static constexpr std::uint32_t first_slot(Word power) noexcept {
        return static_cast<std::uint32_t>(std::uint64_t{power} * 0x9E3779B97F4A7C15u >> 54);
    }
    std::array<Word, slots> keys_{}; // 0 is no power of anything here: an empty slot
    std::array<std::uint16_t, slots> exponents_{};
};

/// The e in 0..order-1 with base^e = power, where base has that order and power is one of its.
template <class Word>
constexpr std::uint64_t logarithm_of_small_order(const gf2_ring<Word, 1>& ring, Word base,
                                                 Word power, std::uint64_t order) noexcept {
    const std::uint64_t stride = order < baby_steps<Word>::most ? order : baby_steps<Word>::most;
    const baby_steps<Word> baby{ring, base, stride};
    const Word giant = ring.power({base}, order - stride)[0]; // base^-stride
    for (std::uint64_t covered = 0;; covered += stride) {
        const std::uint64_t e = baby.find(power);
        if (e < stride) {
            return covered + e;
        }
        power = ring.product({power}, {giant})[0];
    }
}

/// a^-1 modulo a prime, by Fermat's theorem; the prime is below 2^32.
constexpr std::uint64_t inverse_modulo(std::uint64_t a, std::uint64_t prime) noexcept {
    std::uint64_t inverse = 1;
    a %= prime;
    for (std::uint64_t e = prime - 2; e > 0; e /= 2) {
        if (e % 2 == 1) {
            inverse = inverse * a % prime;
        }
        a = a * a % prime;
    }
    return inverse;
}

/// The primes of 2^64 - 1, each once; the first five make 2^32 - 1.
inline constexpr std::array<std::uint64_t, 7> full_word_primes{3, 5, 17, 257, 65537, 641, 6700417};

/// The d with x^d = power: modulo each prime, then put together as remainders.
template <class Word>
constexpr std::uint64_t logarithm_of_x(const gf2_ring<Word, 1>& ring, Word power) noexcept {
    constexpr std::uint64_t order = Word(-1);
    constexpr std::size_t count = sizeof(Word) == 4 ? 5 : 7;
    constexpr Word x = 2;
    std::uint64_t distance = 0;
    std::uint64_t modulus = 1; // distance is known modulo this
    for (std::size_t i = 0; i < count; ++i) {
        const std::uint64_t prime = full_word_primes[i];
        const std::uint64_t rest = logarithm_of_small_order(
            ring, ring.power({x}, order / prime)[0], ring.power({power}, order / prime)[0], prime);
        const std::uint64_t missing = (rest + prime - distance % prime) % prime;
        distance += modulus * (missing * inverse_modulo(modulus, prime) % prime);
        modulus *= prime;
    }
    return distance;
}

/// The polynomial of a one-word state: the numerator, over the characteristic polynomial, of the
/// series of lowest bits that the state gives. A step of the state multiplies it by x.
template <class Step>
constexpr typename Step::word polynomial_of(typename Step::word state) noexcept {
    using word = typename Step::word;
    constexpr int degree = 8 * static_cast<int>(sizeof(word));
    std::array<word, 1> s{state};
    // The characteristic polynomial divided by x, then by x^2 and so on.
    word quotient = characteristic<Step>.low()[0] >> 1 | word{1} << (degree - 1);
    word polynomial = 0;
    for (int i = 0; i < degree; ++i) {
        if ((s[0] & 1u) != 0) {
            polynomial ^= quotient;
        }
        quotient >>= 1;
        Step::step(s);
    }
    return polynomial;
}

template <class Step>
constexpr std::uint64_t steps_of_one_word(typename Step::word from, typename Step::word to) {
    using word = typename Step::word;
    const auto& ring = characteristic<Step>;
    const std::array<word, 1> start{polynomial_of<Step>(from)};
    const std::array<word, 1> end{polynomial_of<Step>(to)};
    // start^-1 is start^(2^n - 2).
    return logarithm_of_x(ring, ring.product(end, ring.power(start, word(-2)))[0]);
}

} // namespace detail

/// The d below the period for which d draws lead from the one engine to the other; for xorshift32
/// and xorshift64.
template <class Method>
requires std::same_as<linear_engine<Method>, xorshift32> ||
    std::same_as<linear_engine<Method>, xorshift64>
constexpr std::optional<wide_integer> steps_between(const linear_engine<Method>& from,
                                                    const linear_engine<Method>& to) {
    return wide_integer{detail::steps_of_one_word<Method>(from.state()[0], to.state()[0])};
}

} // namespace leat

#endif
