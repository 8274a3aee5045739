// Confidence intervals for a proportion: so many successes in so many independent trials.
//
//   leat::wilson_interval(3, 1000)            0.0010 to 0.0088: covers its level on average over
//                                             proportions; short; the usual choice
//   leat::clopper_pearson_interval(3, 1000)   0.0006 to 0.0087: covers at least its level, whatever
//                                             the proportion; for where falling short is worse than
//                                             being wide
//
// Both work for 0 successes and for none but successes, where mean +- z sqrt(p (1 - p) / n) has no
// width.
//
// Errors: invalid_parameter for trials of 0 or above 2^53, more successes than trials, or a level
// outside [0.001, 1).
// Bits: the same everywhere.
// Time: some microseconds for Clopper-Pearson, some milliseconds where trials pass 10^12.
// Sources: E. B. Wilson, J. Amer. Stat. Assoc. 22, 1927; C. J. Clopper and E. S. Pearson,
// Biometrika 26, 1934.
// Not for trials that depend on each other, nor where the number of trials was not fixed in advance
// (sampling until so many successes have been seen).

#ifndef LEAT_ESTIMATE_PROPORTION_INTERVAL_HPP
#define LEAT_ESTIMATE_PROPORTION_INTERVAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/estimate/detail/incomplete_beta.hpp"
#include "leat/estimate/interval.hpp"

#include <cstdint>

namespace leat {
namespace detail {

/// Refuses what is no count of successes, in the caller's name.
constexpr void counts_or_refuse(const char* name, std::uint64_t successes, std::uint64_t trials) {
    if (trials == 0 || trials > std::uint64_t{1} << 53) {
        refuse(name, "trials", trials, "must be at least 1, at most 2^53");
    }
    if (successes > trials) {
        refuse(name, "successes", successes, "must not be above the trials");
    }
}

} // namespace detail

/// Wilson's score interval.
[[nodiscard]] constexpr interval wilson_interval(std::uint64_t successes, std::uint64_t trials,
                                                 double level = 0.95) {
    using real = detail::strict<double>;
    detail::level_or_refuse("wilson_interval", level);
    detail::counts_or_refuse("wilson_interval", successes, trials);
    const real z = detail::normal_point(level);
    const real square = z * z;
    const real n = static_cast<double>(trials);
    const real hits = static_cast<double>(successes);
    const real misses = static_cast<double>(trials - successes);
    // The ends are the roots of a quadratic; the root that is near 0 comes from the other one, so
    // that no digits cancel.
    const real middle = hits + square * 0.5;
    const real spread = z * detail::square_root((hits * (misses / n) + square * 0.25).value);
    const real whole = n + square;
    const real upper = (middle + spread) / whole;
    const real lower = hits * (hits / n) / (middle + spread);
    return {lower.value, successes == trials ? 1.0 : upper.value, level};
}

/// Clopper and Pearson's interval, often called exact.
[[nodiscard]] constexpr interval
clopper_pearson_interval(std::uint64_t successes, std::uint64_t trials, double level = 0.95) {
    detail::level_or_refuse("clopper_pearson_interval", level);
    detail::counts_or_refuse("clopper_pearson_interval", successes, trials);
    const double tail = detail::tail_of(level);
    const auto hits = static_cast<double>(successes);
    const auto misses = static_cast<double>(trials - successes);
    interval ends{0, 1, level};
    if (successes > 0) { // the p at which so many successes or more have the chance `tail`
        ends.lower = detail::beta_point(hits, misses + 1, tail, false).x;
    }
    if (successes < trials) { // the p at which so many or fewer have it
        ends.upper = detail::beta_point(hits + 1, misses, tail, true).x;
    }
    return ends;
}

} // namespace leat

#endif
