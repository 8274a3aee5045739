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

const thread_driver* driver_option(std::string_view value, driver_choice drivers) {
    std::string names;
    for (const thread_driver& driver : drivers) {
        if (driver.name == value) {
            if (driver.run == nullptr) {
                throw refusal("--driver", skerry::quoted(value) +
                                              " is not in this build: it needs " +
                                              std::string(driver.needs));
            }
            return &driver;
        }
        names += (names.empty() ? "" : ", ") + std::string(driver.name);
    }
    throw refusal("--driver", "is " + skerry::quoted(value) + ", must be one of " + names);
}

rehearsal rehearsal_option(std::string_view value) {
    const std::size_t colon = std::min(value.find(':'), value.size());
    const std::string_view kind = value.substr(0, colon);
    const auto replication = colon == value.size()
                                 ? std::nullopt
                                 : whole_number(value.substr(colon + 1), 0, most_replications - 1);
    if ((kind != "error" && kind != "crash") || !replication) {
        throw refusal("--rehearse", "is " + skerry::quoted(value) +
                                        ", must be error:R or crash:R, R a replication");
    }
    return {static_cast<int>(*replication), kind == "crash"};
}

/// Options that make no sense together.
void check_together(const options& chosen, const std::set<std::string>& given) {
    if (given.contains("--checkpoint-every") && !given.contains("--checkpoint")) {
        throw refusal("--checkpoint-every", "needs --checkpoint");
    }
    for (const char* name : {"--checkpoint", "--resume", "--rehearse"}) {
        if (chosen.only && given.contains(name)) {
            throw refusal(name, "does not go with --only, which runs one replication");
        }
    }
}

bool is_known(const std::string& name, driver_choice drivers) {
    static const std::set<std::string> of_both = {"--input",  "--seed",     "--replications",
                                                  "--only",   "--output",   "--checkpoint",
                                                  "--resume", "--rehearse", "--checkpoint-every"};
    return of_both.contains(name) ||
           (!drivers.empty() && (name == "--threads" || name == "--driver"));
}

} // namespace

options parse_options(int count, const char* const* arguments, driver_choice drivers) {
    options chosen;
    chosen.input_file = LEAT_SKERRY_BANK_DIR "/skerry_bank.json";
    chosen.output_folder = "skerry_bank_output";
    chosen.threads =
        std::clamp(static_cast<int>(std::thread::hardware_concurrency()), 1, most_threads);
    chosen.driver = drivers.empty() ? nullptr : &drivers.front();
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
        if (!is_known(name, drivers)) {
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
        } else if (name == "--driver") {
            chosen.driver = driver_option(value, drivers);
        } else if (name == "--checkpoint") {
            chosen.checkpoint_file = value;
        } else if (name == "--checkpoint-every") {
            chosen.checkpoint_every = whole_option(name, value, 1, most_replications);
        } else if (name == "--resume") {
            chosen.resume_file = value;
        } else if (name == "--rehearse") {
            chosen.rehearse = rehearsal_option(value);
        } else {
            chosen.output_folder = value;
        }
    }
    check_together(chosen, given);
    return chosen;
}

std::string help_text(driver_choice drivers) {
    const bool mpi = drivers.empty();
    return std::string(mpi ? "mpirun -n RANKS leat_skerry_bank_mpi [OPTION VALUE]...\n"
                           : "leat_skerry_bank [OPTION VALUE]...\n") +
           "\n"
           "Compares two numbers of service vessels for an invented offshore wind farm: a\n"
           "simulation study whose every random number has an address, so that any number\n"
           "of threads or processes gives the same results to the last byte.\n"
           "\n"
           "  --input FILE       the farm; skerry_bank.json beside the program's source\n"
           "  --seed N           a whole number, or a text; from the input file if not given\n"
           "  --replications N   how many; from the input file if not given\n" +
           (mpi ? ""
                : "  --threads N        1 to 256; as many as the machine has if not given\n"
                  "  --driver NAME      what runs the threads: jthread (if not given), openmp, "
                  "tbb\n") +
           "  --only R           runs replication R (from 0) alone and writes its row and, in\n"
           "                     replay.json, its weather, each turbine's lives and repair\n"
           "                     hours with their streams' addresses, and each design's jobs\n"
           "  --output FOLDER    for results.json, map.svg and availability.svg; made where\n"
           "                     missing, skerry_bank_output if not given\n"
           "  --checkpoint FILE  keeps the finished replications there, for a run that is cut\n"
           "                     short\n"
           "  --checkpoint-every N   saves after N replications more; 100 if not given\n"
           "  --resume FILE      goes on from a checkpoint, whichever driver made it on however\n"
           "                     many threads or ranks; also to more replications than it had\n"
           "  --rehearse error:R, --rehearse crash:R   replication R fails, or kills its process:\n"
           "                     to see beforehand that such a job is noticed\n"
           "  --help             this\n"
           "\n" +
           (mpi ? "Rank 0 deals the replications out, one at a time, and collects the rows: start\n"
                  "one rank more than there are processors to work. A single rank does all "
                  "itself.\n"
                  "\n"
                : "") +
           "Status 0: done. 2: an option, the input or a checkpoint was refused; one line says\n"
           "which key and why. 1: anything else, such as a replication that failed.\n"
           "\n" +
           notice + "\n";
}

} // namespace skerry
