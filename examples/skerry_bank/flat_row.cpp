#include "flat_row.hpp"

#include <cstddef>

namespace skerry {

flat_row flatten(const replication_row& row) {
    flat_row numbers{};
    std::size_t i = 0;
    numbers[i++] = row.replication;
    for (const outcome* x : {&row.designs[0], &row.designs[1], &row.second_apart}) {
        numbers[i++] = x->availability;
        numbers[i++] = x->lost_energy_mwh;
        numbers[i++] = x->vessel_use;
        numbers[i++] = x->failures;
    }
    return numbers;
}

replication_row unflatten(const flat_row& numbers) {
    const auto outcome_at = [&](std::size_t i) {
        return outcome{.availability = numbers[i],
                       .lost_energy_mwh = numbers[i + 1],
                       .vessel_use = numbers[i + 2],
                       .failures = static_cast<int>(numbers[i + 3])};
    };
    return {.replication = static_cast<int>(numbers[0]),
            .designs = {outcome_at(1), outcome_at(5)},
            .second_apart = outcome_at(9)};
}

} // namespace skerry
