// fill_chunks: the result depends on source, sampler and length alone. The addresses of the chunks
// are checked against the specification in streams/path.hpp, through a SipHash of its own tests.

#include "leat/bulk/fill_chunks.hpp"
#include "leat/core/siphash.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/uniform/open_interval.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <atomic>
#include <cstddef>
#include <cstdint>
#include <set>
#include <span>
#include <thread>
#include <vector>

namespace {

constexpr std::size_t several = 5 * leat::chunk_length + 123;
const leat::source study{20261201};

std::vector<double> by_one_thread(std::size_t length) {
    std::vector<double> x(length);
    leat::fill_chunks(x, leat::normal{}, study.branch("array"));
    return x;
}

TEST(FillChunks, CountsTheLastOneToo) {
    static_assert(leat::chunk_length == 4096); // frozen
    static_assert(leat::chunk_count(0) == 0);
    static_assert(leat::chunk_count(1) == 1);
    static_assert(leat::chunk_count(4096) == 1);
    static_assert(leat::chunk_count(4097) == 2);
    static_assert(leat::chunk_count(~std::uint64_t{0}) == std::uint64_t{1} << 52);
}

// The layout of the hash as streams/path.hpp gives it, kind 3, with an index.
TEST(FillChunks, DrawEachChunkFromTheStreamThatTheSpecificationNames) {
    leat::detail::siphash hash(0x0706050403020100u, 0x0f0e0d0c0b0a0908u);
    hash.absorb(0x000000017461656cu); // "leat" 1
    hash.absorb(1);                   // the seed, an integer >= 0
    hash.absorb(20261201);            //
    hash.absorb(3 + 256 * 5);         // a text of five bytes
    hash.absorb(0x0000007961727261u); // "array"
    hash.absorb(3 + 256 * 1);         // a chunk, with an index >= 0
    const auto place = hash.finish(); // the key, the upper half of the counter
    const std::vector<double> x = by_one_thread(several);
    for (std::uint64_t chunk = 0; chunk < leat::chunk_count(several); ++chunk) {
        leat::stream words{leat::stream_address{place.low, place.high + chunk, 0}};
        const std::size_t start = chunk * leat::chunk_length;
        for (std::size_t i = start; i < start + leat::chunk_length && i < several; ++i) {
            ASSERT_EQ(x[i], leat::normal{}(words)) << i;
        }
    }
}

TEST(FillChunks, AreApartFromTheUsersStreams) {
    const leat::stream_address chunk =
        leat::detail::chunk_stream(study.branch("array"), 3).address();
    EXPECT_NE(chunk.key, study.stream("array", 3).address().key);
    EXPECT_NE(chunk.key, study.stream("array").offspring(3).address().key);
    // A trailing integer of the branch is no index: chunks of two branches do not meet.
    EXPECT_NE(leat::detail::chunk_stream(study.branch("array", 1), 3).address().key,
              leat::detail::chunk_stream(study.branch("array", 2), 3).address().key);
}

TEST(FillChunks, DoNotDependOnOrderOrRange) {
    const std::vector<double> expected = by_one_thread(several);
    const std::uint64_t count = leat::chunk_count(several);
    std::vector<double> backwards(several);
    for (std::uint64_t c = count; c-- > 0;) {
        leat::fill_chunks(backwards, leat::normal{}, study.branch("array"), c, c + 1);
    }
    EXPECT_EQ(backwards, expected);
    std::vector<double> in_two(several);
    leat::fill_chunks(in_two, leat::normal{}, study.branch("array"), 2, count);
    leat::fill_chunks(in_two, leat::normal{}, study.branch("array"), 2, 2); // none
    leat::fill_chunks(in_two, leat::normal{}, study.branch("array"), 0, 2);
    EXPECT_EQ(in_two, expected);
    std::vector<double> part(123); // the last chunk, held elsewhere
    leat::fill_chunk(part, leat::normal{}, study.branch("array"), count - 1);
    EXPECT_TRUE(std::equal(part.begin(), part.end(), expected.end() - 123));
}

TEST(FillChunks, OfALongerArrayBeginAlike) {
    const std::vector<double> longer = by_one_thread(several);
    const std::vector<double> shorter = by_one_thread(leat::chunk_length + 7);
    EXPECT_TRUE(std::equal(shorter.begin(), shorter.end(), longer.begin()));
}

TEST(FillChunks, DoNotDependOnThreads) {
    constexpr std::size_t length = 40 * leat::chunk_length + 1;
    const std::vector<double> expected = by_one_thread(length);
    for (const unsigned workers : {2U, 3U, 8U}) {
        std::vector<double> x(length);
        std::atomic<std::uint64_t> next{0};
        std::vector<std::thread> pool;
        for (unsigned i = 0; i < workers; ++i) {
            pool.emplace_back([&] {
                for (std::uint64_t c = next++; c < leat::chunk_count(length); c = next++) {
                    leat::fill_chunks(x, leat::normal{}, study.branch("array"), c, c + 1);
                }
            });
        }
        for (std::thread& worker : pool) {
            worker.join();
        }
        EXPECT_EQ(x, expected) << workers;
    }
}

TEST(FillChunks, ShareNoNumber) {
    std::vector<std::uint64_t> words(leat::chunk_length);
    std::set<std::uint64_t> seen; // 2^16 of 2^64: two alike by chance have a probability of 2^-33
    const auto word = [](auto& g) { return leat::word64(g); };
    for (std::uint64_t c = 0; c < 16; ++c) {
        leat::fill_chunk(words, word, study.branch("array"), c);
        seen.insert(words.begin(), words.end());
    }
    EXPECT_EQ(seen.size(), 16 * leat::chunk_length);
}

TEST(FillChunks, RefuseWhatIsNoChunk) {
    std::vector<double> x(several);
    const auto fill = [&x](std::uint64_t first, std::uint64_t last) {
        leat::fill_chunks(x, leat::uniform{}, study, first, last);
    };
    EXPECT_NO_THROW(fill(6, 6));
    EXPECT_THROW(fill(0, 7), leat::invalid_parameter);
    EXPECT_THROW(fill(3, 2), leat::invalid_parameter);
    EXPECT_THROW(leat::fill_chunk(std::span(x).first(4097), leat::uniform{}, study, 0),
                 leat::invalid_parameter);
    EXPECT_EQ(x, std::vector<double>(several)); // nothing was written
}

} // namespace
