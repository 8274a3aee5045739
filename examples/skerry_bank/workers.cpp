#include "workers.hpp"

#include <algorithm>
#include <atomic>
#include <chrono>
#include <condition_variable>
#include <exception>
#include <mutex>
#include <thread>
#include <vector>

namespace skerry {

void share_out(int count, int threads, const std::function<void(int)>& task,
               const std::function<void(int)>& finished) {
    std::atomic<int> next{0};
    std::atomic<bool> failed{false};
    std::mutex mutex;
    std::condition_variable worker_ended;
    int done = 0; // this and the next three under the mutex
    int working = std::min(threads, count);
    int failed_task = count;
    std::exception_ptr error;

    const auto work = [&] {
        for (int i = next++; i < count && !failed; i = next++) {
            std::exception_ptr trouble;
            try {
                task(i);
            } catch (...) {
                trouble = std::current_exception();
                failed = true;
            }
            const std::lock_guard lock(mutex);
            ++done;
            if (trouble && i < failed_task) {
                failed_task = i;
                error = trouble;
            }
        }
        const std::lock_guard lock(mutex);
        --working;
        worker_ended.notify_one();
    };

    std::vector<std::thread> workers;
    const int wanted = working; // `working` counts down as soon as the first thread runs
    for (int w = 0; w < wanted; ++w) {
        workers.emplace_back(work);
    }
    for (bool ended = false; !ended;) {
        int so_far = 0;
        {
            std::unique_lock lock(mutex);
            ended = worker_ended.wait_for(lock, std::chrono::milliseconds(100),
                                          [&] { return working == 0; });
            so_far = done;
        }
        finished(so_far);
    }
    for (std::thread& worker : workers) {
        worker.join();
    }
    if (error) {
        std::rethrow_exception(error);
    }
}

} // namespace skerry
