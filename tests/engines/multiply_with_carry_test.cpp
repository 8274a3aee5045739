// Multiply-with-carry: published outputs, jumps and periods (tests/reference, each with its
// source), and small analogues enumerated whole against a plain recurrence written here.

#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/splitmix64.hpp"
#include "leat/streams/jump.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cstdint>
#include <numeric>
#include <sstream>
#include <string>
#include <vector>

namespace {

using leat::wide_integer;
using leat_test::json;
using leat_test::wide;
using leat_test::word;

// The multipliers of the reference files beside those of the aliases.
using mwc_698769069 = leat::multiply_with_carry<std::uint32_t, 698769069>;
using mwc_4294967118 = leat::multiply_with_carry<std::uint32_t, 4294967118>;

template <class E>
E lag_one(const json& x, const json& c) {
    using word_type = typename E::result_type;
    return E{{static_cast<word_type>(word(x))}, static_cast<word_type>(word(c))};
}

leat::mwc_lag4_32 lag_four(const json& oldest_first, const json& carry) {
    std::array<std::uint32_t, 4> words{};
    for (std::size_t i = 0; i < 4; ++i) {
        words[i] = static_cast<std::uint32_t>(word(oldest_first.at(i)));
    }
    return leat::mwc_lag4_32{words, static_cast<std::uint32_t>(word(carry))};
}

/// Calls f with a value of the engine type of a lag-1 entry.
template <class F>
void with_lag_one(const std::string& multiplier, F f) {
    if (multiplier == "698769069") {
        f(mwc_698769069{});
    } else if (multiplier == "4294957665") {
        f(leat::mwc_lag1_32{});
    } else if (multiplier == "4294967118") {
        f(mwc_4294967118{});
    } else if (multiplier == "18446744073709550874") {
        f(leat::mwc_lag1_64{});
    } else {
        ADD_FAILURE() << "no engine for the multiplier " << multiplier;
    }
}

template <class E>
void expect_outputs(E engine, const json& expected) {
    E walker = engine;
    EXPECT_EQ(leat_test::draws(walker, expected.at("first").size()),
              leat_test::words(expected.at("first")));
    EXPECT_EQ(walker.state()[E::lag], word(expected.at("carry_after_10")));
    EXPECT_EQ(leat_test::nth_draw(engine, 10000), word(expected.at("x10000")));
    engine.discard(10000);
    EXPECT_EQ(engine.state()[E::lag - 1], word(expected.at("x10000")));
    EXPECT_EQ(engine.state()[E::lag], word(expected.at("carry_after_10000")));
}

TEST(multiply_with_carry, gives_the_published_outputs) {
    for (const json& entry : leat_test::reference_family("engines.mwc1.")) {
        LEAT_TEST_REFERENCE(entry);
        const json& from = entry.at("parameters");
        with_lag_one(from.at("a"), [&](auto kind) {
            using E = decltype(kind);
            expect_outputs(lag_one<E>(from.at("x"), from.at("c")), entry.at("expected"));
            EXPECT_EQ(E::modulus(), wide(entry.at("expected").at("modulus")));
            EXPECT_EQ(E::period(), wide(entry.at("expected").at("period")));
        });
    }
    const json& entry = leat_test::reference_entry("engines.mwc4.hex");
    LEAT_TEST_REFERENCE(entry);
    expect_outputs(lag_four(entry.at("parameters").at("state_oldest_first"),
                            entry.at("parameters").at("carry")),
                   entry.at("expected"));
}

TEST(multiply_with_carry, has_the_published_period_of_lag_four) {
    const json& entry = leat_test::reference_entry("engines.mwc4.period");
    LEAT_TEST_REFERENCE(entry);
    EXPECT_EQ(leat::mwc_lag4_32::modulus(), wide(entry.at("expected").at("modulus")));
    EXPECT_EQ(leat::mwc_lag4_32::period(), wide(entry.at("expected").at("period")));
}

// Two 16-bit engines side by side, as the note of 1999 joins them.
TEST(multiply_with_carry, gives_the_published_pair_of_16_bit_sequences) {
    const json& entry = leat_test::reference_entry("engines.mwc16pair");
    LEAT_TEST_REFERENCE(entry);
    const std::uint64_t z = word(entry.at("parameters").at("z"));
    const std::uint64_t w = word(entry.at("parameters").at("w"));
    leat::multiply_with_carry<std::uint16_t, 36969> upper{{static_cast<std::uint16_t>(z)},
                                                          static_cast<std::uint16_t>(z >> 16)};
    leat::multiply_with_carry<std::uint16_t, 18000> lower{{static_cast<std::uint16_t>(w)},
                                                          static_cast<std::uint16_t>(w >> 16)};
    for (const std::uint64_t expected : leat_test::words(entry.at("expected").at("first"))) {
        const std::uint32_t high = upper();
        EXPECT_EQ(high << 16 | lower(), expected);
    }
    // (m - 1)/2 for safe primes, which the entry says these are.
    EXPECT_EQ(decltype(upper)::period(), wide_integer{(36969u * 65536u - 2) / 2});
    EXPECT_EQ(decltype(lower)::period(), wide_integer{(18000u * 65536u - 2) / 2});
}

TEST(multiply_with_carry, jumps_to_the_published_states) {
    for (const json& entry : leat_test::reference_group("jumps", "mwc")) {
        LEAT_TEST_REFERENCE(entry);
        const json& from = entry.at("parameters");
        const json& to = entry.at("expected");
        if (from.contains("state_oldest_first")) {
            auto engine = lag_four(from.at("state_oldest_first"), from.at("carry"));
            const auto start = engine;
            const auto end = lag_four(to.at("state_oldest_first"), to.at("carry"));
            EXPECT_EQ(leat::jump(engine, wide(from.at("n"))), end);
            if (start.is_recurrent()) {
                EXPECT_EQ(leat::rewind(engine, wide(from.at("n"))), start);
            }
        } else {
            with_lag_one(from.at("a"), [&](auto kind) {
                using E = decltype(kind);
                auto engine = lag_one<E>(from.at("x"), from.at("c"));
                const auto start = engine;
                EXPECT_EQ(leat::jump(engine, wide(from.at("n"))),
                          lag_one<E>(to.at("x"), to.at("c")));
                EXPECT_EQ(leat::rewind(engine, wide(from.at("n"))), start);
            });
        }
    }
}

// The states of a small engine as numbers, stepped by the defining recurrence alone.
template <class E>
class enumeration {
public:
    static constexpr std::size_t lag = E::lag;
    static constexpr std::uint32_t carries = E::greatest_carry + 1u;

