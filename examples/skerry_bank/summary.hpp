// All replications together: means, intervals, and the difference between the two designs.

#ifndef SKERRY_BANK_SUMMARY_HPP
#define SKERRY_BANK_SUMMARY_HPP

#include <array>
#include <vector>

#include "rows.hpp"
#include "statistics.hpp"

namespace skerry {

/// One design's means over the replications.
struct design_summary {
    interval availability;
    interval lost_energy_mwh;
    interval vessel_use;
    interval failures;
};

struct study_summary {
    std::array<design_summary, 2> designs; ///< as run under the same random events
    interval gain;       ///< availability, second less first, replication by replication
    interval gain_apart; ///< the same with random events of its own for each
};

study_summary summarise(const std::vector<replication_row>& rows);

/// How many times as narrow the same random events make the gain's interval; infinite where they
/// leave no spread at all, and 1 where there is none either way.
double narrowing(const study_summary& summary);

} // namespace skerry

#endif
