// Results that come in any order, used in the order of their index: what came early waits until all
// before it have come. So whatever is computed from them has the bits of the plain loop over the
// indices, and a rule that looks at each in turn (stopping, a running plot) decides the same way
// however the work was dealt out.
//
//   leat::in_order<double> results;
//   leat::running_moments wait;
//   // whenever a worker hands one over (under a mutex):
//   results.put(replication, w, [&](std::uint64_t, double x) {
//       wait.add(x);
//       return !rule.enough(wait);     // false: that is enough, the rest is dropped
//   });
//   if (results.closed()) { ... }      // tell the workers
//
// Memory: the results that wait. Deal the indices out in ascending order and they are about as many
// as there are workers.
// Errors: invalid_parameter for an index that has come before. An exception from `use` passes
// through; its index counts as used, those after it still wait.
// Threads: not by itself; guard it.
// Not where only a total is wanted, and results come from places far apart: merge_tree.hpp.

#ifndef LEAT_ESTIMATE_IN_ORDER_HPP
#define LEAT_ESTIMATE_IN_ORDER_HPP

#include "leat/core/errors.hpp"

#include <concepts>
#include <cstdint>
#include <map>
#include <type_traits>
#include <utility> // move

namespace leat {

/// Hands results on in the order of their index.
template <std::movable T>
class in_order {
public:
    /// Indices from 0 on.
    in_order() = default;
    /// Indices from `first` on: those before were used in an earlier run.
    explicit in_order(std::uint64_t first) : next_(first) {}

    /// Takes a result in and calls use(index, result) for each that is now due, this one included.
    /// Where `use` returns something that converts to bool, false closes: what waits and what comes
    /// later is dropped.
    template <class Use>
    requires std::invocable<Use&, std::uint64_t, T>
    void put(std::uint64_t index, T result, Use&& use) {
        if (index < next_ || waiting_.contains(index)) {
            detail::refuse("in_order", "index", index, "must come once only, and has come before");
        }
        if (closed_) {
            return;
        }
        if (index != next_) {
            waiting_.emplace(index, std::move(result));
            return;
        }
        hand_on(std::move(result), use);
        while (!closed_ && !waiting_.empty() && waiting_.begin()->first == next_) {
            T due = std::move(waiting_.begin()->second);
            waiting_.erase(waiting_.begin());
            hand_on(std::move(due), use);
        }
    }

    /// The index that is used next; as many as that have been used.
    [[nodiscard]] std::uint64_t next() const noexcept { return next_; }
    /// How many results wait for one before them.
    [[nodiscard]] std::uint64_t waiting() const noexcept { return waiting_.size(); }
    /// Whether `use` said that it had enough.
    [[nodiscard]] bool closed() const noexcept { return closed_; }

private:
    template <class Use>
    void hand_on(T result, Use& use) {
        const std::uint64_t index = next_++;
        if constexpr (std::convertible_to<std::invoke_result_t<Use&, std::uint64_t, T>, bool>) {
            if (!use(index, std::move(result))) {
                closed_ = true;
                waiting_.clear();
            }
        } else {
            use(index, std::move(result));
        }
    }

    std::map<std::uint64_t, T> waiting_;
    std::uint64_t next_ = 0;
    bool closed_ = false;
};

} // namespace leat

#endif
