// Skerry Bank: a simulation study from input file to report, on leat.
//
// How to read it, in the order in which a study is made:
//   input_file    what the farm is, read from JSON and checked; input holds it
//   farm          turbines placed at random in the lease; the laws of lives, repairs and weather
//   part, weather where random numbers come from: a stream for each path
//   simulation    one design through one replication's events
//   outcome       what that comes to
//   replication   both designs under the same events
//   collector     the finished rows, whoever ran them; checkpoint keeps them in a file
//   drivers/      replications shared among threads (jthread, OpenMP, TBB) or processes (MPI)
//   summary       means, intervals, and what common random numbers are worth
//   report, results, replay, map_picture, availability_picture    what is handed over
//   study         all of these in order
// The data in skerry_bank.json are invented.
//
// This is the program for the threads of one machine; drivers/mpi_main.cpp is the one for MPI.

#include <exception>
#include <iostream>

#include "drivers/drivers.hpp"
#include "options.hpp"
#include "refusal.hpp"
#include "study.hpp"

namespace {

using namespace skerry;

void run_as_chosen(const options& chosen) {
    const study made(chosen_input(chosen));
    run_study(made, chosen, [&](const replication_function& run, collector& rows) {
        chosen.driver->run(run, rows, chosen.threads);
    });
}

} // namespace

int main(int count, char** arguments) {
    try {
        const options chosen = parse_options(count, arguments, thread_drivers());
        if (chosen.help) {
            std::cout << help_text(thread_drivers());
        } else {
            run_as_chosen(chosen);
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
