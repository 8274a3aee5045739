#include "results.hpp"

#include <cmath>

#include <leat/version.hpp>

#include "report.hpp" // the notice
#include "text.hpp"

namespace skerry {
namespace {

json to_json(const outcome& x) {
    return {{"availability", x.availability},
            {"lost_energy_mwh", x.lost_energy_mwh},
            {"vessel_use", x.vessel_use},
            {"failures", x.failures}};
}

json to_json(const input& in, const replication_row& row) {
    json designs = json::array();
    for (std::size_t d = 0; d < row.designs.size(); ++d) {
        json entry = {{"design", in.designs[d].name}};
        entry.update(to_json(row.designs[d]));
        designs.push_back(std::move(entry));
    }
    return {{"replication", row.replication},
            {"designs", std::move(designs)},
            {"second_apart", to_json(row.second_apart)}};
}

// Nine digits: more than the intervals warrant, and fewer than a compiler's freedom could reach.
json to_json(const estimated_mean& x) {
    return {{"mean", rounded(x.mean, 9)},
            {"half_width", rounded(x.interval.half_width(), 9)},
            {"low", rounded(x.interval.lower, 9)},
            {"high", rounded(x.interval.upper, 9)}};
}

json to_json(const input& in, const study_summary& summary) {
    json designs = json::array();
    for (std::size_t d = 0; d < summary.designs.size(); ++d) {
        const design_summary& means = summary.designs[d];
        designs.push_back({{"design", in.designs[d].name},
                           {"vessels", in.designs[d].vessels},
                           {"availability", to_json(means.availability)},
                           {"lost_energy_mwh", to_json(means.lost_energy_mwh)},
                           {"vessel_use", to_json(means.vessel_use)},
                           {"failures", to_json(means.failures)}});
    }
    const double times = narrowing(summary);
    return {
        {"confidence", confidence},
        {"designs", std::move(designs)},
        {"availability_gain",
         {{"same_random_events", to_json(summary.gain)},
          {"random_events_apart", to_json(summary.gain_apart)},
          {"times_as_narrow", std::isfinite(times) ? json(rounded(times, 6)) : json(nullptr)}}}};
}

// Only whether it passed: the notes of a self-check depend on the machine.
json provenance(const loaded_input& in, const leat::self_check_report& build) {
    return {{"program", "leat_skerry_bank"},
            {"notice", notice},
            {"leat_version", leat::version},
            {"self_check", build ? "passed" : "failed"},
            {"engine", "philox4x32, a stream for each path"},
            {"seed", in.document.at("seed")},
            {"replications", in.values.replications},
            {"input", in.document}};
}

} // namespace

std::string results(const loaded_input& in, const leat::self_check_report& build,
                    const std::vector<replication_row>& rows, const study_summary& summary) {
    json document = provenance(in, build);
    document["summary"] = to_json(in.values, summary);
    document["rows"] = json::array();
    for (const replication_row& row : rows) {
        document["rows"].push_back(to_json(in.values, row));
    }
    return spread_out(document, {"rows"});
}

std::string results(const loaded_input& in, const leat::self_check_report& build,
                    const replication_row& row) {
    json document = provenance(in, build);
    document["only"] = row.replication;
    document["rows"] = json::array({to_json(in.values, row)});
    return spread_out(document, {"rows"});
}

std::string row_text(const input& in, const replication_row& row) {
    return to_json(in, row).dump();
}

} // namespace skerry
