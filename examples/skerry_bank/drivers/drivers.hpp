// The ways to run a study's replications on the processors of one machine.
//
// A driver knows nothing of wind farms. It calls attempt(run, rows, r) once for every replication r
// that `rows` still misses, on as many threads as it is told, and lets whoever is free take the
// next: replications differ in length, and equal shares would leave threads idle at the end. Which
// thread ran what, and who was first, leaves no trace in the results.

#ifndef SKERRY_BANK_DRIVERS_HPP
#define SKERRY_BANK_DRIVERS_HPP

#include <span>
#include <string_view>

#include "../collector.hpp"

namespace skerry {

void run_on_jthread(const replication_function& run, collector& rows, int threads);
void run_on_openmp(const replication_function& run, collector& rows, int threads);
void run_on_tbb(const replication_function& run, collector& rows, int threads);

struct thread_driver {
    std::string_view name;
    void (*run)(const replication_function& run, collector& rows, int threads); ///< null: not built
    std::string_view needs;                                                     ///< to be built
};

/// All of them, the default first.
std::span<const thread_driver> thread_drivers();

} // namespace skerry

#endif
