#include "replication.hpp"

#include "outcome.hpp"
#include "simulation.hpp"
#include "weather.hpp"

namespace skerry {

leat::source events_of(const leat::source& study, int replication) {
    return study.branch("replication", replication);
}

replication_row run_replication(const input& in, const farm& place, const leat::source& study,
                                int replication) {
    const auto run = [&](const design_input& design, const leat::source& events) {
        const weather sky(place, events);
        const std::vector<job> jobs = simulate(place, sky, design.vessels, events);
        return measure(in, place, sky, design.vessels, jobs);
    };
    const leat::source events = events_of(study, replication);
    const leat::source others = events_of(study.branch("apart"), replication);
    return {.replication = replication,
            .designs = {run(in.designs[0], events), run(in.designs[1], events)},
            .second_apart = run(in.designs[1], others)};
}

} // namespace skerry
