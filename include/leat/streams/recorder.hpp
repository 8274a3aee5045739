// What sources and streams tell a ledger (ledger.hpp) about themselves, if they were given one.
//
// A source holds a pointer to its place in the ledger, null for most. A stream that a recorded
// source opens tells its record of every word drawn; all others never look. The ledger implements
// these interfaces, so that a program without one includes nothing of it.

#ifndef LEAT_STREAMS_RECORDER_HPP
#define LEAT_STREAMS_RECORDER_HPP

#include "leat/streams/address.hpp"
#include "leat/streams/path.hpp"

#include <cstdint>
#include <span>

namespace leat::detail {

/// What can be opened at a path.
enum class opening : std::uint8_t { stream, thin_stream, engine, chunk };

/// One opened stream in a ledger. Its members may be called by the thread that has the stream.
class stream_record {
public:
    /// So many words were drawn, the stream stands at `position`. What is taken back (by fills,
    /// which read ahead) is the number minus so many, modulo 2^64.
    virtual void drawn(std::uint64_t words, std::uint64_t position) noexcept = 0;
    /// The stream went elsewhere, or has another limit.
    virtual void stands(std::uint64_t position, std::uint64_t limit) noexcept = 0;
    /// An offspring, and its address.
    virtual stream_record* offspring(const path_part& i, const stream_address& where) = 0;
    /// A second stream on purpose.
    virtual stream_record* replica(const stream_address& where, std::uint64_t limit) = 0;

protected:
    ~stream_record() = default;
};

/// A seed and the start of a path in a ledger: what a recorded source holds.
class source_record {
public:
    virtual source_record* branch(std::span<const path_part> parts) = 0;
    /// The same, and what is opened from it is opened at this place in the program.
    virtual source_record* at(const char* file, std::uint64_t line) = 0;
    /// Enters what is opened at an address. Null for an engine, whose words are not counted.
    virtual stream_record* open(opening as, std::span<const path_part> parts,
                                const stream_address& where) = 0;

protected:
    ~source_record() = default;
};

/// A ledger, as a source is given it.
class seed_recorder {
public:
    virtual source_record* start(const path_part& seed) = 0;

protected:
    ~seed_recorder() = default;
};

/// Whether a stream may be drawn from without further ado.
enum class stream_mode : std::uint8_t { plain, recorded, moved_from };

} // namespace leat::detail

#endif
