// Sources: from one seed to every stream of a study.
//
//   leat::source study{20261201};                        // or a text seed
//   leat::source wind = study.branch("wind", site);      // a named sub-tree
//   leat::stream s = study.stream("failures", replication, turbine);
//
// A stream is a pure function of seed and path: the order of opening never matters, and adding one
// entity changes no other's numbers. Paths concatenate: branch("a", 1).stream(2) is
// stream("a", 1, 2). How a path becomes an address is specified in path.hpp.
//
// A path part is an integer of up to 64 bits or a text; bool, char and floating parts do not
// compile. Streams that differ only in a trailing integer of one sign share no block, provably; any
// others are apart but for a 128-bit collision (see overlap.hpp).
//
// Opening twice by the same path gives the same numbers twice: one path, one purpose. A ledger
// (ledger.hpp) finds where that happened: source study{20261201, book}.

#ifndef LEAT_STREAMS_SOURCE_HPP
#define LEAT_STREAMS_SOURCE_HPP

#include "leat/core/text.hpp"
#include "leat/streams/path.hpp"
#include "leat/streams/recorder.hpp"
#include "leat/streams/seeding.hpp" // an engine from an address
#include "leat/streams/stream.hpp"
#include "leat/streams/thin_stream.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <span>

namespace leat {

class source;

namespace detail {
constexpr stream chunk_stream(const source& from, std::uint64_t chunk);
} // namespace detail

/// A seed and the start of a path. A value: copy it, pass it to threads, keep it in entities.
class source {
public:
    /// From a seed: an integer (its type never matters) or a text; 7 and "7" differ.
    template <class Seed>
    requires(!std::same_as<Seed, source>) constexpr explicit source(const Seed& seed)
        : path_(detail::as_path_part(seed)) {}

    /// The same, and everything opened from it and from its branches is entered in a ledger, which
    /// must outlive them.
    template <class Seed>
    source(const Seed& seed, detail::seed_recorder& book)
        : path_(detail::as_path_part(seed)), record_(book.start(detail::as_path_part(seed))) {}

    /// The sub-tree under these parts.
    template <class... Parts>
    [[nodiscard]] constexpr source branch(const Parts&... parts) const {
        source sub_tree(extended(parts...));
        if (record_ != nullptr) [[unlikely]] {
            sub_tree.record_ = recorded_branch(parts...);
        }
        return sub_tree;
    }

    /// The same source. A ledger names the place of this call beside whatever is opened from it.
    [[nodiscard]] constexpr source here(const char* file = __builtin_FILE(),
                                        std::uint64_t line = __builtin_LINE()) const {
        source same = *this;
        if (record_ != nullptr) [[unlikely]] {
            same.record_ = record_->at(file, line);
        }
        return same;
    }

    /// The stream at this path, at its first word.
    template <class... Parts>
    [[nodiscard]] constexpr leat::stream stream(const Parts&... parts) const {
        return open<leat::stream>(detail::opening::stream, detail::path_kind::stream, parts...);
    }

    /// The same stream, small: for millions of entities.
    template <class... Parts>
    [[nodiscard]] constexpr leat::thin_stream thin_stream(const Parts&... parts) const {
        return open<leat::thin_stream>(detail::opening::thin_stream, detail::path_kind::stream,
                                       parts...);
    }

    /// An engine of another kind at this path, its whole state set from the address. The state must
    /// have at least 128 bits: with fewer, two engines of a large study would soon overlap.
    template <class Engine, class... Parts>
    [[nodiscard]] constexpr Engine engine(const Parts&... parts) const {
        static_assert(detail::seedable_bits<Engine>() >= 128,
                      "leat: this engine has fewer than 128 bits of state, too few to give every "
                      "path its own; cut one such engine into blocks instead: "
                      "leat::block(engine, i, length)");
        const stream_address where = start(detail::path_kind::engine, parts...);
        if (record_ != nullptr) [[unlikely]] {
            recorded(detail::opening::engine, where, parts...);
        }
        return detail::seed_from_address<Engine>(where);
    }

    /// Whether both lead to the same streams.
    friend constexpr bool operator==(const source& a, const source& b) noexcept {
        return a.path_ == b.path_;
    }

    /// The hash of the seed and the path so far, as seven words: all that a source consists of.
    using state_type = detail::path_hash::state_type;
    [[nodiscard]] constexpr state_type state() const noexcept { return path_.state(); }
    /// The source of such a state. A last word above 3 is refused; no source has it.
    [[nodiscard]] static constexpr source from_state(const state_type& words) {
        if (words[6] > detail::path_hash::largest_form) {
            detail::refuse("source", "state[6]", words[6], "must be at most 3");
        }
        return source(detail::path_hash(words));
    }

    /// Writes the state, in any locale, one space between two words.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const source& x) {
        detail::write_words(os, x.state());
        return os;
    }
    /// Reads what << wrote; garbage sets failbit and leaves the source as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        source& x) {
        state_type words{};
        if (detail::read_words(is, words)) {
            if (words[6] <= detail::path_hash::largest_form) {
                x = from_state(words);
            } else {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            }
        }
        return is;
    }

private:
    friend constexpr leat::stream detail::chunk_stream(const source&, std::uint64_t);

    constexpr explicit source(const detail::path_hash& path) noexcept : path_(path) {}

    template <class... Parts>
    [[nodiscard]] constexpr detail::path_hash extended(const Parts&... parts) const {
        detail::path_hash path = path_;
        (path.append(detail::as_path_part(parts)), ...);
        return path;
    }

    template <class... Parts>
    [[nodiscard]] constexpr stream_address start(detail::path_kind kind,
                                                 const Parts&... parts) const {
        const auto place = extended(parts...).place(kind);
        return {place.key, place.upper, 0};
    }

    template <class Stream, class... Parts>
    [[nodiscard]] constexpr Stream open(detail::opening as, detail::path_kind kind,
                                        const Parts&... parts) const {
        const stream_address where = start(kind, parts...);
        if (record_ != nullptr) [[unlikely]] {
            return Stream(where, *recorded(as, where, parts...));
        }
        return Stream(where);
    }

    template <class... Parts>
    [[gnu::cold, gnu::noinline]] detail::source_record*
    recorded_branch(const Parts&... parts) const {
        const std::array<detail::path_part, sizeof...(Parts)> list{detail::as_path_part(parts)...};
        return record_->branch(list);
    }
    template <class... Parts>
    [[gnu::cold, gnu::noinline]] detail::stream_record*
    recorded(detail::opening as, const stream_address& where, const Parts&... parts) const {
        const std::array<detail::path_part, sizeof...(Parts)> list{detail::as_path_part(parts)...};
        return record_->open(as, list, where);
    }

    detail::path_hash path_;
    detail::source_record* record_ = nullptr; // its place in a ledger, if it was given one
};

/// The stream that the words of a chunk of an array come from (bulk/fill_chunks.hpp).
constexpr stream detail::chunk_stream(const source& from, std::uint64_t chunk) {
    return from.open<leat::stream>(opening::chunk, path_kind::chunk, chunk);
}

} // namespace leat

#endif
