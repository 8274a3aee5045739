// Run manifests: what a run opened comes back where it stood, or is refused with the reason. What
// is expected is what the run itself would have drawn next.

#include "leat/bulk/fill_chunks.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/state/json.hpp"
#include "leat/state/manifest.hpp"
#include "leat/uniform/unit.hpp"

#include "support/sanitized.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <cstdio>
#include <string>
#include <utility>
#include <vector>

namespace {

using leat::ledger;
using leat::manifest;
using leat::source;
using nlohmann::json;

manifest through_json(const manifest& m) {
    const std::string text = json(m).dump();
    return json::parse(text).get<manifest>();
}

/// A manifest of one of everything.
manifest sample() {
    ledger book;
    const source study{20261201, book};
    leat::stream s = study.branch("wind", 3).stream(7, "gusts", 12);
    leat::thin_stream t = source{"a \"text\"\xff", book}.thin_stream(-1);
    leat::thin_stream child = t.offspring(4);
    (void)s.replica();
    (void)study.engine<leat::xoshiro256_plus_plus>("arrivals");
    std::array<double, 5> values{};
    leat::fill_chunks(
        values, [](auto& g) { return leat::unit(g); }, study);
    (void)s();
    (void)t();
    s.limit(100);
    s.discard(8);
    (void)child();
    return manifest{book};
}

TEST(Manifest, ReturnsThroughJson) {
    const manifest m = sample();
    EXPECT_EQ(through_json(m), m);
    EXPECT_EQ(json::parse(json(m).dump(4)).get<manifest>(), m);
    manifest target;
    EXPECT_NE(target, m);
    json(m).get_to(target);
    EXPECT_EQ(target, m);
    EXPECT_EQ(through_json(manifest{}), manifest{});
    EXPECT_EQ(m.library(), leat::version);
    ASSERT_EQ(m.openings().size(), 6u);
    EXPECT_EQ(m.openings()[0].words, 1u);
    EXPECT_EQ(m.openings()[0].address.position, 9u);
    EXPECT_EQ(m.openings()[0].limit, 100u);
}

TEST(Manifest, CanBeRead) {
    EXPECT_EQ(
        to_string(sample()),
        std::string("leat ") + leat::version +
            "\n"
            "path: SipHash-2-4-128 over seed and parts, version 1\n"
            "stream: philox4x32-10, two 64-bit words a block, version 1\n"
            "chunk: a stream for each 4096 elements, version 1\n"
            "engine: seeded from a stream, version 1\n"
            "source{20261201}\n"
            "source{\"a \\\"text\\\"\\xff\"}\n"
            "opening 1: source{20261201}.branch(\"wind\", 3).stream(7, \"gusts\", 12), at word 9, "
            "1 drawn, limit 100\n"
            "opening 2: source{\"a \\\"text\\\"\\xff\"}.thin_stream(-1), at word 1, 1 drawn\n"
            "opening 3: source{\"a \\\"text\\\"\\xff\"}.thin_stream(-1).offspring(4), at word 1, "
            "1 drawn\n"
            "opening 4: source{20261201}.branch(\"wind\", 3).stream(7, \"gusts\", 12).replica(), "
            "at word 0, 0 drawn\n"
            "opening 5: source{20261201}.engine(\"arrivals\"), at word 0, 0 drawn\n"
            "opening 6: source{20261201}.chunk(0), at word 5, 5 drawn\n");
}

TEST(Manifest, RecreatesARunInAnyOrder) {
    // A run of 50 entities, thin streams, agents born in it, and limits; stopped in its midst.
    ledger book;
    const source study{-7, book};
    std::vector<leat::stream> entities;
    std::vector<leat::thin_stream> thin;
    std::vector<leat::stream> agents;
    for (int i = 0; i < 50; ++i) {
        entities.push_back(study.stream("entity", i));
        thin.push_back(study.branch("thin").thin_stream(i));
        agents.push_back(entities.back().offspring("agent"));
    }
    for (std::size_t i = 0; i < 50; ++i) {
        for (std::size_t n = 0; n < 3 * i; ++n) {
            (void)entities[i]();
            (void)thin[i]();
            (void)agents[i]();
        }
        agents[i].limit(3 * i + 1);
    }
    leat::stream again = entities[9].replica();
    (void)again();
    const manifest saved = through_json(manifest{book});

    // The same program in a new process, which opens in another order and keeps a ledger again.
    ledger second;
    const source restored = saved.study(second);
    EXPECT_EQ(restored, study);
    for (int i = 49; i >= 0; --i) {
        const auto at = static_cast<std::size_t>(i);
        leat::thin_stream t = restored.thin_stream("thin", i);
        leat::stream s = restored.stream("entity", i);
        leat::stream agent = s.offspring("agent");
        ASSERT_TRUE(saved.restore(t));
        ASSERT_TRUE(saved.restore(s));
        ASSERT_TRUE(saved.restore(agent));
        for (int n = 0; n < 40; ++n) {
            ASSERT_EQ(s(), entities[at]());
            ASSERT_EQ(t(), thin[at]());
        }
        EXPECT_EQ(agent(), agents[at]());
        EXPECT_THROW((void)agent(), leat::stream_exhausted);
    }
    EXPECT_EQ(saved.stream(151)(), again()); // the replica, by its number
    EXPECT_EQ(saved.thin_stream(151).address(), saved.stream(151).address());
    EXPECT_TRUE(second.repeated().empty());

    leat::stream unknown = restored.stream("entity", 50);
    unknown.seek(5);
    EXPECT_FALSE(saved.restore(unknown));
    EXPECT_EQ(unknown.position(), 5u);
}

TEST(Manifest, KeepsSeedsOfEveryKind) {
    ledger book;
    const std::vector<source> studies{
        source{0, book},  source{~0ull, book}, source{std::int64_t{-9223372036854775807} - 1, book},
        source{"", book}, source{"7", book},   source{std::string("\0\n\"\\\x80", 5), book},
        source{7, book}};
    const manifest m = through_json(manifest{book});
    for (std::size_t i = 0; i < studies.size(); ++i) {
        EXPECT_EQ(m.study(i), studies[i]) << m.sources()[i];
    }
    EXPECT_EQ(m.study(), studies[0]);
    EXPECT_THROW((void)m.study(studies.size()), leat::invalid_parameter);
    EXPECT_THROW((void)manifest{}.study(), leat::invalid_parameter);
}

TEST(Manifest, RefusesToGuess) {
    const manifest m = sample();
    for (const std::size_t none : {std::size_t{0}, std::size_t{7}, ~std::size_t{0}}) {
        EXPECT_THROW((void)m.stream(none), leat::invalid_parameter);
    }
    EXPECT_THROW((void)m.stream(5), leat::invalid_parameter); // an engine
    // One address, two streams that stand apart.
    ledger book;
    const source study{1, book};
    leat::stream one = study.stream("x");
    leat::stream other = study.stream("x");
    EXPECT_TRUE(manifest{book}.restore(one)); // both at the start
    (void)other();
    const manifest twice{book};
    leat::stream s = source{1}.stream("x");
    s.seek(3);
    EXPECT_THROW((void)twice.restore(s), leat::invalid_parameter);
    EXPECT_EQ(s.position(), 3u);
    EXPECT_EQ(twice.stream(2)(), other());
}

// ---- documents that are refused ----

/// The sample's document after a change, with a checksum that fits.
json changed(void (*change)(json&)) {
    json content = json(sample());
    for (const char* field : {"leat", "version", "checksum"}) {
        content.erase(field);
    }
    change(content);
    return leat::detail::seal("manifest", 1, content);
}

TEST(Manifest, IsRefusedWithTheReason) {
    const std::string major = std::string(leat::version).substr(0, 2);
    const std::string ours = std::to_string(LEAT_VERSION_MAJOR + 1) + ".0.0";
    struct row {
        void (*change)(json&);
        std::string reason;
    };
    const row rows[] = {
        {[](json& d) { d["library"] = std::to_string(LEAT_VERSION_MAJOR + 1) + ".0.0"; },
         "leat::json: manifest: library = \"" + ours + "\", must be " + major + "x: other major"},
        {[](json& d) { d["library"] = ""; }, "library = \"\""},
        {[](json& d) { d["algorithms"]["stream"] = "philox4x32-7, version 2"; },
         "stream = \"philox4x32-7, version 2\", must be \"philox4x32-10, two 64-bit words"},
        {[](json& d) { d["algorithms"]["lattice"] = "of some later version"; },
         "has a field \"lattice\" that is not known here"},
        {[](json& d) { d["algorithms"].erase("path"); }, "has no field \"path\""},
        {[](json& d) { d["sources"][0] = "source{2026-12-01}"; },
         "source = \"source{2026-12-01}\", must be spelled"},
        {[](json& d) { d["openings"][0]["path"] = "source{20261201}.stream(8)"; },
         "path = \"source{20261201}.stream(8)\", must lead to the address beside it"},
        {[](json& d) { d["openings"][0]["path"] = "study.stream(8)"; },
         "path = \"study.stream(8)\", must be a path as a ledger spells it"},
        {[](json& d) { d["openings"][1]["address"] = "leat-stream 1 key 0"; },
         "openings[1]: address: text = \"leat-stream 1 key 0\", must have 16 hexadecimal"},
        {[](json& d) { d["openings"][1].erase("limit"); }, "has no field \"limit\""},
        {[](json& d) { d["openings"][1]["note"] = 1; }, "has a field \"note\""},
        {[](json& d) { d["openings"][1]["words"] = -1; }, "must be the decimal digits"},
        {[](json& d) { d["openings"] = 3; }, "must be a list"},
    };
    EXPECT_NO_THROW((void)changed([](json&) {}).get<manifest>());
    for (const row& r : rows) {
        const manifest before = sample();
        manifest target = before;
        try {
            changed(r.change).get_to(target);
            ADD_FAILURE() << "accepted; wanted: " << r.reason;
        } catch (const leat::state_refused& e) {
            EXPECT_NE(std::string(e.what()).find(r.reason), std::string::npos)
                << e.what() << "\nwanted: " << r.reason;
        }
        EXPECT_EQ(target, before);
    }
}

TEST(Manifest, OfAnotherMinorVersionIsTaken) {
    // P7: what a seed yields changes with the major version only.
    const manifest later = changed([](json& d) {
                               d["library"] = std::to_string(LEAT_VERSION_MAJOR) + ".999.1";
                           }).get<manifest>();
    EXPECT_EQ(later.openings(), sample().openings());
}

TEST(Manifest, IsRefusedWhereAnyCharacterWasChanged) {
    // Every character replaced by others, and every cut: refused, or (white space, say) the same.
    const std::string text = json(sample()).dump();
    const manifest original = sample();
    int refused = 0;
    int same = 0;
    const auto attempt = [&](const std::string& damaged) {
        try {
            EXPECT_EQ(leat::from_json_text<manifest>(damaged), original) << damaged;
            ++same;
        } catch (const leat::state_refused&) {
            ++refused;
        }
    };
    const std::size_t stride = leat_test::sanitized ? 20 : 1;
    for (std::size_t i = 0; i < text.size(); i += stride) {
        for (const char c : {'0', 'x', '"', ' ', '}', static_cast<char>(text[i] ^ 1)}) {
            std::string damaged = text;
            damaged[i] = c;
            if (damaged != text) {
                attempt(damaged);
            }
        }
        attempt(text.substr(0, i));
    }
    std::printf("%d damaged manifests refused, %d read as before\n", refused, same);
    EXPECT_GT(refused, leat_test::sanitized ? 500 : 10000);
    EXPECT_LT(same, 5);
}

TEST(Manifest, OfVersionOneIsReadForEver) {
    // Written by leat 0.1.0 at word 3 of its only stream. The format is frozen.
    const auto run = leat::from_json_text<manifest>(R"json(
{
  "algorithms": {
    "chunk": "a stream for each 4096 elements, version 1",
    "engine": "seeded from a stream, version 1",
    "path": "SipHash-2-4-128 over seed and parts, version 1",
    "stream": "philox4x32-10, two 64-bit words a block, version 1"
  },
  "checksum": "4b47244b8191102d",
  "leat": "manifest",
  "library": "0.1.0",
  "openings": [
    {
      "address": "leat-stream 1 key eddc1b71c2c32af4 upper 68a1b065bfde36ea word 3 sum 904e486c",
      "limit": "1000",
      "path": "source{20261201}.stream(\"failures\", 7)",
      "words": "3"
    }
  ],
  "sources": [
    "source{20261201}"
  ],
  "version": 1
})json");
    EXPECT_EQ(run.sources(), std::vector<std::string>{"source{20261201}"});
    leat::stream s = run.study().stream("failures", 7);
    EXPECT_TRUE(run.restore(s));
    EXPECT_EQ(s.position(), 3u);
    EXPECT_EQ(s.limit(), 1000u);
}

} // namespace
