// steps_between for xorshift32 and xorshift64.

#include "leat/streams/jump.hpp"
#include "leat/streams/steps_xorshift.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <random> // arbitrary states and distances

namespace {

using leat::steps_between;
using leat::wide_integer;

// jumps.json, group discrete-log: PARI/GP's logarithms in finite fields.
TEST(steps_xorshift, gives_the_logarithms_of_the_reference) {
    int checked = 0;
    for (const auto& entry : leat_test::reference_group("jumps", "discrete-log")) {
        const std::string engine = entry["parameters"].value("engine", "");
        const bool narrow = engine.rfind("xorshift32", 0) == 0;
        if (!narrow && engine.rfind("xorshift64", 0) != 0) {
            continue;
        }
        LEAT_TEST_REFERENCE(entry);
        const auto i = leat_test::word(entry["parameters"]["i"]);
        const auto j = leat_test::word(entry["parameters"]["j"]);
        const auto distance = narrow ? steps_between(leat::xorshift32{i}, leat::xorshift32{j})
                                     : steps_between(leat::xorshift64{i}, leat::xorshift64{j});
        ASSERT_TRUE(distance.has_value());
        EXPECT_EQ(*distance, leat_test::wide(entry["expected"]["distance"]));
        ++checked;
    }
    EXPECT_EQ(checked, 5);
}

template <class Engine>
void expect_round_trips(int trials) {
    std::mt19937_64 g{20030704};
    for (int i = 0; i < trials; ++i) {
        const Engine from{g() % Engine::max() + 1};
        const Engine to{g() % Engine::max() + 1};
        const auto distance = steps_between(from, to);
        ASSERT_TRUE(distance.has_value());
        ASSERT_LT(*distance, Engine::period());
        Engine reached = from;
        leat::jump(reached, *distance);
        ASSERT_EQ(reached, to);
        // Back again is the rest of the cycle.
        ASSERT_EQ((*distance + *steps_between(to, from)) % Engine::period(), wide_integer{});
    }
}

TEST(steps_xorshift, leads_from_any_state_to_any_other) {
    expect_round_trips<leat::xorshift32>(50);
    expect_round_trips<leat::xorshift64>(10);
}

TEST(steps_xorshift, counts_draws) {
    const leat::xorshift64 start{88172645463325252};
    leat::xorshift64 e = start;
    for (unsigned n = 0; n < 20; ++n) {
        EXPECT_EQ(steps_between(start, e), wide_integer{n});
        e();
    }
    leat::xorshift64 before = start;
    leat::rewind(before, 1);
    EXPECT_EQ(steps_between(start, before), leat::xorshift64::period() - 1);
    // Multiples of each prime and the neighbours of the table's stride.
    for (const std::uint64_t n : {511u, 512u, 513u, 641u, 65537u, 6700417u, 4294967295u}) {
        e = start;
        e.discard(n);
        EXPECT_EQ(steps_between(start, e), wide_integer{n});
    }
}

} // namespace
