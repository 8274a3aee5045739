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
// Opening twice by the same path gives the same numbers twice: one path, one purpose.

#ifndef LEAT_STREAMS_SOURCE_HPP
#define LEAT_STREAMS_SOURCE_HPP

#include "leat/streams/path.hpp"
#include "leat/streams/seeding.hpp" // an engine from an address
#include "leat/streams/stream.hpp"

#include <cstdint>

namespace leat {

class source;

namespace detail {
constexpr stream_address chunk_address(const source& from, std::uint64_t chunk);
} // namespace detail

/// A seed and the start of a path. A value: copy it, pass it to threads, keep it in entities.
class source {
public:
    /// From a seed: an integer (its type never matters) or a text; 7 and "7" differ.
    template <class Seed>
    requires(!std::same_as<Seed, source>) constexpr explicit source(const Seed& seed)
        : path_(detail::as_path_part(seed)) {}

    /// The sub-tree under these parts.
    template <class... Parts>
    [[nodiscard]] constexpr source branch(const Parts&... parts) const {
        return source(extended(parts...));
    }

    /// The stream at this path, at its first word.
    template <class... Parts>
    [[nodiscard]] constexpr leat::stream stream(const Parts&... parts) const {
        return leat::stream(start(detail::path_kind::stream, parts...));
    }

    /// The same stream, small: for millions of entities.
    template <class... Parts>
    [[nodiscard]] constexpr leat::thin_stream thin_stream(const Parts&... parts) const {
        return leat::thin_stream(start(detail::path_kind::stream, parts...));
    }

    /// An engine of another kind at this path, its whole state set from the address. The state must
    /// have at least 128 bits: with fewer, two engines of a large study would soon overlap.
    template <class Engine, class... Parts>
    [[nodiscard]] constexpr Engine engine(const Parts&... parts) const {
        static_assert(detail::seedable_bits<Engine>() >= 128,
                      "leat: this engine has fewer than 128 bits of state, too few to give every "
                      "path its own; cut one such engine into blocks instead: "
                      "leat::block(engine, i, length)");
        return detail::seed_from_address<Engine>(start(detail::path_kind::engine, parts...));
    }

    friend constexpr bool operator==(const source&, const source&) = default;

private:
    friend constexpr stream_address detail::chunk_address(const source&, std::uint64_t);

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

    detail::path_hash path_;
};

/// Where the words of a chunk of an array come from (bulk/fill_chunks.hpp).
constexpr stream_address detail::chunk_address(const source& from, std::uint64_t chunk) {
    return from.start(path_kind::chunk, chunk);
}

} // namespace leat

#endif
