// The study's promises, checked from outside: the program is run, its files are read.
//
// Outside references: GSL for the t quantile; the limit of an alternating renewal process for the
// long-run availability; and for the simulation, the model's rules as simulation.hpp states them,
// checked here on every job of a replay by other means than the simulation's own.

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <set>
#include <utility>

#include <gsl/gsl_cdf.h>

#include <nlohmann/json.hpp>

#include "run_program.hpp"

namespace skerry_test {
namespace {

using json = nlohmann::ordered_json;

class skerry_bank : public program_test {
protected:
    /// A copy of an input with a change made to it.
    template <class Change>
    std::string changed(const std::filesystem::path& input, Change change) {
        json document = json::parse(read_file(input));
        change(document);
        return write_input(document.dump());
    }
};

// "results.json is byte-identical for 1, 2, 3 and 8 threads", and so is all else.
TEST_F(skerry_bank, gives_the_same_bytes_on_any_number_of_threads) {
    const run_result one = run({"--input", small_, "--threads", "1"});
    ASSERT_EQ(one.status, 0) << one.err;
    EXPECT_EQ(one.err, "") << "no progress where stderr is no terminal";
    for (const char* threads : {"2", "3", "8"}) {
        const run_result many = run({"--input", small_, "--threads", threads});
        ASSERT_EQ(many.status, 0) << many.err;
        for (const char* name : {"results.json", "map.svg", "availability.svg"}) {
            EXPECT_EQ(read_file(many.folder / name), read_file(one.folder / name))
                << name << " on " << threads << " threads";
        }
    }
}

// "--only 17 equals row 17 of the full run"
TEST_F(skerry_bank, replays_one_replication_alone) {
    const run_result full = run({"--input", small_});
    const std::vector<std::string> all = lines_of(read_file(full.folder / "results.json"));
    const auto rows = std::find(all.begin(), all.end(), R"("rows": [)");
    ASSERT_NE(rows, all.end());
    for (const int r : {0, 17, 23}) {
        const run_result alone = run({"--input", small_, "--only", std::to_string(r)});
        ASSERT_EQ(alone.status, 0) << alone.err;
        std::string row = rows[r + 1];
        if (row.back() == ',') {
            row.pop_back();
        }
        const std::vector<std::string> lines = lines_of(read_file(alone.folder / "results.json"));
        EXPECT_EQ(std::count(lines.begin(), lines.end(), row), 1) << row;
        EXPECT_NE(alone.out.find(row), std::string::npos) << alone.out;
        const json results = json::parse(read_file(alone.folder / "results.json"));
        EXPECT_EQ(results.at("rows").size(), 1u);
        EXPECT_EQ(results.at("rows").at(0).at("replication"), r);
        EXPECT_EQ(results.at("only"), r);
    }
}

std::vector<std::string> turbine_lines(const run_result& run) {
    std::vector<std::string> found;
    for (std::string line : lines_of(read_file(run.folder / "replay.json"))) {
        if (line.starts_with(R"({"turbine":)") && line.find("life_hours") != std::string::npos) {
            if (line.back() == ',') {
                line.pop_back();
            }
            found.push_back(line);
        }
    }
    return found;
}

// "adding a turbine at the end changes no other turbine's drawn lives and repair hours"; nor does
// it move one, nor change the weather.
TEST_F(skerry_bank, an_added_turbine_changes_no_other) {
    const run_result before = run({"--input", small_, "--only", "5"});
    const run_result after =
        run({"--input", changed(small_, [](json& in) { in["turbines"]["count"] = 10; }), "--only",
             "5"});
    ASSERT_EQ(after.status, 0) << after.err;
    const std::vector<std::string> old_lines = turbine_lines(before);
    const std::vector<std::string> new_lines = turbine_lines(after);
    ASSERT_EQ(old_lines.size(), 9u);
    ASSERT_EQ(new_lines.size(), 10u);
    EXPECT_TRUE(std::equal(old_lines.begin(), old_lines.end(), new_lines.begin()));
    const json a = json::parse(read_file(before.folder / "replay.json"));
    const json b = json::parse(read_file(after.folder / "replay.json"));
    EXPECT_EQ(a.at("workable_windows_hours"), b.at("workable_windows_hours"));
    EXPECT_NE(a.at("designs"), b.at("designs")) << "the tenth turbine was simulated";
}

// Streams are found by name: a component put in front changes no draw of the others.
TEST_F(skerry_bank, an_added_component_changes_no_other) {
    const run_result before = run({"--input", small_, "--only", "5"});
    const auto add = [](json& in) {
        json extra = in["components"][0];
        extra["name"] = "blades";
        in["components"].insert(in["components"].begin(), extra);
    };
    const run_result after = run({"--input", changed(small_, add), "--only", "5"});
    ASSERT_EQ(after.status, 0) << after.err;
    const json a = json::parse(read_file(before.folder / "replay.json")).at("turbines");
    const json b = json::parse(read_file(after.folder / "replay.json")).at("turbines");
    for (std::size_t t = 0; t < a.size(); ++t) {
        for (std::size_t c = 0; c < 2; ++c) {
            EXPECT_EQ(a[t]["components"][c], b[t]["components"][c + 1]) << "turbine " << t;
        }
    }
}

// Our own golden files: what a seed yields changes only with a new major version (P7). To renew
// them: leat_skerry_bank --input small.json --output expected >expected/report.txt
TEST_F(skerry_bank, gives_the_expected_output) {
    const run_result small = run({"--input", small_});
    ASSERT_EQ(small.status, 0) << small.err;
    EXPECT_EQ(without_version(read_file(small.folder / "results.json")), expected_results());
    const auto table = [](const std::string& report) { // without the name of the output folder
        return report.substr(0, report.find("\nWritten: "));
    };
    EXPECT_EQ(table(small.out), table(read_file(source_ / "tests" / "expected" / "report.txt")));
    EXPECT_EQ(json::parse(read_file(small.folder / "results.json")).at("notice"),
              "This is a planning illustration on invented data, not advice. Offshore work follows "
              "local codes and licensed practice.");
}

// "with the default input the designs' availability differs by a point or more, and the interval
// with common random numbers is at least twice as narrow as without"
TEST_F(skerry_bank, default_input_shows_what_common_random_numbers_are_worth) {
    const run_result study = run({});
    ASSERT_EQ(study.status, 0) << study.err;
    const json gain =
        json::parse(read_file(study.folder / "results.json")).at("summary").at("availability_gain");
    const auto low = gain.at("same_random_events").at("low").get<double>();
    const auto same = gain.at("same_random_events").at("half_width").get<double>();
    const auto apart = gain.at("random_events_apart").at("half_width").get<double>();
    EXPECT_GE(low, 0.01) << "a point or more, by the interval's lower end";
    EXPECT_GE(apart, 2 * same);
    EXPECT_NEAR(gain.at("times_as_narrow").get<double>(), apart / same, 1e-4);
    // Both estimate one quantity: five standard errors of their difference, common practice.
    EXPECT_NEAR(gain.at("same_random_events").at("mean").get<double>(),
                gain.at("random_events_apart").at("mean").get<double>(), 2.55 * (same + apart));
}

void expect_interval(const json& interval, const std::vector<double>& values) {
    const auto n = static_cast<double>(values.size());
    double mean = 0;
    for (const double x : values) {
        mean += x / n;
    }
    double variance = 0;
    for (const double x : values) {
        variance += (x - mean) * (x - mean) / (n - 1);
    }
    // The quantile of Student's t from GSL.
    const double half_width = gsl_cdf_tdist_Pinv(0.975, n - 1) * std::sqrt(variance / n);
    const double tolerance = 1e-9 * std::max(1.0, std::abs(mean)); // nine digits are printed
    EXPECT_NEAR(interval.at("mean").get<double>(), mean, tolerance);
    EXPECT_NEAR(interval.at("half_width").get<double>(), half_width, tolerance);
    EXPECT_NEAR(interval.at("low").get<double>(), mean - half_width, tolerance);
    EXPECT_NEAR(interval.at("high").get<double>(), mean + half_width, tolerance);
}

TEST_F(skerry_bank, intervals_are_those_of_students_t) {
    const run_result small = run({"--input", small_});
    const json results = json::parse(read_file(small.folder / "results.json"));
    const json& summary = results.at("summary");
    std::vector<double> gain;
    std::vector<double> gain_apart;
    for (std::size_t d = 0; d < 2; ++d) {
        for (const char* field : {"availability", "lost_energy_mwh", "vessel_use", "failures"}) {
            std::vector<double> values;
            for (const json& row : results.at("rows")) {
                values.push_back(row.at("designs").at(d).at(field).get<double>());
            }
            expect_interval(summary.at("designs").at(d).at(field), values);
        }
    }
    for (const json& row : results.at("rows")) {
        const auto first = row.at("designs").at(0).at("availability").get<double>();
        gain.push_back(row.at("designs").at(1).at("availability").get<double>() - first);
        gain_apart.push_back(row.at("second_apart").at("availability").get<double>() - first);
    }
    expect_interval(summary.at("availability_gain").at("same_random_events"), gain);
    expect_interval(summary.at("availability_gain").at("random_events_apart"), gain_apart);
}

// Two designs that are one design meet the same events: nothing at all is left between them.
TEST_F(skerry_bank, equal_designs_have_no_difference) {
    const run_result same =
        run({"--input", changed(small_, [](json& in) { in["designs"][1]["vessels"] = 1; })});
    ASSERT_EQ(same.status, 0) << same.err;
    const json results = json::parse(read_file(same.folder / "results.json"));
    const json& gain = results.at("summary").at("availability_gain");
    EXPECT_EQ(gain.at("same_random_events").at("mean"), 0.0);
    EXPECT_EQ(gain.at("same_random_events").at("half_width"), 0.0);
    EXPECT_GT(gain.at("random_events_apart").at("half_width"), 0.0);
    EXPECT_TRUE(gain.at("times_as_narrow").is_null());
}

// With a vessel for each turbine and hardly a wait, a turbine of one component is an alternating
// renewal process: its availability tends to E[up] / (E[up] + E[down]) (Ross, Introduction to
// Probability Models, chapter on renewal theory; cited from memory). Exponential lives (shape 1).
TEST_F(skerry_bank, availability_tends_to_the_renewal_limit) {
    const auto ideal = [](json& in) {
        in["replications"] = 40;
        in["horizon_days"] = 36525;
        in["lease"]["semi_x_km"] = 5;
        in["lease"]["semi_y_km"] = 5;
        in["components"] = {{{"name", "gearbox"},
                             {"spares_days", 2},
                             {"life", {{"shape", 1}, {"scale_days", 30}}},
                             {"repair", {{"mean_hours", 48}, {"sd_hours", 40}}}}};
        in["weather"]["window"] = {{"shape", 100}, {"scale_hours", 10000}};
        in["weather"]["wait"] = {{"mean_hours", 0.5}};
        in["designs"][0]["vessels"] = 9;
        in["designs"][1]["vessels"] = 10;
    };
    const std::string input = changed(small_, ideal);
    const json replay =
        json::parse(read_file(run({"--input", input, "--only", "0"}).folder / "replay.json"));
    double down_days = 2 + 2;
    for (const json& turbine : replay.at("turbines")) {
        down_days += turbine.at("sail_hours").get<double>() / 24 / 9;
    }
    const run_result study = run({"--input", input});
    const json found = json::parse(read_file(study.folder / "results.json"))
                           .at("summary")
                           .at("designs")
                           .at(0)
                           .at("availability");
    // Five standard errors (the half-width is 2.02 of them), and for the start, when all run: at
    // most one mean repair in the horizon.
    EXPECT_NEAR(found.at("mean").get<double>(), 30 / (30 + down_days),
                2.5 * found.at("half_width").get<double>() + down_days / 36525);
    EXPECT_LT(found.at("half_width").get<double>(), 0.001);
}

using seconds = std::int64_t;

seconds in_seconds(const json& hours) {
    return hours.is_null() ? INT64_MAX : std::llround(hours.get<double>() * 3600);
}

/// Workable time between two times, added up window by window.
seconds workable(const json& windows, seconds from, seconds to) {
    seconds sum = 0;
    for (const json& window : windows) {
        sum += std::max<seconds>(0, std::min(to, in_seconds(window[1])) -
                                        std::max(from, in_seconds(window[0])));
    }
    return sum;
}

class replayed_design {
public:
    replayed_design(const json& replay, const json& design, seconds horizon)
        : windows_(replay.at("workable_windows_hours")),
          turbines_(replay.at("turbines")),
          jobs_(design.at("jobs")),
          vessels_(design.at("vessels").get<std::size_t>()),
          horizon_(horizon) {}

