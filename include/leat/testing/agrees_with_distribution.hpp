// Do samples come from a law? The Kolmogorov-Smirnov test against a distribution function.
//
//   EXPECT_TRUE(leat::agrees_with_distribution(lives, leat::weibull{1.5, 4000.0}, 1e-6));
//   EXPECT_TRUE(leat::agrees_with_distribution(x, [](double t) { return t * t; }, 1e-6));
//
// The second argument is a law with a member cumulative(x), or a function that gives P(X <= x).
// The statistic is the largest distance between it and the share of samples up to x.
//
// Assumes independent samples, a continuous law, and that no parameter of the law was fitted to
// these samples (if one was, the check hardly ever fails). Then the rate holds for every number of
// samples: the p-value is exact but for an excess of (p/2)^3 of itself, on the safe side. With
// ties, that is for counts or rounded values, use agrees_with_counts. It sees a shift of the middle
// well, a wrong tail badly: count what lies far out, or test means as well.
//
// Errors: invalid_parameter for no samples, an alarm rate outside (0, 1), a function that leaves
// [0, 1] or falls. Samples that are not finite do not agree.
// Work: sorting, one call of the function and 0.2 microseconds a sample.
// Sources: A. Kolmogorov, Giorn. Ist. Ital. Attuari 4, 1933; detail/tail_areas.hpp.

#ifndef LEAT_TESTING_AGREES_WITH_DISTRIBUTION_HPP
#define LEAT_TESTING_AGREES_WITH_DISTRIBUTION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/distributions/detail/law.hpp" // finite
#include "leat/testing/agreement.hpp"
#include "leat/testing/detail/tail_areas.hpp"

#include <algorithm> // sort
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

namespace leat {
namespace testing {
namespace detail {

template <class Law>
concept has_cumulative = requires(const Law& law, double x) {
    { law.cumulative(x) } -> std::convertible_to<double>;
};

template <class Law>
concept distribution_function = has_cumulative<Law> || requires(const Law& law, double x) {
    { law(x) } -> std::convertible_to<double>;
};

/// Judges the values of the distribution function at the samples, in ascending order.
inline agreement judge_distribution(std::span<const double> values, double alarm_rate) {
    constexpr const char* check = "agrees_with_distribution";
    const auto n = static_cast<double>(values.size());
    real reach = 0.0; // n times the distance
    for (std::size_t i = 0; i < values.size(); ++i) {
        if (!(values[i] >= 0 && values[i] <= 1) || (i > 0 && values[i] < values[i - 1])) {
            leat::detail::refuse(check, "value of the distribution function", values[i],
                                 "must be from 0 to 1, and must not fall");
        }
        const real place = real(n) * values[i];
        const real above = real(static_cast<double>(i + 1)) - place;
        const real below = place - static_cast<double>(i);
        reach = above > reach ? above : reach;
        reach = below > reach ? below : reach;
    }
    const agreement found{.statistic = (reach / n).value,
                          .p = kolmogorov_beyond(reach.value, values.size()),
                          .alarm_rate = alarm_rate,
                          .samples = values.size(),
                          .message = {}};
    message what;
    rounded(what.text("largest distance "), found.statistic);
    return judged(check, found, what);
}

} // namespace detail

/// The Kolmogorov-Smirnov test of samples against a continuous law.
template <detail::number_list Samples, detail::distribution_function Law>
[[nodiscard]] agreement agrees_with_distribution(const Samples& samples, const Law& law,
                                                 double alarm_rate) {
    constexpr const char* check = "agrees_with_distribution";
    detail::alarm_rate_or_refuse(check, alarm_rate);
    std::vector<double> values;
    for (const auto sample : samples) {
        const auto x = static_cast<double>(sample);
        if (!leat::detail::finite(x)) {
            detail::message what;
            what.text("sample ").value(values.size()).text(" (counted from 0) is not finite");
            return detail::judged(
                check, {.alarm_rate = alarm_rate, .samples = values.size() + 1, .message = {}},
                what);
        }
        values.push_back(x);
    }
    if (values.empty()) {
        leat::detail::refuse(check, "samples", 0, "must be at least 1");
    }
    std::sort(values.begin(), values.end());
    for (double& x : values) {
        if constexpr (detail::has_cumulative<Law>) {
            x = law.cumulative(x);
        } else {
            x = law(x);
        }
    }
    return detail::judge_distribution(values, alarm_rate);
}

} // namespace testing

using testing::agrees_with_distribution;

} // namespace leat

#endif
