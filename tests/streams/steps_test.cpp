// steps_between against distances computed elsewhere, and as the inverse of jump.

#include "leat/streams/steps.hpp"

#include "leat/streams/jump.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <random> // an outside generator of states
#include <string>

namespace {

using leat_test::wide;
using leat_test::word;

template <class E>
void expect_distances(const char* family) {
    for (const auto& entry : leat_test::reference_family(family)) {
        LEAT_TEST_REFERENCE(entry);
        const E from{word(entry["parameters"]["i"])};
        const E to{word(entry["parameters"]["j"])};
        const auto steps = leat::steps_between(from, to);
        ASSERT_TRUE(steps.has_value());
        EXPECT_TRUE(*steps == wide(entry["expected"]["distance"]));
        E moved = from;
        EXPECT_TRUE(leat::jump(moved, *steps) == to);
    }
}

// Source: the entries dlog16807.*, dlog48271.*, dlog69621.* of jumps.json.
TEST(steps_between, finds_the_reference_logarithms_of_lehmer_engines) {
    expect_distances<leat::minimal_standard>("jumps.dlog16807.");
    expect_distances<leat::minimal_standard_48271>("jumps.dlog48271.");
    expect_distances<leat::minimal_standard_69621>("jumps.dlog69621.");
}

// Source: the entries xorshift32.dist.* and xorshift64.dist.* of jumps.json.
TEST(steps_between, finds_the_reference_distances_of_xorshift) {
    expect_distances<leat::xorshift32>("jumps.xorshift32.dist.");
    expect_distances<leat::xorshift64>("jumps.xorshift64.dist.");
}

leat::lehmer128 lehmer128_at(const leat_test::json& state) {
    const leat::wide_integer x = wide(state);
    return leat::lehmer128{{x.word(0), x.word(1)}};
}

// Source: the entries mcg128dist.* of jumps.json.
TEST(steps_between, finds_the_reference_distances_of_lehmer128) {
    for (const auto& entry : leat_test::reference_family("jumps.mcg128dist.")) {
        LEAT_TEST_REFERENCE(entry);
        const auto steps = leat::steps_between(lehmer128_at(entry["parameters"]["i"]),
                                               lehmer128_at(entry["parameters"]["j"]));
        ASSERT_TRUE(steps.has_value());
        EXPECT_TRUE(*steps == wide(entry["expected"]["distance"]));
        EXPECT_TRUE(leat::lehmer128::period() == wide(entry["expected"]["period"]));
    }
}

int bits_of(const leat_test::json& modulus) { return wide(modulus).bit_width() - 1; }

// Source: the entries lcgdist.* of jumps.json.
TEST(congruential, finds_the_reference_distances) {
    for (const auto& entry : leat_test::reference_family("jumps.lcgdist.")) {
        LEAT_TEST_REFERENCE(entry);
        const auto& given = entry["parameters"];
        const leat::congruential method{word(given["a"]), word(given["c"]), bits_of(given["m"])};
        EXPECT_EQ(method.steps_between(word(given["i"]), word(given["j"])),
                  word(entry["expected"]["distance"]));
    }
}

// Source: the entries mmix.*, lcg48.* and lcg64b.* of jumps.json.
TEST(congruential, reaches_the_reference_states) {
    for (const auto& entry : leat_test::reference_group("jumps", "lcg")) {
        LEAT_TEST_REFERENCE(entry);
        const auto& given = entry["parameters"];
        const leat::congruential method{word(given["a"]), word(given["c"]), bits_of(given["m"])};
        const std::uint64_t n = wide(given["n"]).word(0); // modulo 2^64
        EXPECT_EQ(method.after(word(given["state"]), n), word(entry["expected"]["state"]));
    }
}

// Source: the group lcg of engines.json, in which each entry shows its states in its own way.
TEST(congruential, steps_as_published) {
    for (const auto& entry : leat_test::reference_group("engines", "lcg")) {
        LEAT_TEST_REFERENCE(entry);
        const auto& given = entry["parameters"];
        const auto& expected = entry["expected"];
        const leat::congruential method{word(given["a"]), word(given["c"]), bits_of(given["m"])};
        const auto follow = [&method](std::uint64_t x, const leat_test::json& list, auto output) {
            for (const auto& value : list) {
                x = method.next(x);
                EXPECT_EQ(std::to_string(output(x)), value.template get<std::string>());
            }
        };
        const auto whole = [](std::uint64_t x) { return x; };
        const auto upper32 = [](std::uint64_t x) {
            return static_cast<std::int32_t>(static_cast<std::uint32_t>(x >> 16));
        };
        const std::string id = entry["id"];
        if (expected.contains("first_from_1")) {
            follow(1, expected["first_from_1"], whole);
            EXPECT_EQ(method.after(1, 10000), word(expected["x10000_from_1"]));
            if (expected.contains("first_from_42")) {
                follow(42, expected["first_from_42"], whole);
            }
        } else if (id == "engines.lcg.randu") {
            follow(1, expected["first"], whole);
            EXPECT_EQ(method.after(1, 10000), word(expected["x10000"]));
        } else if (id == "engines.lcg48.posix") {
            follow(word(given["initial_state"]), expected["states"], whole);
            follow(word(given["initial_state"]), expected["top31"],
                   [](std::uint64_t x) { return x >> 17; });
            follow(word(given["initial_state"]), expected["top32_signed"], upper32);
        } else if (id == "engines.lcg48.java") {
            // Its seeds are scrambled by the multiplier.
            follow((word(given["seed"]) ^ method.multiplier), expected["next32_signed"], upper32);
            follow(12345u ^ method.multiplier, expected["next32_signed_seed_12345"], upper32);
        } else {
            ASSERT_EQ(id, "engines.lcg.cstandard");
            follow(word(given["seed"]), expected["first"],
                   [](std::uint64_t x) { return x / 65536 % 32768; });
        }
    }
}

// Every state of a small full-period method: the distance is the number of steps walked.
TEST(congruential, measures_a_whole_cycle) {
    constexpr leat::congruential small{13, 7, 10};
    std::uint64_t x = 77;
    for (std::uint64_t n = 0; n < 1024; ++n) {
        ASSERT_EQ(small.steps_between(77, x), n);
        ASSERT_EQ(small.after(77, n), x);
        x = small.next(x);
    }
    EXPECT_EQ(x, 77u);
}

// Source: Hull and Dobell 1962, the conditions of full period.
TEST(congruential, refuses_constants_without_full_period) {
    const auto refusal = [](leat::congruential method) -> std::string {
        try {
            static_cast<void>(method.steps_between(1, 2));
        } catch (const leat::invalid_parameter& e) {
            return e.what();
        }
        return "accepted";
    };
    EXPECT_EQ(refusal({7, 1, 32}),
              "leat::congruential: multiplier = 7, must be 1 modulo 4 (full period)");
    EXPECT_EQ(refusal({5, 2, 32}), "leat::congruential: increment = 2, must be odd (full period)");
    EXPECT_EQ(refusal({5, 1, 65}), "leat::congruential: bits = 65, must be 2 to 64");
    EXPECT_EQ(refusal({5, 1, 1}), "leat::congruential: bits = 1, must be 2 to 64");
    EXPECT_EQ(refusal({5, 1, 2}), "accepted");
}

/// jump by random distances and find them again.
template <class E>
void expect_inverse_of_jump(E start) {
    std::mt19937_64 g{20261201};
    for (int i = 0; i < 200; ++i) {
        const leat::wide_integer distance =
            leat::wide_integer{std::array<std::uint64_t, 5>{g(), g(), g(), g(), g()}} % E::period();
        E moved = start;
        leat::jump(moved, distance);
        const auto steps = leat::steps_between(start, moved);
        ASSERT_TRUE(steps.has_value());
        ASSERT_TRUE(*steps == distance);
        start = moved;
    }
    EXPECT_TRUE(*leat::steps_between(start, start) == leat::wide_integer{0});
    E next = start;
    next();
    EXPECT_TRUE(*leat::steps_between(start, next) == leat::wide_integer{1});
    EXPECT_TRUE(*leat::steps_between(next, start) == E::period() - leat::wide_integer{1});
}
TEST(steps_between, undoes_jump) {
    expect_inverse_of_jump(leat::minimal_standard{20261201});
    expect_inverse_of_jump(leat::minimal_standard_48271{3});
    expect_inverse_of_jump(leat::minimal_standard_69621{});
    expect_inverse_of_jump(leat::lehmer128{12345});
    expect_inverse_of_jump(leat::splitmix64{});
    expect_inverse_of_jump(leat::philox4x32{7});
    expect_inverse_of_jump(leat::philox4x64{7});
    expect_inverse_of_jump(leat::xorshift32{});
}

// Where b is not on a's cycle.
TEST(steps_between, is_empty_between_cycles) {
    EXPECT_FALSE(leat::steps_between(leat::philox4x32{1}, leat::philox4x32{2}).has_value());
    EXPECT_FALSE(leat::steps_between(leat::lehmer128{1}, leat::lehmer128{3}).has_value());
    EXPECT_TRUE(leat::steps_between(leat::lehmer128{1}, leat::lehmer128{5}).has_value());
    // 49 = 7^2 is no primitive root, since 2 divides 2^31 - 2: there are two cycles, the squares
    // and the rest. 7 is a primitive root (Park and Miller 1988), thus not a square.
    constexpr std::uint32_t square = 49;
    using halved = leat::lehmer<std::uint32_t, square, 2147483647>;
    EXPECT_TRUE(halved::period() == leat::wide_integer{1073741823});
    EXPECT_FALSE(leat::steps_between(halved{1}, halved{7}).has_value());
    EXPECT_TRUE(*leat::steps_between(halved{1}, halved{49}) == leat::wide_integer{1});
    EXPECT_TRUE(*leat::steps_between(halved{7}, halved{343}) == leat::wide_integer{1});
    using constant = leat::lehmer<std::uint32_t, 1, 2147483647>;
    EXPECT_TRUE(*leat::steps_between(constant{5}, constant{5}) == leat::wide_integer{0});
    EXPECT_FALSE(leat::steps_between(constant{5}, constant{6}).has_value());
}

// Absent where no algebra gives it.
template <class E>
concept measurable = requires(const E& a, const E& b) {
    leat::steps_between(a, b);
};
static_assert(measurable<leat::minimal_standard> && measurable<leat::philox4x32>);
static_assert(!measurable<leat::lehmer<std::uint32_t, 40014, 2147483563>>);
static_assert(!measurable<std::minstd_rand>);

// Usable in constant evaluation. Source: the entry dlog16807.1-2 of jumps.json.
static_assert(*leat::steps_between(leat::minimal_standard{1}, leat::minimal_standard{2}) ==
              leat::wide_integer{1385473320});

} // namespace
