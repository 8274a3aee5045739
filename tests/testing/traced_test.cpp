// testing/traced.hpp, trace_file.hpp, trace_comparison.hpp: tracing changes no draw, the file is as
// described and refused when changed, and planted divergences are found and named.

#include "leat/testing/traced.hpp"

#include "leat/bulk/fill.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/streams/source.hpp"
#include "leat/testing/engines.hpp"
#include "leat/testing/trace_comparison.hpp"
#include "leat/testing/trace_file.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <unistd.h> // getpid, for files that no other test run uses

#include <gtest/gtest.h>

#include <algorithm>
#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <functional>
#include <optional>
#include <random>
#include <string>
#include <thread>
#include <type_traits>
#include <utility>
#include <vector>

namespace {

using leat::recorded_trace;
using leat::testing::parting;

static_assert(leat::random_words<leat::traced<leat::stream&>>);
static_assert(std::uniform_random_bit_generator<leat::traced<leat::minimal_standard>>);
static_assert(!std::is_copy_constructible_v<leat::traced<leat::minimal_standard>>);

/// A file of the running test's own, gone with this.
class own_file {
public:
    explicit own_file(const std::string& name)
        : path_(testing::TempDir() + "/leat_traced_" + std::to_string(getpid()) + "_" + name) {}
    own_file(const own_file&) = delete;
    own_file& operator=(const own_file&) = delete;
    ~own_file() { std::remove(path_.c_str()); }
    [[nodiscard]] const std::string& path() const { return path_; }

private:
    std::string path_;
};

/// Whatever `run` traces, read back.
recorded_trace recorded(const std::function<void(leat::trace&)>& run,
                        const leat::trace_options& options = {}) {
    const own_file file("run");
    leat::trace trace{file.path(), options};
    run(trace);
    trace.save();
    return leat::read_trace(file.path());
}

// ---- tracing changes nothing ----

template <class Engine>
void expect_the_same_values(Engine plain, Engine held) {
    recorded([&](leat::trace& trace) {
        leat::traced g{trace, "held", held};
        static_assert(std::is_same_v<decltype(g), leat::traced<Engine&>>);
        static_assert(decltype(g)::min() == Engine::min() && decltype(g)::max() == Engine::max());
        for (int i = 0; i < 100; ++i) {
            ASSERT_EQ(g(), plain());
            ASSERT_EQ(leat::normal{}(g), leat::normal{}(plain));
            ASSERT_EQ(leat::below(std::uint64_t{10}, g), leat::below(std::uint64_t{10}, plain));
        }
    });
    EXPECT_EQ(plain(), held()) << "an engine held by reference goes along";
}

TEST(Traced, GivesTheValuesOfTheEngine) {
    const leat::source study{7};
    expect_the_same_values(study.stream("a"), study.stream("a"));
    expect_the_same_values(study.thin_stream("a"), study.thin_stream("a"));
    expect_the_same_values(leat::minimal_standard{3}, leat::minimal_standard{3});
    expect_the_same_values(std::mt19937_64{3}, std::mt19937_64{3});

    const recorded_trace t = recorded([&](leat::trace& trace) {
        leat::traced owned{trace, "owned", study.stream("b")};
        static_assert(std::is_same_v<decltype(owned), leat::traced<leat::stream>>);
        leat::stream plain = study.stream("b");
        EXPECT_EQ(owned(), plain());
        leat::traced moved = std::move(owned);
        EXPECT_EQ(moved(), plain());
        EXPECT_EQ(moved.engine().position(), 2u);
        EXPECT_THROW(owned(), leat::error); // NOLINT: what is moved from says so
        EXPECT_THROW(owned.label("x"), leat::error);
    });
    EXPECT_EQ(t.streams[0].draws, 2u);
    EXPECT_EQ(leat::parse_address(t.streams[0].address), study.stream("b").address());
}

TEST(Traced, AFillEqualsTheLoopInValuesAndTrace) {
    const leat::source study{7};
    std::vector<double> filled(1000);
    std::vector<double> looped(1000);
    const auto run = [&](bool by_fill) {
        return recorded([&](leat::trace& trace) {
            leat::stream s = study.stream("a");
            leat::traced g{trace, "a", s};
            if (by_fill) {
                leat::fill(filled, leat::exponential{1.0}, g);
            } else {
                for (double& x : looped) {
                    x = leat::exponential{1.0}(g);
                }
            }
            EXPECT_EQ(g.engine().position(), s.position());
        });
    };
    EXPECT_EQ(run(true), run(false));
    EXPECT_EQ(filled, looped);
}

TEST(Traced, AWordThatIsNotGivenIsNotRecorded) {
    const recorded_trace t = recorded([](leat::trace& trace) {
        leat::traced g{trace, "short", leat::scripted{1, 2}};
        g();
        g();
        EXPECT_THROW(g(), leat::stream_exhausted);
    });
    EXPECT_EQ(t.streams[0].draws, 2u);
}

TEST(Traced, SeveralThreadsMayOpenStreams) {
    const leat::source study{11};
    const auto run = [&](int threads) {
        return recorded(
            [&](leat::trace& trace) {
                std::vector<std::thread> all;
                for (int t = 0; t < threads; ++t) {
                    all.emplace_back([&, t] {
                        for (int i = t; i < 200; i += threads) {
                            leat::traced g{trace, std::to_string(i), study.stream(i)};
                            for (int n = 0; n < 50; ++n) {
                                g();
                            }
                        }
                    });
                }
                for (std::thread& t : all) {
                    t.join();
                }
            },
            {.stride = 16});
    };
    const auto found = leat::compare_traces(run(1), run(4));
    EXPECT_TRUE(found.same());
    EXPECT_EQ(found.alike, 200u);
}

// ---- the file ----

recorded_trace small_trace() {
    return recorded(
        [](leat::trace& trace) {
            leat::traced g{trace, "pump 1", leat::scripted{3, ~std::uint64_t{0}, 5, 0}};
            leat::traced other{trace, "x", leat::constant{0}};
            g();
            g.label("wear");
            g.label("life"); // nothing is drawn for wear
            g();
            g.label("life");
            g();
            g.label("repair");
            g();
        },
        {.stride = 2});
}

// The bytes were computed by a second implementation, in Python, from the description at the head
// of trace_file.hpp, with a list of labels without "wear".
TEST(TraceFile, IsWhatItsDescriptionSays) {
    const std::string expected =
        "6c6561742d7472630100000002000000000000000000000000000000ffffffffffffffff02000000"
        "0600000070756d702031000000000400000000000000b4cf72161a0470228051708211d96f260400"
        "0000000000000400000077656172040000006c696665060000007265706169720300000003000000"
        "0000000000000000000000000000000000000000000000000d1bf3d1515ad0be059bae203fffdc8e"
        "02000000b4cf72161a0470228051708211d96f260300000001000000780000000000000000000000"
        "00000000000000000000000000000000000100000000000000000000000100000000000000000000"
        "0000000000000000000000000000000000fc2141fb8b2f808c59dd9b40207ccf95";
    std::string found;
    for (const unsigned char byte : leat::testing::encode_trace(small_trace())) {
        found += "0123456789abcdef"[byte >> 4];
        found += "0123456789abcdef"[byte & 15];
    }
    EXPECT_EQ(found, expected);
}

std::optional<std::string> why_refused(const std::vector<unsigned char>& data) {
    try {
        static_cast<void>(leat::testing::decode_trace(data, "t"));
        return {};
    } catch (const leat::malformed_text& e) {
        return e.what();
    }
}

TEST(TraceFile, IsRefusedWhereverItIsChangedOrCut) {
    const recorded_trace t = small_trace();
    const std::vector<unsigned char> sound = leat::testing::encode_trace(t);
    EXPECT_EQ(leat::testing::decode_trace(sound, "t"), t);
    for (std::size_t i = 0; i < sound.size(); ++i) {
        for (unsigned bit = 0; bit < 8; ++bit) {
            std::vector<unsigned char> changed = sound;
            changed[i] = static_cast<unsigned char>(changed[i] ^ (1u << bit));
            const auto reason = why_refused(changed);
            ASSERT_TRUE(reason.has_value()) << i;
            ASSERT_EQ(reason->rfind("leat::read_trace: t ", 0), 0u) << *reason;
        }
        EXPECT_TRUE(why_refused({sound.begin(), sound.begin() + static_cast<std::ptrdiff_t>(i)}));
    }
    std::vector<unsigned char> longer = sound;
    longer.push_back(0);
    EXPECT_TRUE(why_refused(longer));
    longer[8] = 2;
    EXPECT_EQ(why_refused(longer),
              "leat::read_trace: t is of another version; this leat reads version 1");
    EXPECT_EQ(why_refused(std::vector<unsigned char>(100, 7)),
              "leat::read_trace: t is no trace, or was cut");
}

// A sum that fits does not make a file sound.
TEST(TraceFile, IsRefusedWhereItsPartsDoNotFit) {
    const auto with_number = [](std::size_t place, unsigned char value) {
        std::vector<unsigned char> data = leat::testing::encode_trace(small_trace());
        data.erase(data.end() - 16, data.end()); // without the sum
        data[place] = value;
        leat::testing::detail::trace_writer out;
        out.raw(std::string(data.begin(), data.end()));
        return out.sealed();
    };
    EXPECT_EQ(why_refused(with_number(12, 0)), "leat::read_trace: t has a stride of 0");
    EXPECT_EQ(why_refused(with_number(36, 100)),
              "leat::read_trace: t has a length that does not fit");
    EXPECT_EQ(why_refused(with_number(43, 0x7f)),
              "leat::read_trace: t has a length that does not fit");
    EXPECT_EQ(why_refused(with_number(36, 1)), "leat::read_trace: t goes on after its end");
    EXPECT_EQ(why_refused(with_number(54, 3)), "leat::read_trace: t has more marks than draws");
    EXPECT_EQ(why_refused(with_number(112, 4)),
              "leat::read_trace: t has a label that is not in its list");
}

TEST(TraceFile, SaysWhatItCannotReadOrWrite) {
    const auto message_of = [](auto call) {
        try {
            call();
        } catch (const leat::error& e) {
            return std::string(e.what());
        }
        return std::string("nothing");
    };
    EXPECT_EQ(message_of([] { static_cast<void>(leat::read_trace("/nowhere/x.trace")); }),
              "leat::read_trace: cannot read /nowhere/x.trace");
    EXPECT_EQ(message_of([] {
                  leat::trace trace{"/nowhere/x.trace"};
                  trace.save();
              }),
              "leat::trace: cannot write /nowhere/x.trace");
    EXPECT_EQ(message_of([] {
                  leat::trace trace{"x", {.stride = 0}};
              }),
              "leat::trace: stride = 0, must be at least 1");
    EXPECT_EQ(message_of([] {
                  leat::trace trace{"x", {.from = 3, .to = 2}};
              }),
              "leat::trace: from = 3, must be at most to");
}

TEST(TraceFile, IsSavedWhenTheTraceGoes) {
    const own_file file("forgotten");
    {
        leat::trace trace{file.path()};
        leat::traced g{trace, "a", leat::constant{1}};
        g();
        trace.save();
        g(); // not saved yet
        leat::traced h{trace, "b", leat::constant{1}};
    }
    const recorded_trace t = leat::read_trace(file.path());
    ASSERT_EQ(t.streams.size(), 2u);
    EXPECT_EQ(t.streams[0].draws, 2u);
}

// ---- where runs part ----

constexpr int faulty = 713;

/// One replication of a small repair shop; `extra` draws once too often before the sixth repair.
template <class G>
void replicate(G& g, bool extra) {
    for (int machine = 0; machine < 10; ++machine) {
        g.label("life");
        const double life = leat::exponential{0.1}(g);
        if (extra && machine == 5) {
            g.label("weather");
            g();
        }
        g.label("repair time");
        for (int part = 0; part < 1 + static_cast<int>(life) % 3; ++part) {
            static_cast<void>(leat::normal{5, 1}(g));
        }
    }
}

/// A run of 1000 replications, each with a stream of its own. Tells the place of the extra draw.
struct shop {
    std::uint64_t seed = 20261201;
    bool extra = false;
    std::uint64_t place = 0;

