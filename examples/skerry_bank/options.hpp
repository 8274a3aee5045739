// The command line.

#ifndef SKERRY_BANK_OPTIONS_HPP
#define SKERRY_BANK_OPTIONS_HPP

#include <optional>
#include <span>
#include <string>

#include "drivers/drivers.hpp"
#include "input.hpp"

namespace skerry {

/// What --driver can choose from. None: the program is the one for MPI, where mpirun says how many
/// ranks there are, and --threads and --driver are unknown.
using driver_choice = std::span<const thread_driver>;

/// A failure on purpose.
struct rehearsal {
    int replication;
    bool crash; ///< kill the process; otherwise throw
};

struct options {
    bool help = false;
    std::string input_file;
    std::optional<seed_value> seed; ///< in place of the input's
    std::optional<int> replications;
    const thread_driver* driver = nullptr; ///< null in the program for MPI
    int threads = 1;
    std::optional<int> only; ///< the one replication to run
    std::string output_folder;
    std::string checkpoint_file; ///< empty: none
    int checkpoint_every = 100;  ///< replications
    std::string resume_file;     ///< empty: none
    std::optional<rehearsal> rehearse;
};

/// Throws refusal with one line that names the option.
options parse_options(int count, const char* const* arguments, driver_choice drivers);

/// What --help prints.
std::string help_text(driver_choice drivers);

} // namespace skerry

#endif
