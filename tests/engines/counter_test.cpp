// splitmix64 and philox against published values.

#include "leat/engines/counter.hpp"

#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <random> // std::seed_seq
#include <string>
#include <vector>

namespace {

using leat_test::word;
using leat_test::words;

// Source: the entries splitmix64.* of engines.json.
TEST(splitmix64, gives_the_reference_draws) {
    for (const auto& entry : leat_test::reference_group("engines", "splitmix")) {
        LEAT_TEST_REFERENCE(entry);
        const leat::splitmix64 start{word(entry["parameters"]["seed"])};
        leat::splitmix64 e = start;
        EXPECT_EQ(leat_test::draws(e, 10), words(entry["expected"]["first"]));
        EXPECT_EQ(leat_test::nth_draw(start, 10000), word(entry["expected"]["x10000"]));
    }
}

// Source: the entry double53.splitmix64-seed-42 of engines.json: the upper 53 bits over 2^53.
TEST(splitmix64, gives_the_reference_53_bit_reals) {
    const auto& entry = leat_test::reference_entry("engines.double53.splitmix64-seed-42");
    LEAT_TEST_REFERENCE(entry);
    leat::splitmix64 e{42};
    for (const auto& real : entry["expected"]["first"]) {
        EXPECT_EQ(static_cast<double>(e() >> 11) / 9007199254740992.0, real.get<double>());
    }
}

template <class E>
std::array<typename E::result_type, 4> four(const leat_test::json& list) {
    std::array<typename E::result_type, 4> result{};
    for (std::size_t i = 0; i < 4; ++i) {
        result[i] = static_cast<typename E::result_type>(word(list.at(i)));
    }
    return result;
}
template <class E>
std::array<typename E::result_type, 2> two(const leat_test::json& list) {
    return {static_cast<typename E::result_type>(word(list.at(0))),
            static_cast<typename E::result_type>(word(list.at(1)))};
}

/// All entries of one engine: those of the bijection, of the default engine, of its other members.
template <class E>
void expect_published(const std::string& family) {
    for (const auto& entry : leat_test::reference_family(family)) {
        LEAT_TEST_REFERENCE(entry);
        const auto& given = entry["parameters"];
        const auto& expected = entry["expected"];
        if (expected.contains("out10")) {
            const auto key = two<E>(given["key"]);
            const auto counter = four<E>(given["counter"]);
            EXPECT_EQ(E::block(key, counter), four<E>(expected["out10"]));
            EXPECT_EQ(E::template block<7>(key, counter), four<E>(expected["out7"]));
            E e{key, counter};
            EXPECT_EQ(leat_test::draws(e, 4), words(expected["out10"]));
        } else if (expected.contains("value")) {
            EXPECT_EQ(leat_test::nth_draw(E{}, 10000), word(expected["value"]));
        } else if (expected.contains("next4")) {
            E e;
            e();
            e.set_counter(four<E>(given["array"]));
            EXPECT_EQ(e.counter(), four<E>(given["X"]));
            EXPECT_EQ(leat_test::draws(e, 4), words(expected["next4"]));
        } else if (given.contains("sequence")) {
            std::seed_seq q{1, 2, 3};
            ASSERT_EQ(words(given["sequence"]), (std::vector<std::uint64_t>{1, 2, 3}));
            E e{q};
            EXPECT_EQ(e.key(), two<E>(given["key"]));
            EXPECT_EQ(leat_test::draws(e, 4), words(expected["first"]));
        } else {
            E e;
            EXPECT_EQ(e.key(), two<E>(given["key"]));
            const auto first = words(expected["first"]);
            EXPECT_EQ(leat_test::draws(e, first.size()), first);
        }
    }
}

// Source: the entries philox4x32.* and philox4x64.* of engines.json.
TEST(philox, gives_the_published_words) {
    expect_published<leat::philox4x32>("engines.philox4x32.");
    expect_published<leat::philox4x64>("engines.philox4x64.");
}

// Source: ISO C++26 [rand.eng.philox], "explicit philox_engine(result_type value)": the key becomes
// {value mod 2^w, 0}, the counter 0.
TEST(philox, takes_one_number_as_iso_does) {
    const leat::philox4x32 narrow{0x123456789ABCDEF0u};
    EXPECT_EQ(narrow.key(), (std::array<std::uint32_t, 2>{0x9ABCDEF0u, 0}));
    EXPECT_EQ(narrow.counter(), (std::array<std::uint32_t, 4>{}));
    const leat::philox4x64 wide{0x123456789ABCDEF0u};
    EXPECT_EQ(wide.key(), (std::array<std::uint64_t, 2>{0x123456789ABCDEF0u, 0}));
}

// A carry runs through all four counter words, and from the last word into none.
template <class E>
void expect_carries() {
    using w = typename E::result_type;
    constexpr w top = E::max();
    E e{{1, 2}, {top, top, 5, 7}};
    e.discard(5);
    EXPECT_EQ(e.counter(), (std::array<w, 4>{0, 0, 6, 7}));
    EXPECT_EQ(e.place(), 1);
    E last{{1, 2}, {top, top, top, top}};
    for (int i = 0; i < 4; ++i) {
        last();
    }
    EXPECT_TRUE((last == E{{1, 2}, {}}));
    EXPECT_TRUE((E{{1, 2}, {}} != E{{1, 3}, {}}));
    EXPECT_TRUE((E{{1, 2}, {}} != E{{1, 2}, {1}}));
}
TEST(philox, carries_through_its_counter) {
    expect_carries<leat::philox4x32>();
    expect_carries<leat::philox4x64>();
}

} // namespace
