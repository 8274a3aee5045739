// A merge in a fixed tree order: contributions carry an index, and who merges with whom depends on
// the indices alone, never on who finished first. So the result has the same bits for any number of
// threads, ranks or restarts.
//
//   leat::merge_tree<leat::running_moments> all;
//   all.add(replication, moments);      // in any order, each index from 0 on once
//   all.merge(of_another_worker);       // in any order too
//   leat::running_moments m = all.total();
//
// The tree: a piece covers 2^k indices from a multiple of 2^k on; two neighbours that make up a
// larger piece are merged at once, the lower one taking in the upper. `total` merges the pieces
// that are left (one for each 1 in the count's binary form), the upper ones first.
//
// T is copyable and has `merge(const T&)`: running_moments, exact_sum, paired_differences, or a
// struct of your own that holds several of them.
// Memory: as many pieces as there are gaps between the indices that have come, plus some 64. Where
// workers keep a tree each and take single indices in turn, that is all of theirs: let them share
// one tree under a mutex, or take runs of indices.
// Errors: invalid_parameter for an index that is there already (a replication counted twice), an
// index of 2^63 or more, and a total asked while an index below the greatest one is missing (one
// that was lost); nothing is changed then.
// Threads: not by itself; guard it, or hold one a thread.
// Source: pairwise summation over a binary tree (T. F. Chan, G. H. Golub and R. J. LeVeque, The
// American Statistician 37(3), 1983).
// Not where each contribution is to be looked at in turn, as in stopping: in_order.hpp.

#ifndef LEAT_ESTIMATE_MERGE_TREE_HPP
#define LEAT_ESTIMATE_MERGE_TREE_HPP

#include "leat/core/errors.hpp"

#include <concepts>
#include <cstdint>
#include <iterator> // prev
#include <map>
#include <utility> // move
#include <vector>

namespace leat {

/// What can take another of its kind in.
template <class T>
concept mergeable = std::copyable<T> && requires(T& a, const T& b) {
    a.merge(b);
};

/// Contributions by index, merged in an order that depends on the indices only.
template <mergeable T>
class merge_tree {
public:
    /// A run of indices, merged: `count`, a power of two, of them from `first`, a multiple of it.
    struct piece {
        std::uint64_t first = 0; ///< the first index
        std::uint64_t count = 1; ///< how many indices
        T value;                 ///< what they come to

        /// Whether indices and value are the same.
        friend constexpr bool operator==(const piece&, const piece&) = default;
    };

    /// Takes in the contribution of one index.
    void add(std::uint64_t index, T value) { add(piece{index, 1, std::move(value)}); }

    /// Takes in a piece that `pieces` gave, here or elsewhere.
    void add(piece part) {
        check(part.first, part.count);
        insert(std::move(part));
    }

    /// Takes in all that another tree holds.
    void merge(const merge_tree& other) {
        for (const auto& [first, there] : other.nodes_) {
            check(first, there.count);
        }
        const auto others = other.pieces(); // a copy: other may be this
        for (const piece& part : others) {
            insert(part);
        }
    }

    /// How many indices have come.
    [[nodiscard]] std::uint64_t count() const noexcept { return count_; }
    /// The least index that has not come.
    [[nodiscard]] std::uint64_t next_gap() const noexcept {
        std::uint64_t next = 0;
        for (const auto& [first, there] : nodes_) {
            if (first != next) {
                break;
            }
            next += there.count;
        }
        return next;
    }
    /// Whether an index has come.
    [[nodiscard]] bool contains(std::uint64_t index) const noexcept {
        const auto after = nodes_.upper_bound(index);
        if (after == nodes_.begin()) {
            return false;
        }
        const auto& [first, there] = *std::prev(after);
        return index - first < there.count;
    }

    /// All contributions merged; refused while there are none, or one is missing.
    [[nodiscard]] T total() const {
        if (nodes_.empty()) {
            detail::refuse("merge_tree", "count", count_, "must be at least 1 for a total");
        }
        if (next_gap() != count_) {
            detail::refuse("merge_tree", "missing index", next_gap(),
                           "must come before a total, since a greater one has");
        }
        auto part = nodes_.rbegin();
        T sum = part->second.value;
        for (++part; part != nodes_.rend(); ++part) {
            T lower = part->second.value;
            lower.merge(sum);
            sum = std::move(lower);
        }
        return sum;
    }

    /// What the tree holds, by ascending index: to be saved, or sent to another process, whose tree
    /// takes each piece in by `add`.
    [[nodiscard]] std::vector<piece> pieces() const {
        std::vector<piece> all;
        all.reserve(nodes_.size());
        for (const auto& [first, there] : nodes_) {
            all.push_back({first, there.count, there.value});
        }
        return all;
    }

private:
    struct run {
        std::uint64_t count;
        T value;
    };

    static constexpr std::uint64_t most_ = std::uint64_t{1} << 63;

    void check(std::uint64_t begin, std::uint64_t size) const {
        if (begin >= most_) {
            detail::refuse("merge_tree", "index", begin, "must be below 2^63");
        }
        if (size == 0 || size > most_ || (size & (size - 1)) != 0 || begin % size != 0) {
            detail::refuse("merge_tree", "count of a piece", size,
                           "must be a power of two that divides its first index");
        }
        // Pieces are disjoint: of those that are there, only the last one that begins before the
        // end of this one can reach into it.
        const auto after = nodes_.lower_bound(begin + size);
        if (after != nodes_.begin()) {
            const auto& [first, there] = *std::prev(after);
            if (first + there.count > begin) {
                detail::refuse("merge_tree", "index", first > begin ? first : begin,
                               "must come once only, and has come before");
            }
        }
    }

    void insert(piece part) {
        count_ += part.count;
        auto place = nodes_.emplace(part.first, run{part.count, std::move(part.value)}).first;
        for (;;) { // with its neighbour it may make up a larger piece
            const std::uint64_t size = place->second.count;
            const auto neighbour = nodes_.find(place->first ^ size);
            if (neighbour == nodes_.end() || neighbour->second.count != size) {
                return;
            }
            const auto lower = place->first < neighbour->first ? place : neighbour;
            const auto upper = lower == place ? neighbour : place;
            lower->second.value.merge(upper->second.value);
            lower->second.count = 2 * size;
            nodes_.erase(upper);
            place = lower;
        }
    }

    std::map<std::uint64_t, run> nodes_; // by first index
    std::uint64_t count_ = 0;
};

} // namespace leat

#endif
