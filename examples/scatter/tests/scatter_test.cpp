// Runs the program as a user does, in a folder of the test's own.

#include <sys/wait.h> // the exit status out of what system() returns
#include <unistd.h>   // getpid, for a folder that no other test run uses

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <sstream>
#include <string>

namespace {

using nlohmann::json;

std::string read_file(const std::filesystem::path& path) {
    std::ifstream file(path, std::ios::binary);
    EXPECT_TRUE(file.is_open()) << path;
    return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

std::ptrdiff_t count_of(const std::string& text, const std::string& part) {
    std::ptrdiff_t n = 0;
    for (std::size_t at = text.find(part); at != std::string::npos; at = text.find(part, at + 1)) {
        ++n;
    }
    return n;
}

struct outcome {
    int status;
    std::string out;
    std::string err;
};

class Scatter : public testing::Test {
protected:
    Scatter()
        : home_(std::filesystem::path(testing::TempDir()) /
                ("scatter_" +
                 std::string(testing::UnitTest::GetInstance()->current_test_info()->name()) + "_" +
                 std::to_string(getpid()))) {
        std::filesystem::create_directories(home_);
        input_ = json::parse(read_file(LEAT_SCATTER_DIR "/scatter.json"));
    }
    ~Scatter() override { std::filesystem::remove_all(home_); }

    outcome run(const std::string& text, const std::string& options = "") const {
        std::ofstream(home_ / "in.json") << text;
        const std::string home = home_.string();
        const int status =
            std::system(("'" LEAT_SCATTER_PROGRAM "' '" + home + "/in.json' --out '" + home + "' " +
                         options + " > '" + home + "/out' 2> '" + home + "/err'")
                            .c_str());
        return {WEXITSTATUS(status), read_file(home_ / "out"), read_file(home_ / "err")};
    }

    void expect_refused(const std::string& text, const std::string& reason) const {
        const outcome found = run(text);
        EXPECT_EQ(found.status, 2) << reason;
        EXPECT_EQ(count_of(found.err, "\n"), 1) << found.err;
        EXPECT_NE(found.err.find(reason), std::string::npos) << found.err;
        EXPECT_EQ(found.out, "");
    }

    std::filesystem::path home_;
    json input_;
};

// Every point right, and its place checked by hand: the wreck and its ring, the lease and the
// zones.
TEST_F(Scatter, DrawsInsideAndNothingIsSuspect) {
    const outcome found = run(input_.dump());
    ASSERT_EQ(found.status, 0) << found.err;
    EXPECT_EQ(count_of(found.out, "NOT UNIFORM"), 0) << found.out;
    EXPECT_EQ(count_of(found.out, "chi-square"), 10);
    std::istringstream csv(read_file(home_ / "scatter.csv"));
    std::string line;
    std::getline(csv, line);
    EXPECT_EQ(line, "layer,sampler,x,y");
    int rows = 0;
    const double degree = std::acos(-1.0) / 180;
    while (std::getline(csv, line)) {
        ++rows;
        const std::size_t comma = line.find("\",", line.find("\",") + 1) + 2;
        std::size_t length = 0;
        const double x = std::stod(line.substr(comma), &length);
        const double y = std::stod(line.substr(comma + length + 1));
        const double wreck = std::hypot(x - 2.5, y - 2);
        const double along = (x * std::cos(28 * degree) + y * std::sin(28 * degree)) / 7.5;
        const double across = (y * std::cos(28 * degree) - x * std::sin(28 * degree)) / 4;
        EXPECT_LT(along * along + across * across, 1 + 1e-12) << line;
        if (line.rfind("\"grab", 0) == 0) {
            EXPECT_GT(wreck, 0.8) << line;
        }
        if (line.rfind("\"sonar", 0) == 0) {
            EXPECT_TRUE(wreck > 0.8 - 1e-12 && wreck < 1.3 + 1e-12) << line;
        }
    }
    EXPECT_EQ(rows, 16000);
    EXPECT_EQ(count_of(read_file(home_ / "scatter.svg"), "<circle"), 16000);
}

TEST_F(Scatter, CompareConvictsTheWrongSamplersOnly) {
    const outcome found = run(input_.dump(), "--compare");
    ASSERT_EQ(found.status, 0) << found.err;
    EXPECT_EQ(count_of(found.out, "sampler"), 9);
    std::istringstream table(found.out);
    std::string sampler;
    for (std::string line; std::getline(table, line);) {
        if (line[0] != ' ') {
            sampler = line;
        } else if (line.find("  x ") == 0) {
            const bool wrong = sampler.find("right sampler") == std::string::npos;
            EXPECT_EQ(line.find("NOT UNIFORM") != std::string::npos, wrong) << sampler << line;
        }
    }
}

TEST_F(Scatter, TheSameInputGivesTheSameFiles) {
    run(input_.dump());
    const std::string csv = read_file(home_ / "scatter.csv");
    json fewer = input_;
    fewer["layers"].erase(0);
    run(fewer.dump());
    const std::string rest = read_file(home_ / "scatter.csv");
    // each layer has a stream by its name: taking one away changes no other
    EXPECT_EQ(csv.substr(csv.find("\"grab")), rest.substr(rest.find("\"grab")));
}

TEST_F(Scatter, BadInputIsOneLineAndStatusTwo) {
    expect_refused("{", "parse error");
    expect_refused("[]", "the file needs \"title\"");
    json bad = input_;
    bad["layers"][0]["points"] = 10;
    expect_refused(bad.dump(), "layer 1: \"points\" must be a whole number");
    bad = input_;
    bad["layers"][4]["shape"]["type"] = "blob";
    expect_refused(bad.dump(), "layer 5: \"type\" must be");
    bad = input_;
    bad["layers"][4]["shape"]["radius"] = -1;
    expect_refused(bad.dump(), "layer 5: leat::disk: radius = -1, must be");
    bad = input_;
    bad["layers"][3]["shape"].erase("holes");
    bad["layers"][3]["shape"]["ring"] = json::parse("[[0, 0], [1, 1], [1, 0], [0, 1]]");
    expect_refused(bad.dump(),
                   "layer 4: leat::polygon: the edge ring[0]-ring[1] crosses ring[2]-ring[3]");
    bad = input_;
    bad["layers"][1]["shape"]["removed"][0]["centre"] = json::parse("[9, 9]");
    expect_refused(bad.dump(), "layer 2: what is removed must lie inside, and apart");
    bad = input_;
    bad["seed"] = "x";
    expect_refused(bad.dump(), "type must be number");
}

} // namespace
