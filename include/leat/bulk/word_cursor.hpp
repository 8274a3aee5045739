// A view on the words that an engine is about to yield: what fills draw from.
//
// Engines that make many words at once faster than one by one (leat::stream, thin_stream,
// xoshiro256_braid) have a member draw_into(span). A word_cursor fetches blocks of up to 512 words
// from one, small enough for the first-level cache, and yields them in order, as an engine does.
// When it goes, by the end of a scope or by an exception, it gives back what was not drawn: the
// engine then stands where drawing one by one would have left it.
//
// Near a limit it fetches no more than the limit allows, and asks the engine itself for the word
// after that, which throws as it always does.

#ifndef LEAT_BULK_WORD_CURSOR_HPP
#define LEAT_BULK_WORD_CURSOR_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/sizes.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <span>
#include <type_traits>

namespace leat::detail {

/// An engine whose words are all 64-bit words, so that one of them is one word64.
template <class G>
concept whole_words = random_words<G> && sizeof(typename G::result_type) == 8 && G::min() == 0 &&
                      G::max() == ~std::uint64_t{0};

/// An engine that makes many words at once.
template <class G>
concept bulk_words = whole_words<G> && requires(G& g, std::span<std::uint64_t> out) {
    g.draw_into(out);
};

/// One that knows its place, can take words back, and may have a limit.
template <class G>
concept seekable_words = bulk_words<G> && requires(G& g, std::uint64_t n) {
    n = g.position();
    n = g.limit();
    g.give_back(n);
};

/// See above. It meets random_words itself: samplers draw from it as from the engine.
template <bulk_words G>
class word_cursor {
public:
    using result_type = std::uint64_t;
    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }

    static constexpr std::size_t block = 512;

    constexpr explicit word_cursor(G& g) : engine_(g), before_(g) {}
    word_cursor(const word_cursor&) = delete; // two would give back twice
    word_cursor& operator=(const word_cursor&) = delete;
    constexpr ~word_cursor() { give_back(); }

    /// Says that some `words` more will be drawn, so that a short fill does not fetch a block.
    constexpr void expect(std::size_t words) noexcept { expected_ = words < block ? words : block; }

    /// The next word.
    [[gnu::always_inline]] constexpr result_type operator()() {
        if (next_ == end_) [[unlikely]] {
            fetch(expected_);
        }
        return words_[next_++];
    }

    /// The next words without drawing them: at least 1, at most `most` (which is not 0). Throws as
    /// a draw would where there is no word left.
    [[nodiscard]] constexpr std::span<const std::uint64_t> ahead(std::size_t most) {
        if (next_ == end_) {
            fetch(most);
        }
        const std::size_t held = end_ - next_;
        return std::span<const std::uint64_t>(words_).subspan(next_, held < most ? held : most);
    }

    /// Draws the next `words` words, that ahead() has shown.
    constexpr void skip(std::size_t words) noexcept { next_ += words; }

private:
    // Where the engine stood before the last fetch, unless it can seek back.
    struct nowhere {
        constexpr explicit nowhere(const G&) noexcept {}
    };
    using bookmark = std::conditional_t<seekable_words<G>, nowhere, G>;

    [[gnu::noinline]] constexpr void fetch(std::size_t words) {
        words = words < 1 ? 1 : words > block ? block : words;
        next_ = end_ = 0;
        if constexpr (seekable_words<G>) {
            const std::uint64_t position = engine_.position();
            const std::uint64_t limit = engine_.limit();
            if (position >= limit) {
                words_[0] = engine_(); // throws
                end_ = 1;
                return;
            }
            words = smaller(words, limit - position);
        } else {
            before_ = engine_;
        }
        engine_.draw_into(std::span(words_).first(words));
        end_ = words;
    }

    constexpr void give_back() noexcept {
        if (next_ == end_) {
            return;
        }
        if constexpr (seekable_words<G>) {
            engine_.give_back(end_ - next_);
        } else {
            engine_ = before_;
            engine_.draw_into(std::span(words_).first(next_));
        }
    }

    G& engine_;
    std::size_t next_ = 0;
    std::size_t end_ = 0;
    std::size_t expected_ = block;
    [[no_unique_address]] bookmark before_;
    std::array<std::uint64_t, block> words_; // those from next_ to end_ are to come
};

} // namespace leat::detail

#endif
