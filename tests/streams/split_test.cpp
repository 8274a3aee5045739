// block, leapfrog and limited: the pieces are the engine's own draws, disjoint, and end where they
// say.

#include "leat/streams/split.hpp"

#include "leat/core/concepts.hpp"
#include "leat/engines/counter.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/xoshiro.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <string>
#include <vector>

namespace {

using leat::wide_integer;

/// The message of what a call throws, which must be an Error.
template <class Error, class Callable>
std::string refusal(Callable call) {
    try {
        static_cast<void>(call());
    } catch (const Error& e) {
        return e.what();
    }
    return "accepted";
}

static_assert(leat::random_words<leat::limited<leat::minimal_standard>>);
static_assert(leat::random_words<decltype(leat::leapfrog(leat::philox4x32{}, 0, 1))>);

// Block i of length L holds draws i L to (i + 1) L - 1.
template <class E>
void expect_blocks(const E& engine) {
    constexpr int length = 37;
    E all = engine;
    for (int i = 0; i < 20; ++i) {
        auto piece = leat::block(engine, i, length);
        EXPECT_TRUE(piece.position() == 0);
        for (int k = 0; k < length; ++k) {
            EXPECT_TRUE(piece.remaining() == length - k);
            ASSERT_EQ(piece(), all()) << i << ' ' << k;
            EXPECT_TRUE(piece.position() == k + 1);
        }
        EXPECT_THROW(piece(), leat::stream_exhausted);
        EXPECT_TRUE(piece.engine() == all); // the refused draw was not made
    }
}
TEST(block, holds_the_engines_own_draws) {
    expect_blocks(leat::minimal_standard{20261201});
    expect_blocks(leat::lehmer128{5});
    expect_blocks(leat::splitmix64{5});
    expect_blocks(leat::philox4x32{5});
    expect_blocks(leat::xoshiro256_plus_plus{5});
}

TEST(block, takes_lengths_in_every_form) {
    const leat::philox4x64 engine{7};
    auto a = leat::block(engine, 3, leat::pow2(200));
    auto b = leat::block(engine, wide_integer{3}, wide_integer::power_of_two(200));
    auto c = leat::block(engine, "6", wide_integer::power_of_two(199));
    EXPECT_TRUE(a == b);
    EXPECT_EQ(a(), c());
    leat::philox4x64 far = engine;
    leat::jump(far, wide_integer::power_of_two(200) * 3);
    EXPECT_EQ(b(), far());
    EXPECT_TRUE(a.remaining() == wide_integer::power_of_two(200) - 1);
}

// The last block within the period is given, the next is refused; 2^31 - 2 = 2 * 3 * 357913941.
TEST(block, ends_within_the_period) {
    const leat::minimal_standard engine;
    auto last = leat::block(engine, 5, 357913941);
    leat::minimal_standard end;
    leat::rewind(end, 1);
    last.discard(357913940);
    leat::minimal_standard final_draw = end;
    EXPECT_EQ(last(), final_draw());
    EXPECT_TRUE(last.engine() == engine); // come round exactly

    using leat::invalid_parameter;
    EXPECT_EQ(
        refusal<invalid_parameter>([&] { return leat::block(engine, 6, 357913941); }),
        "leat::block: i = 6, must be so small that the block ends within the engine's period");
    EXPECT_EQ(
        refusal<invalid_parameter>([&] { return leat::block(engine, 1, 2147483646); }),
        "leat::block: i = 1, must be so small that the block ends within the engine's period");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, 0, 2147483647); }),
              "leat::block: length = 2147483647, must be 1 to the engine's period");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, 0, 0); }),
              "leat::block: length = 0, must be 1 to the engine's period");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, -1, 10); }),
              "leat::block: i = -1, must not be negative");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, 1, -10LL); }),
              "leat::block: length = -10, must not be negative");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, 0, leat::pow2(5000)); }),
              "leat::block: length = 2^5000, must be 1 to the engine's period");
    EXPECT_EQ(refusal<invalid_parameter>(
                  [&] { return leat::block(engine, "123456789012345678901234567890", 1); }),
              "leat::block: i = 123456789012345678901234567890, must be so small that the block "
              "ends within the engine's period");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, leat::pow2(5000), 1); }),
              "leat::block: i = 2^5000, must be so small that the block ends within the engine's "
              "period");
    EXPECT_EQ(refusal<invalid_parameter>([&] { return leat::block(engine, 0, 2147483646); }),
              "accepted"); // all of it
}

TEST(limited, names_its_length_when_it_is_exhausted) {
    auto piece = leat::block(leat::splitmix64{}, 1, 2);
    piece();
    piece();
    EXPECT_EQ(refusal<leat::stream_exhausted>([&] { return piece(); }),
              "leat::limited: length = 2, a draw past the end was asked for");
    EXPECT_TRUE(piece.position() == 2);
    EXPECT_TRUE(piece.remaining() == 0);
}

