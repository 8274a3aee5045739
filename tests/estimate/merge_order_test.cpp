// merge_tree and in_order: the same bits whoever comes first, losses and repeats reported; and a
// merge in order of arrival beside them, which must differ.

#include "leat/engines/xoshiro.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/in_order.hpp"
#include "leat/estimate/merge_tree.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/uniform/permute.hpp"
#include "leat/uniform/unit.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cstdint>
#include <numeric>
#include <set>
#include <string>
#include <utility>
#include <vector>

namespace {

using leat::running_moments;
using tree = leat::merge_tree<running_moments>;

/// What replication i contributes: the moments of three numbers of its own.
running_moments contribution(std::uint64_t i) {
    leat::xoshiro256_plus_plus g{i};
    running_moments m;
    for (int k = 0; k < 3; ++k) {
        m.add(leat::unit(g) * 1e3);
    }
    return m;
}

std::vector<std::uint64_t> indices(std::size_t n) {
    std::vector<std::uint64_t> all(n);
    std::iota(all.begin(), all.end(), 0u);
    return all;
}

running_moments by_tree(const std::vector<std::uint64_t>& order) {
    tree t;
    for (const std::uint64_t i : order) {
        t.add(i, contribution(i));
    }
    return t.total();
}

/// The planted fault: each contribution is merged as it arrives.
running_moments by_arrival(const std::vector<std::uint64_t>& order) {
    running_moments all;
    for (const std::uint64_t i : order) {
        all.merge(contribution(i));
    }
    return all;
}

std::string refusal(auto call) {
    try {
        call();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "not refused";
}

TEST(MergeTree, HasOneResultForEveryOrderOfArrival) {
    std::vector<std::uint64_t> order = indices(7);
    const running_moments known = by_tree(order);
    std::set<double> by_arrival_means;
    int orders = 0;
    do {
        ASSERT_EQ(by_tree(order), known);
        by_arrival_means.insert(by_arrival(order).mean());
        ++orders;
    } while (std::next_permutation(order.begin(), order.end()));
    EXPECT_EQ(orders, 5040);
    EXPECT_GT(by_arrival_means.size(), 1u);
}

TEST(MergeTree, MergesInTheTreeThatItsHeaderDescribes) {
    const auto both = [](running_moments a, const running_moments& b) {
        a.merge(b);
        return a;
    };
    const auto c = [](std::uint64_t i) { return contribution(i); };
    EXPECT_EQ(by_tree(indices(1)), c(0));
    EXPECT_EQ(by_tree(indices(3)), both(both(c(0), c(1)), c(2)));
    EXPECT_EQ(by_tree(indices(7)),
              both(both(both(c(0), c(1)), both(c(2), c(3))), both(both(c(4), c(5)), c(6))));
}

TEST(MergeTree, HasOneResultHoweverTheWorkWasDealtOut) {
    constexpr std::size_t n = 1000;
    std::vector<std::uint64_t> order = indices(n);
    const running_moments known = by_tree(order);
    EXPECT_EQ(known.count(), 3 * n);
    leat::xoshiro256_plus_plus g{5};
    int arrival_differs = 0;
    const running_moments in_line = by_arrival(order);
    for (const std::size_t workers : {1u, 2u, 3u, 8u}) {
        leat::shuffle(order, g);
        std::vector<tree> trees(workers);
        for (const std::uint64_t i : order) {
            trees[leat::below(workers, g)].add(i, contribution(i));
        }
        while (trees.size() > 1) { // whoever finishes first is taken in first
            const std::size_t k = leat::below(trees.size() - 1, g);
            trees.back().merge(trees[k]);
            trees.erase(trees.begin() + static_cast<std::ptrdiff_t>(k));
        }
        EXPECT_EQ(trees[0].count(), n);
        EXPECT_EQ(trees[0].total(), known) << workers;
        arrival_differs += by_arrival(order) == in_line ? 0 : 1;
    }
    EXPECT_EQ(arrival_differs, 4);
}

TEST(MergeTree, IsSavedAndTakenUpByPieces) {
    std::vector<std::uint64_t> order = indices(100);
    const running_moments known = by_tree(order);
    leat::xoshiro256_plus_plus g{6};
    leat::shuffle(order, g);
    tree first;
    for (std::size_t i = 0; i < 61; ++i) {
        first.add(order[i], contribution(order[i]));
    }
    tree second;
    for (const tree::piece& part : first.pieces()) {
        second.add(part);
    }
    EXPECT_EQ(second.pieces(), first.pieces());
    EXPECT_EQ(second.count(), 61u);
    EXPECT_EQ(second.next_gap(), first.next_gap());
    for (std::uint64_t i = 0; i < 100; ++i) {
        const bool came = std::find(order.begin(), order.begin() + 61, i) != order.begin() + 61;
        ASSERT_EQ(second.contains(i), came) << i;
        if (!came) {
            second.add(i, contribution(i));
        }
    }
    EXPECT_EQ(second.total(), known);
    EXPECT_EQ(second.pieces().size(), 3u); // 64, 32 and 4
    EXPECT_EQ(second.next_gap(), 100u);
}

TEST(MergeTree, ReportsWhatIsMissingOrCameTwice) {
    tree t;
    EXPECT_EQ(refusal([&] { (void)t.total(); }),
              "leat::merge_tree: count = 0, must be at least 1 for a total");
    for (const std::uint64_t i : {0u, 1u, 2u, 3u, 5u, 6u, 7u}) {
        t.add(i, contribution(i));
    }
    EXPECT_EQ(refusal([&] { (void)t.total(); }), "leat::merge_tree: missing index = 4, must come "
                                                 "before a total, since a greater one has");
    const auto before = t.pieces();
    for (const std::uint64_t i : {0u, 3u, 5u, 7u}) {
        EXPECT_EQ(refusal([&] { t.add(i, contribution(i)); }),
                  "leat::merge_tree: index = " + std::to_string(i) +
                      ", must come once only, and has come before");
    }
    tree other; // 4 is new, 6 is not: nothing is taken in
    other.add(4, contribution(4));
    other.add(6, contribution(6));
    EXPECT_EQ(refusal([&] { t.merge(other); }),
              "leat::merge_tree: index = 6, must come once only, and has come before");
    EXPECT_EQ(refusal([&] { t.merge(t); }),
              "leat::merge_tree: index = 0, must come once only, and has come before");
    // pieces that overlap, begin amiss, or have a size that is no power of two
    EXPECT_EQ(refusal([&] {
                  t.add({4, 4, contribution(4)});
              }),
              "leat::merge_tree: index = 6, must come once only, and has come before");
    for (const tree::piece& bad :
         {tree::piece{8, 3, {}}, tree::piece{8, 0, {}}, tree::piece{10, 4, {}},
          tree::piece{std::uint64_t{1} << 63, 1, {}}}) {
        EXPECT_THROW(t.add(bad), leat::invalid_parameter);
    }
    EXPECT_EQ(t.pieces(), before);
    EXPECT_EQ(t.count(), 7u);
    t.add(4, contribution(4));
    EXPECT_EQ(t.total().count(), 24u);
}

TEST(MergeTree, TakesWhateverMerges) {
    struct both {
        running_moments wait;
        leat::exact_sum energy;
        void merge(const both& other) {
            wait.merge(other.wait);
            energy.merge(other.energy);
        }
    };
    leat::merge_tree<both> t;
    for (std::uint64_t i = 10; i-- > 0;) {
        both one;
        one.wait = contribution(i);
        one.energy.add(0.1 * static_cast<double>(i));
        t.add(i, one);
    }
    EXPECT_EQ(t.total().wait, by_tree(indices(10)));
    EXPECT_EQ(t.total().energy.value(), 4.5);
}

TEST(InOrder, GivesThePlainLoopForEveryOrderOfArrival) {
    running_moments loop;
    for (std::uint64_t i = 0; i < 6; ++i) {
        loop.add(contribution(i).mean());
    }
    std::vector<std::uint64_t> order = indices(6);
    std::set<double> by_arrival_means; // the planted fault
    do {
        leat::in_order<double> results;
        running_moments m;
        running_moments arrived;
        std::uint64_t due = 0;
        for (const std::uint64_t i : order) {
            results.put(i, contribution(i).mean(), [&](std::uint64_t at, double x) {
                EXPECT_EQ(at, due++);
                m.add(x);
            });
            arrived.add(contribution(i).mean());
        }
        ASSERT_EQ(m, loop);
        EXPECT_EQ(results.next(), 6u);
        EXPECT_EQ(results.waiting(), 0u);
        by_arrival_means.insert(arrived.mean());
    } while (std::next_permutation(order.begin(), order.end()));
    EXPECT_GT(by_arrival_means.size(), 1u);
}

TEST(InOrder, StopsAtTheSameIndexForEveryOrderOfArrival) {
    leat::xoshiro256_plus_plus g{7};
    std::vector<std::uint64_t> order = indices(50);
    for (int i = 0; i < 100; ++i) {
        leat::shuffle(order, g);
        leat::in_order<std::uint64_t> results;
        std::vector<std::uint64_t> used;
        for (const std::uint64_t k : order) {
            results.put(k, k * k, [&](std::uint64_t at, std::uint64_t square) {
                EXPECT_EQ(square, at * at);
                used.push_back(at);
                return used.size() < 20;
            });
        }
        EXPECT_TRUE(results.closed());
        EXPECT_EQ(results.waiting(), 0u);
        EXPECT_EQ(results.next(), 20u);
        EXPECT_EQ(used, indices(20));
    }
}

TEST(InOrder, GoesOnFromWhereAnEarlierRunStopped) {
    leat::in_order<std::string> results(40);
    std::string text;
    const auto use = [&](std::uint64_t, const std::string& part) { text += part; };
    results.put(42, "c", use);
    results.put(41, "b", use);
    EXPECT_EQ(text, "");
    EXPECT_EQ(results.waiting(), 2u);
    EXPECT_EQ(refusal([&] { results.put(39, "x", use); }),
              "leat::in_order: index = 39, must come once only, and has come before");
    EXPECT_EQ(refusal([&] { results.put(42, "x", use); }),
              "leat::in_order: index = 42, must come once only, and has come before");
    results.put(40, "a", use);
    EXPECT_EQ(text, "abc");
    EXPECT_EQ(refusal([&] { results.put(41, "x", use); }),
              "leat::in_order: index = 41, must come once only, and has come before");
}

} // namespace
