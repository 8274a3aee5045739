// Promise P6: a fill gives the values of the loop, and leaves the engine in its state.
//
// Checked for one sampler from five kinds of engine: leat::stream and xoshiro256_braid (their words
// come by blocks), xoshiro256_plus_plus (64 bits, one by one), minimal_standard (31 bits, odd
// range) and a six-sided die. Lengths lie around the edges of all blocks: 16 lanes, 32 words of a
// stream's buffer, 512 of a fill's. Offsets move them against each other.

#ifndef LEAT_TESTS_BULK_FILL_EQUALS_LOOP_HPP
#define LEAT_TESTS_BULK_FILL_EQUALS_LOOP_HPP

#include "leat/bulk/fill.hpp"
#include "leat/engines/braid.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"
#include "support/sanitized.hpp"

#include <gtest/gtest.h>

#include <array>
#include <bit>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <span>
#include <type_traits>
#include <vector>

namespace leat_test {

/// 1 to 6: a range that no power of two divides.
class die {
public:
    using result_type = std::uint32_t;
    static constexpr result_type min() { return 1; }
    static constexpr result_type max() { return 6; }
    constexpr result_type operator()() { return static_cast<result_type>(rolls_() % 6) + 1; }
    friend constexpr bool operator==(const die&, const die&) = default;

private:
    leat::xoshiro256_plus_plus rolls_{11};
};

/// Equal to the last bit.
template <class T>
bool same(const T& a, const T& b) {
    if constexpr (std::same_as<T, double>) {
        return std::bit_cast<std::uint64_t>(a) == std::bit_cast<std::uint64_t>(b);
    } else if constexpr (std::same_as<T, float>) {
        return std::bit_cast<std::uint32_t>(a) == std::bit_cast<std::uint32_t>(b);
    } else if constexpr (requires { a.begin(); }) {
        bool equal = a.size() == b.size();
        for (std::size_t i = 0; equal && i < a.size(); ++i) {
            equal = same(a[i], b[i]);
        }
        return equal;
    } else {
        return a == b;
    }
}

inline bool same_state(leat::stream& a, leat::stream& b) {
    const bool same_place = a.address() == b.address() && a.limit() == b.limit();
    const std::uint64_t next = a();
    return same_place && next == b(); // also what is buffered
}
template <class G>
bool same_state(G& a, G& b) {
    return a == b && a() == b();
}

inline constexpr std::array<std::size_t, 19> fill_lengths{
    0, 1, 2, 3, 15, 16, 17, 31, 32, 33, 63, 64, 65, 127, 128, 129, 511, 512, 513};
inline constexpr std::array<std::size_t, 2> long_fill_lengths{1000, 4097};
inline constexpr std::array<unsigned, 4> fill_offsets{0, 1, 13, 30}; // words drawn before

/// `open()` gives the engine, always at the same place.
template <class Sampler, class Open>
void expect_fill_equals_loop(const Sampler& sampler, Open open) {
    auto probe = open();
    using value = std::remove_cvref_t<decltype(sampler(probe))>;
    const auto check = [&](std::size_t length, unsigned offset) {
        auto one_by_one = open();
        auto filled = open();
        for (unsigned i = 0; i < offset; ++i) {
            one_by_one();
            filled();
        }
        std::vector<value> got(length);
        leat::fill(std::span(got), sampler, filled);
        for (std::size_t i = 0; i < length; ++i) {
            ASSERT_TRUE(same(got[i], sampler(one_by_one)))
                << "element " << i << " of " << length << ", offset " << offset;
        }
        ASSERT_TRUE(same_state(filled, one_by_one)) << length << ", offset " << offset;
    };
    for (const unsigned offset : fill_offsets) {
        for (const std::size_t length : fill_lengths) {
            ASSERT_NO_FATAL_FAILURE(check(length, offset));
        }
        for (const std::size_t length : long_fill_lengths) {
            ASSERT_NO_FATAL_FAILURE(check(length, offset));
        }
    }
}

/// All of the above, for one sampler of support/sampler_list.hpp.
struct expect_every_fill_equals_loop {
    template <class Sampler>
    void operator()(const char* name, const Sampler& sampler) const {
        SCOPED_TRACE(name);
        {
            SCOPED_TRACE("stream");
            expect_fill_equals_loop(sampler, [] { return leat::source{5}.stream("fill"); });
        }
        {
            SCOPED_TRACE("braid");
            const leat::xoshiro256_braid braid{6}; // opening one takes microseconds
            expect_fill_equals_loop(sampler, [&braid] { return braid; });
        }
        {
            SCOPED_TRACE("minimal_standard");
            expect_fill_equals_loop(sampler, [] { return leat::minimal_standard{8}; });
        }
        if constexpr (!sanitized) { // as with minimal_standard: a copy of the engine
            SCOPED_TRACE("xoshiro256_plus_plus");
            expect_fill_equals_loop(sampler, [] { return leat::xoshiro256_plus_plus{7}; });
        }
        if constexpr (!sanitized) {
            SCOPED_TRACE("die");
            expect_fill_equals_loop(sampler, [] { return die{}; });
        }
    }
};

} // namespace leat_test

#endif
