// Every vector kernel this processor runs gives the words of the portable code.

#include "leat/streams/refill.hpp"
#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <array>

namespace {

using leat::detail::refill_portably;
using leat::detail::stream_place;
constexpr std::size_t buffers = 3;
using words = std::array<std::uint64_t, buffers * leat::detail::stream_buffer_words>;

using kernel = void (*)(std::uint64_t, std::uint64_t, std::uint64_t, std::uint64_t*,
                        std::size_t) noexcept;

void expect_the_portable_words(kernel k) {
    constexpr std::uint64_t all_ones = ~std::uint64_t{0};
    for (const stream_place place : {stream_place{0, 0}, stream_place{all_ones, all_ones},
                                     stream_place{0x0123456789abcdef, 0xfedcba9876543210}}) {
        // Carries from the low to the high half of the block number, and its last block.
        for (const std::uint64_t first :
             {std::uint64_t{0}, std::uint64_t{1}, std::uint64_t{16}, (std::uint64_t{1} << 32) - 16,
              (std::uint64_t{1} << 32) - 5, (all_ones >> 1) - 15}) {
            for (const std::size_t count : {std::size_t{0}, std::size_t{1}, buffers}) {
                words expected{};
                words got{};
                refill_portably(place, first, expected.data(), count);
                k(place.key, place.upper, first, got.data(), count);
                EXPECT_EQ(got, expected) << first;
            }
        }
    }
}

#if LEAT_VECTOR_KERNELS
TEST(Refill, BaselineKernelGivesThePortableWords) {
    expect_the_portable_words(leat::detail::kernels_baseline::philox_stream_words);
}
#if defined(__x86_64__)
TEST(Refill, Avx2KernelGivesThePortableWords) {
    if (!__builtin_cpu_supports("avx2")) {
        EXPECT_EQ(leat::detail::best_instruction_set(), leat::detail::instruction_set::baseline);
        return; // running it would be an illegal instruction: it must not be chosen
    }
    expect_the_portable_words(leat::detail::kernels_avx2::philox_stream_words);
}
TEST(Refill, Avx512KernelGivesThePortableWords) {
    if (!__builtin_cpu_supports("avx512dq") || !__builtin_cpu_supports("avx512vl")) {
        EXPECT_NE(leat::detail::best_instruction_set(), leat::detail::instruction_set::avx512);
        return; // running it would be an illegal instruction: it must not be chosen
    }
    expect_the_portable_words(leat::detail::kernels_avx512::philox_stream_words);
}
#endif
#endif

TEST(Refill, TheChosenKernelGivesThePortableWords) {
    expect_the_portable_words([](std::uint64_t key, std::uint64_t upper, std::uint64_t first,
                                 std::uint64_t* out, std::size_t count) noexcept {
        leat::detail::refill({key, upper}, first, out, count);
    });
}

} // namespace
