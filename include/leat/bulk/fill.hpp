// fill: many draws at once, with the values of the loop.
//
//   leat::fill(span, sampler, engine);    // for (auto& x : span) x = sampler(engine);
//   leat::fill_words(span, engine);       // for (auto& w : span) w = leat::word64(engine);
//
// Promise: the same values as that loop, and the engine left in the same state, whatever the
// length, sampler and engine; only faster. The sampler is a law, a region, a uniform_integer, or
// anything that is called with an engine; the engine any random_words. The array's element type is
// the sampler's result, or takes it without narrowing, or is a vector type of yours that
// `region.draw<Vec>` makes.
//
// Words: those of the loop. Any length, 0 included. Nothing is allocated.
// Errors: those of the draws. Where draw n throws, elements 0 to n - 1 are filled, and the engine
// stands where the loop would have left it: for a stream at its limit, after the last word.
//
// How a sampler opts in, beside its own code and without including this header. Both members are
// used with engines that make words in bulk (bulk/word_cursor.hpp), whose words are 64 bits:
//
//   constexpr bool from_word(std::uint64_t word, result_type& x) const noexcept;
//       The value of a draw whose first word is `word`, if that word decides it alone. Returning
//       false (x is then anything) asks for a full draw, from that word on.
//   template <class Words> constexpr void fill_from_words(std::span<result_type> out,
//                                                         Words& words) const;
//       All of it: the draws of the loop, from a word_cursor. It may look ahead:
//       words.ahead(n), words.skip(n). Preferred to from_word.
//
// Beside from_word, a sampler whose draw is a product with a unit real, or a short range of
// integers, may say so by as_product() or as_short_range() (see uniform, uniform_integer): there
// are vector kernels for these.
//
// Everything else that names its result_type or point_type draws from the cursor in a loop. Other
// callables, and engines without bulk words, get the loop itself; a small engine is then held in a
// local copy, which an optimiser keeps in registers, and is written back at the end.
//
// Not for: sharing one array among threads (fill_chunks).

#ifndef LEAT_BULK_FILL_HPP
#define LEAT_BULK_FILL_HPP

#include "leat/bulk/kernels/convert.hpp"
#include "leat/bulk/word_cursor.hpp"
#include "leat/core/concepts.hpp"
#include "leat/uniform/words.hpp" // word64

#include <concepts>
#include <cstddef>
#include <cstdint>
#include <span>
#include <type_traits>
#include <utility> // declval

