// fill_chunks: one array filled by any number of threads, with one result.
//
//   leat::fill_chunks(span, sampler, study.branch("noise"));            // all of it, by this
//   thread for (std::uint64_t c = 0; c < leat::chunk_count(span.size()); ++c)  // any scheduler's
//   loop:
//       leat::fill_chunks(span, sampler, study.branch("noise"), c, c + 1);
//   leat::fill_chunk(part, sampler, study.branch("noise"), c);          // a part held elsewhere
//
// The array is cut into chunks of chunk_length = 4096 elements, the last one shorter. Chunk c is
// fill(chunk, sampler, s), where s is a stream of its own: that of the source's path and the index
// c, under a kind tag that no stream of the user has. So the result depends on source, sampler and
// length alone, not on who fills which chunk, in what order; and the first chunks of a longer array
// are those of a shorter one. Streams of neighbouring chunks share no word, provably.
//
// Chunks may be filled at the same time by different threads: nothing is shared but the sampler,
// which is only read. One source path, one array: two arrays from one source hold the same numbers.
// Words: those of the draws. Chunk length, tag and addresses are frozen (streams/path.hpp).
// Errors: a range of chunks that is not in the array is refused; those of the draws pass.
// Not for: continuing a stream; what is drawn here is apart from all of them.

#ifndef LEAT_BULK_FILL_CHUNKS_HPP
#define LEAT_BULK_FILL_CHUNKS_HPP

#include "leat/bulk/fill.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/sizes.hpp"
#include "leat/streams/source.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat {

/// The elements of one chunk, frozen.
inline constexpr std::size_t chunk_length = 4096;

/// How many chunks an array of so many elements has.
constexpr std::uint64_t chunk_count(std::uint64_t elements) noexcept {
    return elements / chunk_length + (elements % chunk_length != 0 ? 1 : 0);
}

/// Fills one chunk, number `chunk` of an array that need not be here as a whole. More elements than
/// a chunk has are refused.
template <detail::writable_array Array, class Sampler>
constexpr void fill_chunk(Array&& array, const Sampler& sampler, const source& from,
                          std::uint64_t chunk) {
    const auto elements = std::span(array);
    if (elements.size() > chunk_length) {
        detail::refuse("fill_chunk", "length", elements.size(), "must be at most 4096");
    }
    stream words = detail::chunk_stream(from, chunk);
    leat::fill(elements, sampler, words);
}

/// Fills the chunks first, ..., last - 1 of an array.
template <detail::writable_array Array, class Sampler>
constexpr void fill_chunks(Array&& array, const Sampler& sampler, const source& from,
                           std::uint64_t first, std::uint64_t last) {
    const auto elements = std::span(array);
    const std::uint64_t count = chunk_count(elements.size());
    if (last > count) {
        detail::refuse("fill_chunks", "last", last, "must be at most the number of chunks");
    }
    if (first > last) {
        detail::refuse("fill_chunks", "first", first, "must not be above last");
    }
    for (std::uint64_t chunk = first; chunk < last; ++chunk) {
        const std::size_t start = detail::smaller(elements.size(), chunk * chunk_length);
        const std::size_t left = elements.size() - start;
        fill_chunk(elements.subspan(start, left < chunk_length ? left : chunk_length), sampler,
                   from, chunk);
    }
}

/// Fills all chunks.
template <detail::writable_array Array, class Sampler>
constexpr void fill_chunks(Array&& array, const Sampler& sampler, const source& from) {
    const auto elements = std::span(array);
    fill_chunks(elements, sampler, from, 0, chunk_count(elements.size()));
}

} // namespace leat

#endif
