// What the study prints: a table to read.

#ifndef SKERRY_BANK_REPORT_HPP
#define SKERRY_BANK_REPORT_HPP

#include <string>

#include "input.hpp"
#include "rows.hpp"
#include "summary.hpp"

namespace skerry {

/// Stands at the end of every report.
inline constexpr char notice[] =
    "This is a planning illustration on invented data, not advice. Offshore work follows local "
    "codes and licensed practice.";

/// The table of a whole study.
std::string table(const input& in, const study_summary& summary);

/// The lines about one replication that was run alone.
std::string row_table(const input& in, const replication_row& row);

} // namespace skerry

#endif
