// Every vector kernel this processor runs gives what the portable code gives, to the bit: the words
// of xoshiro256_braid, and what uniform makes of words. Lengths lie around the kernels' vectors,
// tiles and groups; words include those at which mappings turn.

#include "leat/bulk/kernels/convert.hpp"
#include "leat/engines/braid.hpp"
#include "leat/engines/splitmix64.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <gtest/gtest.h>

#include <bit>
#include <cstddef>
#include <cstdint>
#include <span>
#include <type_traits>
#include <vector>

namespace {

#if LEAT_VECTOR_KERNELS

using leat::ends;
using leat::detail::instruction_set;

/// Words at random, with the extreme ones and their neighbours in every place of a vector.
std::vector<std::uint64_t> many_words() {
    std::vector<std::uint64_t> words;
    leat::splitmix64 g{4};
    for (unsigned shift = 0; shift < 64; ++shift) {
        for (const std::uint64_t word : {std::uint64_t{1} << shift, (std::uint64_t{1} << shift) - 1,
                                         ~std::uint64_t{0} << shift, ~(std::uint64_t{1} << shift),
                                         g(), g() << shift, ~(g() >> shift)}) {
            words.push_back(word);
        }
    }
    for (int i = 0; i < 2000; ++i) {
        words.push_back(g());
    }
    return words;
}

constexpr std::size_t lengths[] = {0,  1,  2,  3,  4,  5,  7,  8,  9,  15,  16,
                                   17, 31, 32, 33, 63, 64, 65, 95, 97, 512, 2000};

/// Calls check(kernels) with the kernels of each instruction set that runs here, for a kernel that
/// `select` names in each namespace.
template <class Baseline, class Avx2, class Avx512, class Check>
void with_each_kernel([[maybe_unused]] Baseline baseline, [[maybe_unused]] Avx2 avx2,
                      [[maybe_unused]] Avx512 avx512, Check check) {
    {
        SCOPED_TRACE("baseline");
        check(baseline);
    }
#if defined(__x86_64__)
    if (__builtin_cpu_supports("avx2")) {
        SCOPED_TRACE("AVX2");
        check(avx2);
    }
    if (__builtin_cpu_supports("avx512f") && __builtin_cpu_supports("avx512dq") &&
        __builtin_cpu_supports("avx512vl")) {
        SCOPED_TRACE("AVX-512");
        check(avx512);
    }
#endif
}

#if defined(__x86_64__)
#define LEAT_TEST_KERNELS(call)                                                                    \
    [](auto... x) { return leat::detail::kernels_baseline::call(x...); },                          \
        [](auto... x) { return leat::detail::kernels_avx2::call(x...); },                          \
        [](auto... x) { return leat::detail::kernels_avx512::call(x...); }
#else
#define LEAT_TEST_KERNELS(call)                                                                    \
    [](auto... x) { return leat::detail::kernels_baseline::call(x...); }, 0, 0
#endif

TEST(BraidKernel, GivesThePortableWords) {
    leat::splitmix64 g{5};
    leat::detail::braid_state start{};
    for (std::uint64_t& word : start) {
        word = g();
    }
    with_each_kernel(LEAT_TEST_KERNELS(braid_rounds), [&](auto kernel) {
        for (const std::size_t rounds : {0U, 1U, 2U, 3U, 31U, 32U, 33U, 64U, 65U, 100U}) {
            leat::detail::braid_state expected_state = start;
            leat::detail::braid_state state = start;
            std::vector<std::uint64_t> expected(16 * rounds + 8, 7);
            std::vector<std::uint64_t> got(16 * rounds + 8, 7);
            leat::detail::braid_rounds_portably(expected_state, expected.data(), rounds);
            kernel(state.data(), got.data(), rounds);
            EXPECT_EQ(got, expected) << rounds;
            EXPECT_EQ(state, expected_state) << rounds;
        }
    });
}

template <class Real>
auto bits(const std::vector<Real>& values) {
    using word = std::conditional_t<sizeof(Real) == 8, std::uint64_t, std::uint32_t>;
    std::vector<word> all;
    for (const Real x : values) {
        all.push_back(std::bit_cast<word>(x));
    }
    return all;
}

template <class Real, ends Ends>
void expect_products(double b) {
    const std::vector<std::uint64_t> words = many_words();
    const leat::uniform<Real, Ends> law{0, b};
    const auto p = law.as_product();
    ASSERT_TRUE(p.applies);
    with_each_kernel(LEAT_TEST_KERNELS(unit_products), [&](auto kernel) {
        for (const std::size_t length : lengths) {
            for (const std::size_t offset : {0U, 1U, 300U}) {
                std::vector<Real> expected(length + 8, Real{7});
                std::vector<Real> got(length + 8, Real{7});
                for (std::size_t i = 0; i < length; ++i) {
                    law.from_word(words[offset + i], expected[i]);
                }
                kernel(words.data() + offset, got.data(), length, Ends, p.factor, p.lowest,
                       p.highest);
                ASSERT_EQ(bits(got), bits(expected)) << length << ", factor " << b;
            }
        }
    });
}

TEST(ConversionKernel, GivesTheRealsOfUniform) {
    for (const double b : {1.0, 0.3, 3.0, 0x1p-30, 1e30}) {
        expect_products<double, ends::open>(b);
        expect_products<double, ends::closed_open>(b);
        expect_products<double, ends::open_closed>(b);
        expect_products<double, ends::closed>(b);
        expect_products<float, ends::open>(b);
        expect_products<float, ends::closed_open>(b);
        expect_products<float, ends::open_closed>(b);
        expect_products<float, ends::closed>(b);
    }
}

template <class Int>
void expect_integers(Int lo, Int hi) {
    const std::vector<std::uint64_t> words = many_words();
    const leat::uniform_integer<Int> law{lo, hi};
    const leat::detail::short_range range = law.as_short_range();
    ASSERT_NE(range.count, 0U);
    const std::uint32_t surplus = (0 - range.count) % range.count;
    using word = std::conditional_t<sizeof(Int) == 4, std::uint32_t, std::uint64_t>;
    with_each_kernel(LEAT_TEST_KERNELS(short_integers), [&](auto kernel) {
        for (const std::size_t length : lengths) {
            // At the front stand the extreme words, many of them to be rejected.
            for (const std::size_t offset : {0U, 1U, 449U}) {
                std::vector<word> got(length + 8, 7);
                const std::size_t turned =
                    kernel(words.data() + offset, got.data(), length, range, surplus);
                ASSERT_EQ(turned % 32, 0U);
                ASSERT_LE(turned, length);
                const auto is_kept = [&](std::uint64_t w) {
                    return static_cast<std::uint32_t>((w >> 32) * range.count) >= surplus;
                };
                for (std::size_t i = 0; i < turned; ++i) {
                    ASSERT_TRUE(is_kept(words[offset + i]));
                    const std::uint64_t upper = ((words[offset + i] >> 32) * range.count) >> 32;
                    ASSERT_EQ(static_cast<Int>(got[i]),
                              static_cast<Int>(static_cast<std::uint64_t>(lo) + upper));
                }
                // It stopped for a reason.
                if (length - turned >= 32) {
                    bool all_kept = true;
                    for (std::size_t i = turned; i < turned + 32; ++i) {
                        all_kept = all_kept && is_kept(words[offset + i]);
                    }
                    ASSERT_FALSE(all_kept) << turned << " of " << length;
                }
                for (std::size_t i = length; i < length + 8; ++i) {
                    ASSERT_EQ(got[i], 7U); // nothing beyond
                }
            }
        }
    });
}

// Lemire, ACM TOMACS 29(1), 2019, algorithm 5: the product's upper half, unless its lower half is
// below 2^32 mod n.
TEST(ConversionKernel, GivesTheIntegersOfMultiplyAndShift) {
    expect_integers<std::int32_t>(0, 999);
    expect_integers<std::int32_t>(-7, -2);
    expect_integers<std::int32_t>(-2147483647, 2147483647);
    expect_integers<std::uint32_t>(0, 0xFFFFu); // a power of two: no rejection
    expect_integers<std::uint32_t>(5, 0xC0000000u);
    expect_integers<std::int64_t>(0, 999);
    expect_integers<std::int64_t>(-1, 1000000);
    expect_integers<std::uint64_t>(1ULL << 60, (1ULL << 60) + 0xFFFFFFFEu - 1);
    expect_integers<std::uint64_t>(3, 3);
}

#endif

// Whatever kernel was chosen, and also where there is none.
TEST(Braid, DrawsIntoSpansWhatItDrawsOneByOne) {
    for (unsigned before = 0; before < 17; ++before) {
        for (const std::size_t length : {0U, 1U, 15U, 16U, 17U, 512U, 515U, 1100U}) {
            leat::xoshiro256_braid one_by_one{8};
            leat::xoshiro256_braid at_once{8};
            for (unsigned i = 0; i < before; ++i) {
                one_by_one();
                at_once();
            }
            std::vector<std::uint64_t> words(length);
            at_once.draw_into(words);
            for (const std::uint64_t word : words) {
                ASSERT_EQ(word, one_by_one());
            }
            ASSERT_EQ(at_once, one_by_one);
            ASSERT_EQ(at_once(), one_by_one());
        }
    }
}

} // namespace
