// The event-driven simulation of one replication of one design.
//
// The model: a turbine runs until one of its components has used up its life, and then stands
// still, all its other components with it, until that one is repaired as good as new. The
// repair can begin once the spare part is in the port; turbines are served in the order in which
// their spares came. A vessel sails out from the port, repairs
// and sails home, one turbine a trip; it makes way and works in workable weather only and rides out
// the waits where it is. All parts are new at the start.

#ifndef SKERRY_BANK_SIMULATION_HPP
#define SKERRY_BANK_SIMULATION_HPP

#include <vector>

#include <leat/streams/source.hpp>

#include "farm.hpp"
#include "units.hpp"
#include "weather.hpp"

namespace skerry {

/// One failure and what came of it. What did not happen within the horizon is `never`.
struct job {
    int turbine;
    int component;
    seconds repair;  ///< workable time that the repair takes
    seconds failed;  ///< the turbine stops
    seconds ready;   ///< its spare part is in the port
    int vessel;      ///< the vessel that serves it, or -1
    seconds sailed;  ///< the vessel leaves the port
    seconds restart; ///< the turbine runs again
    seconds home;    ///< the vessel is back
};

/// All failures within the horizon, in the order in which they happened. A pure function of its
/// arguments.
std::vector<job> simulate(const farm& place, const weather& sky, int vessels,
                          const leat::source& replication);

} // namespace skerry

#endif
