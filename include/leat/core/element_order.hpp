// The order of an element modulo a wide m: how often it is multiplied by itself to come back to 1.
//
// It gives the true period of a congruential generator, at compile time, from its parameters alone.
// (For an m of one word see core/modular.hpp, which is exact for every m.) It is found where the
// power m - 1 of the element is 1, as for every prime m, and m - 1 is a product of primes below 256
// and of one more factor that is prime or below 2^64: so for every safe prime (m = 2 q + 1), and
// for many others. Elsewhere 0 is returned, "not known".
//
// That the one more factor is prime is judged by the strong test of Miller and Rabin, to the bases
// 2, 3 and 5: sound for parameters chosen for their merits; composites made to deceive it exist.
// Beyond about 200 bits clang needs a larger -fconstexpr-steps.
//
// Sources: Knuth, TAOCP vol. 2, 3.2.1.2 and 4.5.4, Algorithm P; Cohen, A Course in Computational
// Algebraic Number Theory, 1993, Algorithm 1.4.3 (order of an element).

#ifndef LEAT_CORE_ELEMENT_ORDER_HPP
#define LEAT_CORE_ELEMENT_ORDER_HPP

#include "leat/core/modular.hpp" // factors of a word
#include "leat/core/montgomery.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// The lowest N words of x.
template <std::size_t N>
constexpr std::array<std::uint64_t, N> low_words(const wide_integer& x) noexcept {
    std::array<std::uint64_t, N> words{};
    for (std::size_t i = 0; i < N; ++i) {
        words[i] = x.word(static_cast<int>(i));
    }
    return words;
}

/// Whether the modulus, odd and above 5, passes as prime.
template <std::size_t N>
constexpr bool passes_as_prime(const montgomery<N>& field) {
    const wide_integer m{field.modulus()};
    wide_integer odd = m - 1;
    int twos = 0;
    while (!odd.bit(twos)) {
        ++twos;
    }
    odd = odd >> static_cast<unsigned>(twos);
    const auto minus_one = low_words<N>(m - wide_integer{field.one()});
    for (const std::uint64_t base : {2u, 3u, 5u}) {
        auto x = field.power_form(field.to_form({base}), odd);
        bool passes = x == field.one() || x == minus_one;
        for (int k = 1; k < twos && !passes; ++k) {
            x = field.multiply(x, x);
            passes = x == minus_one;
        }
        if (!passes) {
            return false;
        }
    }
    return true;
}

/// The order of an element, not 0, given in Montgomery's form; 0 where it is not known (see above).
template <std::size_t N>
constexpr wide_integer element_order(const montgomery<N>& field,
                                     const std::array<std::uint64_t, N>& form) {
    wide_integer order = wide_integer{field.modulus()} - 1;
    if (field.power_form(form, order) != field.one()) {
        return {}; // m is not prime
    }
    const auto divide_out = [&](const wide_integer& p) {
        while (order % p == 0 && field.power_form(form, order / p) == field.one()) {
            order = order / p;
        }
    };
    wide_integer rest = order;
    const auto divides_rest = [&rest](std::uint64_t p) {
        std::uint64_t remainder = 0; // by 32-bit halves: far fewer steps than a wide division
        for (int i = static_cast<int>(N); i-- > 0;) {
            remainder = ((remainder << 32) | (rest.word(i) >> 32)) % p;
            remainder = ((remainder << 32) | (rest.word(i) & 0xFFFFFFFFu)) % p;
        }
        return remainder == 0;
    };
    for (std::uint64_t p = 2; p < 256; p += p == 2 ? 1 : 2) { // by now no composite p divides
        if (divides_rest(p)) {
            divide_out(p);
            do {
                rest = rest / p;
            } while (divides_rest(p));
        }
    }
    if (rest.fits_word()) {
        const prime_set factors = prime_factors(rest.word(0));
        for (int i = 0; i < factors.count; ++i) {
            divide_out(factors.primes[static_cast<std::size_t>(i)]);
        }
        return order;
    }
    if (!passes_as_prime(montgomery<N>(low_words<N>(rest)))) {
        return {};
    }
    divide_out(rest);
    return order;
}

} // namespace leat::detail

#endif
