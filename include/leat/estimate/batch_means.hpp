// The mean of one long run, whose values depend on each other, with an honest interval: by the
// means of batches long enough to be nearly independent.
//
//   leat::batch_means queue{warm_up};                // leave out the first values of a run
//   for (...) { queue.add(length); }
//   leat::batch_report r = queue.report(0.95);
//   if (r.correlated) { ... }                        // too short a run: the interval is too narrow
//
// The rule: 20 to 39 batches of one length, a power of two; when 40 are full, neighbours are merged
// in pairs and the length doubles. So nothing has to be known about the run beforehand, and memory
// is constant. The interval is Student's over the means of the full batches; values of the batch
// begun are not in it (fewer than one in 20).
// The warning: `correlation` is von Neumann's estimate of the correlation of neighbouring batch
// means; `correlated` says that it is above what independent means give in 1 of 20 runs. Then run
// on. No warning is no proof: a run that never left one of its modes looks fine.
//
// Domain: values up to 2^200 in size, up to 2^53 of them. Errors: invalid_parameter, also for a
// report with fewer than 20 batches.
// Bits: the same everywhere. It does not merge: for several runs, take the mean of each into
// running_moments, or better, merge_tree.
// Sources: B. Schmeiser, Batch size effects in the analysis of simulation output, Oper. Res. 30,
// 1982 (10 to 30 batches suffice); G. S. Fishman, Grouping observations in digital simulation,
// Management Sci. 24, 1978 (doubling until von Neumann's test passes); L. C. Young, Ann. Math.
// Stat. 12, 1941 (the variance of the estimate).
// Not for independent replications: running_moments and student_interval need no batches.

#ifndef LEAT_ESTIMATE_BATCH_MEANS_HPP
#define LEAT_ESTIMATE_BATCH_MEANS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/estimate/interval.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/running_moments.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat {

/// What batch means say about a run.
struct batch_report {
    double estimate = 0;            ///< the mean of the full batches
    interval mean;                  ///< for the long-run mean
    std::uint64_t batches = 0;      ///< how many are full
    std::uint64_t batch_length = 0; ///< the values in each
    double correlation = 0;         ///< of neighbouring batch means
    bool correlated = false;        ///< whether that is too large: the run is too short
};

/// Means of batches of one run.
class batch_means {
    using real = detail::strict<double>;

public:
    /// The least number of batches in a report.
    static constexpr std::size_t least_batches = 20;

    /// Leaves out the first `warm_up` values.
    constexpr explicit batch_means(std::uint64_t warm_up = 0) noexcept : to_skip_(warm_up) {}

    /// Takes the run's next value in.
    constexpr void add(double x) {
        if (!(detail::magnitude(x) <= 0x1p200)) {
            detail::refuse("batch_means", "value", x, "must be at most 2^200 in size");
        }
        if (to_skip_ > 0) {
            --to_skip_;
            return;
        }
        if (count_ >= std::uint64_t{1} << 53) {
            detail::refuse("batch_means", "count", count_, "must be below 2^53");
        }
        ++count_;
        begun_ = (real(begun_) + x).value;
        if (++filled_ < length_) {
            return;
        }
        sums_[batches_++] = begun_;
        begun_ = 0;
        filled_ = 0;
        if (batches_ == sums_.size()) {
            batches_ /= 2;
            length_ *= 2;
            for (std::size_t i = 0; i < batches_; ++i) {
                sums_[i] = (real(sums_[2 * i]) + sums_[2 * i + 1]).value;
            }
        }
    }

    /// How many values were added, those left out at the start not counted.
    [[nodiscard]] constexpr std::uint64_t count() const noexcept { return count_; }
    /// How many batches are full.
    [[nodiscard]] constexpr std::uint64_t batches() const noexcept { return batches_; }
    /// The values in each.
    [[nodiscard]] constexpr std::uint64_t batch_length() const noexcept { return length_; }

    /// The mean with its interval, and whether the batches are long enough.
    [[nodiscard]] constexpr batch_report report(double level = 0.95) const {
        detail::level_or_refuse("batch_means", level);
        if (batches_ < least_batches) {
            detail::refuse("batch_means", "batches", batches(), "must be at least 20: run longer");
        }
        running_moments means;
        real steps = 0.0; // the sum of squared differences of neighbours
        double last = 0;
        for (std::size_t i = 0; i < batches_; ++i) {
            const double mean = (real(sums_[i]) / static_cast<double>(length_)).value;
            const real step = i == 0 ? real(0.0) : real(mean) - last;
            if (detail::magnitude(step.value) > 0x1p-200) {
                steps = steps + step * step;
            }
            means.add(mean);
            last = mean;
        }
        batch_report r;
        r.estimate = means.mean();
        r.mean = student_interval(means, level);
        r.batches = batches_;
        r.batch_length = length_;
        const double second = means.state().second;
        if (second > 0) {
            r.correlation = (real(1.0) - steps / second * 0.5).value;
        }
        const real m = static_cast<double>(batches_);
        const double deviation = detail::square_root(((m - 2.0) / (m * m - 1.0)).value);
        constexpr double one_in_20 = 1.6448536269514722; // of a standard normal, above
        r.correlated = r.correlation > detail::held(one_in_20 * deviation);
        return r;
    }

private:
    std::array<double, 2 * least_batches> sums_{}; // of the full batches
    std::size_t batches_ = 0;
    std::uint64_t length_ = 1;
    std::uint64_t count_ = 0;
    std::uint64_t to_skip_;
    std::uint64_t filled_ = 0; // values in the batch begun
    double begun_ = 0;         // and their sum
};

} // namespace leat

#endif
