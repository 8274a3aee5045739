// The driver for std::jthread: a counter that every thread takes its next replication from, the
// calling one included.

#include <algorithm>
#include <atomic>
#include <system_error>
#include <thread>

#include "drivers.hpp"

namespace skerry {

void run_on_jthread(const replication_function& run, collector& rows, int threads) {
    const std::vector<int> tasks = rows.missing();
    std::atomic<std::size_t> next{0};
    const auto work = [&] {
        for (std::size_t i = next++; i < tasks.size(); i = next++) {
            attempt(run, rows, tasks[i]);
        }
    };
    std::vector<std::jthread> others; // joined where the function ends
    try {
        const std::size_t wanted = std::min(static_cast<std::size_t>(threads), tasks.size());
        while (others.size() + 1 < wanted) {
            others.emplace_back(work);
        }
    } catch (const std::system_error& e) {
        rows.stop("cannot start " + std::to_string(threads) + " threads: " + e.what());
    }
    work();
}

} // namespace skerry
