// The migration, step by step: the commands of README.md, the replay to the bit, the agreement of
// the answers, and that a mistake in the new program would be noticed.
//
// The old program runs on this machine's C library. What it printed on glibc is stored beside it,
// so that the replay is compared with that where the library is another one.

#include "gauge.hpp"

#include "leat/streams/source.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <cstdint>
#include <cstdio> // popen
#include <fstream>
#include <iterator>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace {

using tide_gauge::instrument;

const std::string home = LEAT_TIDE_GAUGE_DIR;

std::string read_file(const std::string& path) {
    std::ifstream file(path, std::ios::binary);
    EXPECT_TRUE(file.is_open()) << path;
    return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

/// What a command prints, run in the example's folder.
std::string printed_by(const std::string& command) {
    std::FILE* const pipe = popen(("cd '" + home + "' && " + command).c_str(), "r");
    if (pipe == nullptr) {
        throw std::runtime_error("cannot run " + command);
    }
    std::string text;
    std::array<char, 4096> part{};
    for (std::size_t n = 0; (n = std::fread(part.data(), 1, part.size(), pipe)) > 0;) {
        text.append(part.data(), n);
    }
    pclose(pipe);
    return text;
}

std::vector<std::string> lines_of(const std::string& text) {
    std::vector<std::string> lines;
    std::istringstream in(text);
    for (std::string line; std::getline(in, line);) {
        lines.push_back(line);
    }
    return lines;
}

/// The command in README.md that begins with this word.
std::string command_of_the_page(const std::string& word) {
    for (const std::string& line : lines_of(read_file(home + "/README.md"))) {
        if (line.starts_with("    " + word + " ")) {
            return line;
        }
    }
    throw std::runtime_error("README.md has no command " + word);
}

TEST(TideGauge, ThePageFindsEveryCall) {
    const std::string found = printed_by(command_of_the_page("grep"));
    EXPECT_EQ(lines_of(found).size(), 4u) << found; // uniform, lost, wake, srand
    // Each name it looks for, once; and no part of a longer name.
    const std::vector<std::string> names{
        "rand",        "srand",         "rand_r",     "RAND_MAX",  "random",   "srandom",
        "random_r",    "srandom_r",     "drand48",    "erand48",   "lrand48",  "nrand48",
        "mrand48",     "jrand48",       "srand48",    "seed48",    "lcong48",  "initstate",
        "initstate_r", "setstate",      "setstate_r", "drand48_r", "seed48_r", "lcong48_r",
        "srand48_r",   "random_shuffle"};
    std::string command = command_of_the_page("grep");
    command.replace(command.rfind(' '), std::string::npos, " -");
    std::string calls;
    for (const std::string& name : names) {
        calls += name + "(1);\\n";
    }
    EXPECT_EQ(lines_of(printed_by("printf '" + calls + "' | " + command)).size(), names.size());
    EXPECT_EQ(printed_by("printf 'operand(1);\\nrandomly();\\nbrand = 2;\\n' | " + command), "");
}

// "differs from the new one by these lines alone"
TEST(TideGauge, ThePageReplacesEveryCall) {
    std::vector<std::string> added;
    for (const std::string& line : lines_of(printed_by(command_of_the_page("sed")))) {
        EXPECT_FALSE(line.starts_with("<")) << line;
        if (line.starts_with("> ") && line.size() > 2) {
            added.push_back(line.substr(2));
        }
    }
    ASSERT_EQ(added.size(), 2u);
    EXPECT_EQ(added[0], "#include \"leat/compat/historical.hpp\"");
    EXPECT_TRUE(added[1].starts_with("static leat::additive_feedback31 replayed;")) << added[1];
}

TEST(TideGauge, TheReplayPrintsWhatIsStored) {
    EXPECT_EQ(printed_by(LEAT_TIDE_GAUGE_REPLAYED),
              read_file(home + "/before/tide_gauge.expected"));
}

TEST(TideGauge, TheReplayGivesEveryReadingToTheBit) {
#if defined(__GLIBC__)
    EXPECT_EQ(printed_by(LEAT_TIDE_GAUGE_BEFORE), read_file(home + "/before/tide_gauge.expected"));
    for (const char* seed : {"1", "2", "42", "0", "4294967295"}) {
        const std::string options = std::string(" 2 ") + seed + " readings";
        const std::string before = printed_by(LEAT_TIDE_GAUGE_BEFORE + options);
        EXPECT_GT(lines_of(before).size(), 14000u); // of 14400, some lost
        EXPECT_TRUE(before == printed_by(LEAT_TIDE_GAUGE_REPLAYED + options)) << seed;
    }
    // The comparison is sharp.
    EXPECT_FALSE(printed_by(LEAT_TIDE_GAUGE_BEFORE " 2 1 readings") ==
                 printed_by(LEAT_TIDE_GAUGE_REPLAYED " 2 2 readings"));
#else
    std::puts("The C library here is not glibc: the replay is compared with what was stored there, "
              "by the test before this one.");
#endif
}

TEST(TideGauge, TheNewProgramIsReproducible) {
    EXPECT_EQ(printed_by(LEAT_TIDE_GAUGE_PROGRAM), read_file(home + "/tide_gauge.expected"));
    // A month does not depend on the months before it.
    const std::string all = printed_by(LEAT_TIDE_GAUGE_PROGRAM " 5");
    EXPECT_TRUE(printed_by(LEAT_TIDE_GAUGE_PROGRAM " 12").starts_with(all));
    EXPECT_NE(all, printed_by(LEAT_TIDE_GAUGE_PROGRAM " 5 1"));
    EXPECT_EQ(printed_by(LEAT_TIDE_GAUGE_PROGRAM " 1x 2>&1"),
              "leat_tide_gauge: MONTHS = \"1x\", must be a whole number, 0 or more\n");
}

// ---- The answers ----

constexpr int months = 600;

struct column {
    const char* name;
    std::vector<double> values; // a month each
};
using table = std::array<column, 5>;

table empty_table() {
    return {{{"rms error of an hour, mm", {}},
             {"hours off by more than 30 mm", {}},
             {"readings lost", {}},
             {"wakes", {}},
             {"top hour overstated, mm", {}}}};
}

/// The months of the old program, replayed, from what it prints.
table old_answers(std::uint64_t seed) {
    table answers = empty_table();
    std::istringstream lines(printed_by(LEAT_TIDE_GAUGE_REPLAYED " " + std::to_string(months) +
                                        " " + std::to_string(seed)));
    std::string heading;
    std::getline(lines, heading);
    for (int month = 0; lines >> month;) {
        for (column& c : answers) {
            double x = 0;
            lines >> x;
            c.values.push_back(x);
        }
    }
    return answers;
}

table new_answers(const instrument& gauge, const leat::source& study) {
    table answers = empty_table();
    for (int month = 0; month < months; ++month) {
        leat::stream s = study.stream("tide gauge", month);
        const tide_gauge::month_result r = observe(gauge, month, s);
        answers[0].values.push_back(r.rms_error);
        answers[1].values.push_back(r.hours_off);
        answers[2].values.push_back(r.readings_lost);
        answers[3].values.push_back(r.wakes);
        answers[4].values.push_back(r.top_overstated);
    }
    return answers;
}

struct estimate {
    double mean;
    double error; // the standard error of the mean
};

estimate estimate_of(const std::vector<double>& x) {
    const auto n = static_cast<double>(x.size());
    double sum = 0;
    for (const double value : x) {
        sum += value;
    }
    const double mean = sum / n;
    double squares = 0;
    for (const double value : x) {
        squares += (value - mean) * (value - mean);
    }
    return {mean, std::sqrt(squares / (n - 1) / n)};
}

/// Whether two means agree: normal, two-sided. Both samples have one size and, if the programs
/// agree, one law, so that the skewness of a column drops out of the difference.
std::vector<leat_test::outcome> compared(const table& before, const table& after, bool print) {
    std::vector<leat_test::outcome> found;
    for (std::size_t i = 0; i < before.size(); ++i) {
        const estimate a = estimate_of(before[i].values);
        const estimate b = estimate_of(after[i].values);
        const double error = std::hypot(a.error, b.error);
        const double z = (b.mean - a.mean) / error;
        found.push_back({before[i].name, z, std::erfc(std::abs(z) / std::sqrt(2.0))});
        if (print) {
            std::printf("| %s | %.2f | %.2f | %+.2f +- %.2f |\n", before[i].name, a.mean, b.mean,
                        b.mean - a.mean, 1.96 * error);
        }
    }
    return found;
}

std::uint64_t old_seed() { return leat_test::source_of_this_test().stream("old")() >> 33; }

TEST(TideGauge, TheAnswersAgree) {
    const table before = old_answers(old_seed());
    for (const column& c : before) {
        ASSERT_EQ(c.values.size(), static_cast<std::size_t>(months));
    }
    const table after = new_answers(instrument{}, leat_test::source_of_this_test());
    leat_test::check(compared(before, after, true));
}

TEST(TideGauge, AMistakeInTheNewProgramIsFoundOut) {
    const table before = old_answers(old_seed());
    const leat::source study = leat_test::source_of_this_test();
    const auto with_mistake = [&](auto make) {
        instrument gauge;
        make(gauge);
        return compared(before, new_answers(gauge, study), false);
    };
    EXPECT_TRUE(leat_test::is_rejected(with_mistake([](instrument& g) {
        g.waves = leat::normal{0, 0.023};
    })));
    EXPECT_TRUE(leat_test::is_rejected(
        with_mistake([](instrument& g) { g.wake = leat::bernoulli{1.1 / 250}; })));
    EXPECT_TRUE(leat_test::is_rejected(
        with_mistake([](instrument& g) { g.lost = leat::bernoulli{1.1 / 100}; })));
    EXPECT_TRUE(leat_test::is_rejected(with_mistake([](instrument& g) {
        g.wake_height = leat::uniform{0, 0.66};
    })));
}

} // namespace
