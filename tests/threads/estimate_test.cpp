// Results reduced by 1, 2 and 8 threads that take work as they are ready: the same bits, whether
// they share a tree, keep one each, hand results on in order, or sum exactly.

#include "leat/distributions/exponential.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/in_order.hpp"
#include "leat/estimate/merge_tree.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/estimate/stopping.hpp"
#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <atomic>
#include <cstdint>
#include <mutex>
#include <thread>
#include <vector>

namespace {

constexpr std::uint64_t replications = 500;

/// One replication of a small study: a mean of ten exponential times.
double replicate(std::uint64_t replication) {
    static const leat::source study{20261201};
    leat::stream s = study.stream("estimate", replication);
    const leat::exponential time{0.25};
    leat::running_moments m;
    for (int i = 0; i < 10; ++i) {
        m.add(time(s));
    }
    return m.mean();
}

struct results {
    leat::running_moments shared;   // one tree under a mutex
    leat::running_moments separate; // a tree each
    leat::running_moments ordered;  // in order, until the rule has enough
    leat::exact_sum sum;

    friend bool operator==(const results&, const results&) = default;
};

results by_threads(unsigned threads) {
    const leat::stopping_rule rule{.half_width = 0.15};
    results out;
    std::mutex guard;
    leat::merge_tree<leat::running_moments> shared;
    leat::merge_tree<leat::running_moments> joined;
    leat::in_order<double> ordered;
    std::atomic<std::uint64_t> next{0};
    std::vector<std::thread> pool;
    for (unsigned t = 0; t < threads; ++t) {
        pool.emplace_back([&] {
            leat::merge_tree<leat::running_moments> own;
            leat::exact_sum own_sum;
            for (std::uint64_t i = next++; i < replications; i = next++) {
                const double x = replicate(i);
                leat::running_moments one;
                one.add(x);
                own.add(i, one);
                own_sum.add(x);
                const std::lock_guard<std::mutex> lock(guard);
                shared.add(i, one);
                ordered.put(i, x, [&](std::uint64_t, double due) {
                    out.ordered.add(due);
                    return !rule.enough(out.ordered);
                });
            }
            const std::lock_guard<std::mutex> lock(guard);
            joined.merge(own);
            out.sum.merge(own_sum);
        });
    }
    for (std::thread& worker : pool) {
        worker.join();
    }
    out.shared = shared.total();
    out.separate = joined.total();
    return out;
}

TEST(Estimates, DoNotDependOnThreads) {
    const results alone = by_threads(1);
    EXPECT_EQ(alone.shared, alone.separate);
    EXPECT_EQ(alone.shared.count(), replications);
    EXPECT_EQ(alone.sum.count(), replications);
    EXPECT_GT(alone.ordered.count(), 30u);
    EXPECT_LT(alone.ordered.count(), replications);
    for (const unsigned threads : {2U, 8U}) {
        for (int again = 0; again < 3; ++again) {
            EXPECT_EQ(by_threads(threads), alone) << threads;
        }
    }
}

} // namespace
