// The driver for OpenMP: a parallel loop, dealt out one replication at a time.

#include "drivers.hpp"

namespace skerry {

void run_on_openmp(const replication_function& run, collector& rows, int threads) {
    const std::vector<int> tasks = rows.missing();
    const auto count = static_cast<std::ptrdiff_t>(tasks.size()); // signed, as a loop variable
#pragma omp parallel for schedule(dynamic, 1) num_threads(threads)
    for (std::ptrdiff_t i = 0; i < count; ++i) {
        attempt(run, rows, tasks[static_cast<std::size_t>(i)]);
    }
}

} // namespace skerry