    /// A turbine fails when a component has run for its life, and runs again after the repair; the
    /// k-th life and the k-th repair are those that its streams gave.
    void check_lives_and_repairs() const {
        for (std::size_t t = 0; t < turbines_.size(); ++t) {
            const json& parts = turbines_[t].at("components");
            std::vector<std::size_t> k(parts.size(), 0);
            std::vector<seconds> renewed(parts.size(), 0); // operating time at the last renewal
            seconds operated = 0;
            seconds running_since = 0;
            for (const json& job : jobs_) {
                if (job.at("turbine") != t) {
                    continue;
                }
                const std::size_t c = component_of(parts, job);
                ASSERT_NE(running_since, INT64_MAX) << "failed while it stood still: " << job;
                operated += in_seconds(job.at("failed")) - running_since;
                EXPECT_EQ(operated - renewed[c], in_seconds(parts[c].at("life_hours").at(k[c])))
                    << job;
                EXPECT_EQ(job.at("repair_hours"), parts[c].at("repair_hours").at(k[c])) << job;
                ++k[c];
                renewed[c] = operated;
                running_since = in_seconds(job.at("restart"));
            }
            // No failure was left out.
            if (running_since < horizon_) {
                operated += horizon_ - running_since;
                for (std::size_t c = 0; c < parts.size(); ++c) {
                    EXPECT_GE(in_seconds(parts[c].at("life_hours").at(k[c])), operated - renewed[c])
                        << "turbine " << t << " component " << c;
                }
            }
        }
    }

