// mrg32k3a: published outputs, jumps and period (tests/reference, each with its source), against
// the 3x3 matrices of the literature too.

#include "leat/engines/combined_recursive.hpp"
#include "leat/engines/splitmix64.hpp"
#include "leat/streams/jump.hpp"
#include "support/reference.hpp"

#include <boost/multiprecision/cpp_int.hpp>
#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cstdint>
#include <string>

namespace {

using leat::mrg32k3a;
using leat::wide_integer;
using leat_test::json;
using leat_test::wide;
using leat_test::word;

constexpr std::uint64_t m1 = 4294967087;
constexpr std::uint64_t m2 = 4294944443;

mrg32k3a from_words(const json& words) {
    mrg32k3a::state_type state{};
    for (std::size_t i = 0; i < 6; ++i) {
        state[i] = static_cast<std::uint32_t>(word(words.at(i)));
    }
    return mrg32k3a{state};
}

TEST(mrg32k3a, gives_the_published_outputs) {
    int entries = 0;
    for (const json& entry : leat_test::reference_family("engines.mrg32k3a.")) {
        LEAT_TEST_REFERENCE(entry);
        const json& to = entry.at("expected");
        if (!to.contains("first")) {
            continue; // the period, below
        }
        ++entries;
        const mrg32k3a start = from_words(entry.at("parameters").at("seeds"));
        mrg32k3a integers = start;
        EXPECT_EQ(leat_test::draws(integers, to.at("first").size()),
                  leat_test::words(to.at("first")));
        mrg32k3a reals = start;
        for (const json& expected : to.at("doubles")) {
            EXPECT_EQ(reals.unit(), expected.get<double>());
        }
        EXPECT_EQ(leat_test::nth_draw(start, 10000), word(to.at("x10000")));
        mrg32k3a jumped = start;
        jumped.discard(9999);
        EXPECT_EQ(jumped(), word(to.at("x10000")));
    }
    EXPECT_EQ(entries, 4);
}

TEST(mrg32k3a, has_the_published_period) {
    const json& entry = leat_test::reference_entry("engines.mrg32k3a.period");
    LEAT_TEST_REFERENCE(entry);
    EXPECT_EQ(mrg32k3a::period(), wide(entry.at("expected").at("period")));
    // "Whole bits that the states fill": (m1^3 - 1)(m2^3 - 1) is twice the period.
    EXPECT_EQ(mrg32k3a::state_bits, (mrg32k3a::period() << 1).bit_width() - 1);
}

// The parts alone have the periods m1^3 - 1 and m2^3 - 1: after one of them its three words are
// back, while the other part is elsewhere.
TEST(mrg32k3a, has_two_parts_of_the_periods_of_the_paper) {
    const mrg32k3a start{5};
    const auto before = start.state();
    for (const std::uint64_t m : {m1, m2}) {
        mrg32k3a engine = start;
        engine.advance(wide_integer{m} * m * m - 1);
        const auto after = engine.state();
        const bool first_is_back = std::equal(after.begin(), after.begin() + 3, before.begin());
        const bool second_is_back = std::equal(after.begin() + 3, after.end(), before.begin() + 3);
        EXPECT_EQ(first_is_back, m == m1);
        EXPECT_EQ(second_is_back, m == m2);
    }
}

/// A state times a published matrix: the words of a jump, row by row.
std::array<std::uint64_t, 3> product(const json& matrix, const std::uint32_t* words,
                                     std::uint64_t m) {
    std::array<std::uint64_t, 3> result{};
    for (std::size_t row = 0; row < 3; ++row) {
        boost::multiprecision::cpp_int sum = 0;
        for (std::size_t column = 0; column < 3; ++column) {
            sum += boost::multiprecision::cpp_int{word(matrix.at(row).at(column))} * words[column];
        }
        result[row] = static_cast<std::uint64_t>(sum % m);
    }
    return result;
}

TEST(mrg32k3a, jumps_to_the_published_states) {
    int matrices = 0;
    for (const json& entry : leat_test::reference_group("jumps", "mrg")) {
        LEAT_TEST_REFERENCE(entry);
        const wide_integer n = wide(entry.at("parameters").at("n"));
        const json& to = entry.at("expected");
        const mrg32k3a start = from_words(entry.at("parameters").at("state"));
        mrg32k3a engine = start;
        EXPECT_EQ(leat::jump(engine, n), from_words(to.at("state")));
        mrg32k3a walker = engine;
        EXPECT_EQ(leat_test::draws(walker, 3), leat_test::words(to.at("next3")));
        EXPECT_EQ(leat::rewind(engine, n), start);
        if (to.contains("matrix1")) {
            ++matrices;
            const mrg32k3a any{matrices == 1 ? 17u : 18u};
            mrg32k3a jumped = any;
            leat::jump(jumped, n);
            const auto from = any.state();
            const auto words = jumped.state();
            const auto upper = product(to.at("matrix1"), from.data(), m1);
            const auto lower = product(to.at("matrix2"), from.data() + 3, m2);
            EXPECT_TRUE(std::equal(upper.begin(), upper.end(), words.begin()));
            EXPECT_TRUE(std::equal(lower.begin(), lower.end(), words.begin() + 3));
        }
    }
    EXPECT_EQ(matrices, 2);
}

// Steps and powers change over inside discard: no distance near the change differs from drawing.
TEST(mrg32k3a, discards_as_it_draws_where_powers_take_over) {
    mrg32k3a walker{9};
    const mrg32k3a start = walker;
    for (unsigned n = 0; n < 300; ++n) {
        mrg32k3a jumped = start;
        jumped.discard(n);
        ASSERT_EQ(jumped, walker) << n;
        walker();
    }
}

// The output 0 of the difference is given as m1 (the paper's Figure I: "if (p1 <= p2) p1 - p2 +
// m1"). States with a step to x = y are made from the recurrences: with zeros but for the oldest
// words, x = -810728 s10 and y = -1370589 s20.
TEST(mrg32k3a, gives_m1_where_the_parts_are_equal) {
    using big = boost::multiprecision::cpp_int;
    static constexpr std::uint64_t common = 123456789;
    // s = -common / b mod m, by Fermat.
    const auto oldest = [](std::uint64_t b, std::uint64_t m) {
        const big inverse = boost::multiprecision::powm(big{b}, big{m - 2}, big{m});
        return static_cast<std::uint32_t>((big{m} - common) * inverse % m);
    };
    mrg32k3a engine{{oldest(810728, m1), 0, 0, oldest(1370589, m2), 0, 0}};
    EXPECT_EQ(engine(), m1);
    EXPECT_EQ(engine.state()[2], common);
    EXPECT_EQ(engine.state()[5], common);
    EXPECT_EQ(mrg32k3a::max(), m1);
    EXPECT_EQ(mrg32k3a::min(), 1u);
    mrg32k3a real{{oldest(810728, m1), 0, 0, oldest(1370589, m2), 0, 0}};
    EXPECT_EQ(real.unit(), 4294967087.0 / 4294967088.0); // one IEEE division, of exact numbers
}

// The rule of the header.
TEST(mrg32k3a, expands_one_value_by_splitmix64) {
    leat::splitmix64 expand{20261201};
    mrg32k3a::state_type words{};
    for (std::size_t i = 0; i < 6; ++i) {
        words[i] = static_cast<std::uint32_t>(expand() % (i < 3 ? m1 : m2));
    }
    EXPECT_EQ(mrg32k3a{20261201}, mrg32k3a{words});
}

/// A seed sequence that gives a list of words.
struct listed_sequence {
    std::array<std::uint32_t, 6> words;
    template <class Iterator>
    void generate(Iterator first, Iterator last) const {
        for (std::size_t i = 0; first != last; ++first, ++i) {
            *first = words.at(i);
        }
    }
};

// As ISO C++ [rand.eng.mers] maps an all-zero state, here for each part.
TEST(mrg32k3a, reduces_seed_sequences_and_refuses_none) {
    listed_sequence wide_words{{0xFFFFFFFFu, 1, 2, 0xFFFFFFFFu, 4, 5}};
    EXPECT_EQ(mrg32k3a{wide_words}, (mrg32k3a{{208, 1, 2, 22852, 4, 5}}));
    listed_sequence zero_first{{0, 4294967087, 0, 3, 4, 5}};
    EXPECT_EQ(mrg32k3a{zero_first}, (mrg32k3a{{0x80000000u, 0, 0, 3, 4, 5}}));
    listed_sequence zero_second{{0, 1, 2, 4294944443, 0, 0}};
    EXPECT_EQ(mrg32k3a{zero_second}, (mrg32k3a{{0, 1, 2, 0x80000000u, 0, 0}}));
}

void expect_message(const std::string& message, const mrg32k3a::state_type& state) {
    try {
        mrg32k3a{state};
        ADD_FAILURE() << "not refused: " << message;
    } catch (const leat::invalid_parameter& refusal) {
        EXPECT_EQ(refusal.what(), message);
    }
}

TEST(mrg32k3a, refuses_what_the_paper_forbids) {
    expect_message("leat::mrg32k3a: s11 = 4294967087, must be below 4294967087",
                   {1, 4294967087, 1, 1, 1, 1});
    expect_message("leat::mrg32k3a: s20 = 4294944443, must be below 4294944443",
                   {1, 1, 1, 4294944443, 1, 1});
    expect_message("leat::mrg32k3a: s10, s11, s12 = 0, must not all three be 0",
                   {0, 0, 0, 1, 1, 1});
    expect_message("leat::mrg32k3a: s20, s21, s22 = 0, must not all three be 0",
                   {1, 1, 1, 0, 0, 0});
    EXPECT_NO_THROW((mrg32k3a{{4294967086, 4294967086, 4294967086, 4294944442, 0, 0}}));
    EXPECT_NO_THROW((mrg32k3a{{0, 0, 1, 0, 0, 1}}));
}

// One function at compile time and at run time.
constexpr std::array<std::uint64_t, 3> excursion() {
    mrg32k3a engine{{12345, 12345, 12345, 12345, 12345, 12345}};
    leat::jump(engine, leat::pow2(127));
    const auto state = engine.state();
    leat::rewind(engine, leat::pow2(127));
    return {state[0], state[5], engine()};
}

TEST(mrg32k3a, works_in_constant_evaluation) {
    static constexpr auto at_compile_time = excursion();
    EXPECT_EQ(at_compile_time, excursion());
    EXPECT_EQ(at_compile_time[2], 545508589u); // engines.mrg32k3a.first10
    static constexpr double real = mrg32k3a{{12345, 12345, 12345, 12345, 12345, 12345}}.unit();
    EXPECT_EQ(real, 0.12701112204657714); // engines.mrg32k3a.first10
}

} // namespace