    void operator()(leat::trace& trace) {
        const leat::source study{seed};
        for (int i = 0; i < 1000; ++i) {
            leat::stream s = study.stream("replication", i);
            if (extra && i == faulty) {
                place = place_of_the_extra_draw(s.replica());
            }
            leat::traced g{trace, "replication " + std::to_string(i), s};
            replicate(g, extra && i == faulty);
        }
    }

    static std::uint64_t place_of_the_extra_draw(leat::stream s) {
        struct watcher {
            using result_type = std::uint64_t;
            static constexpr result_type min() { return leat::stream::min(); }
            static constexpr result_type max() { return leat::stream::max(); }
            result_type operator()() { return of(); }
            void label(const std::string& text) {
                if (text == "weather") {
                    seen = of.position();
                }
            }
            leat::stream& of;
            std::uint64_t seen = 0;
        } w{s};
        replicate(w, true);
        return w.seen;
    }
};

TEST(Divergence, OneExtraDrawInReplication713IsFoundAndNamed) {
    shop right;
    shop wrong{.extra = true};
    const auto compare = [&](const leat::trace_options& options) {
        return leat::compare_traces(recorded(std::ref(right), options),
                                    recorded(std::ref(wrong), options));
    };

    const auto coarse = compare({.stride = 8});
    EXPECT_FALSE(coarse.same());
    EXPECT_EQ(coarse.alike, 999u);
    EXPECT_TRUE(coarse.only_in_a.empty() && coarse.only_in_b.empty());
    ASSERT_EQ(coarse.parted.size(), 1u);
    const leat::divergence& where = coarse.parted[0];
    EXPECT_EQ(where.stream, "replication 713");
    EXPECT_EQ(where.how, parting::labels) << "the words are those of the same stream";
    EXPECT_LE(where.first, wrong.place);
    EXPECT_GE(where.last, wrong.place);
    EXPECT_EQ(where.last - where.first, 7u);

    // A second pass over that range alone, to the draw.
    const auto fine = compare(
        {.stride = 1, .from = where.first, .to = where.last + 1, .only = "replication 713"});
    ASSERT_EQ(fine.parted.size(), 1u);
    EXPECT_EQ(fine.alike, 999u);
    EXPECT_EQ(fine.parted[0].first, wrong.place);
    EXPECT_EQ(fine.parted[0].last, wrong.place);
    EXPECT_EQ(fine.parted[0].label_before, "life");
    EXPECT_EQ(fine.parted[0].label_a, "repair time");
    EXPECT_EQ(fine.parted[0].label_b, "weather");

    EXPECT_TRUE(leat::compare_traces(recorded(std::ref(right)), recorded(std::ref(right))).same());
}

// All replications draw from one engine: the extra draw shifts all that follow.
TEST(Divergence, IsFoundInASharedEngineToo) {
    std::uint64_t place = 0;
    const auto run = [&](bool extra) {
        return recorded(
            [&](leat::trace& trace) {
                leat::traced g{trace, "engine", leat::source{1}.stream()};
                for (int i = 0; i < 1000; ++i) {
                    if (extra && i == faulty) {
                        place = g.engine().position();
                        g.label("weather");
                        g();
                    }
                    replicate(g, false);
                }
            },
            {.stride = 1});
    };
    const auto found = leat::compare_traces(run(false), run(true));
    ASSERT_EQ(found.parted.size(), 1u);
    EXPECT_EQ(found.parted[0].first, place);
    EXPECT_EQ(found.parted[0].last, place);
    EXPECT_EQ(found.parted[0].how, parting::labels);
    EXPECT_EQ(found.parted[0].label_b, "weather");
}

/// Two runs of one stream "s" of scripted words.
leat::divergence parted(const std::vector<std::uint64_t>& a, const std::vector<std::uint64_t>& b,
                        const leat::trace_options& options) {
    const auto run = [&](const std::vector<std::uint64_t>& words) {
        return recorded(
            [&](leat::trace& trace) {
                leat::traced g{trace, "s", leat::scripted{words}};
                for (std::size_t i = 0; i < words.size(); ++i) {
                    g.label(i < 3 ? "early" : "late");
                    g();
                }
            },
            options);
    };
    const auto found = leat::compare_traces(run(a), run(b));
    EXPECT_EQ(found.parted.size(), 1u);
    return found.parted.empty() ? leat::divergence{} : found.parted[0];
}

TEST(Divergence, KnowsAnotherWordFromAnEarlyEnd) {
    const std::vector<std::uint64_t> a{1, 2, 3, 4, 5, 6, 7, 8, 9};
    for (std::size_t i = 0; i < a.size(); ++i) {
        std::vector<std::uint64_t> b = a;
        b[i] += 1;
        for (const std::uint64_t stride : {1u, 2u, 4u, 100u}) {
            const leat::divergence d = parted(a, b, {.stride = stride});
            EXPECT_EQ(d.how, parting::words);
            EXPECT_EQ(d.first, i / stride * stride) << i << " " << stride;
            EXPECT_EQ(d.last, std::min(d.first + stride - 1, std::uint64_t{8}))
                << i << " " << stride;
        }
        b.assign(a.begin(), a.begin() + static_cast<std::ptrdiff_t>(i));
        const leat::divergence d = parted(a, b, {.stride = 1});
        EXPECT_EQ(d.how, parting::end);
        EXPECT_EQ(d.first, i);
        EXPECT_EQ(d.last, i);
        EXPECT_EQ(d.label_a, i < 3 ? "early" : "late");
        EXPECT_EQ(d.label_b, "");
        EXPECT_EQ(d.draws_b, i);
    }
}

TEST(Divergence, BeforeAndBehindTheRangeIsKnownRoughly) {
    const std::vector<std::uint64_t> a(100, 5);
    std::vector<std::uint64_t> b = a;
    b[20] = 6;
    leat::divergence d = parted(a, b, {.stride = 1, .from = 40, .to = 60});
    EXPECT_EQ(std::pair(d.first, d.last), std::pair(std::uint64_t{0}, std::uint64_t{39}));
    b = a;
    b[80] = 6;
    d = parted(a, b, {.stride = 1, .from = 40, .to = 60});
    EXPECT_EQ(std::pair(d.first, d.last), std::pair(std::uint64_t{60}, std::uint64_t{99}));
    d = parted(a, b, {.stride = 1, .only = "another"});
    EXPECT_EQ(std::pair(d.first, d.last), std::pair(std::uint64_t{0}, std::uint64_t{99}));
}

TEST(Divergence, NamesStreamsThatOneRunLacks) {
    const auto run = [](const std::vector<std::string>& names) {
        return recorded([&](leat::trace& trace) {
            std::uint64_t word = 0;
            for (const std::string& name : names) {
                leat::traced g{trace, name, leat::constant{word++}};
                g();
            }
        });
    };
    const auto found = leat::compare_traces(run({"a", "b", "b", "c"}), run({"a", "b", "d"}));
    EXPECT_EQ(found.alike, 2u);
    EXPECT_TRUE(found.parted.empty());
    EXPECT_FALSE(found.same());
    EXPECT_EQ(found.only_in_a, (std::vector<std::string>{"b", "c"}));
    EXPECT_EQ(found.only_in_b, (std::vector<std::string>{"d"}));
}

TEST(Divergence, AnotherSeedDiffersAtTheFirstWord) {
    shop one;
    shop other{.seed = 1};
    const auto found = leat::compare_traces(recorded(std::ref(one), {.stride = 1}),
                                            recorded(std::ref(other), {.stride = 1}));
    ASSERT_EQ(found.parted.size(), 1000u);
    EXPECT_EQ(found.parted[0].stream, "replication 0");
    EXPECT_EQ(found.parted[0].how, parting::words);
    EXPECT_EQ(found.parted[0].last, 0u);
    EXPECT_NE(found.parted[0].address_a, found.parted[0].address_b);
}

TEST(Divergence, RefusesRunsThatWereRecordedUnlike) {
    recorded_trace a;
    recorded_trace b;
    b.stride = 7;
    EXPECT_THROW(static_cast<void>(leat::compare_traces(a, b)), leat::invalid_parameter);
    b.stride = a.stride;
    b.from = 1;
    EXPECT_THROW(static_cast<void>(leat::compare_traces(a, b)), leat::invalid_parameter);
}

} // namespace
