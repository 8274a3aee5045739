// Reading and refusing: each of nlohmann's ways to ask for an object, and what each fault of a
// document is refused with, the target being kept.

#include "state/json_report.hpp"

#include "leat/distributions/normal.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/regions/disk.hpp"
#include "leat/regions/rejection.hpp"
#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace {

using leat_test::refusal_of;
using nlohmann::json;

TEST(JsonReading, StreamsGoOnWhereTheyWere) {
    for (const std::uint64_t position : {0u, 1u, 31u, 32u, 33u, 1000003u}) {
        leat::stream original = leat::source{5}.stream("x", 1);
        original.seek(position);
        original.limit(position + 40);
        const json saved = original;
        auto again = saved.get<leat::stream>();
        auto thin = json(original.address()).get<leat::stream_address>() == original.address();
        EXPECT_TRUE(thin);
        for (int i = 0; i < 40; ++i) {
            EXPECT_EQ(original(), again()) << position << " + " << i;
        }
        EXPECT_THROW(again(), leat::stream_exhausted);
    }
}

TEST(JsonReading, EveryWayOfNlohmannWorks) {
    const leat::normal original{3, 0.5};
    const json saved = original;
    EXPECT_EQ(saved.get<leat::normal<>>(), original);
    leat::normal target{0, 1};
    saved.get_to(target);
    EXPECT_EQ(target, original);
    target = leat::normal{0, 1};
    from_json(saved, target); // found by its argument's namespace
    EXPECT_EQ(target, original);
    json copy;
    to_json(copy, original);
    EXPECT_EQ(copy, saved);
    const nlohmann::ordered_json ordered = original;
    EXPECT_EQ(ordered.begin().key(), "leat"); // in the order that people read
    EXPECT_EQ(ordered.get<leat::normal<>>(), original);
    EXPECT_EQ(ordered.at("checksum").get<std::string>(), saved.at("checksum").get<std::string>());

    // Inside the program's own documents, move-only streams too.
    std::vector<leat::stream> streams;
    streams.push_back(leat::source{1}.stream(0));
    streams.push_back(leat::source{1}.stream(1));
    const json all = {{"time", 3.5}, {"streams", streams}, {"law", original}};
    auto again =
        json::parse(std::string_view(all.dump())).at("streams").get<std::vector<leat::stream>>();
    ASSERT_EQ(again.size(), 2u);
    EXPECT_EQ(again[1](), streams[1]());
    EXPECT_EQ(leat::json_text(original), saved.dump());
    EXPECT_EQ(leat::from_json_text<leat::normal<>>(saved.dump()), original);
}

TEST(JsonRefusals, AStreamThatWasMovedFromIsNotSaved) {
    leat::stream original = leat::source{1}.stream(0);
    const leat::stream taken = std::move(original);
    try {
        (void)json(original); // NOLINT: that is the point
        ADD_FAILURE() << "saved";
    } catch (const leat::error& refused) {
        EXPECT_STREQ(refused.what(), "leat::json: stream: saved after it was moved from; save what "
                                     "it was moved to");
    }
}

/// The document with one field put in place of another, and a checksum that fits.
json resealed(json document, const char* field, const json& value) {
    const auto type = document.at("leat").get<std::string>();
    for (const char* const name : {"leat", "version", "checksum"}) {
        document.erase(name);
    }
    document[field] = value;
    return leat::detail::seal(type, 1, document);
}

