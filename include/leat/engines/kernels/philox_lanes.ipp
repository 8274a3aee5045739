// philox4x32-10 on vectors: 16 consecutive blocks of a stream at once. Included by philox.hpp in
// this folder through per_instruction_set.ipp, which sets the width and the namespace.
//
// Each 64-bit lane holds one 32-bit word of one block. Only its low half counts: what a product
// leaves in the upper half is cut off once, at the end.

namespace leat::detail::LEAT_KERNEL_SPACE {

/// The 32 words of the blocks first to first + 15 of the stream (key, upper); see
/// streams/refill.hpp.
[[gnu::always_inline]] inline void philox_set(std::uint64_t key, std::uint64_t upper,
                                              std::uint64_t first, std::uint64_t* words) noexcept {
    static constexpr std::uint64_t block_numbers[16] = {0, 1, 2,  3,  4,  5,  6,  7,
                                                        8, 9, 10, 11, 12, 13, 14, 15};
    constexpr int groups = 16 / LEAT_KERNEL_LANES;
    lanes x0[groups];
    lanes x1[groups];
    lanes x2[groups];
    lanes x3[groups];
    for (int g = 0; g < groups; ++g) {
        x0[g] = load_lanes(block_numbers + LEAT_KERNEL_LANES * g) + first;
        x1[g] = x0[g] >> 32;
        x2[g] = lanes{} + upper;
        x3[g] = lanes{} + (upper >> 32);
    }
    const lanes m0 = lanes{} + 0xD2511F53u;
    const lanes m1 = lanes{} + 0xCD9E8D57u;
    std::uint64_t k0 = key; // their low halves count, so that sums wrap by themselves
    std::uint64_t k1 = key >> 32;
#pragma GCC unroll 10
    for (int round = 0; round < 10; ++round) {
        const lanes key0 = lanes{} + k0;
        const lanes key1 = lanes{} + k1;
#pragma GCC unroll 8
        for (int g = 0; g < groups; ++g) {
            const lanes p0 = multiply_low_halves(x0[g], m0);
            const lanes p1 = multiply_low_halves(x2[g], m1);
            x0[g] = (p1 >> 32) ^ x1[g] ^ key0;
            x1[g] = p1;
            x2[g] = (p0 >> 32) ^ x3[g] ^ key1;
            x3[g] = p0;
        }
        k0 += 0x9E3779B9u;
        k1 += 0xBB67AE85u;
    }
    for (int g = 0; g < groups; ++g) {
        const lanes even = (x0[g] & 0xFFFFFFFFu) | (x1[g] << 32);
        const lanes odd = (x2[g] & 0xFFFFFFFFu) | (x3[g] << 32);
#if LEAT_KERNEL_LANES == 2
        const lanes front = __builtin_shufflevector(even, odd, 0, 2);
        const lanes back = __builtin_shufflevector(even, odd, 1, 3);
#elif LEAT_KERNEL_LANES == 4
        const lanes front = __builtin_shufflevector(even, odd, 0, 4, 1, 5);
        const lanes back = __builtin_shufflevector(even, odd, 2, 6, 3, 7);
#else
        const lanes front = __builtin_shufflevector(even, odd, 0, 8, 1, 9, 2, 10, 3, 11);
        const lanes back = __builtin_shufflevector(even, odd, 4, 12, 5, 13, 6, 14, 7, 15);
#endif
        std::uint64_t* to = words + 2 * LEAT_KERNEL_LANES * g;
        store_lanes(to, front);
        store_lanes(to + LEAT_KERNEL_LANES, back);
    }
}

/// The words of `sets` times 16 blocks from block `first` on.
inline void philox_stream_words(std::uint64_t key, std::uint64_t upper, std::uint64_t first,
                                std::uint64_t* words, std::size_t sets) noexcept {
    for (; sets > 0; --sets) {
        philox_set(key, upper, first, words);
        first += 16;
        words += 32;
    }
}

} // namespace leat::detail::LEAT_KERNEL_SPACE
