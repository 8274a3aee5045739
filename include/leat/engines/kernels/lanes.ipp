// The vectors that kernels compute on. Included by lanes.hpp through per_instruction_set.ipp.

namespace leat::detail::LEAT_KERNEL_SPACE {

using lanes [[gnu::vector_size(8 * LEAT_KERNEL_LANES)]] = std::uint64_t;
using half_lanes [[gnu::vector_size(8 * LEAT_KERNEL_LANES)]] = std::uint32_t; // two a lane

[[gnu::always_inline]] inline lanes load_lanes(const std::uint64_t* words) noexcept {
    lanes x;
    __builtin_memcpy(&x, words, sizeof x);
    return x;
}
[[gnu::always_inline]] inline void store_lanes(std::uint64_t* words, const lanes& x) noexcept {
    __builtin_memcpy(words, &x, sizeof x);
}

/// The full products of the low halves of the lanes.
[[gnu::always_inline]] inline lanes multiply_low_halves(const lanes& a, const lanes& b) noexcept {
#if defined(__x86_64__) && !defined(__clang__)
    // g++ 12 does not find this instruction for a masked product on SSE2 and AVX2.
    using int_lanes [[gnu::vector_size(8 * LEAT_KERNEL_LANES)]] = int;
    const auto x = reinterpret_cast<int_lanes>(a);
    const auto y = reinterpret_cast<int_lanes>(b);
#if LEAT_KERNEL_LANES == 2
    return reinterpret_cast<lanes>(__builtin_ia32_pmuludq128(x, y));
#elif LEAT_KERNEL_LANES == 4
    return reinterpret_cast<lanes>(__builtin_ia32_pmuludq256(x, y));
#else
    using signed_lanes [[gnu::vector_size(64)]] = long long;
    return reinterpret_cast<lanes>(__builtin_ia32_pmuludq512_mask(x, y, signed_lanes{}, 0xFF));
#endif
#elif defined(__aarch64__)
    // NEON has no 64-bit product, only one of halves to full: with `*` the compilers take the
    // vectors apart.
    using narrow_lanes [[gnu::vector_size(8)]] = std::uint32_t;
    const auto x = __builtin_convertvector(a, narrow_lanes);
    const auto y = __builtin_convertvector(b, narrow_lanes);
#if defined(__clang__)
    using byte_lanes [[gnu::vector_size(8)]] = signed char;
    constexpr int unsigned_halves = 51; // how clang numbers the type of the result
    return reinterpret_cast<lanes>(__builtin_neon_vmull_v(
        reinterpret_cast<byte_lanes>(x), reinterpret_cast<byte_lanes>(y), unsigned_halves));
#elif __has_builtin(__builtin_aarch64_intrinsic_vec_umult_lo_v2si_uuu)
    return __builtin_aarch64_intrinsic_vec_umult_lo_v2si_uuu(x, y);
#else
    return __builtin_convertvector(x, lanes) * __builtin_convertvector(y, lanes);
#endif
#else
    return (a & 0xFFFFFFFFu) * (b & 0xFFFFFFFFu);
#endif
}

/// The upper halves of the lanes of two vectors, in order.
[[gnu::always_inline]] inline half_lanes upper_halves(const lanes& a, const lanes& b) noexcept {
    const auto x = reinterpret_cast<half_lanes>(a);
    const auto y = reinterpret_cast<half_lanes>(b);
#if LEAT_KERNEL_LANES == 2
    return __builtin_shufflevector(x, y, 1, 3, 5, 7);
#elif LEAT_KERNEL_LANES == 4
    return __builtin_shufflevector(x, y, 1, 3, 5, 7, 9, 11, 13, 15);
#else
    return __builtin_shufflevector(x, y, 1, 3, 5, 7, 9, 11, 13, 15, 17, 19, 21, 23, 25, 27, 29, 31);
#endif
}

} // namespace leat::detail::LEAT_KERNEL_SPACE
