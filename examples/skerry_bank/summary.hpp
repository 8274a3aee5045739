// All replications together: means, intervals, and the difference between the two designs.

#ifndef SKERRY_BANK_SUMMARY_HPP
#define SKERRY_BANK_SUMMARY_HPP

#include <array>
#include <vector>

#include <leat/estimate/interval.hpp>

#include "rows.hpp"

namespace skerry {

inline constexpr double confidence = 0.95;

/// A mean over the replications, and Student's interval for what it estimates.
struct estimated_mean {
    double mean;
    leat::interval interval;
};

/// One design's means.
struct design_summary {
    estimated_mean availability;
    estimated_mean lost_energy_mwh;
    estimated_mean vessel_use;
    estimated_mean failures;
};

struct study_summary {
    std::array<design_summary, 2> designs; ///< as run under the same random events
    estimated_mean gain;       ///< availability, second less first, replication by replication
    estimated_mean gain_apart; ///< the same with random events of its own for each
};

/// Needs two rows or more, of replications 0, 1, 2, ... in any order: the bits are the same.
study_summary summarise(const std::vector<replication_row>& rows);

/// How many times as narrow the same random events make the gain's interval; infinite where they
/// leave no spread at all, and 1 where there is none either way.
double narrowing(const study_summary& summary);

} // namespace skerry

#endif
