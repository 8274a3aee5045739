// jump and rewind: the laws they obey on every engine, and the distances that were computed
// elsewhere.

#include "leat/streams/jump.hpp"

#include "leat/core/errors.hpp"
#include "support/engine_list.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <limits>
#include <string>
#include <vector>

namespace {

/// An engine away from its start, and away from the start of a block.
template <class E>
E used_engine() {
    E e;
    for (int i = 0; i < 11; ++i) {
        e();
    }
    return e;
}

template <class Callable>
void expect_refused(Callable call) {
    try {
        call();
        ADD_FAILURE() << "not refused";
    } catch (const leat::invalid_parameter& refusal) {
        const std::string what = refusal.what();
        EXPECT_EQ(what.rfind("leat::", 0), 0u) << what;
        EXPECT_NE(what.find(" = "), std::string::npos) << what;
        EXPECT_NE(what.find("must"), std::string::npos) << what;
    }
}

template <class E>
class jump_test : public ::testing::Test {};
TYPED_TEST_SUITE(jump_test, leat_test::engines);

// The laws of jumping. Distances: small, beyond a word, beyond every period.
template <class E>
std::vector<leat::wide_integer> sample_distances() {
    using leat::wide_integer;
    return {wide_integer{0},
            wide_integer{1},
            wide_integer{31},
            wide_integer{1000003},
            wide_integer{"12345678901234567890"},
            wide_integer{"3141592653589793238462643383279"},
            wide_integer::power_of_two(64),
            wide_integer::power_of_two(300) + wide_integer{17},
            E::period() - wide_integer{1}};
}

TYPED_TEST(jump_test, jumps_add_up_and_come_back) {
    using E = TypeParam;
    if constexpr (leat::detail::jumpable<E>) {
        const E start = used_engine<E>();
        for (const leat::wide_integer& a : sample_distances<E>()) {
            E e = start;
            EXPECT_EQ(&leat::rewind(leat::jump(e, a), a), &e); // in place, by reference
            EXPECT_TRUE(e == start);
            leat::jump(leat::rewind(e, a), a);
            EXPECT_TRUE(e == start);
            for (const leat::wide_integer& b : sample_distances<E>()) {
                E twice = start;
                leat::jump(leat::jump(twice, a), b);
                E once = start;
                leat::jump(once, a + b);
                ASSERT_TRUE(twice == once);
                ASSERT_EQ(twice(), once());
            }
        }
    }
}

TYPED_TEST(jump_test, jumps_by_the_period_change_nothing) {
    using E = TypeParam;
    if constexpr (leat::detail::jumpable<E>) {
        const E start = used_engine<E>();
        E e = start;
        e.advance(E::period()); // the algebra itself, unreduced
        EXPECT_TRUE(e == start);
        leat::jump(e, E::period());
        EXPECT_TRUE(e == start);
        leat::jump(e, E::period() * leat::wide_integer{1000003} + leat::wide_integer{5});
        E five = start;
        five.discard(5);
        EXPECT_TRUE(e == five);
        // One less is the step back; no smaller power-of-two part of it is a period.
        e = start;
        leat::jump(e, E::period() - leat::wide_integer{1});
        EXPECT_FALSE(e == start);
        e();
        EXPECT_TRUE(e == start);
        if (E::period() % leat::wide_integer{2} == leat::wide_integer{0}) {
            leat::jump(e, E::period() / leat::wide_integer{2});
            EXPECT_FALSE(e == start);
        }
    }
}

TYPED_TEST(jump_test, jumps_as_it_draws) {
    using E = TypeParam;
    if constexpr (leat::detail::jumpable<E>) {
        E drawn = used_engine<E>();
        const E start = drawn;
        for (int n = 0; n <= 100000; ++n) {
            if (n <= 70 || n % 9973 == 0 || n == 100000) {
                E jumped = start;
                leat::jump(jumped, n);
                ASSERT_TRUE(jumped == drawn) << n;
                leat::rewind(jumped, n);
                ASSERT_TRUE(jumped == start) << n;
            }
            drawn();
        }
    }
}

TYPED_TEST(jump_test, takes_distances_in_every_form) {
    using E = TypeParam;
    if constexpr (leat::detail::jumpable<E>) {
        const E start;
        E expected = start;
        leat::jump(expected, leat::wide_integer{"18446744073709551616"});
        E e = start;
        leat::jump(e, leat::pow2(64));
        EXPECT_TRUE(e == expected);
        e = start;
        leat::jump(e, "18446744073709551616");
        EXPECT_TRUE(e == expected);
        e = start;
        leat::jump(e, std::numeric_limits<std::uint64_t>::max());
        leat::jump(e, static_cast<signed char>(1));
        EXPECT_TRUE(e == expected);
        // 2^k where no wide integer holds it, by plain squares and doublings modulo the period.
        const leat::wide_integer period = E::period();
        for (const std::uint64_t k : {63ull, 1024ull, 2047ull, 18446744073709551615ull}) {
            leat::wide_integer power{1};
            for (int i = 63; i >= 0; --i) {
                power = power * power % period;
                if ((k >> i & 1u) != 0) {
                    power = (power << 1) % period;
                }
            }
            expected = start;
            leat::jump(expected, power);
            e = start;
            leat::jump(e, leat::pow2(k));
            EXPECT_TRUE(e == expected) << k;
            leat::rewind(e, leat::pow2(k));
            EXPECT_TRUE(e == start) << k;
        }

        e = start;
        expect_refused([&e] { leat::jump(e, -1); });
        expect_refused([&e] { leat::rewind(e, -5LL); });
        EXPECT_THROW(leat::jump(e, "12x"), leat::malformed_text);
        EXPECT_THROW(leat::jump(e, ""), leat::malformed_text);
        EXPECT_THROW(leat::rewind(e, "-1"), leat::malformed_text);
        EXPECT_TRUE(e == start);
        try {
            leat::jump(e, -1);
        } catch (const leat::error& refusal) {
            EXPECT_STREQ(refusal.what(), "leat::jump: distance = -1, must not be negative");
        }
    }
}

// The engine's words after a jump, against every entry of a family of jumps.json. `begin` makes the
// engine from the entry's parameters, `check` compares the engine with its expected values.
template <class Begin, class Check>
void expect_jumps(const char* family, Begin begin, Check check) {
    for (const auto& entry : leat_test::reference_family(family)) {
        LEAT_TEST_REFERENCE(entry);
        const auto& n = entry["parameters"]["n"];
        auto e = begin(entry["parameters"]);
        const auto start = e;
        if (n.get<std::string>()[0] == '-') {
            leat::rewind(e, n.get<std::string>().substr(1));
            check(e, entry["expected"]);
            leat::jump(e, n.get<std::string>().substr(1));
        } else {
            leat::jump(e, leat_test::wide(n));
            check(e, entry["expected"]);
            leat::rewind(e, leat_test::wide(n));
        }
        EXPECT_TRUE(e == start);
    }
}

template <class E>
void expect_lehmer_jumps(const char* family) {
    expect_jumps(
        family, [](const auto& given) { return E{leat_test::word(given["state"])}; },
        [](const E& e, const auto& expected) {
            EXPECT_EQ(e.state(), leat_test::word(expected["state"]));
        });
}

// Source: the entries lehmer*.* of jumps.json.
TEST(jump, reaches_the_reference_states_of_lehmer_engines) {
    expect_lehmer_jumps<leat::minimal_standard>("jumps.lehmer16807.");
    expect_lehmer_jumps<leat::minimal_standard_48271>("jumps.lehmer48271.");
    expect_lehmer_jumps<leat::minimal_standard_69621>("jumps.lehmer69621.");
}

// Source: the entries mcg128.* of jumps.json.
TEST(jump, reaches_the_reference_states_of_lehmer128) {
    expect_jumps(
        "jumps.mcg128.",
        [](const auto& given) {
            const leat::wide_integer state = leat_test::wide(given["state"]);
            return leat::lehmer128{{state.word(0), state.word(1)}};
        },
        [](const leat::lehmer128& e, const auto& expected) {
            EXPECT_TRUE(leat::wide_integer{e.state()} == leat_test::wide(expected["state"]));
            EXPECT_EQ(e.state()[1], leat_test::word(expected["high64"]));
        });
}

// Source: the entries splitmix64.* of jumps.json.
TEST(jump, reaches_the_reference_draws_of_splitmix64) {
    expect_jumps(
        "jumps.splitmix64.",
        [](const auto& given) { return leat::splitmix64{leat_test::word(given["seed"])}; },
        [](leat::splitmix64 e, const auto& expected) {
            EXPECT_EQ(e.state(), leat_test::word(expected["state"]));
            EXPECT_EQ(leat_test::draws(e, 3), leat_test::words(expected["next3"]));
        });
}

template <class E>
void expect_philox_jumps(const char* family) {
    using word = typename E::result_type;
    expect_jumps(
        family,
        [](const auto& given) {
            const auto key = leat_test::words(given["key"]);
            return E{{static_cast<word>(key[0]), static_cast<word>(key[1])}, {}};
        },
        [](E e, const auto& expected) {
            const auto counter = leat_test::words(expected["block_counter"]);
            for (std::size_t i = 0; i < 4; ++i) {
                EXPECT_EQ(e.counter()[i], counter[i]) << i;
            }
            EXPECT_EQ(e.place(),
                      std::stoi(expected["position_in_block"].template get<std::string>()));
            EXPECT_EQ(leat_test::draws(e, 5), leat_test::words(expected["next5"]));
        });
}

// Source: the entries philox4x32.* and philox4x64.* of jumps.json.
TEST(jump, reaches_the_reference_draws_of_philox) {
    expect_philox_jumps<leat::philox4x32>("jumps.philox4x32.");
    expect_philox_jumps<leat::philox4x64>("jumps.philox4x64.");
}

// From a transient state the period does not hold yet: a jump walks to the cycle first, and nothing
// leads back. Every 64th transient state of an 8-bit analogue; source: the steps themselves.
TEST(jump, walks_out_of_transient_states) {
    using small = leat::multiply_with_carry<std::uint8_t, 7, 5>;
    const auto period = static_cast<std::uint64_t>(small::period());
    int transient = 0;
    for (unsigned state = 1; state < 65536 * 12 - 1; ++state) {
        const small start{{static_cast<std::uint8_t>(state), static_cast<std::uint8_t>(state >> 8)},
                          static_cast<std::uint8_t>(state >> 16)};
        if (start.is_recurrent()) {
            continue;
        }
        if (++transient % 64 != 0) {
            continue;
        }
        small drawn = start;
        for (int n = 0; n < 6; ++n) {
            small jumped = start;
            leat::jump(jumped, n);
            ASSERT_TRUE(jumped == drawn) << state << ' ' << n;
            drawn();
        }
        // Once on the cycle, the period changes nothing: neither given, nor within a power of two.
        small once = start;
        once.discard(5);
        small around = start;
        leat::jump(around, period + 5);
        ASSERT_TRUE(around == once) << state;
        small far = start;
        leat::jump(leat::jump(far, leat::pow2(1100)), 5);
        leat::jump(once, leat::pow2(1100));
        ASSERT_TRUE(far == once) << state;
        ASSERT_THROW(leat::rewind(far = start, 1), leat::invalid_parameter);
        ASSERT_TRUE(far == start);
    }
    EXPECT_GT(transient, 64000);
}

// Lehmer engines and counters jump in constant evaluation.
constexpr bool jumps_at_compile_time() {
    leat::minimal_standard a{1};
    leat::jump(a, 9999); // x_10000 = 1043618065: Park and Miller, CACM 31(10), 1988
    const bool park_miller = a() == 1043618065;
    leat::lehmer128 b;
    leat::rewind(leat::jump(b, "123456789012345678901234567890"), leat::pow2(77));
    leat::jump(b, leat::pow2(77));
    leat::lehmer128 c;
    leat::jump(c, leat::wide_integer{"123456789012345678901234567890"});
    leat::philox4x64 d;
    leat::rewind(leat::jump(d, leat::pow2(257)), leat::pow2(257));
    return park_miller && b == c && d == leat::philox4x64{};
}
static_assert(jumps_at_compile_time());

} // namespace
