// The ledger: every opening under its path, addresses opened twice, words counted; and the same
// numbers with it and without. What is expected is counted by the tests themselves.

#include "leat/bulk/fill_chunks.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/ledger.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <random>
#include <string>
#include <thread>
#include <utility>
#include <vector>

namespace {

using leat::ledger;
using leat::ledger_entry;
using leat::source;

std::vector<std::string> paths(const ledger& book) {
    std::vector<std::string> list;
    for (const ledger_entry& e : book.entries()) {
        list.push_back(e.path);
    }
    return list;
}

using texts = std::vector<std::string>;

TEST(Ledger, KeepsThePathOfEveryOpening) {
    ledger book;
    const source study{20261201, book};
    EXPECT_EQ(book.size(), 0u);
    const source wind = study.branch("wind", 3).branch(-5);
    leat::stream s = wind.stream(7, "gusts", 12);
    (void)study.stream();
    leat::thin_stream thin = study.thin_stream("site", 4u);
    (void)s.offspring(2).offspring("x");
    (void)thin.offspring(9);
    (void)s.replica();
    (void)study.engine<leat::xoshiro256_plus_plus>("arrivals", 7);
    std::array<double, 5000> values{};
    leat::fill_chunks(values, leat::exponential{1}, study.branch("noise"));
    EXPECT_EQ(paths(book),
              (texts{R"(source{20261201}.branch("wind", 3).branch(-5).stream(7, "gusts", 12))",
                     R"(source{20261201}.stream())", R"(source{20261201}.thin_stream("site", 4))",
                     R"(source{20261201}.branch("wind", 3).branch(-5).stream(7, "gusts", 12))"
                     R"(.offspring(2))",
                     R"(source{20261201}.branch("wind", 3).branch(-5).stream(7, "gusts", 12))"
                     R"(.offspring(2).offspring("x"))",
                     R"(source{20261201}.thin_stream("site", 4).offspring(9))",
                     R"(source{20261201}.branch("wind", 3).branch(-5).stream(7, "gusts", 12))"
                     R"(.replica())",
                     R"(source{20261201}.engine("arrivals", 7))",
                     R"(source{20261201}.branch("noise").chunk(0))",
                     R"(source{20261201}.branch("noise").chunk(1))"}));
    EXPECT_TRUE(book.repeated().empty());
    EXPECT_EQ(book.sources(), texts{"source{20261201}"});
    std::uint64_t number = 0;
    for (const ledger_entry& e : book.entries()) {
        EXPECT_EQ(e.opening, ++number);
    }
    EXPECT_EQ(book.entries()[0].address, s.address());
}

TEST(Ledger, SpellsTextsInPrintableASCII) {
    ledger book;
    const source study{"a \"seed\"", book};
    (void)study.stream(std::string("back\\slash\n\0\xff", 13), "", -1);
    EXPECT_EQ(paths(book),
              texts{R"(source{"a \"seed\""}.stream("back\\slash\x0a\x00\xff", "", -1))"});
}

// ---- opened twice ----

/// The one repeated opening of a ledger, as its two paths.
std::pair<std::string, std::string> the_repeated(const ledger& book) {
    const auto list = book.repeated();
    EXPECT_EQ(list.size(), 1u) << to_string(book);
    return list.empty() ? std::pair<std::string, std::string>{}
                        : std::pair{list[0].first.path, list[0].again.path};
}

TEST(Ledger, FindsAPlantedSecondOpeningAndNamesBothPlaces) {
    // One module opens by a branch, another by the whole path; the paths concatenate.
    ledger book;
    const source study{1, book};
    const source site = study.branch("a", 1);
    for (int i = 0; i < 100; ++i) {
        (void)site.stream(i);
    }
    leat::stream twin = study.stream("a", 1, 42);
    (void)twin();
    const auto list = book.repeated();
    ASSERT_EQ(list.size(), 1u);
    EXPECT_EQ(list[0].first.path, R"(source{1}.branch("a", 1).stream(42))");
    EXPECT_EQ(list[0].first.opening, 43u);
    EXPECT_EQ(list[0].again.path, R"(source{1}.stream("a", 1, 42))");
    EXPECT_EQ(list[0].again.opening, 101u);
    const std::string line = to_string(list[0]);
    EXPECT_EQ(line, R"(opened twice: source{1}.branch("a", 1).stream(42) (opening 43, )"
                    R"(0 words drawn) and source{1}.stream("a", 1, 42) (opening 101, )"
                    R"(1 words drawn))");
    EXPECT_NE(to_string(book).find(line), std::string::npos);
}

TEST(Ledger, FindsEveryKindOfSecondOpening) {
    const auto of = [](auto open) {
        ledger book;
        open(source{1, book});
        return the_repeated(book);
    };
    using pair = std::pair<std::string, std::string>;
    EXPECT_EQ(of([](const source& s) {
                  (void)s.stream("x", 1);
                  (void)s.stream("x", 1);
              }),
              (pair{R"(source{1}.stream("x", 1))", R"(source{1}.stream("x", 1))"}));
    EXPECT_EQ(of([](const source& s) {
                  (void)s.thin_stream("x");
                  (void)s.branch("x").stream();
              }),
              (pair{R"(source{1}.thin_stream("x"))", R"(source{1}.branch("x").stream())"}));
    EXPECT_EQ(of([](const source& s) {
                  (void)s.engine<leat::xoshiro256_plus_plus>("e");
                  (void)s.engine<leat::xoshiro256_plus>("e");
              }),
              (pair{R"(source{1}.engine("e"))", R"(source{1}.engine("e"))"}));
    EXPECT_EQ(
        of([](const source& s) {
            const leat::stream parent = s.stream("p");
            (void)parent.offspring(3);
            (void)parent.offspring(3);
        }),
        (pair{R"(source{1}.stream("p").offspring(3))", R"(source{1}.stream("p").offspring(3))"}));
    EXPECT_EQ(of([](const source& s) {
                  std::array<double, 10> a{};
                  leat::fill_chunks(a, leat::exponential{1}, s);
                  leat::fill_chunks(a, leat::exponential{2}, s);
              }),
              (pair{"source{1}.chunk(0)", "source{1}.chunk(0)"}));
    EXPECT_EQ(of([](const source& s) { // the same offspring of one replica
                  const leat::stream replica = s.stream("p").replica();
                  (void)replica.offspring(3);
                  (void)replica.offspring(3);
              }),
              (pair{R"(source{1}.stream("p").replica().offspring(3))",
                    R"(source{1}.stream("p").replica().offspring(3))"}));
}

TEST(Ledger, DoesNotReportWhatIsApartOrMeant) {
    ledger book;
    const source study{1, book};
    const source other{2, book};
    leat::stream s = study.stream("x", 1);
    (void)study.stream("x", 2);
    (void)study.stream("x", -1);
    (void)study.stream("x", "1");
    (void)other.stream("x", 1);
    (void)study.engine<leat::xoshiro256_plus_plus>("x", 1);
    std::array<double, 10> a{};
    leat::fill_chunks(a, leat::exponential{1}, study.branch("x"));
    leat::fill_chunks(a, leat::exponential{1}, study.branch("x", 1));
    leat::stream r = s.replica();
    (void)s.replica();
    (void)s.offspring(1);
    (void)r.offspring(1); // a replica has the offspring of the original
    leat::stream moved = std::move(s);
    EXPECT_TRUE(book.repeated().empty()) << to_string(book);
    EXPECT_EQ(book.size(), 12u);
    EXPECT_EQ(book.sources(), (texts{"source{1}", "source{2}"}));
}

TEST(Ledger, RefusesASecondOpeningAtOnceWhenToldTo) {
    ledger book{ledger::repeats::refuse};
    const source study{1, book};
    leat::stream kept = study.stream("x", 1);
    (void)study.stream("x", 2);
    try {
        (void)study.branch("x").thin_stream(1);
        FAIL() << "it was opened";
    } catch (const leat::repeated_stream& e) {
        EXPECT_STREQ(e.what(),
                     R"(leat::ledger: opened twice: source{1}.branch("x").thin_stream(1) )"
                     R"((opening 3), first as source{1}.stream("x", 1) (opening 1))");
    }
    EXPECT_EQ(book.size(), 2u);
    EXPECT_TRUE(book.repeated().empty());
    EXPECT_NO_THROW((void)kept.replica()());
    EXPECT_NO_THROW((void)study.stream("x", 3));
    EXPECT_EQ(book.entries().back().opening, 4u);
    // Long paths are cut, so that both are named.
    const std::string longest(500, 'y');
    (void)study.stream(longest);
    try {
        (void)study.stream(longest);
        FAIL() << "it was opened";
    } catch (const leat::repeated_stream& e) {
        EXPECT_NE(std::string(e.what()).find("first as source{1}.stream(\"yyy"), std::string::npos);
    }
}

TEST(Ledger, NamesThePlaceWhereASourceWasTold) {
    ledger book;
    const source study{1, book};
    (void)study.stream("noise", 3);
    const source mine = study.here().branch("noise");
    const std::string place = "ledger_test.cpp:" + std::to_string(__LINE__ - 1);
    leat::stream s = mine.stream(3);
    (void)s.replica();
    (void)s.offspring(1);
    (void)mine.here("C:\\src\\demand.cpp", 42).stream(4);
    (void)study.stream("noise", 5);
    std::vector<std::string> places;
    for (const ledger_entry& e : book.entries()) {
        places.push_back(e.place);
    }
    EXPECT_EQ(places, (texts{"", place, place, place, "demand.cpp:42", ""}));
    ASSERT_EQ(book.repeated().size(), 1u);
    EXPECT_EQ(to_string(book.repeated()[0]),
              R"(opened twice: source{1}.stream("noise", 3) (opening 1, 0 words drawn) and )"
              R"(source{1}.branch("noise").stream(3) (opening 2, from )" +
                  place + ", 0 words drawn)");
    EXPECT_NE(to_string(book).find(", from demand.cpp:42, at word 0"), std::string::npos);
    // Told or not, it is the same source.
    EXPECT_EQ(study.here(), study);
    EXPECT_EQ(source{1}.here().stream("noise", 3).address(), s.address());

    ledger strict{ledger::repeats::refuse};
    const source other{1, strict};
    (void)other.here("a/first.cpp", 1).stream();
    try {
        (void)other.here("b/second.cpp", 2).stream();
        FAIL() << "it was opened";
    } catch (const leat::repeated_stream& e) {
        EXPECT_STREQ(e.what(), "leat::ledger: opened twice: source{1}.stream() (opening 2, from "
                               "second.cpp:2), first as source{1}.stream() (opening 1, from "
                               "first.cpp:1)");
    }
}

// ---- counting, and the same numbers ----

// Without a ledger, a stream can still be drawn from while compiling.
constexpr source plain_study{1};
static_assert([] {
    leat::stream s = plain_study.here().branch("x").stream(3);
    leat::stream t = std::move(s);
    t.seek(7);
    leat::stream r = t.replica();
    r.limit(9);
    return r() == t() && r.offspring(1)() != t();
}());
static_assert([] {
    leat::thin_stream s = plain_study.thin_stream("x", 3);
    leat::thin_stream t = std::move(s);
    std::array<std::uint64_t, 3> words{};
    t.draw_into(words);
    t.give_back(1);
    return t.replica()() == words[2] && t() == words[2];
}());

/// Does the same to a recorded stream and to one that is not, and counts.
template <class Stream>
struct followed {
    Stream recorded;
    Stream plain;
    std::uint64_t words = 0;

