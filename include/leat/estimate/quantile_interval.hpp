// Confidence intervals for a quantile, whatever the law: two values of the ordered sample between
// which it lies.
//
//   std::vector<double> waits = ...;             // one a replication
//   std::sort(waits.begin(), waits.end());
//   leat::interval ci = leat::quantile_interval(waits, 0.9);          // of the 90 % quantile
//   leat::quantile_ranks(200, 0.9, 0.95);        // which of 200 values: the 171st and the 189th
//
// Coverage: at least the level, for independent values of any law, continuous or not; each end
// misses with a chance of at most half of what the level leaves. The true coverage, `coverage`, is
// the binomial law's, so it jumps from sample size to sample size.
//
// Errors: invalid_parameter for p outside (0, 1) or a level outside [0.001, 1), for values that are
// NaN or not in ascending order, and for a sample too small: its extremes bound the quantile only
// where p^n and (1 - p)^n are at most (1 - level) / 2. For p = 0.9 and 95 % that takes 36 values,
// for p = 0.99 it takes 368.
// Bits: the same everywhere.
// Source: H. A. David and H. N. Nagaraja, Order Statistics, 3rd ed., 2003, 7.1 (W. R. Thompson,
// Ann. Math. Stat. 7, 1936).
// Not for values of one long run, which depend on each other.

#ifndef LEAT_ESTIMATE_QUANTILE_INTERVAL_HPP
#define LEAT_ESTIMATE_QUANTILE_INTERVAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/sizes.hpp"
#include "leat/distributions/detail/evaluate.hpp" // chance_or_refuse
#include "leat/estimate/detail/incomplete_beta.hpp"
#include "leat/estimate/interval.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat {

/// Which values of an ordered sample bound a quantile.
struct order_ranks {
    std::uint64_t lower = 0; ///< the lower end is the value of this rank; 1 is the least
    std::uint64_t upper = 0; ///< the upper end
    double coverage = 0;     ///< the chance that the quantile lies between, for a continuous law

    /// Whether ranks and coverage are the same.
    friend constexpr bool operator==(const order_ranks&, const order_ranks&) = default;
};

namespace detail {

/// The chances of k or more successes (`below`) and of fewer in n trials of chance p, 1 <= k <= n.
constexpr beta_shares shares_of_count(std::uint64_t k, std::uint64_t n, double p) noexcept {
    return beta_shares_at(static_cast<double>(k), static_cast<double>(n - k + 1), p, held(1.0 - p));
}

} // namespace detail

/// The ranks between which, in a sample of n, the p-quantile lies with at least the level's chance.
[[nodiscard]] constexpr order_ranks quantile_ranks(std::uint64_t n, double p, double level = 0.95) {
    using real = detail::strict<double>;
    detail::chance_or_refuse("quantile_interval", p);
    detail::level_or_refuse("quantile_interval", level);
    if (n == 0 || n > std::uint64_t{1} << 53) {
        detail::refuse("quantile_interval", "n", n, "must be at least 1, at most 2^53");
    }
    const double tail = detail::tail_of(level);
    // The value of rank r is above the quantile when fewer than r values lie at or below it.
    std::uint64_t lower = 0;
    for (std::uint64_t past = n + 1; past - lower > 1;) {
        const std::uint64_t r = lower + (past - lower) / 2;
        (detail::or_zero(detail::shares_of_count(r, n, p).above) <= tail ? lower : past) = r;
    }
    // The value of rank s is below the quantile when at least s values lie below it.
    std::uint64_t upper = n + 1;
    for (std::uint64_t before = 0; upper - before > 1;) {
        const std::uint64_t s = before + (upper - before) / 2;
        (detail::or_zero(detail::shares_of_count(s, n, p).below) <= tail ? upper : before) = s;
    }
    if (lower == 0 || upper == n + 1) {
        detail::refuse("quantile_interval", "n", n,
                       "must be large enough for p^n and (1 - p)^n to be at most (1 - level) / 2");
    }
    const real missed = real(detail::or_zero(detail::shares_of_count(lower, n, p).above)) +
                        detail::or_zero(detail::shares_of_count(upper, n, p).below);
    return {lower, upper, (real(1.0) - missed).value};
}

/// The interval for the p-quantile of the law that the values, in ascending order, come from.
[[nodiscard]] constexpr interval quantile_interval(std::span<const double> ascending, double p,
                                                   double level = 0.95) {
    const order_ranks ranks = quantile_ranks(ascending.size(), p, level);
    for (std::size_t i = 0; i < ascending.size(); ++i) {
        if (!(ascending[i] >= ascending[i == 0 ? 0 : i - 1])) {
            detail::refuse_entry("quantile_interval", "values", i, ascending[i],
                                 "must not be NaN, nor below the value before it");
        }
    }
    const auto of_rank = [ascending](std::uint64_t rank) {
        return ascending[detail::smaller(ascending.size(), rank - 1)];
    };
    return {of_rank(ranks.lower), of_rank(ranks.upper), level};
}

} // namespace leat

#endif
