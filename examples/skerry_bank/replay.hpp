// replay.json: what happened in one replication, for whoever has to look into it.

#ifndef SKERRY_BANK_REPLAY_HPP
#define SKERRY_BANK_REPLAY_HPP

#include <string>

#include <leat/streams/source.hpp>

#include "farm.hpp"
#include "input.hpp"

namespace skerry {

/// The weather, each turbine's lives and repair hours with the addresses of their streams, and each
/// design's jobs. Times are hours since the start, null for what lies beyond the horizon.
///
/// Of each part it lists the lives that are needed to cover the horizon and as many repairs. That
/// is all a run can use, and does not depend on the design or on the other turbines.
std::string replay(const input& in, const farm& place, const leat::source& study, int replication);

} // namespace skerry

#endif
