#include "summary.hpp"

#include <cmath>
#include <limits>

namespace skerry {
namespace {

/// The interval of a value taken from each row.
template <class Value>
interval over(const std::vector<replication_row>& rows, Value value) {
    std::vector<double> values;
    values.reserve(rows.size());
    for (const replication_row& row : rows) {
        values.push_back(value(row));
    }
    return mean_interval(values);
}

} // namespace

study_summary summarise(const std::vector<replication_row>& rows) {
    const auto design = [&](std::size_t d) {
        const auto mean_of = [&](auto outcome::*field) {
            return over(rows, [&](const replication_row& row) {
                return static_cast<double>(row.designs[d].*field);
            });
        };
        return design_summary{.availability = mean_of(&outcome::availability),
                              .lost_energy_mwh = mean_of(&outcome::lost_energy_mwh),
                              .vessel_use = mean_of(&outcome::vessel_use),
                              .failures = mean_of(&outcome::failures)};
    };
    return {.designs = {design(0), design(1)},
            .gain = over(rows,
                         [](const replication_row& row) {
                             return row.designs[1].availability - row.designs[0].availability;
                         }),
            .gain_apart = over(rows, [](const replication_row& row) {
                return row.second_apart.availability - row.designs[0].availability;
            })};
}

double narrowing(const study_summary& summary) {
    const double same = summary.gain.half_width;
    const double apart = summary.gain_apart.half_width;
    if (same > 0) {
        return apart / same;
    }
    return apart > 0 ? std::numeric_limits<double>::infinity() : 1;
}

} // namespace skerry
