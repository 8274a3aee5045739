// shuffled and shuffled_by against published values and against libstdc++'s shuffle_order_engine.

#include "leat/engines/shuffled.hpp"

#include "leat/engines/lehmer.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <random> // libstdc++'s shuffle_order_engine and mt19937, running references
#include <sstream>
#include <string>

namespace {

using leat_test::word;
using leat_test::words;

using classic = leat::shuffled<leat::minimal_standard, 256>;

template <class E>
void expect_entry(const char* id) {
    const auto& entry = leat_test::reference_entry(id);
    LEAT_TEST_REFERENCE(entry);
    const auto& expected = entry["expected"];
    const E start{word(entry["parameters"]["seed"])};
    if (expected.contains("value")) {
        EXPECT_EQ(leat_test::nth_draw(start, 10000), word(expected["value"]));
    } else {
        E e = start;
        EXPECT_EQ(leat_test::draws(e, 10), words(expected["first"]));
        EXPECT_EQ(leat_test::nth_draw(start, 10000), word(expected["x10000"]));
    }
}

// Source: the entries shuffle.* of engines.json. The first is ISO C++ [rand.predef]: the 10000th
// value of knuth_b is 1112339016. The last base engine is one of <random>.
TEST(shuffled, gives_the_published_values) {
    expect_entry<classic>("engines.shuffle.256.x10000");
    expect_entry<classic>("engines.shuffle.256.seed42");
    expect_entry<leat::shuffled<leat::minimal_standard_48271, 97>>(
        "engines.shuffle.97.48271.seed1");
    expect_entry<leat::shuffled<leat::minimal_standard_48271, 97>>(
        "engines.shuffle.97.48271.seed2024");
    expect_entry<leat::shuffled<std::mt19937, 64>>("engines.shuffle.64.mt19937");
}

// Source: libstdc++'s shuffle_order_engine, ISO C++ [rand.adapt.shuf].
TEST(shuffled, agrees_with_the_standard_library) {
    classic ours;
    std::knuth_b iso;
    leat::shuffled<std::mt19937_64, 100> ours64; // a range of 2^64
    std::shuffle_order_engine<std::mt19937_64, 100> iso64;
    std::seed_seq q{4, 5};
    leat::shuffled<leat::minimal_standard_48271, 3> ours3{q};
    std::shuffle_order_engine<std::minstd_rand, 3> iso3{q};
    for (int i = 0; i < 100000; ++i) {
        ASSERT_EQ(ours(), iso()) << i;
        ASSERT_EQ(ours64(), iso64()) << i;
        ASSERT_EQ(ours3(), iso3()) << i;
    }
}

// An engine of <random> as the base: compared, written and read as any other.
TEST(shuffled, wraps_engines_of_the_standard_library) {
    leat::shuffled<std::mt19937, 64> e{7};
    e.discard(1000);
    std::stringstream text;
    text << e;
    leat::shuffled<std::mt19937, 64> back;
    EXPECT_FALSE(back == e);
    text >> back;
    EXPECT_FALSE(text.fail());
    EXPECT_TRUE(back == e);
    EXPECT_TRUE(back.state() == e.state());
    EXPECT_EQ(back(), e());
}

// Source: the entry shuffle.index-definitions of engines.json: ISO's index and that of Knuth's
// Algorithm B differ for 127 values. The range is cut into 256 cells: only their edges can differ.
TEST(shuffled, uses_the_index_of_iso) {
    const auto& entry = leat_test::reference_entry("engines.shuffle.index-definitions");
    LEAT_TEST_REFERENCE(entry);
    std::uint64_t count = 0;
    std::uint64_t smallest = 0;
    std::uint64_t largest = 0;
    for (std::uint64_t cell = 0; cell <= 256; ++cell) {
        const std::uint64_t edge = cell * 2147483647 / 256;
        for (std::uint64_t y = edge < 3 ? 1 : edge - 2; y <= edge + 2 && y < 2147483647; ++y) {
            if (leat::detail::table_place(256, y - 1, 2147483646) !=
                leat::detail::table_place(256, y, 2147483647)) {
                ++count;
                smallest = smallest == 0 ? y : smallest;
                largest = y;
            }
        }
    }
    EXPECT_EQ(count, word(entry["expected"]["number_of_Y_where_they_differ"]));
    EXPECT_EQ(smallest, word(entry["expected"]["smallest_such_Y"]));
    EXPECT_EQ(largest, word(entry["expected"]["largest_such_Y"]));
}

// Source: the entry shuffle.algorithmM of engines.json.
TEST(shuffled_by, gives_the_reference_draws) {
    const auto& entry = leat_test::reference_entry("engines.shuffle.algorithmM");
    LEAT_TEST_REFERENCE(entry);
    leat::shuffled_by<leat::minimal_standard_48271, leat::minimal_standard, 128> e{
        leat::minimal_standard_48271{1}, leat::minimal_standard{2}};
    const auto start = e;
    EXPECT_EQ(leat_test::draws(e, 10), words(entry["expected"]["first"]));
    EXPECT_EQ(leat_test::nth_draw(start, 1000), word(entry["expected"]["x1000"]));
}

// Equal engines must not run in step, whatever they are seeded from.
TEST(shuffled_by, seeds_its_engines_apart) {
    using same = leat::shuffled_by<leat::minimal_standard, leat::minimal_standard, 8>;
    const auto expect_apart = [](const same& e) {
        leat::minimal_standard filled = e.selector();
        filled.discard(8); // the base engine filled the table
        EXPECT_FALSE(e.base() == e.selector());
        EXPECT_FALSE(e.base() == filled);
    };
    expect_apart(same{});
    for (std::uint32_t i = 0; i < 100; ++i) {
        expect_apart(same{i});
        std::seed_seq q{i};
        expect_apart(same{q});
    }
}

// "Jump the base engine and wrap it then": the wrapped engine draws its table from where it stands.
TEST(shuffled, wraps_an_engine_where_it_stands) {
    leat::minimal_standard base{20261201};
    const classic e{base};
    base.discard(257);
    EXPECT_TRUE(e.base() == base);
    EXPECT_TRUE((e == classic{20261201}));
}

// A word that the base engine cannot give is refused: in the table and as the last value, in the
// state and in text.
TEST(shuffled, refuses_words_outside_the_base_engines_range) {
    using small = leat::shuffled<leat::minimal_standard, 2>;
    const auto refused = [](small::state_type state, const char* message) {
        try {
            small{state};
            ADD_FAILURE() << message;
        } catch (const leat::invalid_parameter& e) {
            EXPECT_STREQ(e.what(), message);
        }
    };
    const leat::minimal_standard base{5};
    const small good{small::state_type{base, 7, {8, 9}}};
    refused({base, 7, {0, 9}},
            "leat::shuffled: table word = 0, must lie in the base engine's range");
    refused({base, 0, {8, 9}}, "leat::shuffled: last = 0, must lie in the base engine's range");
    refused({base, 2147483647, {8, 9}},
            "leat::shuffled: last = 2147483647, must lie in the base engine's range");

    std::ostringstream os;
    os << good;
    EXPECT_EQ(os.str(), "5 8 9 7"); // the order of ISO C++ [rand.adapt.shuf]: engine, table, last
    for (const char* text : {"0 8 9 7", "5 0 9 7", "5 8 2147483647 7", "5 8 9 0", "5 8 9"}) {
        small e = good;
        std::istringstream is{text};
        is >> e;
        EXPECT_TRUE(is.fail()) << text;
        EXPECT_TRUE(e == good) << text;
    }

    using by = leat::shuffled_by<leat::minimal_standard, leat::minimal_standard, 2>;
    EXPECT_THROW((by{by::state_type{base, base, {0, 1}}}), leat::invalid_parameter);
    const by good_by{by::state_type{base, leat::minimal_standard{6}, {8, 9}}};
    std::ostringstream os_by;
    os_by << good_by;
    EXPECT_EQ(os_by.str(), "5 6 8 9");
    for (const char* text : {"5 0 8 9", "5 6 0 9", "5 6 8"}) {
        by e = good_by;
        std::istringstream is{text};
        is >> e;
        EXPECT_TRUE(is.fail()) << text;
        EXPECT_TRUE(e == good_by) << text;
    }
}

} // namespace
