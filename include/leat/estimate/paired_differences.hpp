// Two systems under the same random numbers: the moments of their differences, pair by pair.
//
//   leat::paired_differences d;
//   for (each replication) { d.add(downtime_of_two_vessels, downtime_of_three); }
//   leat::interval gain = d.interval(0.95);     // of the mean difference, first less second
//   d.variance_ratio();                         // how many times fewer replications than unpaired
//
// A pair is two results of one replication, each drawn from streams with the same addresses (common
// random numbers). Whatever both share drops out of the difference.
// Domain: values up to 2^199 in size. Merges as running_moments does, and goes into a merge_tree.
// Errors: as running_moments and student_interval.
// Source: common practice (the paired t interval: "Student", Biometrika 6, 1908).
// Not for two samples that were drawn apart: welch_interval.

#ifndef LEAT_ESTIMATE_PAIRED_DIFFERENCES_HPP
#define LEAT_ESTIMATE_PAIRED_DIFFERENCES_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/estimate/interval.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/running_moments.hpp"

#include <cstdint>

namespace leat {

/// Moments of pairs and of their differences.
class paired_differences {
public:
    /// Of no pairs.
    constexpr paired_differences() noexcept = default;
    /// As they were when these three were taken: refused unless their counts are the same.
    constexpr paired_differences(const running_moments& first, const running_moments& second,
                                 const running_moments& difference)
        : first_(first), second_(second), difference_(difference) {
        if (first.count() != second.count() || first.count() != difference.count()) {
            detail::refuse("paired_differences", "count", second.count(),
                           "must be the same in all three");
        }
    }

    /// Takes in what both systems gave in one replication.
    constexpr void add(double first, double second) {
        for (const double x : {first, second}) {
            if (!(detail::magnitude(x) <= 0x1p199)) {
                detail::refuse("paired_differences", "value", x, "must be at most 2^199 in size");
            }
        }
        difference_.add((detail::strict<double>(first) - second).value);
        first_.add(first);
        second_.add(second);
    }
    /// Takes in what `other` has.
    constexpr void merge(const paired_differences& other) {
        difference_.merge(other.difference_);
        first_.merge(other.first_);
        second_.merge(other.second_);
    }

    /// How many pairs were added.
    [[nodiscard]] constexpr std::uint64_t count() const noexcept { return difference_.count(); }
    /// The first of each pair.
    [[nodiscard]] constexpr const running_moments& first() const noexcept { return first_; }
    /// The second of each pair.
    [[nodiscard]] constexpr const running_moments& second() const noexcept { return second_; }
    /// First less second.
    [[nodiscard]] constexpr const running_moments& difference() const noexcept {
        return difference_;
    }

    /// Student's interval for the mean of first less second.
    [[nodiscard]] constexpr leat::interval interval(double level = 0.95) const {
        return student_interval(difference_, level);
    }
    /// The variance that independent runs would give their difference, over that of the pairs: so
    /// many times more independent replications would be needed. Refused where the differences do
    /// not vary.
    [[nodiscard]] constexpr double variance_ratio() const {
        const detail::strict<double> paired = difference_.variance();
        if (paired.value == 0) {
            detail::refuse("paired_differences", "variance of the difference", paired.value,
                           "must be > 0 for a ratio");
        }
        return ((detail::strict<double>(first_.variance()) + second_.variance()) / paired).value;
    }

    /// Whether all moments are the same.
    friend constexpr bool operator==(const paired_differences&,
                                     const paired_differences&) = default;

private:
    running_moments first_;
    running_moments second_;
    running_moments difference_;
};

} // namespace leat

#endif