    void draw() {
        bool exhausted = false;
        std::uint64_t word = 0;
        try {
            word = plain();
            ++words;
        } catch (const leat::stream_exhausted&) {
            exhausted = true;
        }
        if (exhausted) {
            EXPECT_THROW(recorded(), leat::stream_exhausted);
        } else {
            EXPECT_EQ(recorded(), word);
        }
    }
    void fill(std::size_t size) {
        std::vector<double> a(size);
        std::vector<double> b(size);
        const leat::exponential law{1};
        const std::uint64_t before = plain.position();
        bool exhausted = false;
        try {
            leat::fill(a, law, plain);
        } catch (const leat::stream_exhausted&) {
            exhausted = true;
        }
        words += plain.position() - before;
        if (exhausted) {
            EXPECT_THROW(leat::fill(b, law, recorded), leat::stream_exhausted);
        } else {
            leat::fill(b, law, recorded);
        }
        EXPECT_EQ(a, b);
    }
    void draw_into(std::size_t size) {
        std::vector<std::uint64_t> a(size);
        std::vector<std::uint64_t> b(size);
        const std::uint64_t before = plain.position();
        try {
            plain.draw_into(a);
        } catch (const leat::stream_exhausted&) {
        }
        words += plain.position() - before;
        try {
            recorded.draw_into(b);
        } catch (const leat::stream_exhausted&) {
        }
        EXPECT_EQ(a, b);
    }
};

template <class Stream>
void follow(Stream recorded, const ledger& book) {
    std::mt19937 choose{20261201};
    Stream plain{recorded.address()};
    followed<Stream> f{std::move(recorded), std::move(plain)};
    for (int step = 0; step < 3000; ++step) {
        const std::uint64_t n = choose() % 200;
        switch (choose() % 12) {
        case 0:
            f.plain.seek(n);
            f.recorded.seek(n);
            break;
        case 1:
            f.plain.discard(n);
            f.recorded.discard(n);
            break;
        case 2:
            f.plain.limit(f.plain.position() + n * (n % 5));
            f.recorded.limit(f.recorded.position() + n * (n % 5));
            break;
        case 3:
            f.fill(n);
            break;
        case 4:
            f.draw_into(n);
            break;
        case 5: {
            Stream elsewhere = std::move(f.recorded);
            f.recorded = std::move(elsewhere);
            break;
        }
        default:
            f.draw();
        }
        const ledger_entry e = book.entries().front();
        ASSERT_EQ(f.recorded.address(), f.plain.address()) << step;
        ASSERT_EQ(e.address, f.plain.address()) << step;
        ASSERT_EQ(e.limit, f.plain.limit()) << step;
        ASSERT_EQ(e.words, f.words) << step;
    }
    EXPECT_GT(f.words, 10000u); // not cut off by a limit
    EXPECT_EQ(book.size(), 1u);
}

TEST(Ledger, CountsWordsAndChangesNoNumberOfAStream) {
    ledger book;
    follow(source{1, book}.stream("walk"), book);
}

TEST(Ledger, CountsWordsAndChangesNoNumberOfAThinStream) {
    ledger book;
    follow(source{1, book}.thin_stream("walk"), book);
}

TEST(Ledger, CountsTheWordsOfChunksReplicasAndOffspring) {
    ledger book;
    const source study{3, book};
    std::vector<std::uint64_t> words(10000);
    leat::fill_chunks(
        words, [](auto& g) { return g(); }, study);
    std::vector<std::uint64_t> expected(words.size());
    leat::fill_chunks(
        expected, [](auto& g) { return g(); }, source{3});
    EXPECT_EQ(words, expected);
    leat::stream s = study.stream("s");
    leat::stream child = s.offspring(1);
    for (int i = 0; i < 70; ++i) {
        (void)s();
    }
    s.limit(100);
    leat::stream again = s.replica();
    (void)again();
    (void)child();
    EXPECT_EQ(again(), [&] {
        (void)s();
        return s();
    }());
    const auto e = book.entries();
    ASSERT_EQ(e.size(), 6u);
    const auto counts = [&e](std::size_t i) {
        return std::pair{e[i].words, e[i].address.position};
    };
    using pair = std::pair<std::uint64_t, std::uint64_t>;
    EXPECT_EQ(counts(0), (pair{4096, 4096}));
    EXPECT_EQ(counts(1), (pair{4096, 4096}));
    EXPECT_EQ(counts(2), (pair{1808, 1808}));
    EXPECT_EQ(counts(3), (pair{72, 72}));
    EXPECT_EQ(counts(4), (pair{1, 1}));
    EXPECT_EQ(counts(5), (pair{2, 72})); // a replica starts where the original stood
    EXPECT_EQ(e[5].limit, 100u);
    EXPECT_EQ(book.words(), 10000u + 72 + 1 + 2);
}

TEST(Ledger, LeavesSourcesEqualAndEnginesAsTheyAre) {
    ledger book;
    const source recorded{1, book};
    EXPECT_EQ(recorded, source{1});
    EXPECT_EQ(recorded.branch("x", 3), source{1}.branch("x", 3));
    EXPECT_EQ(recorded.engine<leat::xoshiro256_plus_plus>("e"),
              source{1}.engine<leat::xoshiro256_plus_plus>("e"));
    EXPECT_EQ(recorded.stream("x", 3).address(), source{1}.stream("x", 3).address());
}

TEST(Ledger, LeavesAMovedFromStreamUnusable) {
    ledger book;
    const source study{1, book};
    leat::stream s = study.stream("s");
    leat::thin_stream t = study.thin_stream("t");
    leat::stream s2 = std::move(s);
    leat::thin_stream t2 = std::move(t);
    EXPECT_THROW((void)s(), leat::error); // NOLINT: the point
    EXPECT_THROW((void)t(), leat::error); // NOLINT
    s2 = leat::stream{s2.address()};      // no longer the recorded one
    (void)s2();
    (void)t2();
    EXPECT_EQ(book.words(), 1u);
}

TEST(Ledger, CountsRightWithEightThreads) {
    // Each thread opens 200 streams of its own and one that all open; it draws from all of them,
    // while the ledger is looked at.
    ledger book;
    const source study{1, book};
    constexpr int threads = 8;
    const auto work = [&study](int t) {
        const source mine = study.branch("thread", t);
        for (int i = 0; i < 200; ++i) {
            leat::stream s = mine.stream(i);
            leat::thin_stream thin = mine.thin_stream("thin", i);
            for (int n = 0; n <= i; ++n) {
                (void)s();
                (void)thin();
            }
        }
        leat::stream shared = study.stream("shared");
        for (int n = 0; n < 1000; ++n) {
            (void)shared();
        }
    };
    std::vector<std::thread> pool;
    for (int t = 0; t < threads; ++t) {
        pool.emplace_back(work, t);
    }
    std::uint64_t seen = 0;
    for (int look = 0; look < 20; ++look) {
        const std::uint64_t now = book.words();
        EXPECT_GE(now, seen);
        seen = now;
        (void)book.entries();
        (void)book.repeated();
    }
    for (std::thread& t : pool) {
        t.join();
    }
    EXPECT_EQ(book.size(), threads * 401u);
    EXPECT_EQ(book.words(), threads * (2 * (200u * 201 / 2) + 1000));
    const auto repeated = book.repeated();
    ASSERT_EQ(repeated.size(), threads - 1u);
    for (const auto& r : repeated) {
        EXPECT_EQ(r.first.path, R"(source{1}.stream("shared"))");
        EXPECT_EQ(r.first.opening, repeated[0].first.opening);
        EXPECT_EQ(r.again.words, 1000u);
    }
    for (const ledger_entry& e : book.entries()) {
        EXPECT_EQ(e.words, e.address.position);
    }
}

// ---- a spelled path leads back to the address ----

TEST(SpelledPath, LeadsToTheAddressThatWasOpened) {
    ledger book;
    for (const source& study : {source{0, book}, source{-1, book}, source{~0ull, book},
                                source{"", book}, source{"\"q\"\\ \x80, ).stream(", book},
                                source{std::numeric_limits<std::int64_t>::min(), book}}) {
        for (const source& at :
             {study, study.branch(), study.branch("a", 1), study.branch(1).branch(-2, "b")}) {
            (void)at.stream();
            (void)at.thin_stream(5);
            (void)at.stream("x, y\"").offspring(std::numeric_limits<std::int64_t>::min());
            (void)at.stream("z", -3).replica().offspring("c").replica();
            (void)at.engine<leat::xoshiro256_plus_plus>("e", 2);
            (void)leat::detail::chunk_stream(at, 77);
        }
    }
    ASSERT_GE(book.size(), 100u);
    for (const ledger_entry& e : book.entries()) {
        const auto found = leat::detail::place_of(e.path);
        ASSERT_TRUE(found) << e.path;
        EXPECT_EQ(found->place.key, e.address.key) << e.path;
        EXPECT_EQ(found->place.upper, e.address.upper) << e.path;
    }
}

TEST(SpelledPath, IsNotWhatNoProgramSpells) {
    const auto& place_of = leat::detail::place_of;
    ASSERT_TRUE(place_of(R"(source{1}.branch("a", 2).stream(3, "\x41\"").offspring(4).replica())"));
    for (const char* text : {"",
                             "source",
                             "source{",
                             "source{1",
                             "source{1}",
                             "source{}.stream()",
                             "source{01}.stream()",
                             "source{-0}.stream()",
                             "source{+1}.stream()",
                             "source{18446744073709551616}.stream()",
                             "source{-9223372036854775809}.stream()",
                             "source{1}.stream(",
                             "source{1}.stream(1,2)",
                             "source{1}.stream(1, )",
                             "source{1}.stream(, 1)",
                             "source{1}.stream() ",
                             " source{1}.stream()",
                             "source{1}.branch(1)",
                             "source{1}.stream().branch(1)",
                             "source{1}.stream().stream()",
                             "source{1}.streams()",
                             "source{1}.engine(1).offspring(1)",
                             "source{1}.stream().offspring()",
                             "source{1}.stream().offspring(1, 2)",
                             "source{1}.stream(\"a)",
                             "source{1}.stream(a)",
                             "source{1}.stream(\"\\n\")",
                             "source{1}.stream(\"\\x4\")",
                             "source{1}.stream(\"\\xAB\")",
                             "source{1}.stream(\"\x80\")",
                             "source{1}.stream(1.5)",
                             "source{1}.stream(true)"}) {
        EXPECT_FALSE(place_of(text)) << text;
    }
}

} // namespace