    enumeration() : next_(count()), recurrent_(count(), true), cycle_(count(), 0) {
        std::vector<std::uint32_t> in(count(), 0);
        for (std::uint32_t s = 0; s < count(); ++s) {
            next_[s] = step(s);
            ++in[next_[s]];
        }
        // What nothing leads to is transient; without it, what only it led to is so too.
        std::vector<std::uint32_t> open;
        for (std::uint32_t s = 0; s < count(); ++s) {
            if (in[s] == 0) {
                open.push_back(s);
            }
        }
        while (!open.empty()) {
            const std::uint32_t s = open.back();
            open.pop_back();
            recurrent_[s] = false;
            if (--in[next_[s]] == 0) {
                open.push_back(next_[s]);
            }
        }
        for (std::uint32_t s = 0; s < count(); ++s) {
            if (recurrent_[s] && cycle_[s] == 0) {
                std::uint32_t length = 0;
                std::uint32_t t = s;
                do {
                    t = next_[t];
                    ++length;
                } while (t != s);
                do {
                    cycle_[t] = length;
                    t = next_[t];
                } while (t != s);
            }
        }
    }

    static constexpr std::uint32_t count() { return carries << (8 * lag); }
    static constexpr std::uint32_t zeros() { return 0; }
    static constexpr std::uint32_t ones() { return count() - 1; }
    bool recurrent(std::uint32_t s) const { return recurrent_[s]; }
    std::uint32_t next(std::uint32_t s) const { return next_[s]; }
    std::uint32_t cycle(std::uint32_t s) const { return cycle_[s]; }

    // s = carry * b^r + the words as digits, the oldest the highest.
    static E engine(std::uint32_t s) {
        std::array<std::uint8_t, lag> words{};
        for (std::size_t i = 0; i < lag; ++i) {
            words[i] = static_cast<std::uint8_t>(s >> (8 * (lag - 1 - i)));
        }
        return E{words, static_cast<std::uint8_t>(s >> (8 * lag))};
    }
    static std::uint32_t number(const E& engine) {
        std::uint32_t s = engine.state()[lag];
        for (std::size_t i = 0; i < lag; ++i) {
            s = s << 8 | engine.state()[i];
        }
        return s;
    }

private:
    // x_n + b c_n = sum of a x + c, with the words moved up by one.
    static std::uint32_t step(std::uint32_t s) {
        std::uint32_t sum = s >> (8 * lag);
        for (std::size_t i = 0; i < lag; ++i) {
            sum += E::multipliers[i] * ((s >> (8 * (lag - 1 - i))) & 0xFFu);
        }
        const std::uint32_t kept = lag == 1 ? 0 : s & ((1u << (8 * (lag - 1))) - 1);
        return (sum >> 8) << (8 * lag) | kept << 8 | (sum & 0xFFu);
    }