    /// Sailing and repairing take workable time and nothing else.
    void check_work() const {
        for (const json& job : jobs_) {
            const seconds sailed = in_seconds(job.at("sailed"));
            const seconds restart = in_seconds(job.at("restart"));
            const seconds home = in_seconds(job.at("home"));
            const seconds sail =
                in_seconds(turbines_[job.at("turbine").get<std::size_t>()].at("sail_hours"));
            const seconds out = sail + in_seconds(job.at("repair_hours"));
            if (restart != INT64_MAX) {
                EXPECT_EQ(workable(windows_, sailed, restart), out) << job;
                EXPECT_EQ(workable(windows_, restart - 1, restart), 1) << job << " not earlier";
            } else if (sailed != INT64_MAX) {
                EXPECT_LE(workable(windows_, sailed, horizon_), out) << job;
            }
            if (home != INT64_MAX) {
                EXPECT_EQ(workable(windows_, restart, home), sail) << job;
                EXPECT_EQ(workable(windows_, home - 1, home), 1) << job << " not earlier";
            }
        }
    }

    /// First ready, first served, by whichever vessel is in port, at once.
    void check_queue() const {
        std::vector<json> by_ready(jobs_.begin(), jobs_.end());
        std::stable_sort(by_ready.begin(), by_ready.end(), [](const json& a, const json& b) {
            return in_seconds(a.at("ready")) < in_seconds(b.at("ready"));
        });
        std::vector<seconds> in_port(vessels_, 0); // since when each vessel is, or will be
        for (const json& job : by_ready) {
            const seconds ready = in_seconds(job.at("ready"));
            const auto first = std::min_element(in_port.begin(), in_port.end());
            if (ready == INT64_MAX || *first == INT64_MAX) {
                EXPECT_TRUE(job.at("vessel").is_null()) << job;
                continue;
            }
            ASSERT_FALSE(job.at("vessel").is_null()) << job;
            seconds& vessel = in_port.at(job.at("vessel").get<std::size_t>());
            EXPECT_LE(vessel, in_seconds(job.at("sailed"))) << job << " still at sea";
            EXPECT_EQ(in_seconds(job.at("sailed")), std::max(ready, *first)) << job;
            vessel = in_seconds(job.at("home"));
        }
    }

