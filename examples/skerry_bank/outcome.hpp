// What one run of a design comes to, measured from its jobs.

#ifndef SKERRY_BANK_OUTCOME_HPP
#define SKERRY_BANK_OUTCOME_HPP

#include <vector>

#include "farm.hpp"
#include "input.hpp"
#include "rows.hpp"
#include "simulation.hpp"
#include "weather.hpp"

namespace skerry {

/// The outcome of a design that was run with so many vessels.
outcome measure(const input& in, const farm& place, const weather& sky, int vessels,
                const std::vector<job>& jobs);

} // namespace skerry

#endif
