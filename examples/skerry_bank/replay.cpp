#include "replay.hpp"

#include "json_text.hpp"
#include "part.hpp"
#include "replication.hpp"
#include "simulation.hpp"
#include "weather.hpp"

namespace skerry {
namespace {

/// Hours since the start, or null for what did not happen within the horizon.
json hours_or_null(const farm& place, seconds t) {
    return t < place.horizon ? json(to_hours(t)) : json(nullptr);
}

json draws_of(const farm& place, const leat::source& events, int turbine) {
    json components = json::array();
    for (const component_laws& laws : place.components) {
        part drawn(laws, events, turbine);
        const std::string life_address = to_string(drawn.life_address());
        const std::string repair_address = to_string(drawn.repair_address());
        json lives = json::array();
        json repairs = json::array();
        for (seconds covered = 0; covered < place.horizon;) {
            const seconds life = drawn.next_life();
            covered += life;
            lives.push_back(to_hours(life));
            repairs.push_back(to_hours(drawn.next_repair()));
        }
        components.push_back({{"component", laws.name},
                              {"life_hours", std::move(lives)},
                              {"repair_hours", std::move(repairs)},
                              {"life_stream", life_address},
                              {"repair_stream", repair_address}});
    }
    const site& at = place.sites[static_cast<std::size_t>(turbine)];
    return {{"turbine", turbine},
            {"x_km", at.x_km},
            {"y_km", at.y_km},
            {"sail_hours", to_hours(at.sail)},
            {"components", std::move(components)}};
}

json jobs_of(const farm& place, const std::vector<job>& jobs) {
    json list = json::array();
    for (const job& j : jobs) {
        list.push_back({{"turbine", j.turbine},
                        {"component", place.components[static_cast<std::size_t>(j.component)].name},
                        {"repair_hours", to_hours(j.repair)},
                        {"failed", hours_or_null(place, j.failed)},
                        {"ready", hours_or_null(place, j.ready)},
                        {"vessel", j.vessel < 0 ? json(nullptr) : json(j.vessel)},
                        {"sailed", hours_or_null(place, j.sailed)},
                        {"restart", hours_or_null(place, j.restart)},
                        {"home", hours_or_null(place, j.home)}});
    }
    return list;
}

} // namespace

std::string replay(const input& in, const farm& place, const leat::source& study, int replication) {
    const leat::source events = events_of(study, replication);
    const weather sky(place, events);
    json windows = json::array();
    for (const weather_window& w : sky.windows()) {
        windows.push_back({to_hours(w.begin), to_hours(w.end)});
    }
    json turbines = json::array();
    for (int t = 0; t < in.turbines.count; ++t) {
        turbines.push_back(draws_of(place, events, t));
    }
    json designs = json::array();
    for (const design_input& design : in.designs) {
        designs.push_back({{"design", design.name},
                           {"vessels", design.vessels},
                           {"jobs", jobs_of(place, simulate(place, sky, design.vessels, events))}});
    }
    const json record = {{"replication", replication},
                         {"workable_windows_hours", std::move(windows)},
                         {"turbines", std::move(turbines)},
                         {"designs", std::move(designs)}};
    return spread_out(record, {"turbines", "designs"});
}

} // namespace skerry
