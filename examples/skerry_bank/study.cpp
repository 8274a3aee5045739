#include "study.hpp"

#include <unistd.h> // isatty: progress is for a terminal, not for a log

#include <chrono>
#include <filesystem>
#include <iostream>
#include <stdexcept>
#include <utility>

#include <leat/self_check.hpp>

#include "availability_picture.hpp"
#include "checkpoint.hpp"
#include "files.hpp"
#include "map_picture.hpp"
#include "refusal.hpp"
#include "rehearsal.hpp"
#include "replay.hpp"
#include "replication.hpp"
#include "report.hpp"
#include "results.hpp"
#include "summary.hpp"

namespace skerry {
namespace {

void make_folder(const std::string& folder) {
    std::error_code trouble;
    std::filesystem::create_directories(folder, trouble);
    if (!std::filesystem::is_directory(folder, trouble)) {
        throw refusal("--output", "the folder cannot be made: " + folder);
    }
}

void write(const std::string& folder, const std::string& name, const std::string& text) {
    write_file((std::filesystem::path(folder) / name).string(), text);
}

/// Says now and then how far the study is, where somebody watches.
std::function<void(int)> progress_line(int replications) {
    if (isatty(STDERR_FILENO) == 0) {
        return {};
    }
    using clock = std::chrono::steady_clock;
    return [replications, said = clock::time_point()](int finished) mutable {
        const clock::time_point now = clock::now();
        if (finished == replications || now - said > std::chrono::milliseconds(100)) {
            said = now;
            std::cerr << "\rreplications: " << finished << " of " << replications
                      << (finished == replications ? "\n" : "") << std::flush;
        }
    };
}

/// The rows to begin with: those of the checkpoint to go on from, else none.
row_set first_rows(const study& made, const options& chosen) {
    if (chosen.resume_file.empty()) {
        return row_set(static_cast<std::size_t>(made.in().replications));
    }
    return load_checkpoint(chosen.resume_file, made.loaded());
}

std::function<void(const row_set&)> saver(const study& made, const options& chosen) {
    const std::string& file = chosen.checkpoint_file;
    if (file.empty()) {
        return {};
    }
    // Work of hours must not be overwritten because somebody forgot to ask for it.
    const bool going_on = !chosen.resume_file.empty() && std::filesystem::exists(file) &&
                          std::filesystem::equivalent(file, chosen.resume_file);
    if (std::filesystem::exists(file) && !going_on) {
        throw refusal("--checkpoint", file + " exists already: go on from it with --resume, or "
                                             "remove it");
    }
    return [&made, file](const row_set& rows) { save_checkpoint(file, made.loaded(), rows); };
}

std::vector<replication_row> run_all(const study& made, const options& chosen,
                                     const driver_function& driver) {
    row_set first = first_rows(made, chosen);
    const auto save = saver(made, chosen);
    if (save) {
        try { // a place that cannot be written to is found now, not after hours
            save(first);
        } catch (const std::runtime_error& e) {
            throw refusal("--checkpoint", e.what());
        }
    }
    collector rows(std::move(first), {.save = save,
                                      .save_every = chosen.checkpoint_every,
                                      .progress = progress_line(made.in().replications)});
    driver(rehearsed([&](int r) { return made.run(r); }, chosen.rehearse), rows);
    return rows.finish();
}

void run_only(const study& made, const options& chosen) {
    const int r = *chosen.only;
    const replication_row row = made.run(r);
    write(chosen.output_folder, "results.json", results(made.loaded(), made.build(), row));
    write(chosen.output_folder, "replay.json", replay(made.in(), made.place(), made.root(), r));
    std::cout << row_table(made.in(), row) << "\nIts row of results.json:\n"
              << row_text(made.in(), row) << "\n\nWritten: results.json and replay.json in "
              << chosen.output_folder << "\n";
}

} // namespace

study::study(loaded_input in)
    : build_(leat::self_check_or_throw()),
      in_(std::move(in)),
      root_(root_of(in_.values)),
      place_(build_farm(in_.values, root_)) {}

replication_row study::run(int replication) const {
    return run_replication(in_.values, place_, root_, replication);
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

void run_study(const study& made, const options& chosen, const driver_function& driver) {
    make_folder(chosen.output_folder);
    if (chosen.only) {
        run_only(made, chosen);
        return;
    }
    const std::vector<replication_row> rows = run_all(made, chosen, driver);
    const study_summary summary = summarise(rows);
    write(chosen.output_folder, "results.json",
          results(made.loaded(), made.build(), rows, summary));
    write(chosen.output_folder, "map.svg", map_picture(made.in(), made.place()));
    write(chosen.output_folder, "availability.svg", availability_picture(made.in(), rows, summary));
    std::cout << table(made.in(), summary)
              << "\nWritten: results.json, map.svg and availability.svg in " << chosen.output_folder
              << "\n";
}

} // namespace skerry
