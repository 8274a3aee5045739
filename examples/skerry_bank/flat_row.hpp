// A row as plain numbers: what a message between processes and a line of a checkpoint hold.

#ifndef SKERRY_BANK_FLAT_ROW_HPP
#define SKERRY_BANK_FLAT_ROW_HPP

#include <array>

#include "rows.hpp"

namespace skerry {

/// The replication's number, then the four values of each of its three outcomes. A double holds
/// every one exactly.
using flat_row = std::array<double, 13>;

flat_row flatten(const replication_row& row);

/// The row again, equal to the last bit.
replication_row unflatten(const flat_row& numbers);

} // namespace skerry

#endif
