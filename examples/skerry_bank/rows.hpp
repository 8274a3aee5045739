// What a replication comes to: a row of results.json.

#ifndef SKERRY_BANK_ROWS_HPP
#define SKERRY_BANK_ROWS_HPP

#include <array>

namespace skerry {

/// One run of one design.
struct outcome {
    double availability;    ///< share of the turbines' time in which they could run
    double lost_energy_mwh; ///< what they would have yielded in the rest, to the kilowatt-hour
    double vessel_use;      ///< share of the vessels' time in which they were at sea
    int failures;
};

/// One replication of both.
struct replication_row {
    int replication;
    std::array<outcome, 2> designs; ///< under the same random events
    outcome second_apart;           ///< the second design under random events of its own
};

} // namespace skerry

#endif
