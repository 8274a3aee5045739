// The Skerry Bank study on MPI: main.cpp's program, with ranks in place of threads.

#include <exception>
#include <iostream>
#include <memory>

#include <leat/version.hpp>

#include "../options.hpp"
#include "../refusal.hpp"
#include "../rehearsal.hpp"
#include "../study.hpp"
#include "mpi.hpp"

namespace {

using namespace skerry;

constexpr driver_choice no_threads;
constexpr const char* program = "leat_skerry_bank_mpi: ";

/// What rank 0 tells the others: the version of leat, a line end, the input as JSON.
std::string announcement(const study& made) {
    return std::string(leat::version) + "\n" + made.loaded().document.dump();
}

/// The study that was announced; refused where this rank's program was built with another leat.
study announced_study(const std::string& text) {
    const std::size_t end = text.find('\n');
    if (text.substr(0, end) != leat::version) {
        throw refusal("leat", "is " + std::string(leat::version) + " on this rank, " +
                                  text.substr(0, end) + " on rank 0");
    }
    return study(parse_input(parse_json(text.substr(end + 1))));
}

int deal(int count, char** arguments) {
    const mpi_dealer dealer; // sends the other ranks home, however this ends
    try {
        const options chosen = parse_options(count, arguments, no_threads);
        if (chosen.help) {
            std::cout << help_text(no_threads);
        } else {
            const study made(chosen_input(chosen));
            run_study(made, chosen, [&](const replication_function& run, collector& rows) {
                dealer.announce(announcement(made));
                dealer.run(run, rows);
            });
        }
        std::cout.flush();
        return std::cout ? 0 : 1;
    } catch (const refusal& e) {
        std::cerr << program << e.what() << std::endl;
        return 2;
    } catch (const std::exception& e) {
        std::cerr << program << e.what() << std::endl;
        return 1;
    }
}

int serve(int rank, int count, char** arguments) {
    try {
        serve_mpi_dealer([&](const std::string& text) {
            const auto made = std::make_shared<const study>(announced_study(text));
            const options chosen = parse_options(count, arguments, no_threads);
            return rehearsed([made](int r) { return made->run(r); }, chosen.rehearse);
        });
        return 0;
    } catch (const std::exception& e) {
        // Rank 0 waits for rows that will not come: end it too, rather than let it hang.
        std::cerr << program << "rank " << rank << ": " << e.what() << std::endl;
        mpi_session::abort(1);
    }
}

} // namespace

int main(int count, char** arguments) {
    const mpi_session session(count, arguments);
    return session.rank() == 0 ? deal(count, arguments) : serve(session.rank(), count, arguments);
}
