// The command line.

#ifndef SKERRY_BANK_OPTIONS_HPP
#define SKERRY_BANK_OPTIONS_HPP

#include <optional>
#include <string>

#include "input.hpp"

namespace skerry {

struct options {
    bool help = false;
    std::string input_file;
    std::optional<seed_value> seed; ///< in place of the input's
    std::optional<int> replications;
    int threads = 1;
    std::optional<int> only; ///< the one replication to run
    std::string output_folder;
};

/// Throws refusal with one line that names the option.
options parse_options(int count, const char* const* arguments);

/// What --help prints.
std::string help_text();

} // namespace skerry

#endif