    std::vector<std::uint32_t> next_;
    std::vector<bool> recurrent_;
    std::vector<std::uint32_t> cycle_;
};

/// Every state but the two that never change.
template <class E>
void expect_all_states_right() {
    const enumeration<E> all;
    const auto m = static_cast<std::uint32_t>(E::modulus().word(0));
    std::uint64_t common = 1;
    std::uint32_t recurrent = 0;
    std::vector<bool> seen(m, false);
    for (std::uint32_t s = all.zeros() + 1; s < all.ones(); ++s) {
        E engine = all.engine(s);
        ASSERT_EQ(engine.is_recurrent(), all.recurrent(s)) << s;
        const auto y = static_cast<std::uint32_t>(engine.residue().word(0));
        ASSERT_GT(y, 0u) << s;
        ASSERT_LT(y, m) << s;
        const E back = E::from_residue(y);
        ASSERT_EQ(back.residue(), wide_integer{y}) << s;
        ASSERT_TRUE(all.recurrent(all.number(back))) << s;
        ASSERT_EQ(back == engine, all.recurrent(s)) << s;
        if (all.recurrent(s)) {
            ++recurrent;
            ASSERT_FALSE(seen[y]) << s << " shares a residue with another recurrent state";
            seen[y] = true;
            common = std::lcm(common, std::uint64_t{all.cycle(s)});
        }
        ASSERT_EQ(engine(), y % 256) << s;
        ASSERT_EQ(all.number(engine), all.next(s)) << s;
        for (std::size_t i = 1; i < E::lag; ++i) {
            engine();
        }
        ASSERT_TRUE(engine.is_recurrent()) << s << " is transient for more steps than the lag";
    }
    EXPECT_EQ(recurrent, m - 1);
    EXPECT_EQ(wide_integer{common}, E::period());
}

/// Where m is prime, all cycles have the length of the period.
template <class E>
void expect_one_cycle_length() {
    const enumeration<E> all;
    for (std::uint32_t s = all.zeros() + 1; s < all.ones(); ++s) {
        if (all.recurrent(s)) {
            ASSERT_EQ(wide_integer{all.cycle(s)}, E::period()) << s;
        }
    }
}

// Analogues with 8-bit words. Whether m and (m - 1)/2 are prime is from trial division.
using safe_lag1 = leat::multiply_with_carry<std::uint8_t, 210>;       // m = 53759, safe
using prime_lag1 = leat::multiply_with_carry<std::uint8_t, 249>;      // m = 63743, prime
using composite_lag1 = leat::multiply_with_carry<std::uint8_t, 255>;  // m = 65279 = 97 * 673
using least_lag1 = leat::multiply_with_carry<std::uint8_t, 1>;        // m = 255
using safe_lag2 = leat::multiply_with_carry<std::uint8_t, 14, 1>;     // m = 917759, safe
using prime_lag2 = leat::multiply_with_carry<std::uint8_t, 2, 6>;     // m = 132607, prime
using composite_lag2 = leat::multiply_with_carry<std::uint8_t, 1, 9>; // m = 67839, composite
using gap_lag2 = leat::multiply_with_carry<std::uint8_t, 9, 0>;       // m = 589823, composite

// The theorems of Couture and L'Ecuyer 1997 and of Goresky and Klapper 2003, on every state.
TEST(multiply_with_carry, is_right_on_every_state_of_lag_1_analogues) {
    expect_all_states_right<safe_lag1>();
    expect_all_states_right<prime_lag1>();
    expect_all_states_right<composite_lag1>();
    expect_all_states_right<least_lag1>();
    expect_one_cycle_length<safe_lag1>();
    expect_one_cycle_length<prime_lag1>();
}

TEST(multiply_with_carry, is_right_on_every_state_of_lag_2_analogues) {
    expect_all_states_right<safe_lag2>();
    expect_all_states_right<prime_lag2>();
    expect_all_states_right<composite_lag2>();
    expect_all_states_right<gap_lag2>();
    expect_one_cycle_length<safe_lag2>();
    expect_one_cycle_length<prime_lag2>();
}

// (m - 1)/2 for a safe prime m: 2^8 is a square, so it generates the squares.
static_assert(safe_lag1::period() == wide_integer{(53759 - 1) / 2});
static_assert(safe_lag2::period() == wide_integer{(917759 - 1) / 2});

// The jump from a transient state is that many draws, though the period does not hold there.
TEST(multiply_with_carry, jumps_from_transient_states_by_real_steps) {
    const leat::mwc_lag4_32 transient{{0, 0, 0, 5}, 2111119493};
    ASSERT_FALSE(transient.is_recurrent());
    for (const unsigned n : {0u, 1u, 2u, 3u, 4u, 5u, 17u, 1000u}) {
        auto drawn = transient;
        for (unsigned i = 0; i < n; ++i) {
            drawn();
        }
        auto jumped = transient;
        EXPECT_EQ(leat::jump(jumped, n), drawn) << n;
        auto discarded = transient;
        discarded.discard(n);
        EXPECT_EQ(discarded, drawn) << n;
    }
    auto on_cycle = transient;
    leat::jump(on_cycle, 4);
    ASSERT_TRUE(on_cycle.is_recurrent());
    auto round = transient;
    leat::jump(round, leat::mwc_lag4_32::period() + 4);
    EXPECT_EQ(round, on_cycle);
    leat::jump(round = transient, leat::mwc_lag4_32::period());
    EXPECT_TRUE(round.is_recurrent());
    EXPECT_EQ(leat::jump(round, 4), on_cycle);
    try {
        auto engine = transient;
        leat::rewind(engine, 1);
        ADD_FAILURE() << "rewind from a transient state was not refused";
    } catch (const leat::invalid_parameter& refusal) {
        EXPECT_EQ(std::string{refusal.what()}.rfind("leat::rewind: ", 0), 0u) << refusal.what();
    }
}

// A transient state and the recurrent one of its residue draw the same numbers for ever.
TEST(multiply_with_carry, outputs_depend_on_the_residue_alone) {
    leat::mwc_lag4_32 transient{{7, 1, 0, 4000000000}, 2111119400};
    auto recurrent = leat::mwc_lag4_32::from_residue(transient.residue());
    ASSERT_NE(transient, recurrent);
    for (int i = 0; i < 4; ++i) {
        EXPECT_EQ(transient(), recurrent()) << i;
    }
    EXPECT_EQ(transient, recurrent);
}

// The rule of the header: splitmix64 outputs, oldest word first, upper halves; the last for the
// carry.
TEST(multiply_with_carry, expands_one_value_by_splitmix64) {
    const leat::mwc_lag4_32 engine{20261201};
    leat::splitmix64 expand{20261201};
    std::array<std::uint32_t, 4> words{};
    for (std::uint32_t& x : words) {
        x = static_cast<std::uint32_t>(expand() >> 32);
    }
    const auto carry = static_cast<std::uint32_t>(expand() % 2111119494u);
    EXPECT_EQ(engine, (leat::mwc_lag4_32{words, carry}));
    const leat::mwc_lag1_64 wide_engine{20261201};
    leat::splitmix64 again{20261201};
    const std::uint64_t x = again();
    EXPECT_EQ(wide_engine, (leat::mwc_lag1_64{{x}, again() % 18446744073709550874u}));
}

/// A seed sequence that gives one word over and over.
struct constant_sequence {
    std::uint32_t value;
    template <class Iterator>
    void generate(Iterator first, Iterator last) const {
        std::fill(first, last, value);
    }
};

// As ISO C++ [rand.eng.mers] maps an all-zero state; the other fixed point likewise.
TEST(multiply_with_carry, turns_fixed_points_from_seeding_into_usable_states) {
    constant_sequence zeros{0};
    EXPECT_EQ(leat::mwc_lag1_32{zeros}, (leat::mwc_lag1_32{{0x80000000u}, 0}));
    EXPECT_EQ(leat::mwc_lag1_64{zeros}, (leat::mwc_lag1_64{{0x8000000000000000u}, 0}));
    EXPECT_EQ(leat::mwc_lag4_32{zeros}.residue(),
              (leat::mwc_lag4_32{{0x80000000u, 0, 0, 0}, 0}.residue()));
    constant_sequence ones{0xFFFFFFFFu}; // carry 2^32 - 1 mod 2^8 = 255 = the greatest
    using full = leat::multiply_with_carry<std::uint8_t, 250, 6>;
    const full engine{ones};
    EXPECT_EQ(engine.residue(), (full{{0x80, 0xFF}, 255}.residue()));
    EXPECT_TRUE(engine.is_recurrent());
}

// Half of the states of these multipliers are transient; a seed never makes one.
TEST(multiply_with_carry, seeds_recurrent_states_only) {
    using half = leat::multiply_with_carry<std::uint32_t, 1000000007, 1000000007>;
    int moved = 0;
    for (std::uint64_t seed = 0; seed < 200; ++seed) {
        half engine{seed};
        ASSERT_TRUE(engine.is_recurrent()) << seed;
        leat::splitmix64 expand{seed};
        const auto oldest = static_cast<std::uint32_t>(expand() >> 32);
        const auto newest = static_cast<std::uint32_t>(expand() >> 32);
        half plain{{oldest, newest}, static_cast<std::uint32_t>(expand() % 2000000014u)};
        moved += plain.is_recurrent() ? 0 : 1;
        for (int i = 0; i < 5; ++i) {
            ASSERT_EQ(engine(), plain()) << seed;
        }
    }
    EXPECT_GT(moved, 60); // about a half of 200
    EXPECT_LT(moved, 140);
}

template <class Call>
void expect_message(const std::string& message, Call call) {
    try {
        call();
        ADD_FAILURE() << "not refused: " << message;
    } catch (const leat::invalid_parameter& refusal) {
        EXPECT_EQ(refusal.what(), message);
    }
}

TEST(multiply_with_carry, refuses_what_never_changes_and_carries_too_large) {
    expect_message("leat::multiply_with_carry: carry = 2111119494, must be below the sum of the "
                   "multipliers",
                   [] {
                       leat::mwc_lag4_32{{1, 2, 3, 4}, 2111119494};
                   });
    expect_message("leat::multiply_with_carry: words = 0, must not all be 0 where the carry is 0: "
                   "that state never changes",
                   [] {
                       leat::mwc_lag1_64{{0}, 0};
                   });
    expect_message(
        "leat::multiply_with_carry: words = 4294967295, must not all be the greatest word "
        "where the carry is the greatest too: that state never changes",
        [] {
            leat::mwc_lag1_32{{4294967295}, 4294957664};
        });
    expect_message("leat::multiply_with_carry: the residue must be above 0 and below the modulus",
                   [] { leat::mwc_lag1_32::from_residue(leat::mwc_lag1_32::modulus()); });
    // The near twins are taken.
    EXPECT_NO_THROW((leat::mwc_lag4_32{{1, 2, 3, 4}, 2111119493}));
    EXPECT_NO_THROW((leat::mwc_lag1_64{{0}, 1}));
    EXPECT_NO_THROW((leat::mwc_lag1_32{{4294967295}, 4294957663}));
    EXPECT_NO_THROW(leat::mwc_lag1_32::from_residue(leat::mwc_lag1_32::modulus() - 1));
}

// Seven words of 64 bits, the widest that compile: the jump against plain steps, and back.
TEST(multiply_with_carry, jumps_with_many_words) {
    using widest =
        leat::multiply_with_carry<std::uint64_t, 9000000000000000001u, 2, 0, 3, 5, 7, 11>;
    widest walked{3};
    const widest start = walked;
    for (int i = 0; i < 5000; ++i) {
        walked();
    }
    widest jumped = start;
    jumped.discard(5000);
    EXPECT_EQ(jumped, walked);
    jumped = start;
    const wide_integer far{std::string_view{"98765432109876543210987654321098765432109876543210"}};
    jumped.advance(far + 1);
    widest by_parts = start;
    by_parts.advance(far);
    by_parts();
    EXPECT_EQ(jumped, by_parts);
}

// The weakness that the header names, on the engines themselves.
TEST(multiply_with_carry, shows_the_planes_of_lag_one_that_the_header_names) {
    leat::mwc_lag1_64 engine{1};
    std::uint64_t x = engine();
    std::uint64_t y = engine();
    for (int i = 0; i < 10000; ++i) {
        const std::uint64_t z = engine();
        const std::uint64_t off = x - 742 * y - z; // modulo 2^64
        ASSERT_LT(std::min(off, 0 - off), 744u);
        x = y;
        y = z;
    }
}

// One function at compile time and at run time: residues, jumps and seeding.
constexpr std::array<std::uint64_t, 6> excursion() {
    leat::mwc_lag4_32 a{42};
    a.discard(1000000);
    leat::mwc_lag1_64 b{42};
    b.advance(wide_integer::power_of_two(100));
    leat::mwc_lag1_32 c{{1}, 1};
    const bool recurrent = a.is_recurrent() && c.is_recurrent();
    return {a(), a(), b(), b(), c(), recurrent ? 1u : 0u};
}

TEST(multiply_with_carry, works_in_constant_evaluation) {
    static constexpr auto at_compile_time = excursion();
    EXPECT_EQ(at_compile_time, excursion());
    EXPECT_EQ(at_compile_time[5], 1u);
}

} // namespace
