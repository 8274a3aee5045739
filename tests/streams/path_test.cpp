// Addresses from paths: the vectors of tests/golden/vectors.json, made by the second implementation
// (tests/specification), and what tells two paths apart.

#include "leat/streams/source.hpp"

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <array>
#include <fstream>
#include <limits>
#include <set>
#include <string>
#include <tuple>

namespace {

using leat::source;
using leat::stream;
using leat::stream_address;

nlohmann::json vectors() {
    std::ifstream file(std::string(LEAT_TEST_DIR) + "/golden/vectors.json");
    return nlohmann::json::parse(file);
}

std::uint64_t from_hex(const nlohmann::json& text) {
    return std::stoull(text.get<std::string>(), nullptr, 16);
}

source opened(const nlohmann::json& seed) {
    if (seed.is_string()) {
        return source(seed.get<std::string>());
    }
    return seed.is_number_unsigned() ? source(seed.get<std::uint64_t>())
                                     : source(seed.get<std::int64_t>());
}

source extended(const source& from, const nlohmann::json& part) {
    if (part.is_string()) {
        return from.branch(part.get<std::string>());
    }
    return part.is_number_unsigned() ? from.branch(part.get<std::uint64_t>())
                                     : from.branch(part.get<std::int64_t>());
}

TEST(Path, GivesTheAddressesAndWordsOfTheSecondImplementation) {
    const nlohmann::json rows = vectors().at("streams");
    ASSERT_GE(rows.size(), 20u);
    for (const auto& row : rows) {
        SCOPED_TRACE(row.dump());
        source at = opened(row.at("seed"));
        for (const auto& part : row.at("path")) {
            at = extended(at, part); // one part at a time: paths concatenate
        }
        stream s = at.stream();
        EXPECT_EQ(s.address(),
                  (stream_address{from_hex(row.at("key")), from_hex(row.at("upper")), 0}));
        EXPECT_EQ(to_string(s.address()), row.at("line"));
        EXPECT_EQ(to_string(s.offspring(5).address()), row.at("offspring_5"));
        EXPECT_EQ(to_string(s.offspring("spare").address()), row.at("offspring_spare"));
        leat::thin_stream thin = at.thin_stream();
        for (const auto& word : row.at("words")) {
            EXPECT_EQ(s(), from_hex(word));
            EXPECT_EQ(thin(), from_hex(word));
        }
        s.seek(~std::uint64_t{0} - 2);
        for (const auto& word : row.at("last_words")) {
            EXPECT_EQ(s(), from_hex(word));
        }
        EXPECT_THROW(s(), leat::stream_exhausted);
    }
}

constexpr source study{20261201};

template <class... Parts>
stream_address at(const Parts&... parts) {
    return study.stream(parts...).address();
}

TEST(Path, TellsApartWhatIsWrittenDifferently) {
    const std::array addresses{
        at(),
        at(7),
        at("7"),
        at("ab", "c"),
        at("a", "bc"),
        at("abc"),
        at("a"),
        at("a", 0),
        at(0),
        at("a", 0u, 0u),
        at(-1),
        at(1),
        at(~std::uint64_t{0}),
        at(""),
        at("", ""),
        at(0, "a"),
        at(0, 0),
        at(0, 0, 0),
        at(std::numeric_limits<std::int64_t>::min()),
        at(std::uint64_t{1} << 63),
        source("20261201").stream().address(),
        source(20261202).stream().address(),
        source(-20261201).stream().address(),
        study.stream().offspring(0).address(),
        study.stream().offspring("0").address(),
        study.stream(0).offspring(0).address(),
    };
    std::set<std::tuple<std::uint64_t, std::uint64_t>> distinct;
    for (const auto& a : addresses) {
        distinct.emplace(a.key, a.upper);
    }
    EXPECT_EQ(distinct.size(), addresses.size());
}

TEST(Path, IgnoresTheTypeOfAnInteger) {
    EXPECT_EQ(at(7), at(std::uint8_t{7}));
    EXPECT_EQ(at(7), at(std::int16_t{7}));
    EXPECT_EQ(at(7), at(7ull));
    EXPECT_EQ(at(-7, 1), at(std::int8_t{-7}, 1));
    EXPECT_EQ(source(7).stream().address(), source(7ull).stream().address());
    EXPECT_EQ(at("gearbox"), at(std::string("gearbox")));
    EXPECT_EQ(at("gearbox"), at(std::string_view("gearbox")));
}

TEST(Path, Concatenates) {
    EXPECT_EQ(study.branch("a", 1).stream(2).address(), at("a", 1, 2));
    EXPECT_EQ(study.branch("a").branch(1).branch(2).stream().address(), at("a", 1, 2));
    EXPECT_EQ(study.branch(3).stream().address(), at(3));
    EXPECT_EQ(study.branch().stream(3).address(), at(3));
    EXPECT_EQ(study.branch(3).stream("x").address(), at(3, "x"));
    EXPECT_EQ(study.branch(1), study.branch(1u));
}

TEST(Path, GivesSiblingsOneKeyAndCountersApart) {
    const auto first = at("turbine", 0);
    for (std::uint64_t i : {std::uint64_t{1}, std::uint64_t{1000}, ~std::uint64_t{0}}) {
        const auto other = at("turbine", i);
        EXPECT_EQ(other.key, first.key);
        EXPECT_EQ(other.upper, first.upper + i);
    }
    EXPECT_NE(at("turbine", -1).key, first.key);
}

TEST(Path, RefusesANullPointer) {
    const char* nothing = nullptr;
    try {
        (void)study.stream(nothing);
        FAIL();
    } catch (const leat::invalid_parameter& e) {
        EXPECT_STREQ(e.what(), "leat::source: a path part is a null pointer, must be a text");
    }
}

// The same stream whatever was opened before, and in constant evaluation.
constexpr std::uint64_t first_word(const source& from, int turbine) {
    stream s = from.stream("failures", 3, turbine);
    return s();
}
static_assert(first_word(study, 4) == 0x349520491e0e5afe); // as in vectors.json

} // namespace
