// The driver for the standard library's parallel algorithms, which run on TBB in libstdc++: idle
// threads take over parts of what the others have not begun.

#include <algorithm>
#include <execution>

#include <tbb/global_control.h> // the standard has no say in how many threads there are
#include <tbb/task_arena.h>

#include "drivers.hpp"

namespace skerry {

void run_on_tbb(const replication_function& run, collector& rows, int threads) {
    const std::vector<int> tasks = rows.missing();
    const tbb::global_control at_most(tbb::global_control::max_allowed_parallelism,
                                      static_cast<std::size_t>(threads));
    tbb::task_arena arena(threads);
    arena.execute([&] {
        std::for_each(std::execution::par, tasks.begin(), tasks.end(),
                      [&](int replication) { attempt(run, rows, replication); });
    });
}

} // namespace skerry
