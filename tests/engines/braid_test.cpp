// xoshiro256_braid: the specification is its header, in terms of xoshiro256_plus_plus, whose
// sequence and jumps are checked against published values in xoshiro_test.cpp.

#include "leat/engines/braid.hpp"
#include "support/linear_engines.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <vector>

namespace {

using leat::wide_integer;
using leat::xoshiro256_braid;
using leat::xoshiro256_plus_plus;

const wide_integer lane_distance = wide_integer::power_of_two(252);

// design.md, the engine table: lane k is lane 0 jumped by k * 2^252; drawn in turn.
TEST(braid, draws_from_sixteen_lanes_in_turn) {
    const std::array<std::uint64_t, 4> start{1, 2, 3, 4};
    std::vector<xoshiro256_plus_plus> lanes;
    for (int k = 0; k < 16; ++k) {
        lanes.emplace_back(start);
        leat::jump(lanes.back(), lane_distance * wide_integer{k});
    }
    xoshiro256_braid braid{start};
    for (std::size_t n = 0; n < 1000; ++n) {
        ASSERT_EQ(braid(), lanes[n % 16]()) << n;
    }
}

// The lane polynomial is the 16th root of x: unique, since squaring permutes a field; and it is
// x^(2^252).
TEST(braid, has_the_lane_jump_it_says) {
    const auto& ring = leat::detail::characteristic<leat::detail::xoshiro256_step>;
    auto power = leat::detail::braid_lane_jump;
    for (int i = 0; i < 4; ++i) {
        power = ring.square(power);
    }
    EXPECT_EQ(power, (std::array<std::uint64_t, 4>{2, 0, 0, 0}));
    EXPECT_EQ(ring.power_of_x(lane_distance), leat::detail::braid_lane_jump);
}

// The header: draw n is draw n * 2^252 of xoshiro256++, modulo its period; also far away.
TEST(braid, is_one_sequence_read_in_large_steps) {
    const wide_integer period = xoshiro256_plus_plus::period();
    for (const wide_integer& n :
         {wide_integer{0}, wide_integer{15}, wide_integer{16}, wide_integer{123456789},
          wide_integer::power_of_two(130) + 7, period - 1}) {
        xoshiro256_braid braid{42};
        leat::jump(braid, n);
        xoshiro256_plus_plus single{42};
        leat::jump(single, n * lane_distance % period);
        EXPECT_EQ(braid.state(), single.state());
        EXPECT_EQ(braid(), single());
    }
}

// So a whole period, 2^256 - 1 draws, leads back to the start, and no proper divisor of it does.
// The primes of 2^256 - 1, Fermat's numbers: Euler 1732, Landry 1880, Morrison and Brillhart 1975.
TEST(braid, has_the_period_it_says) {
    const xoshiro256_braid start{42};
    xoshiro256_braid braid = start;
    braid.advance(xoshiro256_braid::period());
    EXPECT_EQ(braid, start);
    EXPECT_EQ(braid(), xoshiro256_braid{42}());
    for (const char* prime : {"3", "5", "17", "257", "641", "65537", "274177", "6700417",
                              "67280421310721", "59649589127497217", "5704689200685129054721"}) {
        const wide_integer p{std::string_view{prime}};
        ASSERT_EQ(xoshiro256_braid::period() % p, wide_integer{}) << prime;
        braid = start;
        braid.advance(xoshiro256_braid::period() / p);
        EXPECT_FALSE(braid == start) << prime;
    }
}

// "In its own units, lanes and phase right": from every lane, short and long, n steps are n draws.
TEST(braid, advances_in_draws) {
    for (unsigned phase = 0; phase < 17; ++phase) {
        xoshiro256_braid drawn{7};
        for (unsigned i = 0; i < phase; ++i) {
            drawn();
        }
        for (const unsigned n : {0u, 1u, 15u, 16u, 17u, 31u, 100u, 8191u, 8192u, 8193u, 20000u}) {
            xoshiro256_braid advanced = drawn;
            advanced.advance(wide_integer{n});
            xoshiro256_braid walked = drawn;
            for (unsigned i = 0; i < n; ++i) {
                walked();
            }
            ASSERT_EQ(advanced, walked) << phase << ' ' << n;
            for (int i = 0; i < 40; ++i) {
                ASSERT_EQ(advanced(), walked()) << phase << ' ' << n << ' ' << i;
            }
        }
    }
}

// The next lane's words are the whole state, whichever lane it was.
TEST(braid, goes_on_from_its_state_at_any_lane) {
    xoshiro256_braid braid{7};
    for (int phase = 0; phase < 33; ++phase) {
        xoshiro256_braid copy = braid;
        xoshiro256_braid again{braid.state()};
        ASSERT_EQ(again, copy);
        for (int i = 0; i < 50; ++i) {
            ASSERT_EQ(again(), copy()) << phase << ' ' << i;
        }
        ASSERT_EQ(again, copy);
        braid();
        ASSERT_FALSE(braid == xoshiro256_braid{7}) << phase;
    }
}

// Promise P6: a fill equals the loop, in values and in the state it leaves, for every length and
// offset about the sixteen.
TEST(braid, fills_as_it_draws) {
    for (unsigned phase = 0; phase < 16; ++phase) {
        for (std::size_t length = 0; length < 70; ++length) {
            xoshiro256_braid filling{3};
            filling.discard(phase);
            xoshiro256_braid drawing = filling;
            std::vector<std::uint64_t> filled(length + 1, 12345);
            filling.draw_into(std::span{filled}.first(length));
            for (std::size_t i = 0; i < length; ++i) {
                ASSERT_EQ(filled[i], drawing()) << phase << ' ' << length << ' ' << i;
            }
            ASSERT_EQ(filled[length], 12345u) << "written past the end";
            ASSERT_EQ(filling, drawing);
            ASSERT_EQ(filling(), drawing());
        }
    }
}

// Seeds make lane 0 as xoshiro256_plus_plus makes its state.
TEST(braid, is_seeded_as_its_first_lane) {
    EXPECT_EQ(xoshiro256_braid{1234567}.state(), xoshiro256_plus_plus{1234567}.state());
    EXPECT_EQ(xoshiro256_braid{}.state(), xoshiro256_plus_plus{}.state());
}

} // namespace
