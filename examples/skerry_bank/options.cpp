#include "options.hpp"

#include <algorithm>
#include <charconv>
#include <set>
#include <string_view>
#include <thread>

#include "refusal.hpp"
#include "report.hpp"
#include "text.hpp"

namespace skerry {
namespace {

constexpr int most_threads = 256;

int whole_option(const std::string& name, std::string_view value, int lo, int hi) {
    const auto x = whole_number(value, lo, hi);
    if (!x) {
        throw refusal(name, "is " + skerry::quoted(value) + ", must be a whole number from " +
                                std::to_string(lo) + " to " + std::to_string(hi));
    }
    return static_cast<int>(*x);
}

seed_value seed_option(std::string_view value) {
    std::uint64_t number = 0;
    const char* const end = value.data() + value.size();
    const auto [stop, problem] = std::from_chars(value.data(), end, number);
    if (problem == std::errc{} && stop == end) {
        return number;
    }
    // A text seed begins with a letter, so that a mistyped number is not taken for one. ASCII on
    // the command line, whose encoding nobody states; the input file may hold any text.
    const auto is_letter = [](char c) { return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z'); };
    const bool ascii =
        std::all_of(value.begin(), value.end(), [](char c) { return c >= ' ' && c <= '~'; });
    if (value.empty() || value.size() > 60 || !is_letter(value.front()) || !ascii) {
        throw refusal("--seed", "is " + skerry::quoted(value) +
                                    ", must be a whole number from 0 to 18446744073709551615, or "
                                    "an ASCII text of 1 to 60 characters that begins with a "
                                    "letter");
    }
    return std::string(value);
}

} // namespace

options parse_options(int count, const char* const* arguments) {
    options chosen;
    chosen.input_file = LEAT_SKERRY_BANK_DIR "/skerry_bank.json";
    chosen.output_folder = "skerry_bank_output";
    chosen.threads =
        std::clamp(static_cast<int>(std::thread::hardware_concurrency()), 1, most_threads);
    std::set<std::string> given;
    for (int i = 1; i < count; ++i) {
        // "--name value" or "--name=value"
        const std::string_view argument = arguments[i];
        const std::size_t equals =
            argument.starts_with("--") ? argument.find('=') : std::string_view::npos;
        const std::string name(argument.substr(0, equals));
        if (name == "--help" && equals == std::string_view::npos) {
            chosen.help = true;
            continue;
        }
        static const std::set<std::string> known = {"--input",   "--seed", "--replications",
                                                    "--threads", "--only", "--output"};
        if (!known.contains(name)) {
            throw refusal("unknown option", skerry::quoted(name) + "; --help lists them");
        }
        if (!given.insert(name).second) {
            throw refusal(name, "given twice");
        }
        if (equals == std::string_view::npos && i + 1 == count) {
            throw refusal(name, "needs a value");
        }
        const std::string_view value =
            equals == std::string_view::npos ? arguments[++i] : argument.substr(equals + 1);
        if (value.empty()) {
            throw refusal(name, "needs a value");
        }
        if (name == "--input") {
            chosen.input_file = value;
        } else if (name == "--seed") {
            chosen.seed = seed_option(value);
        } else if (name == "--replications") {
            chosen.replications = whole_option(name, value, least_replications, most_replications);
        } else if (name == "--threads") {
            chosen.threads = whole_option(name, value, 1, most_threads);
        } else if (name == "--only") {
            chosen.only = whole_option(name, value, 0, most_replications - 1);
        } else {
            chosen.output_folder = value;
        }
    }
    return chosen;
}

std::string help_text() {
    return std::string(
               "leat_skerry_bank [--input FILE] [--seed N] [--replications N] [--threads N]\n"
               "                 [--only R] [--output FOLDER] [--help]\n"
               "\n"
               "Compares two numbers of service vessels for an invented offshore wind farm: a\n"
               "simulation study whose every random number has an address, so that any number\n"
               "of threads gives the same results to the last byte.\n"
               "\n"
               "  --input FILE       the farm; skerry_bank.json beside the program's source\n"
               "  --seed N           a whole number, or a text; from the input file if not given\n"
               "  --replications N   how many; from the input file if not given\n"
               "  --threads N        1 to 256; as many as the machine has if not given\n"
               "  --only R           runs replication R (from 0) alone and writes its row and, in\n"
               "                     replay.json, its weather, each turbine's lives and repair\n"
               "                     hours with their streams' addresses, and each design's jobs\n"
               "  --output FOLDER    for results.json, map.svg and availability.svg; made where\n"
               "                     missing, skerry_bank_output if not given\n"
               "\n"
               "Status 0: done. 2: an option or the input was refused; one line says which key\n"
               "and why. 1: anything else.\n"
               "\n") +
           notice + "\n";
}

} // namespace skerry
