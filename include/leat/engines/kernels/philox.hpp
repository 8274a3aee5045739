// The words of a stream by the fastest kernel this processor has: 16 blocks of philox4x32-10.

#ifndef LEAT_ENGINES_KERNELS_PHILOX_HPP
#define LEAT_ENGINES_KERNELS_PHILOX_HPP

#include "leat/engines/kernels/instruction_set.hpp"

#include <cstdint>

#if LEAT_VECTOR_KERNELS

#define LEAT_KERNEL_FILE "leat/engines/kernels/philox_lanes.ipp"
#include "leat/engines/kernels/per_instruction_set.ipp"
#undef LEAT_KERNEL_FILE

namespace leat::detail {

/// The 32 words of blocks first to first + 15 of the stream (key, upper).
inline void philox_stream_words(std::uint64_t key, std::uint64_t upper, std::uint64_t first,
                                std::uint64_t* words) noexcept {
#if defined(__x86_64__)
    switch (best_instruction_set()) {
    case instruction_set::avx512:
        return kernels_avx512::philox_stream_words(key, upper, first, words);
    case instruction_set::avx2:
        return kernels_avx2::philox_stream_words(key, upper, first, words);
    case instruction_set::baseline:
        break;
    }
#endif
    kernels_baseline::philox_stream_words(key, upper, first, words);
}

} // namespace leat::detail

#endif

#endif
