// The standard normal and the standard exponential: the two samplers that most laws build on.
//
// One 64-bit word is one trial. Its bits 0 to 7 choose one of 256 layers of equal area, bit 8 the
// sign (normal), and its upper 52 bits k the place in the layer, x = (k + 1/2) 2^-52 times the
// width: no bit serves two purposes. An integer comparison accepts 98.5 % of normal words and
// 97.8 % of exponential ones. The rest, compiled out of line, draws one more word to compare
// with the density between the layer's edges (in the base: samples the tail) or starts again.
// The normal tail is Marsaglia's: two exponentials, themselves of this file, so that no logarithm
// of a uniform cuts it off. The exponential tail is r plus a fresh exponential (memorylessness).
//
// Words consumed: 1.02 on average by the normal, 1.03 by the exponential. Throws engine_stuck after
// 32 rejected trials in a row (a chance below 2^-200). Neither value is ever 0.
// Source: G. Marsaglia and W. W. Tsang, The ziggurat method for generating random variables,
// J. Stat. Software 5(8), 2000; the tail: G. Marsaglia, Generating a variable from the tail of the
// normal distribution, Technometrics 6(1), 1964.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_ZIGGURAT_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_ZIGGURAT_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/distributions/detail/ziggurat_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <bit>
#include <cstdint>

namespace leat::detail {

// The fast paths are always inlined, for clang takes each value barrier for a call and would not.

inline constexpr int ziggurat_trials = 32;

/// The layer a word chooses.
constexpr std::uint64_t layer_of(std::uint64_t word) noexcept { return word & 255u; }

/// Where in its layer a word falls: (2 k + 1) times half a step of the layer's width.
constexpr double place_in_layer(std::uint64_t word, const ziggurat_layer& layer) noexcept {
    return held(static_cast<double>(static_cast<std::int64_t>((word >> 11) | 1u)) * layer.width);
}

/// True with the chance that the density at x has between the heights at a layer's edges.
/// Consumes one word.
template <random_words G>
constexpr bool below_density(G& g, double low, double high, double density) {
    using real = strict<double>;
    const std::uint64_t word = word64(g);
    return real(low) + real(open_unit(word)) * (real(high) - low) < density;
}

/// Goes on from a word that was not accepted at once.
template <random_words G>
[[gnu::noinline]] constexpr double standard_exponential_rest(G& g, std::uint64_t word) {
    using real = strict<double>;
    real passed = 0.0; // the tails entered
    for (int trial = 0; trial < ziggurat_trials; ++trial) {
        const std::uint64_t i = layer_of(word);
        const double x = place_in_layer(word, exponential_layers[i]);
        if (word < exponential_layers[i].bar) {
            return (passed + x).value;
        }
        if (i == 0) {
            passed = passed + exponential_tail;
        } else if (below_density(g, exponential_heights[i], exponential_heights[i + 1],
                                 natural_exp(-x))) {
            return (passed + x).value;
        }
        word = word64(g);
    }
    stuck("exponential");
}

/// The exponential that a word gives where it is accepted at once; else false.
[[gnu::always_inline]] constexpr bool exponential_at_once(std::uint64_t word, double& x) noexcept {
    const ziggurat_layer& layer = exponential_layers[layer_of(word)];
    x = place_in_layer(word, layer);
    return word < layer.bar;
}

/// An exponential of rate 1, above 0.
template <random_words G>
[[gnu::always_inline]] constexpr double standard_exponential(G& g) {
    const std::uint64_t word = word64(g);
    double x = 0;
    if (exponential_at_once(word, x)) [[likely]] {
        return x;
    }
    return standard_exponential_rest(g, word);
}

/// x with the sign that a word's bit 8 gives.
constexpr double with_sign_of(std::uint64_t word, double x) noexcept {
    return std::bit_cast<double>(std::bit_cast<std::uint64_t>(x) ^ ((word & 256u) << 55));
}

/// A normal beyond the outermost edge.
template <random_words G>
constexpr double normal_tail_value(G& g) {
    using real = strict<double>;
    for (int trial = 0; trial < ziggurat_trials; ++trial) {
        const real x = real(standard_exponential(g)) / normal_tail;
        const real y = standard_exponential(g);
        if (y + y > x * x) {
            return (x + normal_tail).value;
        }
    }
    stuck("normal");
}

/// Goes on from a word that was not accepted at once.
template <random_words G>
[[gnu::noinline]] constexpr double standard_normal_rest(G& g, std::uint64_t word) {
    using real = strict<double>;
    for (int trial = 0; trial < ziggurat_trials; ++trial) {
        const std::uint64_t i = layer_of(word);
        const double x = place_in_layer(word, normal_layers[i]);
        if (word < normal_layers[i].bar) {
            return with_sign_of(word, x);
        }
        if (i == 0) {
            const double tail = normal_tail_value(g);
            return with_sign_of(word, tail);
        }
        if (below_density(g, normal_heights[i], normal_heights[i + 1],
                          natural_exp((real(x) * x * -0.5).value))) {
            return with_sign_of(word, x);
        }
        word = word64(g);
    }
    stuck("normal");
}

/// The normal that a word gives where it is accepted at once; else false.
[[gnu::always_inline]] constexpr bool normal_at_once(std::uint64_t word, double& x) noexcept {
    const ziggurat_layer& layer = normal_layers[layer_of(word)];
    // The sign goes to the integer: the same value as with_sign_of(place_in_layer), sooner.
    const std::uint64_t sign = 0 - ((word >> 8) & 1u);
    const std::uint64_t odd = (((word >> 11) | 1u) ^ sign) - sign;
    x = held(static_cast<double>(static_cast<std::int64_t>(odd)) * layer.width);
    return word < layer.bar;
}

/// A normal of mean 0 and standard deviation 1.
template <random_words G>
[[gnu::always_inline]] constexpr double standard_normal(G& g) {
    const std::uint64_t word = word64(g);
    double x = 0;
    if (normal_at_once(word, x)) [[likely]] {
        return x;
    }
    return standard_normal_rest(g, word);
}

} // namespace leat::detail

#endif
