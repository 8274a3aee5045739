// Digests of estimates: of what is computed from draws.

#include "digest/digest.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/estimate/batch_means.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/merge_tree.hpp"
#include "leat/estimate/proportion_interval.hpp"
#include "leat/estimate/quantile_interval.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/permute.hpp"

#include <array>
#include <bit>
#include <vector>

namespace digests {
namespace {

using ends = std::array<double, 2>;

ends ends_of(const leat::interval& i) { return {i.lower, i.upper}; }

std::array<double, 5> numbers_of(const leat::running_moments& m) {
    return {m.mean(), m.standard_error(), m.skewness(), m.excess_kurtosis(), m.max()};
}

/// The moments of 100 contributions that come in a drawn order.
leat::running_moments by_tree(leat::xoshiro256_plus_plus& g) {
    std::array<std::uint64_t, 100> order{};
    for (std::size_t i = 0; i < order.size(); ++i) {
        order[i] = i;
    }
    leat::shuffle(order, g);
    leat::merge_tree<leat::running_moments> tree;
    for (const std::uint64_t i : order) {
        leat::running_moments one;
        one.add(leat::exponential{1}(g));
        one.add(leat::normal{0, 3}(g));
        tree.add(i, one);
    }
    return tree.total();
}

} // namespace

void estimate() {
    leat::running_moments m;
    draws("estimate.running_moments", [&m](auto& g) {
        m.add(leat::normal{5, 2}(g));
        m.add(leat::exponential{0.1}(g));
        return numbers_of(m);
    });
    draws(
        "estimate.merge_tree", [](auto& g) { return numbers_of(by_tree(g)); }, 200);
    leat::exact_sum sum;
    draws("estimate.exact_sum", [&sum](auto& g) {
        // any sign, and any exponent but the highest
        const std::uint64_t field = leat::below(std::uint64_t{2040}, g);
        sum.add(std::bit_cast<double>((g() & 0x800FFFFFFFFFFFFFu) | field << 52));
        return sum.value();
    });
    draws(
        "estimate.student_factor",
        [](auto& g) {
            const double k = 1 + leat::exponential{0.001}(g);
            const double level = leat::uniform{0.001, 1}(g);
            return leat::student_factor(k, level);
        },
        5000);
    draws(
        "estimate.welch_interval",
        [](auto& g) {
            leat::running_moments a;
            leat::running_moments b;
            for (int i = 0; i < 5; ++i) {
                a.add(leat::normal{}(g));
                b.add(leat::exponential{1}(g));
            }
            return ends_of(leat::welch_interval(a, b, 0.9));
        },
        2000);
    const auto counted = [](auto make) {
        return [make](auto& g) {
            const std::uint64_t trials = 1 + leat::below(std::uint64_t{10000}, g);
            const std::uint64_t successes = leat::below(trials + 1, g);
            const double level = leat::uniform{0.001, 1}(g);
            return ends_of(make(successes, trials, level));
        };
    };
    draws("estimate.wilson_interval",
          counted([](auto k, auto n, double level) { return leat::wilson_interval(k, n, level); }));
    draws("estimate.clopper_pearson_interval", counted([](auto k, auto n, double level) {
              return leat::clopper_pearson_interval(k, n, level);
          }),
          2000);
    draws(
        "estimate.quantile_ranks",
        [](auto& g) {
            const std::uint64_t n = 100 + leat::below(std::uint64_t{10000}, g);
            const double p = leat::uniform{0.1, 0.9}(g);
            const leat::order_ranks r = leat::quantile_ranks(n, p, 0.95);
            return std::array<double, 3>{static_cast<double>(r.lower), static_cast<double>(r.upper),
                                         r.coverage};
        },
        500);
    draws(
        "estimate.batch_means",
        [](auto& g) {
            leat::batch_means run;
            double x = 0;
            for (int i = 0; i < 200; ++i) {
                x = x / 2 + leat::normal{}(g); // the half is exact: nothing to contract
                run.add(x);
            }
            const leat::batch_report r = run.report();
            return std::array<double, 3>{r.mean.lower, r.mean.upper, r.correlation};
        },
        500);
}

} // namespace digests
