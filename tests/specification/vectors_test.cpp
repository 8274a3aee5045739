// The library against the second implementation: every mapping and law of
// tests/golden/vectors.json, which tests/specification/second_implementation.py wrote. (Addresses
// and words of streams: tests/streams/path_test.cpp.)

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/streams/source.hpp"
#include "leat/testing/engines.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <bit>
#include <cstddef>
#include <cstdint>
#include <fstream>
#include <set>
#include <string>

namespace {

using leat::ends;
using nlohmann::json;

json section(const char* name) {
    std::ifstream file(std::string(LEAT_TEST_DIR) + "/golden/vectors.json");
    return json::parse(file).at(name);
}

std::uint64_t from_hex(const json& text) {
    return std::stoull(text.get<std::string>(), nullptr, 16);
}

/// The stream of a row; these paths are a text and an integer.
leat::stream stream_of(const json& row) {
    const json& path = row.at("path");
    return leat::source(row.at("seed").get<std::uint64_t>())
        .stream(path.at(0).get<std::string>(), path.at(1).get<std::uint64_t>());
}

/// An engine of `Values` values from `Smallest` on, made of a stream's words.
template <std::uint64_t Values, std::uint64_t Smallest>
struct ranged {
    using result_type = std::uint64_t;
    static constexpr result_type min() { return Smallest; }
    static constexpr result_type max() { return Smallest + (Values - 1); }
    result_type operator()() { return Smallest + words() % Values; }

    leat::stream words;
};

template <std::uint64_t Values, std::uint64_t Smallest>
void check_words(const json& row) {
    SCOPED_TRACE(row.dump());
    ASSERT_EQ(row.at("values"), Values);
    ASSERT_EQ(row.at("smallest"), Smallest);
    ranged<Values, Smallest> g{stream_of(row)};
    ASSERT_EQ(row.at("word64").size(), row.at("word32").size());
    for (std::size_t i = 0; i < row.at("word64").size(); ++i) {
        EXPECT_EQ(leat::word64(g), from_hex(row.at("word64").at(i)));
        EXPECT_EQ(leat::word32(g), from_hex(row.at("word32").at(i)));
    }
    EXPECT_EQ(g.words.position(), row.at("position"));
}

TEST(Vectors, WordsOfEnginesOfAnyRange) {
    const json rows = section("words");
    ASSERT_EQ(rows.size(), 8u);
    check_words<6, 1>(rows.at(0));
    check_words<57, 3>(rows.at(1)); // rejects
    check_words<2, 0>(rows.at(2));
    check_words<256, 0>(rows.at(3));
    check_words<2147483646, 1>(rows.at(4));
    check_words<4294967296, 0>(rows.at(5));
    check_words<4294967295, 1>(rows.at(6));
    check_words<18446744073709551615u, 1>(rows.at(7));
}

template <ends Ends>
void check_unit(const json& row, const char* name) {
    SCOPED_TRACE(name);
    leat::scripted g{from_hex(row.at("word")), 0};
    EXPECT_EQ(std::bit_cast<std::uint64_t>(leat::unit<double, Ends>(g)),
              from_hex(row.at("double").at(name)));
    EXPECT_EQ(g.asked(), 1u);
    leat::scripted again{from_hex(row.at("word")), 0};
    EXPECT_EQ(std::bit_cast<std::uint32_t>(leat::unit<float, Ends>(again)),
              from_hex(row.at("float").at(name)));
    EXPECT_EQ(again.asked(), 1u);
}

TEST(Vectors, Unit) {
    const json rows = section("unit");
    ASSERT_GE(rows.size(), 30u);
    for (const json& row : rows) {
        SCOPED_TRACE(row.dump());
        check_unit<ends::open>(row, "open");
        check_unit<ends::closed_open>(row, "closed_open");
        check_unit<ends::open_closed>(row, "open_closed");
        check_unit<ends::closed>(row, "closed");
    }
}

/// The row's values from uniform_integer<Int>, whatever the type they are drawn as.
template <class Int>
void check_uniform_integer(const json& row) {
    const leat::uniform_integer<Int> law(row.at("lo").get<Int>(), row.at("hi").get<Int>());
    leat::stream s = stream_of(row);
    for (const json& value : row.at("values")) {
        EXPECT_EQ(law(s), value.get<Int>());
    }
    EXPECT_EQ(s.position(), row.at("position"));
}

TEST(Vectors, UniformInteger) {
    const json rows = section("uniform_integer");
    int rejected = 0;
    for (const json& row : rows) {
        SCOPED_TRACE(row.dump());
        const bool is_signed = row.at("lo").get<double>() < 0;
        if (is_signed) {
            check_uniform_integer<std::int64_t>(row);
        } else {
            check_uniform_integer<std::uint64_t>(row);
        }
        if (row.at("hi").get<double>() < 0x1p31) { // the type does not matter
            check_uniform_integer<std::int32_t>(row);
        }
        rejected += row.at("position") > row.at("values").size() ? 1 : 0;
    }
    EXPECT_GE(rows.size(), 12u);
    EXPECT_GE(rejected, 3) << "ranges of 32 and of 64 bits in which words are rejected";
}

TEST(Vectors, Below) {
    const json rows = section("below");
    ASSERT_GE(rows.size(), 9u);
    for (const json& row : rows) {
        SCOPED_TRACE(row.dump());
        leat::stream s = stream_of(row);
        for (const json& value : row.at("values")) {
            EXPECT_EQ(leat::below(row.at("n").get<std::uint64_t>(), s), value);
        }
        EXPECT_EQ(s.position(), row.at("position"));
    }
}

/// The draws of a row, to the bit, and the words they consume.
template <class Law>
void check_law(const json& row, const Law& law, std::set<std::string>& branches) {
    SCOPED_TRACE(row.dump());
    leat::stream s = stream_of(row);
    s.seek(row.at("word").get<std::uint64_t>());
    for (const json& value : row.at("values")) {
        EXPECT_EQ(std::bit_cast<std::uint64_t>(law(s)), from_hex(value));
    }
    EXPECT_EQ(s.position(), row.at("position"));
    for (const json& branch : row.at("branches")) {
        branches.insert(branch.get<std::string>());
    }
}

TEST(Vectors, Exponential) {
    std::set<std::string> branches;
    for (const json& row : section("exponential")) {
        check_law(row, leat::exponential(row.at("rate").get<double>()), branches);
    }
    EXPECT_EQ(branches, (std::set<std::string>{"tail", "wedge", "wedge, rejected"}));
}

TEST(Vectors, Normal) {
    std::set<std::string> branches;
    for (const json& row : section("normal")) {
        check_law(row, leat::normal(row.at("mean").get<double>(), row.at("sd").get<double>()),
                  branches);
    }
    EXPECT_EQ(branches,
              (std::set<std::string>{"tail", "tail, rejected", "wedge", "wedge, rejected"}));
}

} // namespace
