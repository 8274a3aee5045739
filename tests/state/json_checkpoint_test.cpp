// Checkpoints: a simulation that was stopped, saved as JSON text, and resumed from it gives the
// bits of one that was not. Saved by 8 workers, it is resumed by 3.

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/weighted_index.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/regions/disk.hpp"
#include "leat/state/json.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"
#include "leat/uniform/permute.hpp"

#include <gtest/gtest.h>

#include <bit>
#include <cstdint>
#include <string>
#include <string_view>
#include <thread>
#include <utility>
#include <vector>

namespace {

using nlohmann::json;

/// A drifting buoy that is visited at random: streams, engines of three kinds, laws, a region, and
/// a sampler whose weights change as the simulation goes on.
struct buoy {
    leat::stream drift;
    leat::thin_stream visits;
    leat::xoshiro256_plus_plus noise;
    leat::limited<leat::xoshiro256_plus_plus> block;
    leat::shuffled<leat::minimal_standard, 16> old;
    leat::normal<> step;
    leat::exponential<> gap;
    leat::weighted_index<> harbour;
    leat::disk<> place;
    double time = 0;
    double x = 0;
    std::uint64_t trace = 0;

    buoy(const leat::source& study, int number)
        : drift(study.stream("drift", number)),
          visits(study.thin_stream("visit", number)),
          noise(study.engine<leat::xoshiro256_plus_plus>("noise", number)),
          block(leat::block(leat::xoshiro256_plus_plus{5}, number, leat::pow2(20))),
          old(static_cast<std::uint64_t>(number + 1)),
          step{0, 0.25},
          gap{0.5},
          harbour({3, 1, 2, 0.5}),
          place{{static_cast<double>(number), 0}, 2} {}
    explicit buoy(const json& j)
        : drift(j.at("drift").get<leat::stream>()),
          visits(j.at("visits").get<leat::thin_stream>()),
          noise(j.at("noise").get<leat::xoshiro256_plus_plus>()),
          block(j.at("block").get<leat::limited<leat::xoshiro256_plus_plus>>()),
          old(j.at("old").get<leat::shuffled<leat::minimal_standard, 16>>()),
          step(j.at("step").get<leat::normal<>>()),
          gap(j.at("gap").get<leat::exponential<>>()),
          harbour(j.at("harbour").get<leat::weighted_index<>>()),
          place(j.at("place").get<leat::disk<>>()),
          time(j.at("time")),
          x(j.at("x")),
          trace(j.at("trace")) {}

    [[nodiscard]] json saved() const {
        return {{"drift", drift}, {"visits", visits}, {"noise", noise}, {"block", block},
                {"old", old},     {"step", step},     {"gap", gap},     {"harbour", harbour},
                {"place", place}, {"time", time},     {"x", x},         {"trace", trace}};
    }

    void advance() {
        time += gap(visits);
        x += step(drift);
        const auto port = harbour(noise);
        harbour.update(port, 0.5 + harbour.weight(port) * 0.75);
        const auto [east, north] = place(block);
        x += 0.001 * step(noise);
        trace ^= old() + leat::below(1000003u, visits);
        for (const double real : {time, x, east, north, static_cast<double>(port)}) {
            trace = std::rotl(trace * 0x9e3779b97f4a7c15u, 23) ^ std::bit_cast<std::uint64_t>(real);
        }
    }
};

constexpr int steps = 60;

/// The traces of buoys that were never stopped.
std::vector<std::uint64_t> uninterrupted(const leat::source& study, int count) {
    std::vector<std::uint64_t> traces;
    for (int number = 0; number < count; ++number) {
        buoy one(study, number);
        for (int i = 0; i < steps; ++i) {
            one.advance();
        }
        traces.push_back(one.trace);
    }
    return traces;
}

TEST(JsonCheckpoint, StoppedAtEveryKthStepGivesTheSameBits) {
    const leat::source study{"buoys"};
    const std::uint64_t wanted = uninterrupted(study, 1).front();
    for (const int k : {1, 2, 7, 30, 59}) {
        std::string text = buoy(study, 0).saved().dump();
        for (int done = 0; done < steps;) {
            buoy resumed(json::parse(std::string_view(text)));
            for (int i = 0; i < k && done < steps; ++i, ++done) {
                resumed.advance();
            }
            text = resumed.saved().dump();
        }
        EXPECT_EQ(json::parse(std::string_view(text)).at("trace"), wanted) << "k = " << k;
    }
}

TEST(JsonCheckpoint, AWordThatIsLostShows) {
    const leat::source study{"buoys"};
    buoy original(study, 0);
    json saved = original.saved();
    leat::stream drift = saved.at("drift").get<leat::stream>();
    drift.seek(drift.position() + 1); // the planted fault
    saved["drift"] = drift;
    buoy resumed(saved);
    for (int i = 0; i < steps; ++i) {
        resumed.advance();
    }
    EXPECT_NE(resumed.trace, uninterrupted(study, 1).front());
}

TEST(JsonCheckpoint, SavedByEightWorkersAndResumedByThree) {
    const leat::source study{"buoys"};
    constexpr int count = 24;
    // Worker w of n has every n-th buoy; it writes one text for each.
    const auto work = [&](int workers, const std::vector<std::string>& from, int until) {
        std::vector<std::string> texts(count);
        std::vector<std::thread> threads;
        for (int w = 0; w < workers; ++w) {
            threads.emplace_back([&, w] {
                for (int number = w; number < count; number += workers) {
                    const auto i = static_cast<std::size_t>(number);
                    buoy one(json::parse(std::string_view(from[i])).at("buoy"));
                    int done = json::parse(std::string_view(from[i])).at("done");
                    for (; done < until; ++done) {
                        one.advance();
                    }
                    texts[i] = json{{"buoy", one.saved()}, {"done", done}}.dump();
                }
            });
        }
        for (std::thread& thread : threads) {
            thread.join();
        }
        return texts;
    };
    std::vector<std::string> start;
    for (int number = 0; number < count; ++number) {
        start.push_back(json{{"buoy", buoy(study, number).saved()}, {"done", 0}}.dump());
    }
    const std::vector<std::string> middle = work(8, start, 25);
    const std::vector<std::string> end = work(3, middle, steps);
    const std::vector<std::uint64_t> wanted = uninterrupted(study, count);
    for (std::size_t i = 0; i < wanted.size(); ++i) {
        EXPECT_EQ(json::parse(std::string_view(end[i])).at("buoy").at("trace"), wanted[i]) << i;
    }
}

} // namespace