    /// Availability, vessel use and lost energy as they follow from the jobs.
    void check_outcome(const json& outcome, double rated_mw, double yield_workable,
                       double yield_waiting) const {
        seconds down = 0;
        seconds down_workable = 0;
        seconds at_sea = 0;
        for (const json& job : jobs_) {
            const seconds failed = in_seconds(job.at("failed"));
            const seconds until = std::min(horizon_, in_seconds(job.at("restart")));
            down += until - failed;
            down_workable += workable(windows_, failed, until);
            at_sea += std::min(horizon_, in_seconds(job.at("home"))) -
                      std::min(horizon_, in_seconds(job.at("sailed")));
        }
        const auto total = static_cast<double>(horizon_);
        EXPECT_NEAR(outcome.at("availability").get<double>(),
                    1 - static_cast<double>(down) / total / static_cast<double>(turbines_.size()),
                    1e-12);
        EXPECT_NEAR(outcome.at("vessel_use").get<double>(),
                    static_cast<double>(at_sea) / total / static_cast<double>(vessels_), 1e-12);
        EXPECT_NEAR(outcome.at("lost_energy_mwh").get<double>(),
                    rated_mw / 3600 *
                        (yield_workable * static_cast<double>(down_workable) +
                         yield_waiting * static_cast<double>(down - down_workable)),
                    0.000501); // it is printed to the kilowatt-hour
        EXPECT_EQ(outcome.at("failures"), jobs_.size());
    }

private:
    static std::size_t component_of(const json& parts, const json& job) {
        std::size_t c = 0;
        while (parts.at(c).at("component") != job.at("component")) {
            ++c;
        }
        return c;
    }

