// Runs the study as a user does, in a folder of the test's own.

#ifndef SKERRY_BANK_TESTS_RUN_PROGRAM_HPP
#define SKERRY_BANK_TESTS_RUN_PROGRAM_HPP

#include <sys/wait.h> // the exit status out of what system() returns
#include <unistd.h>   // getpid, for a folder that no other test run uses

#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>
#include <vector>

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

namespace skerry_test {

using json = nlohmann::ordered_json;

inline std::string read_file(const std::filesystem::path& path) {
    std::ifstream file(path, std::ios::binary);
    EXPECT_TRUE(file.is_open()) << path;
    return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

inline void write_file(const std::filesystem::path& path, const std::string& text) {
    std::ofstream(path, std::ios::binary) << text;
}

inline std::vector<std::string> lines_of(const std::string& text) {
    std::vector<std::string> lines;
    std::size_t begin = 0;
    for (std::size_t end = text.find('\n'); end != std::string::npos;
         begin = end + 1, end = text.find('\n', begin)) {
        lines.push_back(text.substr(begin, end - begin));
    }
    if (begin < text.size()) {
        lines.push_back(text.substr(begin));
    }
    return lines;
}

struct run_result {
    int status;
    std::string out, err;
    std::filesystem::path folder; ///< what was given as --output
};

class skerry_bank : public testing::Test {
protected:
    skerry_bank() {
        const auto* const info = testing::UnitTest::GetInstance()->current_test_info();
        home_ = std::filesystem::path(testing::TempDir()) /
                (std::string("skerry_bank_") + info->name() + "_" + std::to_string(getpid()));
        std::filesystem::create_directories(home_);
    }
    ~skerry_bank() override { std::filesystem::remove_all(home_); }

    /// Runs the program with these arguments and an output folder of its own.
    run_result run(std::vector<std::string> arguments) {
        const std::filesystem::path folder = home_ / ("run_" + std::to_string(runs_++));
        arguments.insert(arguments.end(), {"--output", folder.string()});
        return run_as_given(arguments, folder);
    }

    run_result run_as_given(const std::vector<std::string>& arguments,
                            const std::filesystem::path& folder) {
        std::string command = quoted(LEAT_SKERRY_BANK_PROGRAM);
        for (const std::string& argument : arguments) {
            command += " " + quoted(argument);
        }
        command += " >" + quoted(home_ / "out") + " 2>" + quoted(home_ / "err");
        const int status = std::system(command.c_str());
        return {WIFEXITED(status) ? WEXITSTATUS(status) : -1, read_file(home_ / "out"),
                read_file(home_ / "err"), folder};
    }

    /// A copy of an input with a change made to it.
    template <class Change>
    std::string changed(const std::filesystem::path& input, Change change) {
        json document = json::parse(read_file(input));
        change(document);
        return write_input(document.dump());
    }

    std::string write_input(const std::string& text) {
        const std::filesystem::path path = home_ / "input.json";
        write_file(path, text);
        return path.string();
    }

    const std::filesystem::path source_ = LEAT_SKERRY_BANK_DIR;
    const std::string small_ = (source_ / "tests" / "small.json").string();

private:
    static std::string quoted(const std::string& argument) {
        std::string safe = "'";
        for (const char c : argument) {
            safe += c == '\'' ? std::string("'\\''") : std::string(1, c);
        }
        return safe + "'";
    }

    std::filesystem::path home_;
    int runs_ = 0;
};

} // namespace skerry_test

#endif
