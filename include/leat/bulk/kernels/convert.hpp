// From words to uniform reals and integers by the fastest kernel this processor has. All give the
// values of the samplers' from_word.

#ifndef LEAT_BULK_KERNELS_CONVERT_HPP
#define LEAT_BULK_KERNELS_CONVERT_HPP

#include "leat/engines/kernels/instruction_set.hpp"
#include "leat/engines/kernels/lanes.hpp"
#include "leat/uniform/detail/interval_map.hpp" // unit_product
#include "leat/uniform/uniform_integer.hpp"     // short_range
#include "leat/uniform/unit.hpp"                // ends

#include <cstddef>
#include <cstdint>

#if LEAT_VECTOR_KERNELS

#define LEAT_KERNEL_FILE "leat/bulk/kernels/convert_lanes.ipp"
#include "leat/engines/kernels/per_instruction_set.ipp"
#undef LEAT_KERNEL_FILE

namespace leat::detail {

/// The draws of a unit_product from n words.
template <class Real, ends Ends>
void unit_products(const std::uint64_t* words, Real* out, std::size_t n,
                   const unit_product<Real, Ends>& p) noexcept {
#if defined(__x86_64__)
    switch (best_instruction_set()) {
    case instruction_set::avx512:
        return kernels_avx512::unit_products(words, out, n, Ends, p.factor, p.lowest, p.highest);
    case instruction_set::avx2:
        return kernels_avx2::unit_products(words, out, n, Ends, p.factor, p.lowest, p.highest);
    case instruction_set::baseline:
        break;
    }
#endif
    kernels_baseline::unit_products(words, out, n, Ends, p.factor, p.lowest, p.highest);
}

/// The draws of a short_range from the first of n words; returns how many: it stops before 32 words
/// of which one is to be rejected, and where fewer than 32 are left.
template <class Word>
std::size_t short_integers(const std::uint64_t* words, Word* out, std::size_t n, short_range range,
                           std::uint32_t surplus) noexcept {
#if defined(__x86_64__)
    switch (best_instruction_set()) {
    case instruction_set::avx512:
        return kernels_avx512::short_integers(words, out, n, range, surplus);
    case instruction_set::avx2:
        return kernels_avx2::short_integers(words, out, n, range, surplus);
    case instruction_set::baseline:
        break;
    }
#endif
    return kernels_baseline::short_integers(words, out, n, range, surplus);
}

} // namespace leat::detail

#endif

#endif