namespace leat {
namespace detail {

/// Whether `Result` becomes a T without losing anything.
template <class T, class Result>
concept holds = std::same_as<T, Result> ||
    (std::convertible_to<Result, T>&& requires(Result r) { T{r}; });

/// One draw, as the element type of the array.
template <class T, class Sampler, class G>
constexpr T draw_as(Sampler& sampler, G& g) {
    using result = std::remove_cvref_t<std::invoke_result_t<Sampler&, G&>>;
    if constexpr (holds<T, result>) {
        return sampler(g);
    } else {
        static_assert(
            requires { sampler.template draw<T>(g); },
            "leat::fill: the array's elements do not hold what the sampler draws "
            "without narrowing; give the array the sampler's type");
        return sampler.template draw<T>(g);
    }
}

/// The loop that everything else must equal.
template <class T, class Sampler, class G>
constexpr void fill_by_loop(std::span<T> out, Sampler& sampler, G& g) {
    for (T& x : out) {
        x = draw_as<T>(sampler, g);
    }
}

/// A sampler that is made to be drawn from by any engine; a callable may be made for one.
template <class Sampler>
concept takes_any_engine = requires {
    typename Sampler::result_type;
}
|| requires { typename Sampler::point_type; };

template <class Sampler, class T>
concept has_from_word = requires(const Sampler& sampler, std::uint64_t word, T& x) {
    { sampler.from_word(word, x) } -> std::same_as<bool>;
    requires std::same_as<typename Sampler::result_type, T>;
};

template <class Sampler, class T, class Words>
concept has_fill_from_words = requires(const Sampler& sampler, std::span<T> out, Words& words) {
    sampler.fill_from_words(out, words);
    requires std::same_as<typename Sampler::result_type, T>;
};

/// A sampler whose draws are unit_products, for some of its parameters.
template <class Sampler>
concept has_as_product = requires(const Sampler& sampler) {
    sampler.as_product().applies;
};

/// A sampler whose draws are of a short_range, for some of its parameters.
template <class Sampler>
concept has_as_short_range = requires(const Sampler& sampler) {
    sampler.as_short_range().count;
};

/// Draws by kernels where there is one for the sampler: from the start of `ahead`, as many as the
/// kernel takes. Returns how many, often 0.
template <class T, class Sampler>
constexpr std::size_t fill_by_kernel([[maybe_unused]] std::span<T> out,
                                     [[maybe_unused]] const Sampler& sampler,
                                     [[maybe_unused]] std::span<const std::uint64_t> ahead) {
#if LEAT_VECTOR_KERNELS
    if (!std::is_constant_evaluated()) {
        if constexpr (has_as_product<Sampler>) {
            const auto p = sampler.as_product();
            if (p.applies) {
                unit_products(ahead.data(), out.data(), ahead.size(), p);
                return ahead.size();
            }
        } else if constexpr (has_as_short_range<Sampler> && (sizeof(T) == 4 || sizeof(T) == 8)) {
            const short_range range = sampler.as_short_range();
            if (range.count != 0) {
                const std::uint32_t surplus = (0 - range.count) % range.count;
                using word = std::conditional_t<sizeof(T) == 4, std::uint32_t, std::uint64_t>;
                // Written by memcpy alone, so that the type does not matter.
                return short_integers(ahead.data(), reinterpret_cast<word*>(out.data()),
                                      ahead.size(), range, surplus);
            }
        }
    }
#endif
    return 0;
}

/// Draws whose first word mostly decides alone, in a loop that the rare others do not burden.
template <class T, class Sampler, class Words>
constexpr void fill_by_word(std::span<T> out, const Sampler& given, Words& words) {
    const Sampler sampler = given; // a copy cannot alias the output
    for (std::size_t i = 0; i < out.size();) {
        const std::span<const std::uint64_t> ahead = words.ahead(out.size() - i);
        const std::span<T> part = out.subspan(i, ahead.size());
        std::size_t k = fill_by_kernel(part, sampler, ahead);
        while (k < part.size() && sampler.from_word(ahead[k], part[k]))
            [[likely]] { ++k; }
        words.skip(k);
        if (k < part.size()) {
            part[k] = sampler(words);
            ++k;
        }
        i += k;
    }
}

template <class T, class Sampler, class G>
constexpr void fill_from_cursor(std::span<T> out, Sampler& sampler, G& g) {
    word_cursor<G> words(g);
    if constexpr (has_fill_from_words<Sampler, T, word_cursor<G>>) {
        sampler.fill_from_words(out, words);
    } else if constexpr (has_from_word<Sampler, T>) {
        fill_by_word<T>(out, sampler, words);
    } else {
        for (std::size_t i = 0; i < out.size(); i += word_cursor<G>::block) {
            const std::size_t left = out.size() - i;
            words.expect(left);
            fill_by_loop(out.subspan(i, left < words.block ? left : words.block), sampler, words);
        }
    }
}

/// A local copy of an engine, written back when it goes, also by an exception.
template <class G>
class borrowed {
public:
    constexpr explicit borrowed(G& g) : engine(g), home_(g) {}
    borrowed(const borrowed&) = delete;
    borrowed& operator=(const borrowed&) = delete;
    constexpr ~borrowed() { home_ = engine; }

    G engine;

private:
    G& home_;
};

/// Engines that fit in registers, or nearly so, and whose copies are as good as they.
template <class G>
concept borrowable = std::is_trivially_copyable_v<G> && std::is_copy_constructible_v<G> &&
                     std::is_copy_assignable_v<G> && sizeof(G) <= 64;

template <class T, class Sampler, class G>
constexpr void fill_span(std::span<T> out, Sampler& sampler, G& g) {
    if constexpr (bulk_words<G> && takes_any_engine<std::remove_const_t<Sampler>>) {
        // Below this, setting up costs more than it saves.
        constexpr std::size_t worth_it = 16;
        if (out.size() < worth_it) {
            fill_by_loop(out, sampler, g);
        } else {
            fill_from_cursor(out, sampler, g);
        }
    } else if constexpr (borrowable<G>) {
        borrowed<G> local(g);
        fill_by_loop(out, sampler, local.engine);
    } else {
        fill_by_loop(out, sampler, g);
    }
}

/// An array, vector, span: what std::span can view and write to.
template <class Array>
concept writable_array = requires(Array& a) {
    std::span(a);
    requires !std::is_const_v<typename decltype(std::span(a))::element_type>;
};

} // namespace detail

/// Fills an array with draws: the values, and the engine's state after, of drawing one by one.
template <detail::writable_array Array, class Sampler, random_words G>
constexpr void fill(Array&& array, Sampler&& sampler, G& g) {
    using element = typename decltype(std::span(array))::element_type;
    detail::fill_span(std::span<element>(array), sampler, g);
}

/// Fills an array with 64-bit words: word64(g) for each.
template <random_words G>
constexpr void fill_words(std::span<std::uint64_t> out, G& g) {
    if constexpr (detail::bulk_words<G>) {
        g.draw_into(out);
    } else {
        const auto next_word = [](auto& engine) { return word64(engine); };
        detail::fill_span(out, next_word, g);
    }
}

} // namespace leat

#endif
