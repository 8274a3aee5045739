// Streams of neighbouring addresses are as good as independent: what a large study leans on.
// The bounds are plain probability of uniform words (common practice), no published figures.

#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"
#include "support/statistics.hpp"

#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <bit>
#include <cstdint>
#include <string>
#include <vector>

namespace {

using namespace leat_test;

constexpr std::uint64_t seeds = 65536;

/// The first words of the same stream under seeds 0, 1, ..., 65535; at a seed offset, the next
/// 65536 seeds or those after them.
std::vector<std::uint64_t> first_words() {
    std::vector<std::uint64_t> words;
    for (std::uint64_t seed = 0; seed < seeds; ++seed) {
        words.push_back(leat::source{seed_offset() * seeds + seed}.thin_stream("first")());
    }
    return words;
}

std::uint64_t repeats(std::vector<std::uint64_t> words) {
    std::sort(words.begin(), words.end());
    std::uint64_t count = 0;
    for (std::size_t i = 1; i < words.size(); ++i) {
        count += words[i] == words[i - 1] ? 1u : 0u;
    }
    return count;
}

// Of 2^16 uniform words two agree with a probability of 2^31 / 2^64, or 1.2e-10: two checks' worth
// of the budget.
TEST(StreamStatistics, FirstWordsOfSeedsAreDistinct) { EXPECT_EQ(repeats(first_words()), 0u); }

TEST(StreamStatistics, FirstWordsOfSeedsAreBalanced) {
    const auto words = first_words();
    for (int bit = 0; bit < 64; ++bit) {
        std::uint64_t ones = 0;
        for (const auto word : words) {
            ones += (word >> bit) & 1u;
        }
        check(count_test("bit " + std::to_string(bit), ones, seeds, 0.5));
    }
    std::vector<std::uint64_t> cells(256, 0);
    for (const auto word : words) {
        ++cells[word >> 56];
    }
    check(chi_square_test("top bytes", cells));
}

// Neighbouring seeds s and s ^ d, d a power of two: every bit of the two first words agrees half of
// the time, and so do all bits taken together (the strict avalanche criterion, common practice).
TEST(StreamStatistics, FirstWordsOfNeighbouringSeedsAreUncorrelated) {
    const auto words = first_words();
    for (std::uint64_t d = 1; d < seeds; d *= 2) {
        std::uint64_t flips = 0;
        for (std::uint64_t s = 0; s < seeds; ++s) {
            if ((s & d) == 0) {
                flips += static_cast<std::uint64_t>(std::popcount(words[s] ^ words[s ^ d]));
            }
        }
        check(count_test("flipped bits, seeds apart by " + std::to_string(d), flips, 32 * seeds,
                         0.5));
    }
    for (int bit = 0; bit < 64; ++bit) { // consecutive seeds, disjoint pairs
        std::uint64_t flips = 0;
        for (std::uint64_t s = 0; s < seeds; s += 2) {
            flips += ((words[s] ^ words[s + 1]) >> bit) & 1u;
        }
        check(count_test("flips of bit " + std::to_string(bit), flips, seeds / 2, 0.5));
    }
}

// Correlation of the words as numbers: for independent uniforms on (-1/2, 1/2) the product of
// neighbours has mean 0 and variance 1/144; products of disjoint pairs are independent.
TEST(StreamStatistics, NeighbouringStreamsAreUncorrelated) {
    const auto centred = [](std::uint64_t word) {
        return static_cast<double>(word >> 11) * 0x1p-53 - 0.5;
    };
    const leat::source study = source_of_this_test();
    constexpr int length = 1000;
    double by_index = 0;
    double by_seed = 0;
    double by_branch = 0;
    double along = 0;
    constexpr int pairs = 500;
    for (std::uint64_t i = 0; i < pairs; ++i) {
        auto a = study.stream("index", 2 * i);
        auto b = study.stream("index", 2 * i + 1);
        const std::uint64_t pair = seed_offset() * pairs + i;
        auto c = leat::source{2 * pair}.stream("seed");
        auto d = leat::source{2 * pair + 1}.stream("seed");
        auto e = study.branch(2 * i).stream("branch");
        auto f = study.branch(2 * i + 1).stream("branch");
        auto g = study.stream("along", i);
        for (int k = 0; k < length; ++k) {
            by_index += centred(a()) * centred(b());
            by_seed += centred(c()) * centred(d());
            by_branch += centred(e()) * centred(f());
            const double first = centred(g());
            along += first * centred(g());
        }
    }
    const known_moments product{0, 1.0 / 144};
    constexpr double n = 1.0 * pairs * length;
    check(mean_test("streams next to each other by index", by_index, n, product));
    check(mean_test("by seed", by_seed, n, product));
    check(mean_test("by branch", by_branch, n, product));
    check(mean_test("words next to each other in one stream", along, n, product));
}

// Siblings share no block, provably, but words of different blocks may agree by chance: of 10^6
// uniform words two agree with a probability of 10^12 / 2^65, about 3e-8. This is no p-value below
// the level, so it has 271 checks' worth of budget.
TEST(StreamStatistics, SiblingsShareNoWord) {
    const leat::source study = source_of_this_test();
    std::vector<std::uint64_t> words;
    words.reserve(1000000);
    for (int sibling = 0; sibling < 1000; ++sibling) {
        auto g = study.stream("sibling", sibling);
        for (int k = 0; k < 1000; ++k) {
            words.push_back(g());
        }
    }
    EXPECT_EQ(repeats(words), 0u);
}

// The same test sees a fault: streams that are blocks of one sequence, cut too short.
TEST(StreamStatistics, OverlappingBlocksAreSeen) {
    std::vector<std::uint64_t> words;
    for (std::uint64_t block = 0; block < 10; ++block) {
        auto g = source_of_this_test().stream();
        g.seek(block * 999);
        for (int k = 0; k < 1000; ++k) {
            words.push_back(g());
        }
    }
    EXPECT_EQ(repeats(words), 9u);
}

} // namespace