TEST(JsonRefusals, ForbiddenStatesAreRefusedAndTheTargetIsKept) {
    const leat::xorshift128 before{7};
    leat::xorshift128 target = before;
    const json saved = leat::xorshift128{8};
    const auto refusal = [&](const json& document) {
        const std::string reason = refusal_of([&] { document.get_to(target); });
        EXPECT_EQ(target, before);
        return reason;
    };
    const std::string not_a_state =
        "leat::json: xorshift128: state = a list of 4, must be the words of a state that the "
        "engine can be in";
    EXPECT_EQ(refusal(resealed(saved, "state", {"0", "0", "0", "0"})), not_a_state);
    EXPECT_EQ(refusal(resealed(saved, "state", {"1", "2", "3", "4294967296"})), not_a_state);
    EXPECT_EQ(refusal(resealed(saved, "state", {"1", "2", "3"})),
              "leat::json: xorshift128: state = a list of 3, must be the words of a state that the "
              "engine can be in");
    EXPECT_EQ(refusal(resealed(saved, "state", {"1", "2", "3", "4", "5"})),
              "leat::json: xorshift128: state = a list of 5, must be the words of a state that the "
              "engine can be in");
    EXPECT_EQ(refusal(resealed(saved, "state", {"1", "2", "3", 4})),
              "leat::json: xorshift128: state[3] = 4, must be the decimal digits, as a text, of a "
              "whole number from 0 to 18446744073709551615");
    for (const char* const word : {"", "+4", "04", " 4", "4 5", "18446744073709551616", "x4"}) {
        EXPECT_NE(refusal(resealed(saved, "state", {"1", "2", "3", word})).find("state[3] = "),
                  std::string::npos);
    }
    EXPECT_EQ(refusal(resealed(saved, "state", 7)),
              "leat::json: xorshift128: state = 7, must be a list");
    EXPECT_EQ(refusal(resealed(saved, "seed", 7)),
              "leat::json: xorshift128 has a field \"seed\" that is not known here");
    EXPECT_EQ(refusal(leat::detail::seal("xorshift128", 1, json::object())),
              "leat::json: xorshift128 has no field \"state\"");
    json changed = saved;
    changed["state"][0] = "9";
    EXPECT_NE(
        refusal(changed).find("\", must fit the rest of the document: it was changed or damaged"),
        std::string::npos);
    changed = saved;
    changed.erase("checksum");
    EXPECT_EQ(refusal(changed), "leat::json: xorshift128 has no field \"checksum\"");
    changed = saved;
    changed["version"] = 0;
    EXPECT_EQ(refusal(changed), "leat::json: xorshift128: version = 0, must be 1");
    changed["version"] = "1";
    EXPECT_NE(refusal(changed).find("version = \"1\", must be a whole number from 0"),
              std::string::npos);
    EXPECT_EQ(refusal(json(leat::xorshift32{8})),
              "leat::json: xorshift128: leat = \"xorshift32\", must be \"xorshift128\": it was "
              "saved from another type");
    for (const json& other : {json(), json(7), json("xorshift128"), json::array({saved})}) {
        EXPECT_NE(refusal(other).find("leat::json: xorshift128: the document = "),
                  std::string::npos);
    }
    json deep = 0;
    for (int i = 0; i < 1000; ++i) {
        deep = json::array({std::move(deep)});
    }
    changed = saved;
    changed["state"] = std::move(deep);
    EXPECT_NE(refusal(changed).find("more than 64 deep"), std::string::npos);
    EXPECT_EQ(refusal_of([] { (void)leat::from_json_text<leat::xorshift128>(R"({"leat": "x)"); }),
              "leat::json: xorshift128: the text is no JSON: it was cut or damaged");
    // The twin that is accepted.
    resealed(saved, "state", {"1", "2", "3", "4"}).get_to(target);
    EXPECT_EQ(target, (leat::xorshift128{leat::xorshift128::state_type{1, 2, 3, 4}}));
}

TEST(JsonRefusals, RefusedParametersNameThemselves) {
    leat::normal<float> target{1, 2};
    const json saved = leat::normal<float>{0, 1};
    const auto refusal = [&](const json& document) {
        const std::string reason = refusal_of([&] { document.get_to(target); });
        EXPECT_EQ(target, (leat::normal<float>{1, 2}));
        return reason;
    };
    EXPECT_EQ(refusal(resealed(saved, "sd", -1)),
              "leat::json: normal<float>: sd = -1, must be finite and >= 0");
    EXPECT_EQ(refusal(resealed(saved, "sd", "infinity")),
              "leat::json: normal<float>: sd = inf, must be finite and >= 0");
    EXPECT_EQ(refusal(resealed(saved, "sd", 0.1)),
              "leat::json: normal<float>: sd = 0.1, must be a number that a float holds, or the "
              "text \"infinity\" or \"-infinity\"");
    EXPECT_EQ(refusal(resealed(saved, "sd", 1e300)),
              "leat::json: normal<float>: sd = 1e+300, must be a number that a float holds, or the "
              "text \"infinity\" or \"-infinity\"");
    EXPECT_NE(refusal(resealed(saved, "sd", nullptr)).find("sd = null, must be"),
              std::string::npos);
    EXPECT_EQ(refusal(json(leat::normal{0, 1})),
              "leat::json: normal<float>: leat = \"normal\", must be \"normal<float>\": it was "
              "saved from another type");
    // What another program may write for the same number.
    resealed(saved, "sd", 3).get_to(target);
    EXPECT_EQ(target, (leat::normal<float>{0, 3}));
}

/// A predicate with a member: it has a form of its own.
struct left_of {
    double edge = 0;
    bool operator()(const std::array<double, 2>& p) const { return p[0] < edge; }
    friend bool operator==(const left_of&, const left_of&) = default;
};
void to_json(json& j, const left_of& x) { j = {{"edge", x.edge}}; }
void from_json(const json& j, left_of& x) { j.at("edge").get_to(x.edge); }

TEST(JsonReading, APredicateWithMembersIsSavedByItsOwnForm) {
    const leat::rejection region{leat::disk{{0, 0}, 1}, left_of{0.25}};
    const json document = region;
    EXPECT_EQ(document.at("predicate").at("edge"), 0.25);
    EXPECT_TRUE(document.at("measure").is_null()); // not known
    EXPECT_EQ(document.get<decltype(region)>(), region);
    json content = document;
    for (const char* const name : {"leat", "version", "checksum"}) {
        content.erase(name);
    }
    content["predicate"] = 7;
    const json wrong = leat::detail::seal("rejection<disk>", 1, content);
    EXPECT_EQ(refusal_of([&] { (void)wrong.get<decltype(region)>(); }),
              "leat::json: rejection<disk>: predicate = 7, must be what its own from_json reads");
}

} // namespace
