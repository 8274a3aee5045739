// SipHash-2-4-128 over whole words, under the key bytes 00 01 .. 0f.

#include "leat/core/siphash.hpp"

#include <gtest/gtest.h>

#include <array>

namespace {

using leat::detail::siphash;
using leat::detail::word_pair;

// The message that the reference values are of: byte i is 37 i + 11 modulo 256.
constexpr word_pair hash_of_bytes(int words) {
    siphash hash(0x0706050403020100u, 0x0f0e0d0c0b0a0908u);
    unsigned byte = 11;
    for (int i = 0; i < words; ++i) {
        std::uint64_t word = 0;
        for (int j = 0; j < 8; ++j) {
            word |= std::uint64_t{byte & 255u} << (8 * j);
            byte += 37;
        }
        hash.absorb(word);
    }
    return hash.finish();
}

constexpr std::uint64_t reversed(std::uint64_t x) {
    std::uint64_t y = 0;
    for (int i = 0; i < 8; ++i) {
        y |= ((x >> (8 * i)) & 255u) << (56 - 8 * i);
    }
    return y;
}

// Reference: OpenSSL 3.0, `openssl mac -macopt hexkey:000102..0f -macopt size:16 SIPHASH` over the
// same bytes. The first row (empty message) is also the first 128-bit vector of the authors'
// reference code (from memory). Results as bytes in order, that is, halves reversed.
struct row {
    int words;
    std::uint64_t first;
    std::uint64_t second;
};
constexpr std::array<row, 5> reference{{
    {0, 0xa3817f04ba25a8e6u, 0x6df67214c7550293u},
    {1, 0x7fd35084b6c38891u, 0xea2bb57cbf944f7fu},
    {2, 0x20b08df43a2dd298u, 0x24b6d06daa02d96cu},
    {5, 0xcdbee0cd7034a0b2u, 0x23df136f6c4ad428u},
    {40, 0x488706840eeb7419u, 0x38a7ce9fbd6c3fd7u}, // length over 255 bytes
}};

static_assert(hash_of_bytes(0).low == reversed(reference[0].first));

TEST(Siphash, GivesTheReferenceValues) {
    for (const row& r : reference) {
        const word_pair result = hash_of_bytes(r.words);
        EXPECT_EQ(result.low, reversed(r.first)) << r.words;
        EXPECT_EQ(result.high, reversed(r.second)) << r.words;
    }
}

TEST(Siphash, FinishingLeavesTheStateToGoOnFrom) {
    siphash one(0x0706050403020100u, 0x0f0e0d0c0b0a0908u);
    const siphash before = one;
    (void)one.finish();
    EXPECT_EQ(one, before);
}

} // namespace
