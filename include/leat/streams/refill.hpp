// The refill seam: the words of a stream, from philox4x32 blocks.
//
// Word 2b of the stream (key, upper) is y0 + 2^32 y1 and word 2b + 1 is y2 + 2^32 y3, where y0..y3
// are the outputs of philox4x32-10 with key words (low key, high key) and counter words (low b,
// high b, low upper, high upper), least significant first. Everything a stream yields comes
// through here; faster kernels go behind these functions and must give the same words.

#ifndef LEAT_STREAMS_REFILL_HPP
#define LEAT_STREAMS_REFILL_HPP

#include "leat/engines/kernels/philox.hpp"
#include "leat/engines/philox.hpp"
#include "leat/streams/path.hpp" // stream_place

#include <array>
#include <cstddef>
#include <cstdint>
#include <type_traits>

namespace leat::detail {

/// The two words of block b.
constexpr std::array<std::uint64_t, 2> stream_block(stream_place place, std::uint64_t b) noexcept {
    const auto low = [](std::uint64_t x) { return static_cast<std::uint32_t>(x); };
    const auto high = [](std::uint64_t x) { return static_cast<std::uint32_t>(x >> 32); };
    const auto y = philox4x32::block({low(place.key), high(place.key)},
                                     {low(b), high(b), low(place.upper), high(place.upper)});
    return {std::uint64_t{y[0]} | std::uint64_t{y[1]} << 32,
            std::uint64_t{y[2]} | std::uint64_t{y[3]} << 32};
}

/// How many words a stream keeps at hand: 16 blocks.
constexpr std::uint64_t stream_buffer_words = 32;

/// The same by the portable code alone: constant evaluation, and what kernels are tested against.
constexpr void refill_portably(stream_place place, std::uint64_t first, std::uint64_t* words,
                               std::size_t buffers = 1) noexcept {
    for (std::size_t i = 0; i < buffers * (stream_buffer_words / 2); ++i) {
        const auto pair = stream_block(place, first + i);
        words[2 * i] = pair[0];
        words[2 * i + 1] = pair[1];
    }
}

/// All words of 16 consecutive blocks, starting with block `first`: 32 words. With `buffers`, those
/// of so many times 16 blocks.
constexpr void refill(stream_place place, std::uint64_t first, std::uint64_t* words,
                      std::size_t buffers = 1) noexcept {
#if LEAT_VECTOR_KERNELS
    if (!std::is_constant_evaluated()) {
        philox_stream_words(place.key, place.upper, first, words, buffers);
        return;
    }
#endif
    refill_portably(place, first, words, buffers);
}

} // namespace leat::detail

#endif
