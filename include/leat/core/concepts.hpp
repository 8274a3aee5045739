// What leat asks of an engine: the boundary that everything above engines/ is written against.

#ifndef LEAT_CORE_CONCEPTS_HPP
#define LEAT_CORE_CONCEPTS_HPP

#include <concepts>
#include <cstdint>
#include <type_traits>

namespace leat {

/// A source of uniform words: what ISO C++ calls a uniform random bit generator. Any engine of
/// leat, any leat::stream, and any engine of `<random>` is one.
template <class G>
concept random_words =
    std::invocable<G&> && std::unsigned_integral<std::invoke_result_t<G&>> && requires {
    { G::min() } -> std::same_as<std::invoke_result_t<G&>>;
    { G::max() } -> std::same_as<std::invoke_result_t<G&>>;
    requires std::bool_constant<(G::min() < G::max())>::value;
} && sizeof(std::invoke_result_t<G&>) <= 8;

namespace detail {

/// A seed sequence as ISO C++ defines it, told apart from `Engine` itself and from a plain seed.
template <class Sequence, class Engine>
concept seed_sequence_for =
    !std::same_as<std::remove_cv_t<Sequence>, Engine> &&
    !std::convertible_to<Sequence, std::uint64_t> && requires(Sequence & q, std::uint32_t* words) {
    q.generate(words, words);
};

/// float or double: the real types that leat computes with, everywhere the same.
template <class Real>
concept portable_real = std::same_as<Real, double> || std::same_as<Real, float>;

} // namespace detail
} // namespace leat

#endif
