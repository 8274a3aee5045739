#include "outcome.hpp"

#include <algorithm>

#include "text.hpp"

namespace skerry {
namespace {

double share(seconds part, seconds whole) {
    return static_cast<double>(part) / static_cast<double>(whole);
}

} // namespace

outcome measure(const input& in, const farm& place, const weather& sky, int vessels,
                const std::vector<job>& jobs) {
    seconds down_workable = 0;
    seconds down_waiting = 0;
    seconds at_sea = 0;
    for (const job& j : jobs) {
        const seconds until = std::min(j.restart, place.horizon);
        const seconds workable = sky.workable_before(until) - sky.workable_before(j.failed);
        down_workable += workable;
        down_waiting += until - j.failed - workable;
        at_sea += std::min(j.home, place.horizon) - std::min(j.sailed, place.horizon);
    }
    const seconds turbine_time = static_cast<seconds>(place.sites.size()) * place.horizon;
    const double lost_hours = to_hours(down_workable) * in.weather.capacity_workable +
                              to_hours(down_waiting) * in.weather.capacity_waiting;
    return {.availability = share(turbine_time - down_workable - down_waiting, turbine_time),
            .lost_energy_mwh = rounded(lost_hours * in.turbines.rated_mw, 3),
            .vessel_use = share(at_sea, vessels * place.horizon),
            .failures = static_cast<int>(jobs.size())};
}

} // namespace skerry