    const json& windows_;
    const json& turbines_;
    const json& jobs_;
    std::size_t vessels_;
    seconds horizon_;
};

TEST_F(skerry_bank, every_job_of_a_replay_follows_the_rules) {
    for (const char* only : {"0", "7", "23"}) {
        const run_result alone = run({"--input", small_, "--only", only});
        const json replay = json::parse(read_file(alone.folder / "replay.json"));
        const json row = json::parse(read_file(alone.folder / "results.json")).at("rows").at(0);
        for (std::size_t d = 0; d < 2; ++d) {
            const replayed_design design(replay, replay.at("designs").at(d), 365 * 86400);
            design.check_lives_and_repairs();
            design.check_work();
            design.check_queue();
            design.check_outcome(row.at("designs").at(d), 6, 0.36, 0.61);
            EXPECT_GT(replay.at("designs").at(d).at("jobs").size(), 50u);
        }
    }
}

// The lease and the spacing hold for every turbine.
TEST_F(skerry_bank, turbines_stand_in_the_lease_and_apart) {
    const run_result alone = run({"--only", "0"});
    const json turbines = json::parse(read_file(alone.folder / "replay.json")).at("turbines");
    const double angle = 28 * std::acos(-1.0) / 180;
    for (std::size_t i = 0; i < turbines.size(); ++i) {
        const auto x = turbines[i].at("x_km").get<double>();
        const auto y = turbines[i].at("y_km").get<double>();
        const double u = (x * std::cos(angle) + y * std::sin(angle)) / 7.5;
        const double v = (y * std::cos(angle) - x * std::sin(angle)) / 4;
        EXPECT_LE(u * u + v * v, 1 + 1e-9) << "turbine " << i;
        for (std::size_t j = 0; j < i; ++j) {
            EXPECT_GE(std::hypot(x - turbines[j].at("x_km").get<double>(),
                                 y - turbines[j].at("y_km").get<double>()),
                      0.7 - 1e-12)
                << "turbines " << i << " and " << j;
        }
    }
}

// An option's value is the file's value: the files that come out are the same.
TEST_F(skerry_bank, options_replace_the_inputs_values) {
    const auto change = [](json& in) {
        in["seed"] = 18446744073709551615u;
        in["replications"] = 7;
    };
    const run_result by_file = run({"--input", changed(small_, change)});
    const run_result by_option =
        run({"--input=" + small_, "--seed=18446744073709551615", "--replications", "7"});
    ASSERT_EQ(by_file.status, 0) << by_file.err;
    ASSERT_EQ(by_option.status, 0) << by_option.err;
    const std::string results = read_file(by_file.folder / "results.json");
    EXPECT_EQ(read_file(by_option.folder / "results.json"), results);
    // And results.json holds an input that runs to the same results.
    const std::string held = write_input(json::parse(results).at("input").dump());
    EXPECT_EQ(read_file(run({"--input", held}).folder / "results.json"), results);
    // 7 and "7" are different seeds; a text seed may be given too.
    const run_result number = run({"--input", small_, "--seed", "7"});
    const run_result text = run({"--input", changed(small_, [](json& in) { in["seed"] = "7"; })});
    const run_result word = run({"--input", small_, "--seed", "little skerry"});
    EXPECT_NE(json::parse(read_file(number.folder / "results.json")).at("rows"),
              json::parse(read_file(text.folder / "results.json")).at("rows"));
    EXPECT_EQ(read_file(word.folder / "results.json"),
              read_file(run({"--input", small_}).folder / "results.json"));
}

void expect_refusal(const run_result& refused, const std::string& part) {
    EXPECT_EQ(refused.status, 2) << part;
    EXPECT_EQ(refused.out, "") << part;
    EXPECT_EQ(std::count(refused.err.begin(), refused.err.end(), '\n'), 1) << refused.err;
    EXPECT_TRUE(refused.err.starts_with("leat_skerry_bank: ")) << refused.err;
    EXPECT_NE(refused.err.find(part), std::string::npos) << refused.err << "lacks " << part;
    EXPECT_FALSE(std::filesystem::exists(refused.folder)) << part;
}

/// "/components/0/life/shape" as the program says it: components[0].life.shape.
std::string as_path(const json::json_pointer& pointer) {
    if (pointer.empty()) {
        return "";
    }
    const std::string last = pointer.back();
    const std::string before = as_path(pointer.parent_pointer());
    if (last.find_first_not_of("0123456789") == std::string::npos) {
        return before + "[" + last + "]";
    }
    return before.empty() ? last : before + "." + last;
}

// "an unknown key, a missing key, a wrong type, a value out of range each give one clear line
// naming the key, exit status 2"
TEST_F(skerry_bank, refuses_every_key_that_is_missing_unknown_or_wrong) {
    std::set<std::string> parents;
    const json leaves = json::parse(read_file(small_)).flatten();
    for (const auto& leaf : leaves.items()) {
        const json::json_pointer at(leaf.key());
        const json::json_pointer parent = at.parent_pointer();
        const std::string path = as_path(at);
        const auto refuses = [&](auto change, const std::string& part) {
            expect_refusal(run({"--input", changed(small_, change)}), part);
        };
        std::vector<json> wrong = {nullptr, json::array()};
        if (leaf.value().is_number()) {
            wrong = {nullptr, "3", -1e6, 1e300};
        }
        for (const json& value : wrong) {
            refuses([&](json& in) { in[at] = value; }, path + ": ");
        }
        refuses([&](json& in) { in[parent].erase(at.back()); }, path + ": missing");
        if (parents.insert(as_path(parent)).second) {
            refuses([&](json& in) { in[parent]["extra_key"] = 1; },
                    as_path(parent / "extra_key") + ": unknown key");
        }
    }
    EXPECT_GT(leaves.size(), 30u);
    EXPECT_GE(parents.size(), 14u);
}

TEST_F(skerry_bank, refuses_what_a_single_key_cannot_show) {
    using change = void (*)(json&);
    const std::vector<std::pair<change, std::string>> cases = {
        {[](json& in) { in["turbines"]["count"] = 0; },
         "turbines.count: is 0, must be a whole number from 1 to 500"},
        {[](json& in) { in["turbines"]["count"] = 2.5; },
         "turbines.count: is 2.5, must be a whole"},
        {[](json& in) { in["seed"] = -1; }, "seed: must be a whole number from 0 to"},
        {[](json& in) { in["seed"] = ""; }, "seed: must be"},
        {[](json& in) { in["title"] = ""; }, "title: must be a text"},
        {[](json& in) { in["title"] = "two\nlines"; }, "title: must be a text"},
        {[](json& in) { in["lease"] = 3; }, "lease: is a number, must be an object"},
        {[](json& in) { in["components"] = json::array(); }, "components: has 0 entries"},
        {[](json& in) { in["components"] = json::object(); }, "components: is an object"},
        {[](json& in) { in["components"][1]["name"] = "gearbox"; }, "components[1].name: must dif"},
        {[](json& in) { in["designs"].push_back(in["designs"][0]); }, "designs: has 3 entries"},
        {[](json& in) { in["designs"][1]["name"] = "one vessel"; }, "designs[1].name: must differ"},
        {[](json& in) { in["two\nlines"] = 1; }, "\"two\\x0alines\": unknown key"},
        {[](json& in) { in["turbines"]["min_spacing_m"] = 5000; },
         "turbines.min_spacing_m: is 5000"},
        {[](json& in) { in = json::array(); }, "the document: is a list"},
    };
    for (const auto& [spoil, part] : cases) {
        expect_refusal(run({"--input", changed(small_, spoil)}), part);
    }
    for (const auto& [text, part] : std::vector<std::pair<std::string, std::string>>{
             {"", "not JSON"},
             {"{\"title\": \"x\",}", "not JSON: parse error at line 1"},
             {"{}\n{}", "not JSON: parse error at line 2"},
             {"{\"title\": \"\xff\"}", "not JSON"},
             {"{\"seed\": 1e999}", "not JSON"},
             {"{\"port\": {\"x_km\": 1, \"x_km\": 2}}", "port.x_km: stands twice"}}) {
        expect_refusal(run({"--input", write_input(text)}), part);
    }
}

TEST_F(skerry_bank, refuses_bad_options) {
    const std::vector<std::pair<std::vector<std::string>, std::string>> cases = {
        {{"--sed", "1"}, "unknown option: \"--sed\""},
        {{"small.json"}, "unknown option: \"small.json\""},
        {{"--help=1"}, "unknown option: \"--help\""},
        {{"--input", "no such file"}, "no such file: cannot be read"},
        {{"--input", "/"}, "/: cannot be read"},
        {{"--input", small_, "--input", small_}, "--input: given twice"},
        {{"--threads", "0"}, "--threads: is \"0\", must be a whole number from 1 to 256"},
        {{"--threads", "2x"}, "--threads: is \"2x\""},
        {{"--threads", ""}, "--threads: needs a value"},
        {{"--replications", "1"}, "--replications: is \"1\", must be a whole number from 2"},
        {{"--replications", "99999999999999999999"}, "--replications: is"},
        {{"--seed", "-1"}, "--seed: is \"-1\""},
        {{"--seed", "18446744073709551616"}, "--seed: is \"18446744073709551616\""},
        {{"--seed", "1e3"}, "--seed: is \"1e3\""},
        {{"--seed", "two\nlines"}, "--seed: is \"two\\x0alines\""},
        {{"--only", "-1"}, "--only: is \"-1\""},
        {{"--input", small_, "--only", "24"}, "--only: is 24, must be below"},
        {{"--driver", "fork"}, "--driver: is \"fork\", must be one of jthread, openmp, tbb"},
        {{"--checkpoint-every", "5"}, "--checkpoint-every: needs --checkpoint"},
        {{"--checkpoint", "x", "--checkpoint-every", "0"}, "--checkpoint-every: is \"0\""},
        {{"--only", "1", "--resume", "x"}, "--resume: does not go with --only"},
        {{"--only", "1", "--checkpoint", "x"}, "--checkpoint: does not go with --only"},
        {{"--only", "1", "--rehearse", "error:1"}, "--rehearse: does not go with --only"},
        {{"--rehearse", "17"}, "--rehearse: is \"17\", must be error:R or crash:R"},
        {{"--rehearse", "panic:17"}, "--rehearse: is \"panic:17\""},
        {{"--rehearse", "error:"}, "--rehearse: is \"error:\""},
    };
    for (const auto& [arguments, part] : cases) {
        expect_refusal(run(arguments), part);
    }
    expect_refusal(run_as_given({"--output"}, "never made"), "--output: needs a value");
    expect_refusal(run_as_given({"--input", small_, "--output", small_ + "/x"}, small_ + "/x"),
                   "--output: the folder cannot be made");
}

TEST_F(skerry_bank, help_names_every_option_and_the_notice) {
    const run_result help = run({"--help"});
    EXPECT_EQ(help.status, 0);
    for (const char* part : {"--input", "--seed", "--replications", "--threads", "--driver",
                             "--only", "--output", "--checkpoint", "--checkpoint-every", "--resume",
                             "--rehearse", "--help", "local codes and licensed practice"}) {
        EXPECT_NE(help.out.find(part), std::string::npos) << part;
    }
    EXPECT_FALSE(std::filesystem::exists(help.folder));
}

} // namespace
} // namespace skerry_test
