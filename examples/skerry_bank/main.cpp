// Skerry Bank: a simulation study from input file to report, on leat.
//
// How to read it, in the order in which a study is made:
//   input_file    what the farm is, read from JSON and checked; input holds it
//   farm          turbines placed at random in the lease; the laws of lives, repairs and weather
//   part, weather where random numbers come from: a stream for each path
//   simulation    one design through one replication's events
//   outcome       what that comes to
//   replication   both designs under the same events
//   workers       replications shared among threads
//   summary       means, intervals, and what common random numbers are worth
//   report, results, replay, map_picture, availability_picture    what is handed over
// The data in skerry_bank.json are invented.

#include <unistd.h> // isatty: progress is for a terminal, not for a log

#include <exception>
#include <filesystem>
#include <fstream>
#include <iostream>

#include <leat/self_check.hpp>

#include "availability_picture.hpp"
#include "farm.hpp"
#include "input_file.hpp"
#include "map_picture.hpp"
#include "options.hpp"
#include "refusal.hpp"
#include "replay.hpp"
#include "replication.hpp"
#include "report.hpp"
#include "results.hpp"
#include "summary.hpp"
#include "workers.hpp"

namespace {

using namespace skerry;

void make_folder(const std::string& folder) {
    std::error_code trouble;
    std::filesystem::create_directories(folder, trouble);
    if (!std::filesystem::is_directory(folder, trouble)) {
        throw refusal("--output", "the folder cannot be made: " + folder);
    }
}

void write(const std::string& folder, const std::string& name, const std::string& text) {
    const std::filesystem::path path = std::filesystem::path(folder) / name;
    std::ofstream file(path, std::ios::binary);
    file << text;
    file.close();
    if (!file) {
        throw std::runtime_error("cannot write " + path.string());
    }
}

loaded_input chosen_input(const options& chosen) {
    loaded_input in = load_input(chosen.input_file);
    if (chosen.seed) {
        replace_seed(in, *chosen.seed);
    }
    if (chosen.replications) {
        replace_replications(in, *chosen.replications);
    }
    if (chosen.only && *chosen.only >= in.values.replications) {
        throw refusal("--only", "is " + std::to_string(*chosen.only) +
                                    ", must be below the number of replications, " +
                                    std::to_string(in.values.replications));
    }
    return in;
}

std::vector<replication_row> run_all(const input& in, const farm& place, const leat::source& study,
                                     int threads) {
    std::vector<replication_row> rows(static_cast<std::size_t>(in.replications));
    const bool terminal = isatty(STDERR_FILENO) != 0;
    share_out(
        in.replications, threads,
        [&](int r) { rows[static_cast<std::size_t>(r)] = run_replication(in, place, study, r); },
        [&](int finished) {
            if (terminal) {
                std::cerr << "\rreplications: " << finished << " of " << in.replications
                          << (finished == in.replications ? "\n" : "") << std::flush;
            }
        });
    return rows;
}

void run_only(const loaded_input& in, const farm& place, const leat::source& study, int replication,
              const std::string& folder, const leat::self_check_report& build) {
    const replication_row row = run_replication(in.values, place, study, replication);
    write(folder, "results.json", results(in, build, row));
    write(folder, "replay.json", replay(in.values, place, study, replication));
    std::cout << row_table(in.values, row) << "\nIts row of results.json:\n"
              << row_text(in.values, row) << "\n\nWritten: results.json and replay.json in "
              << folder << "\n";
}

void run_study(const options& chosen) {
    const leat::self_check_report build = leat::self_check_or_throw(); // before anything is drawn
    const loaded_input loaded = chosen_input(chosen);
    const input& in = loaded.values;
    const leat::source study = root_of(in);
    const farm place = build_farm(in, study);
    make_folder(chosen.output_folder);
    if (chosen.only) {
        run_only(loaded, place, study, *chosen.only, chosen.output_folder, build);
        return;
    }
    const std::vector<replication_row> rows = run_all(in, place, study, chosen.threads);
    const study_summary summary = summarise(rows);
    write(chosen.output_folder, "results.json", results(loaded, build, rows, summary));
    write(chosen.output_folder, "map.svg", map_picture(in, place));
    write(chosen.output_folder, "availability.svg", availability_picture(in, rows, summary));
    std::cout << table(in, summary) << "\nWritten: results.json, map.svg and availability.svg in "
              << chosen.output_folder << "\n";
}

} // namespace

int main(int count, char** arguments) {
    try {
        const options chosen = parse_options(count, arguments);
        if (chosen.help) {
            std::cout << help_text();
        } else {
            run_study(chosen);
        }
        std::cout.flush();
        return std::cout ? 0 : 1;
    } catch (const refusal& e) {
        std::cerr << "leat_skerry_bank: " << e.what() << "\n";
        return 2;
    } catch (const std::exception& e) {
        std::cerr << "leat_skerry_bank: " << e.what() << "\n";
        return 1;
    }
}
