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
#include <utility>
#include <vector>

#include <gtest/gtest.h>

namespace skerry_test {

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

/// A results file but for the line that every release changes.
inline std::string without_version(const std::string& results) {
    std::string text;
    for (const std::string& line : lines_of(results)) {
        if (!line.starts_with("\"leat_version\"")) {
            text += line + "\n";
        }
    }
    return text;
}

struct run_result {
    int status; ///< the exit status; 128 and the signal's number where one ended the program
    std::string out, err;
    std::filesystem::path folder; ///< what was given as --output
};

class program_test : public testing::Test {
protected:
    program_test() {
        const auto* const info = testing::UnitTest::GetInstance()->current_test_info();
        home_ = std::filesystem::path(testing::TempDir()) /
                (std::string("skerry_bank_") + info->name() + "_" + std::to_string(getpid()));
        std::filesystem::create_directories(home_);
    }
    ~program_test() override { std::filesystem::remove_all(home_); }

    /// Runs the program with these arguments and an output folder of its own.
    run_result run(std::vector<std::string> arguments) {
        return run_by("", LEAT_SKERRY_BANK_PROGRAM, std::move(arguments));
    }

    /// Runs a program, with something before it, as the shell reads it.
    run_result run_by(const std::string& before, const std::string& program,
                      std::vector<std::string> arguments) {
        const std::filesystem::path folder = home_ / ("run_" + std::to_string(runs_++));
        arguments.insert(arguments.end(), {"--output", folder.string()});
        return execute(before, program, arguments, folder);
    }

    run_result run_as_given(const std::vector<std::string>& arguments,
                            const std::filesystem::path& folder) {
        return execute("", LEAT_SKERRY_BANK_PROGRAM, arguments, folder);
    }

    /// A file of this test's own.
    [[nodiscard]] std::string own_file(const std::string& name) const {
        return (home_ / name).string();
    }

    std::string write_input(const std::string& text) {
        const std::filesystem::path path = home_ / "input.json";
        write_file(path, text);
        return path.string();
    }

    /// What results.json must be for small.json.
    [[nodiscard]] std::string expected_results() const {
        return without_version(read_file(source_ / "tests" / "expected" / "results.json"));
    }

    const std::filesystem::path source_ = LEAT_SKERRY_BANK_DIR;
    const std::string small_ = (source_ / "tests" / "small.json").string();

private:
    run_result execute(const std::string& before, const std::string& program,
                       const std::vector<std::string>& arguments,
                       const std::filesystem::path& folder) {
        std::string command = before + " " + quoted(program);
        for (const std::string& argument : arguments) {
            command += " " + quoted(argument);
        }
        command += " >" + quoted(home_ / "out") + " 2>" + quoted(home_ / "err");
        const int status = std::system(command.c_str());
        return {WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status),
                read_file(home_ / "out"), read_file(home_ / "err"), folder};
    }

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
