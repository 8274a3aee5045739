// From words to reals and integers on vectors. Included by convert.hpp in this folder through
// per_instruction_set.ipp, which sets the width and the namespace.
//
// The upper 52 bits of a word (23 for float), j, become the fraction of a number in [1, 2):
//   1 + j / 2^52, less 1 - 2^-53,  is (2 j + 1) / 2^53: the open mapping
//                 less 1,          is 2 j / 2^53; the word's next bit adds 2^-53: closed_open
// and the first of them plus that bit is open_closed; closed divides what closed_open gives, as an
// integer, by 2^53 - 1. Every step is exact but that division and the product with a factor, which
// are rounded once: there is nothing to contract, so that no barrier is needed.

namespace leat::detail::LEAT_KERNEL_SPACE {

using double_lanes [[gnu::vector_size(8 * LEAT_KERNEL_LANES)]] = double;
using float_lanes [[gnu::vector_size(8 * LEAT_KERNEL_LANES)]] = float;

/// unit_of<double, which>(word) of each word; `which` is a constant where this is inlined.
[[gnu::always_inline]] inline double_lanes units_of(const lanes& words, ends which) noexcept {
    const auto in_one_to_two = reinterpret_cast<double_lanes>((words >> 12) | 0x3FF0000000000000u);
    if (which == ends::open) {
        return in_one_to_two - 0x1.fffffffffffffp-1;
    }
    const lanes next_bit = lanes{} - ((words >> 11) & 1u);
    const auto half_step = reinterpret_cast<double_lanes>(next_bit & 0x3CA0000000000000u); // 2^-53
    if (which == ends::open_closed) {
        return (in_one_to_two - 0x1.fffffffffffffp-1) + half_step;
    }
    const double_lanes unit = (in_one_to_two - 1.0) + half_step;
    return which == ends::closed_open ? unit : unit * 0x1p53 / 0x1.fffffffffffffp52;
}

/// unit_of<float, which>(word) from the upper halves of the words.
[[gnu::always_inline]] inline float_lanes units_of(const half_lanes& words, ends which) noexcept {
    const auto in_one_to_two = reinterpret_cast<float_lanes>((words >> 9) | 0x3F800000u);
    if (which == ends::open) {
        return in_one_to_two - 0x1.fffffep-1F;
    }
    const half_lanes next_bit = half_lanes{} - ((words >> 8) & 1u);
    const auto half_step = reinterpret_cast<float_lanes>(next_bit & 0x33800000u); // 2^-24
    if (which == ends::open_closed) {
        return (in_one_to_two - 0x1.fffffep-1F) + half_step;
    }
    const float_lanes unit = (in_one_to_two - 1.0F) + half_step;
    return which == ends::closed_open ? unit : unit * 0x1p24F / 0x1.fffffep23F;
}

/// A vector of reals from as many words.
[[gnu::always_inline]] inline double_lanes next_units(const std::uint64_t* words, ends which,
                                                      const double*) noexcept {
    return units_of(load_lanes(words), which);
}
[[gnu::always_inline]] inline float_lanes next_units(const std::uint64_t* words, ends which,
                                                     const float*) noexcept {
    return units_of(upper_halves(load_lanes(words), load_lanes(words + LEAT_KERNEL_LANES)), which);
}

#define LEAT_KERNEL_REAL double
#define LEAT_KERNEL_REALS double_lanes
#include "leat/bulk/kernels/products.ipp"
#undef LEAT_KERNEL_REAL
#undef LEAT_KERNEL_REALS
#define LEAT_KERNEL_REAL float
#define LEAT_KERNEL_REALS float_lanes
#include "leat/bulk/kernels/products.ipp"
#undef LEAT_KERNEL_REAL
#undef LEAT_KERNEL_REALS

/// The products of the words' upper halves with `count`; `doubt` gets a sign bit where a lower half
/// lies below `surplus`, so that the word is to be rejected (see uniform/uniform_integer.hpp).
[[gnu::always_inline]] inline lanes scaled_halves(const std::uint64_t* words, const lanes& count,
                                                  const lanes& surplus, lanes& doubt) noexcept {
    const lanes x = multiply_low_halves(load_lanes(words) >> 32, count);
    doubt |= (x & 0xFFFFFFFFu) - surplus;
    return x;
}

[[gnu::always_inline]] inline bool any_sign(const lanes& x) noexcept {
    std::uint64_t all = 0;
    for (int i = 0; i < LEAT_KERNEL_LANES; ++i) {
        all |= x[i];
    }
    return all >> 63 != 0;
}

/// Turns words into integers until one among 32 is to be rejected, or fewer than 32 are left.
/// Returns how many it turned.
inline std::size_t short_integers(const std::uint64_t* words, std::uint64_t* out, std::size_t n,
                                  short_range range, std::uint32_t surplus) noexcept {
    std::size_t i = 0;
    for (; n - i >= 32; i += 32) {
        lanes doubt{};
        for (std::size_t k = i; k < i + 32; k += LEAT_KERNEL_LANES) {
            const lanes x =
                scaled_halves(words + k, lanes{} + range.count, lanes{} + surplus, doubt);
            store_lanes(out + k, (x >> 32) + range.lowest);
        }
        if (any_sign(doubt)) {
            break;
        }
    }
    return i;
}
inline std::size_t short_integers(const std::uint64_t* words, std::uint32_t* out, std::size_t n,
                                  short_range range, std::uint32_t surplus) noexcept {
    std::size_t i = 0;
    for (; n - i >= 32; i += 32) {
        lanes doubt{};
        for (std::size_t k = i; k < i + 32; k += 2 * LEAT_KERNEL_LANES) {
            const lanes x =
                scaled_halves(words + k, lanes{} + range.count, lanes{} + surplus, doubt);
            const lanes y = scaled_halves(words + k + LEAT_KERNEL_LANES, lanes{} + range.count,
                                          lanes{} + surplus, doubt);
            const half_lanes both =
                upper_halves(x, y) + static_cast<std::uint32_t>(range.lowest & 0xFFFFFFFFu);
            __builtin_memcpy(out + k, &both, sizeof both);
        }
        if (any_sign(doubt)) {
            break;
        }
    }
    return i;
}

} // namespace leat::detail::LEAT_KERNEL_SPACE
