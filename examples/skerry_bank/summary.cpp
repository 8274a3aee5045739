#include "summary.hpp"

#include <cstdint>
#include <limits>

#include <leat/estimate/mean_interval.hpp>
#include <leat/estimate/merge_tree.hpp>
#include <leat/estimate/running_moments.hpp>

namespace skerry {
namespace {

/// The moments of every value that is averaged.
struct study_moments {
    struct of_design {
        leat::running_moments availability, lost_energy_mwh, vessel_use, failures;
    };
    std::array<of_design, 2> designs;
    leat::running_moments gain, gain_apart;

    /// Of one row.
    explicit study_moments(const replication_row& row) {
        for (std::size_t d = 0; d < designs.size(); ++d) {
            designs[d].availability.add(row.designs[d].availability);
            designs[d].lost_energy_mwh.add(row.designs[d].lost_energy_mwh);
            designs[d].vessel_use.add(row.designs[d].vessel_use);
            designs[d].failures.add(row.designs[d].failures);
        }
        gain.add(row.designs[1].availability - row.designs[0].availability);
        gain_apart.add(row.second_apart.availability - row.designs[0].availability);
    }

    void merge(const study_moments& other) {
        for (std::size_t d = 0; d < designs.size(); ++d) {
            designs[d].availability.merge(other.designs[d].availability);
            designs[d].lost_energy_mwh.merge(other.designs[d].lost_energy_mwh);
            designs[d].vessel_use.merge(other.designs[d].vessel_use);
            designs[d].failures.merge(other.designs[d].failures);
        }
        gain.merge(other.gain);
        gain_apart.merge(other.gain_apart);
    }
};

estimated_mean estimate(const leat::running_moments& values) {
    return {values.mean(), leat::student_interval(values, confidence)};
}

design_summary estimate(const study_moments::of_design& design) {
    return {.availability = estimate(design.availability),
            .lost_energy_mwh = estimate(design.lost_energy_mwh),
            .vessel_use = estimate(design.vessel_use),
            .failures = estimate(design.failures)};
}

} // namespace

study_summary summarise(const std::vector<replication_row>& rows) {
    leat::merge_tree<study_moments> tree; // merges by the replications' numbers
    for (const replication_row& row : rows) {
        tree.add(static_cast<std::uint64_t>(row.replication), study_moments(row));
    }
    const study_moments all = tree.total();
    return {.designs = {estimate(all.designs[0]), estimate(all.designs[1])},
            .gain = estimate(all.gain),
            .gain_apart = estimate(all.gain_apart)};
}

double narrowing(const study_summary& summary) {
    const double same = summary.gain.interval.half_width();
    const double apart = summary.gain_apart.interval.half_width();
    if (same > 0) {
        return apart / same;
    }
    return apart > 0 ? std::numeric_limits<double>::infinity() : 1;
}

} // namespace skerry
