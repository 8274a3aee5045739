// Rounds of xoshiro256_braid by the fastest kernel this processor has.

#ifndef LEAT_ENGINES_KERNELS_BRAID_HPP
#define LEAT_ENGINES_KERNELS_BRAID_HPP

#include "leat/engines/kernels/instruction_set.hpp"
#include "leat/engines/kernels/lanes.hpp"

#include <cstddef>
#include <cstdint>

#if LEAT_VECTOR_KERNELS

#define LEAT_KERNEL_FILE "leat/engines/kernels/braid_lanes.ipp"
#include "leat/engines/kernels/per_instruction_set.ipp"
#undef LEAT_KERNEL_FILE

namespace leat::detail {

/// Draws `rounds` rounds of sixteen words each. Word w of lane k stands at 16 w + k of `state`.
inline void braid_rounds_by_vectors(std::uint64_t* state, std::uint64_t* out,
                                    std::size_t rounds) noexcept {
#if defined(__x86_64__)
    switch (best_instruction_set()) {
    case instruction_set::avx512:
        return kernels_avx512::braid_rounds(state, out, rounds);
    case instruction_set::avx2:
        return kernels_avx2::braid_rounds(state, out, rounds);
    case instruction_set::baseline:
        break;
    }
#endif
    kernels_baseline::braid_rounds(state, out, rounds);
}

} // namespace leat::detail

#endif

#endif
