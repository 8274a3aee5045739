// Runs the program as a user does, on the traces of two runs of a small ferry simulation, and pins
// what it prints.

#include "leat/distributions/exponential.hpp"
#include "leat/streams/source.hpp"
#include "leat/testing/traced.hpp"

#include <sys/wait.h> // the exit status out of what system() returns
#include <unistd.h>   // getpid, for a folder that no other test run uses

#include <gtest/gtest.h>

#include <cstddef>
#include <cstdint>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>

namespace {

std::string read_file(const std::filesystem::path& path) {
    std::ifstream file(path, std::ios::binary);
    EXPECT_TRUE(file.is_open()) << path;
    return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

struct outcome {
    int status;
    std::string out;
    std::string err;
};

class Divergence : public testing::Test {
protected:
    Divergence()
        : home_(std::filesystem::path(testing::TempDir()) /
                ("divergence_" +
                 std::string(testing::UnitTest::GetInstance()->current_test_info()->name()) + "_" +
                 std::to_string(getpid()))) {
        std::filesystem::create_directories(home_);
    }
    ~Divergence() override { std::filesystem::remove_all(home_); }

    outcome run(const std::string& arguments) const {
        const std::string home = home_.string();
        const int status = std::system(
            ("cd '" + home + "' && '" LEAT_DIVERGENCE_PROGRAM "' " + arguments + " > out 2> err")
                .c_str());
        return {WEXITSTATUS(status), read_file(home_ / "out"), read_file(home_ / "err")};
    }

    /// A day of crossings in each of 1000 replications: a word for each wait and each crossing, and
    /// in the faulty program one more for a cancelled crossing, once.
    void sail(const std::string& file, bool faulty, const leat::trace_options& options,
              int replications = 1000) const {
        leat::trace trace{(home_ / file).string(), options};
        const leat::source study{20261201};
        for (int i = 0; i < replications; ++i) {
            leat::stream s = study.stream("ferry", i);
            leat::traced g{trace, "replication " + std::to_string(i), s};
            for (int crossing = 0; crossing < 12; ++crossing) {
                g.label("wait");
                g();
                if (faulty && i == 713 && crossing == 7) {
                    g.label("fog");
                    g();
                }
                g.label("crossing time");
                g();
            }
        }
        trace.save();
    }

    std::filesystem::path home_;
};

TEST_F(Divergence, NamesReplicationDrawAndLabel) {
    sail("right", false, {.stride = 8});
    sail("wrong", true, {.stride = 8});
    const outcome coarse = run("right wrong");
    EXPECT_EQ(coarse.status, 1);
    EXPECT_EQ(coarse.err, "");
    const std::string start = to_string(leat::source{20261201}.stream("ferry", 713).address());
    leat::stream_address there = leat::parse_address(start);
    there.position = 8;
    EXPECT_EQ(
        coarse.out,
        "run A: right: 1000 streams, 24000 draws, marks every 8 draws\n"
        "run B: wrong: 1000 streams, 24001 draws, marks every 8 draws\n"
        "1 stream of both runs differs, 999 are the same.\n"
        "\n"
        "replication 713: the runs part at one of the draws 8 to 15 (counted from 0)\n"
        "  in A: draw 15 drawn for \"crossing time\"\n"
        "  in B: draw 15 drawn for \"fog\"\n"
        "  draw 7, the last that both surely share, was for \"crossing time\"\n"
        "  The words are the same, what they are drawn for is not: one run drew more or fewer,\n"
        "  or in another order.\n"
        "  To go there: leat::stream{leat::parse_address(\"" +
            to_string(there) +
            "\")}\n"
            "  For the exact draw, record both runs again with leat::trace_options{.stride = 1,\n"
            "  .from = 8, .to = 16, .only = \"replication 713\"} and compare those.\n");

    const leat::trace_options fine{.stride = 1, .from = 8, .to = 16, .only = "replication 713"};
    sail("right", false, fine);
    sail("wrong", true, fine);
    const outcome exact = run("right wrong");
    EXPECT_EQ(exact.status, 1);
    there.position = 15;
    EXPECT_EQ(
        exact.out,
        "run A: right: 1000 streams, 24000 draws, marks every 1 draw\n"
        "run B: wrong: 1000 streams, 24001 draws, marks every 1 draw\n"
        "1 stream of both runs differs, 999 are the same.\n"
        "\n"
        "replication 713: the runs part at draw 15 (counted from 0)\n"
        "  in A: drawn for \"crossing time\"\n"
        "  in B: drawn for \"fog\"\n"
        "  draw 14, the last that both surely share, was for \"wait\"\n"
        "  The words are the same, what they are drawn for is not: one run drew more or fewer,\n"
        "  or in another order.\n"
        "  To go there: leat::stream{leat::parse_address(\"" +
            to_string(there) + "\")}\n");
}

TEST_F(Divergence, SaysWhenTheRunsAreTheSame) {
    sail("one", false, {});
    sail("two", false, {});
    const outcome found = run("one two");
    EXPECT_EQ(found.status, 0);
    EXPECT_NE(found.out.find("The runs are the same: every stream, every draw, every label.\n"),
              std::string::npos);
}

TEST_F(Divergence, NamesStreamsOfOneRunOnly) {
    sail("more", false, {}, 20);
    sail("fewer", false, {}, 3);
    const outcome found = run("fewer more");
    EXPECT_EQ(found.status, 1);
    EXPECT_NE(found.out.find("0 streams of both runs differ, 3 are the same.\n"
                             "only run B opened 17 streams: replication 3, replication 4, "
                             "replication 5, replication 6, replication 7, ...\n"),
              std::string::npos)
        << found.out;
}

TEST_F(Divergence, RefusesWhatItCannotUse) {
    sail("sound", false, {}, 3);
    std::string data = read_file(home_ / "sound");
    std::ofstream(home_ / "cut", std::ios::binary) << data.substr(0, data.size() / 2);
    data[100] = static_cast<char>(data[100] ^ 1);
    std::ofstream(home_ / "changed", std::ios::binary) << data;
    sail("finer", false, {.stride = 1}, 3);

    const auto expect_refused = [&](const std::string& arguments, const std::string& text) {
        const outcome found = run(arguments);
        EXPECT_EQ(found.status, 2) << arguments;
        EXPECT_EQ(found.out, "");
        EXPECT_EQ(found.err, text + "\n");
    };
    const std::string changed = "has a sum that does not fit: it was changed or cut";
    expect_refused("sound cut", "divergence: leat::read_trace: cut " + changed);
    expect_refused("changed sound", "divergence: leat::read_trace: changed " + changed);
    expect_refused("sound none", "divergence: leat::read_trace: cannot read none");
    expect_refused("sound finer", "divergence: leat::compare_traces: stride of the second run = 1, "
                                  "must be that of the first: record both alike");
    expect_refused("sound", "usage: leat_divergence A.trace B.trace");
}

} // namespace
