// A mean and its interval.

#ifndef SKERRY_BANK_STATISTICS_HPP
#define SKERRY_BANK_STATISTICS_HPP

#include <vector>

namespace skerry {

inline constexpr double confidence = 0.95;

/// The mean of independent values and the half-width of its Student t interval.
struct interval {
    double mean;
    double half_width;
    [[nodiscard]] double low() const { return mean - half_width; }
    [[nodiscard]] double high() const { return mean + half_width; }
};

/// The interval that covers the true mean with probability `confidence`, if the mean of the values
/// is near enough to normal. Needs two values or more; sums in the order given.
interval mean_interval(const std::vector<double>& values);

} // namespace skerry

#endif
