// One replication: both designs under the same random events, and the second once more under
// others, to show what the same events are worth.
//
// Everything random in replication r is drawn from streams under
//
//   branch("replication", r)                      the events that both designs meet
//   branch("apart").branch("replication", r)      the second design's own
//
// so a replication is a function of seed, input and r alone: any thread may run it, in any order,
// and it can be run again by itself.

#ifndef SKERRY_BANK_REPLICATION_HPP
#define SKERRY_BANK_REPLICATION_HPP

#include <leat/streams/source.hpp>

#include "farm.hpp"
#include "input.hpp"
#include "rows.hpp"

namespace skerry {

/// The root of the events that both designs meet in a replication.
leat::source events_of(const leat::source& study, int replication);

replication_row run_replication(const input& in, const farm& place, const leat::source& study,
                                int replication);

} // namespace skerry

#endif
