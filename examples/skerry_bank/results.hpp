// results.json: all that is needed to run the study again, a line for each replication, and the
// summary. Nothing in it depends on the threads, the machine or the time.

#ifndef SKERRY_BANK_RESULTS_HPP
#define SKERRY_BANK_RESULTS_HPP

#include <string>
#include <vector>

#include <leat/self_check/report.hpp>

#include "input_file.hpp"
#include "rows.hpp"
#include "summary.hpp"

namespace skerry {

/// The file of a whole study; `build` is what the self-check at its start said.
std::string results(const loaded_input& in, const leat::self_check_report& build,
                    const std::vector<replication_row>& rows, const study_summary& summary);

/// The file of one replication run alone: the same, with that one row and no summary.
std::string results(const loaded_input& in, const leat::self_check_report& build,
                    const replication_row& row);

/// A row as it stands in both.
std::string row_text(const input& in, const replication_row& row);

} // namespace skerry

#endif