// discard: as draws; one too many is refused and changes nothing, also beyond 2^64 draws.
TEST(limited, discards_up_to_its_end) {
    auto piece = leat::block(leat::philox4x32{1}, 2, 100);
    auto drawn = piece;
    piece.discard(40);
    for (int i = 0; i < 40; ++i) {
        drawn();
    }
    EXPECT_TRUE(piece == drawn);
    EXPECT_THROW(piece.discard(61), leat::stream_exhausted);
    EXPECT_TRUE(piece == drawn);
    piece.discard(60);
    EXPECT_TRUE(piece.remaining() == 0);
    EXPECT_THROW(piece(), leat::stream_exhausted);

    const wide_integer length{"36893488147419103240"}; // 2^65 + 8
    auto large = leat::block(leat::philox4x32{1}, 0, length);
    constexpr unsigned long long most = ~0ull;
    large.discard(most);
    large.discard(most);
    EXPECT_TRUE(large.remaining() == 10);
    EXPECT_TRUE(large.position() == length - 10);
    EXPECT_THROW(large.discard(11), leat::stream_exhausted);
    leat::philox4x32 plain{1};
    leat::jump(plain, length - 10);
    for (int i = 0; i < 10; ++i) {
        ASSERT_EQ(large(), plain());
    }
    EXPECT_THROW(large(), leat::stream_exhausted);

    // Drawn, not skipped, over the edge of 2^64 - 1.
    auto edge = leat::block(leat::philox4x32{1}, 0, leat::pow2(64));
    edge.discard(most - 1);
    edge();
    EXPECT_TRUE(edge.remaining() == 1);
    edge();
    EXPECT_THROW(edge(), leat::stream_exhausted);
    EXPECT_TRUE(edge.position() == wide_integer::power_of_two(64));
}

// Leap i of n holds draws i, i + n, i + 2n, ...
template <class E>
void expect_leaps(const E& engine) {
    for (const int n : {1, 2, 3, 4, 5, 7, 64}) {
        for (int i = 0; i < n; ++i) {
            auto leap = leat::leapfrog(engine, i, n);
            E all = engine;
            all.discard(static_cast<unsigned long long>(i));
            for (int k = 0; k < 50; ++k) {
                ASSERT_EQ(leap(), all()) << i << ' ' << n << ' ' << k;
                all.discard(static_cast<unsigned long long>(n - 1));
            }
        }
    }
}
TEST(leapfrog, holds_every_nth_draw) {
    expect_leaps(leat::minimal_standard{20261201});
    expect_leaps(leat::lehmer<std::uint64_t, 37, 2305843009213693951u>{3});
    expect_leaps(leat::lehmer128{5});
    expect_leaps(leat::splitmix64{5});
    expect_leaps(leat::philox4x32{5});
    leat::philox4x64 inside_a_block{5};
    inside_a_block.discard(3);
    expect_leaps(inside_a_block);
}

// A small engine whole: together the leaps deal out the period, each draw once, whether or not n
// divides it, and each leap ends there.
TEST(leapfrog, deals_out_the_period_once) {
    using small = leat::lehmer<std::uint32_t, 3, 257>; // 3 is a primitive root: period 256
    ASSERT_TRUE(small::period() == 256);
    for (const int n : {1, 2, 3, 5, 6, 16, 100, 255, 256, 257, 300}) {
        std::vector<int> seen(257, 0);
        for (int i = 0; i < n && i < 256; ++i) {
            auto leap = leat::leapfrog(small{}, i, n);
            while (leap.remaining() != 0) {
                ++seen[leap()];
            }
            EXPECT_THROW(leap(), leat::stream_exhausted);
        }
        EXPECT_EQ(seen[0], 0);
        for (std::size_t x = 1; x < seen.size(); ++x) {
            ASSERT_EQ(seen[x], 1) << n << ' ' << x;
        }
    }
}

TEST(leapfrog, knows_its_end) {
    EXPECT_TRUE(leat::leapfrog(leat::minimal_standard{}, 0, 2).remaining() == 1073741823);
    EXPECT_TRUE(leat::leapfrog(leat::minimal_standard{}, 1, 2).remaining() == 1073741823);
    EXPECT_TRUE(leat::leapfrog(leat::minimal_standard{}, 1, 4).remaining() == 536870912);
    EXPECT_TRUE(leat::leapfrog(leat::minimal_standard{}, 2, 4).remaining() == 536870911);
    EXPECT_TRUE(leat::leapfrog(leat::splitmix64{}, 0, 1).remaining() ==
                wide_integer::power_of_two(64));
    EXPECT_TRUE(leat::leapfrog(leat::philox4x64{}, 7, 8).remaining() ==
                wide_integer::power_of_two(255));
}

TEST(leapfrog, refuses_what_it_must) {
    const leat::minimal_standard engine;
    using leat::invalid_parameter;
    const auto message = [&engine](auto i, auto n) {
        return refusal<invalid_parameter>([&] { return leat::leapfrog(engine, i, n); });
    };
    EXPECT_EQ(message(4, 4), "leat::leapfrog: i = 4, must be below n");
    EXPECT_EQ(message(5u, 4), "leat::leapfrog: i = 5, must be below n");
    EXPECT_EQ(message(-1, 4), "leat::leapfrog: i = -1, must not be negative");
    EXPECT_EQ(message(0, -4), "leat::leapfrog: n = -4, must not be negative");
    EXPECT_EQ(message(0, 0), "leat::leapfrog: n = 0, must be at least 1");
    EXPECT_EQ(message(2147483646u, 4294967295u),
              "leat::leapfrog: i = 2147483646, must be below the engine's period");
    EXPECT_EQ(message(2147483645u, 4294967295u), "accepted");
}

// Pieces of constant evaluation.
constexpr bool splits_at_compile_time() {
    auto piece = leat::block(leat::minimal_standard{}, 9999, 1);
    auto leap = leat::leapfrog(leat::minimal_standard{}, 9999, 10000);
    // x_10000 = 1043618065: Park and Miller, CACM 31(10), 1988.
    return piece() == 1043618065 && leap() == 1043618065;
}
static_assert(splits_at_compile_time());

} // namespace
