// The words of a stream by the fastest kernel this processor has: 16 blocks of philox4x32-10.

#ifndef LEAT_ENGINES_KERNELS_PHILOX_HPP
#define LEAT_ENGINES_KERNELS_PHILOX_HPP

#include "leat/engines/kernels/instruction_set.hpp"
#include "leat/engines/kernels/lanes.hpp"

#include <cstddef>
#include <cstdint>

#if LEAT_VECTOR_KERNELS

#define LEAT_KERNEL_FILE "leat/engines/kernels/philox_lanes.ipp"
#include "leat/engines/kernels/per_instruction_set.ipp"
#undef LEAT_KERNEL_FILE

namespace leat::detail {

/// The words of `sets` times 16 blocks of the stream (key, upper), from block `first` on; two words
/// a block.
inline void philox_stream_words(std::uint64_t key, std::uint64_t upper, std::uint64_t first,
                                std::uint64_t* words, std::size_t sets) noexcept {
#if defined(__x86_64__)
    switch (best_instruction_set()) {
    case instruction_set::avx512:
        return kernels_avx512::philox_stream_words(key, upper, first, words, sets);
    case instruction_set::avx2:
        return kernels_avx2::philox_stream_words(key, upper, first, words, sets);
    case instruction_set::baseline:
        break;
    }
#endif
    kernels_baseline::philox_stream_words(key, upper, first, words, sets);
}

} // namespace leat::detail

#endif

#endif
