// Do samples have the mean they should?
//
//   EXPECT_TRUE(leat::agrees_with_mean(waits, 2.5, 1e-6));
//       Student's t test, both sides. `waits` is any list of numbers; the last is the alarm rate.
//   EXPECT_TRUE(leat::agrees_with_bounded_mean(shares, 0.25, 0, 1, 1e-6));
//       For samples that cannot leave [lo, hi]: the rate holds exactly, for every number of samples
//       and every law, and the check is weaker.
//   EXPECT_TRUE(leat::agrees_with_mean_within(draw, 2.5, 0.01, 1e-6));
//       Draws as many as it takes: draw() is called until it is clear that the mean is 2.5, to
//       within 0.01, or that it is not 2.5.
//
// What each assumes, beside independent samples (or batches: the successive values of one
// simulation are not independent, their means over long batches nearly are):
// - agrees_with_mean: a finite variance, and enough samples for a nearly normal mean. Skew samples
//   need more: the leading error of the alarm rate is a factor e^h on one side, with h = |skewness|
//   z^3 / (3 sqrt(n)) and z the normal quantile of the rate. Where h, from the samples' own
//   skewness, is above 1, the message says so, and also where all samples are alike, as rare hits
//   and misses may be: nothing is known of their spread then. Of heavy tails (an infinite third
//   moment) a sample shows too little: there the rate is not to be trusted; test a bounded function
//   of the samples, or agrees_with_distribution.
// - agrees_with_bounded_mean: nothing more.
// - agrees_with_mean_within: as agrees_with_mean, but it looks only where h is at most 1 and the
//   samples are not all alike. If the mean is as expected, it fails with a chance of at most the
//   alarm rate; if it is off by the tolerance or more, it passes with a chance of at most that. In
//   between both may happen. Looks come at 1000, 2000, 4000, ... draws, and the i-th spends 2^-i of
//   the rate, since looking again and again at one level would raise it. Undecided at `most_draws`,
//   it fails and says so.
//
// Errors: invalid_parameter for fewer than two samples, an alarm rate outside (0, 1), a mean
// outside [lo, hi], a tolerance that is not positive, numbers above 2^200 in size or NaN. Samples
// that are so, or outside [lo, hi], do not agree.
//
// Sources: "Student", Biometrika 6, 1908; P. Hall, The Bootstrap and Edgeworth Expansion, 1992, 2.6
// (skewness); W. Hoeffding, JASA 58, 1963, eq. (2.1) (bounded); P. Armitage, C. K. McPherson and B.
// C. Rowe, JRSS A 132, 1969 (repeated looks); K. K. G. Lan and D. L. DeMets, Biometrika 70, 1983
// (spending the rate).

#ifndef LEAT_TESTING_AGREES_WITH_MEAN_HPP
#define LEAT_TESTING_AGREES_WITH_MEAN_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/normal_quantile.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/testing/agreement.hpp"
#include "leat/testing/detail/tail_areas.hpp"

#include <concepts>
#include <cstdint>
#include <limits>

namespace leat {
namespace testing {
namespace detail {

using leat::detail::magnitude;

/// Whether running moments take x.
constexpr bool moderate(double x) noexcept { return magnitude(x) <= 0x1p200; }

/// Running moments that remember a value they cannot take, in place of an error.
class sample_moments : public running_moments {
public:
    static constexpr std::uint64_t none = ~std::uint64_t{0};

    void add(double x) {
        if (first_bad_ != none) {
            return;
        }
        if (moderate(x)) {
            running_moments::add(x);
        } else {
            first_bad_ = count();
        }
    }
    /// Which value was the first that is not moderate, or `none`; later ones are not looked at.
    [[nodiscard]] std::uint64_t first_bad() const noexcept { return first_bad_; }

private:
    std::uint64_t first_bad_ = none;
};

inline void refuse_unless_moderate(const char* check, const char* parameter, double x) {
    if (!moderate(x)) {
        leat::detail::refuse(check, parameter, x, "must be at most 2^200 in size");
    }
}

/// What the samples' skewness does to a mean, on a logarithmic scale: h at the head of this file.
inline double skewness_strain(const sample_moments& m, double alarm_rate) {
    const real z = leat::detail::normal_quantile((real(alarm_rate) * 0.5).value);
    const double root = leat::detail::square_root(static_cast<double>(m.count()));
    return magnitude((real(m.skewness()) * z * z * z / 3.0 / root).value);
}

/// How many standard errors the samples' mean lies above `mean`.
inline double t_statistic(const sample_moments& m, double mean) {
    const double difference = (real(m.mean()) - mean).value;
    const double error = m.standard_error();
    if (error > 0) {
        return (real(difference) / error).value;
    }
    constexpr double infinite = std::numeric_limits<double>::infinity(); // all samples are equal
    return difference == 0 ? 0.0 : difference > 0 ? infinite : -infinite;
}

inline double p_of_mean(const sample_moments& m, double mean) {
    return student_t_beyond(t_statistic(m, mean), static_cast<double>(m.count()) - 1);
}

/// A disagreement because of one sample, the last that was looked at.
inline agreement spoilt(const char* check, double alarm_rate, std::uint64_t which,
                        const char* why) {
    message what;
    what.text("sample ").value(which).text(" (counted from 0) ").text(why);
    return judged(check, {.alarm_rate = alarm_rate, .samples = which + 1, .message = {}}, what);
}

inline constexpr const char* too_large = "is not at most 2^200 in size";

inline message& describe_mean(message& m, const sample_moments& found, double expected) {
    rounded(m.text("mean "), found.mean());
    return m.text(", expected ").value(expected);
}

inline agreement judge_mean(const sample_moments& m, double expected, double alarm_rate) {
    constexpr const char* check = "agrees_with_mean";
    alarm_rate_or_refuse(check, alarm_rate);
    refuse_unless_moderate(check, "expected_mean", expected);
    if (m.first_bad() != m.none) {
        return spoilt(check, alarm_rate, m.first_bad(), too_large);
    }
    if (m.count() < 2) {
        leat::detail::refuse(check, "samples", m.count(), "must be at least 2");
    }
    const double t = t_statistic(m, expected);
    message what;
    rounded(describe_mean(what, m, expected).text(", t = "), t);
    if (m.standard_error() == 0) {
        what.text(" (BEWARE: all samples are alike, so that nothing is known of their spread)");
    } else if (skewness_strain(m, alarm_rate) > 1) {
        rounded(what.text(" (BEWARE: skewness "), m.skewness());
        what.text(" is too much for so few samples, the alarm rate does not hold)");
    }
    return judged(check,
                  {.statistic = t,
                   .p = p_of_mean(m, expected),
                   .alarm_rate = alarm_rate,
                   .samples = m.count(),
                   .message = {}},
                  what);
}

/// Hoeffding's bound on the chance that a mean of n samples in [0, 1] lies as far from its
/// expectation as `found`, on either side.
inline double p_of_bounded_mean(double found, double expected, double n) {
    if (expected <= 0 || expected >= 1) { // all samples lie at that end
        return found == expected ? 1.0 : 0.0;
    }
    const real difference = real(found) - expected;
    const real information =
        real(leat::detail::deviance(found, expected, difference.value)) +
        leat::detail::deviance((real(1.0) - found).value, (real(1.0) - expected).value,
                               -difference.value);
    const double p = 2 * leat::detail::natural_exp((-information * n).value);
    return p < 1 ? p : 1.0;
}

} // namespace detail

/// Student's t test of the samples' mean.
template <detail::number_list Samples>
[[nodiscard]] agreement agrees_with_mean(const Samples& samples, double expected_mean,
                                         double alarm_rate) {
    detail::sample_moments m;
    for (const auto x : samples) {
        m.add(static_cast<double>(x));
    }
    return detail::judge_mean(m, expected_mean, alarm_rate);
}

/// Hoeffding's test of the mean of samples that lie in [lo, hi].
template <detail::number_list Samples>
[[nodiscard]] agreement agrees_with_bounded_mean(const Samples& samples, double expected_mean,
                                                 double lo, double hi, double alarm_rate) {
    using real = leat::detail::strict<double>;
    constexpr const char* check = "agrees_with_bounded_mean";
    detail::alarm_rate_or_refuse(check, alarm_rate);
    detail::refuse_unless_moderate(check, "lo", lo);
    detail::refuse_unless_moderate(check, "hi", hi);
    if (!(lo < hi)) {
        leat::detail::refuse(check, "hi", hi, "must be > lo");
    }
    if (!(expected_mean >= lo && expected_mean <= hi)) {
        leat::detail::refuse(check, "expected_mean", expected_mean, "must be from lo to hi");
    }
    detail::sample_moments m;
    std::uint64_t outside = m.none;
    for (const auto sample : samples) {
        const auto x = static_cast<double>(sample);
        if (outside == m.none && !(x >= lo && x <= hi)) {
            outside = m.count();
        }
        m.add(x);
    }
    if (outside != m.none) {
        return detail::spoilt(check, alarm_rate, outside, "is outside lo to hi");
    }
    if (m.count() < 2) {
        leat::detail::refuse(check, "samples", m.count(), "must be at least 2");
    }
    const real width = real(hi) - lo;
    const real found = (real(m.mean()) - lo) / width;
    const real expected = (real(expected_mean) - lo) / width;
    detail::message what;
    detail::describe_mean(what, m, expected_mean).text(", by Hoeffding's bound");
    return detail::judged(check,
                          {.statistic = m.mean(),
                           .p = detail::p_of_bounded_mean(found.value, expected.value,
                                                          static_cast<double>(m.count())),
                           .alarm_rate = alarm_rate,
                           .samples = m.count(),
                           .message = {}},
                          what);
}

/// Calls draw() until its mean is known to be `expected_mean`, to within `tolerance`, or not to be.
/// The result's p is that of the last look, its alarm rate that of all.
template <std::invocable Draw>
[[nodiscard]] agreement agrees_with_mean_within(Draw&& draw, double expected_mean, double tolerance,
                                                double alarm_rate,
                                                std::uint64_t most_draws = std::uint64_t{1} << 26) {
    using real = leat::detail::strict<double>;
    constexpr const char* check = "agrees_with_mean_within";
    constexpr std::uint64_t first_look = 1000;
    detail::alarm_rate_or_refuse(check, alarm_rate);
    detail::refuse_unless_moderate(check, "expected_mean", expected_mean);
    if (!(tolerance > 0) || !detail::moderate(tolerance)) {
        leat::detail::refuse(check, "tolerance", tolerance, "must be > 0 and at most 2^200");
    }
    if (most_draws < first_look) {
        leat::detail::refuse(check, "most_draws", most_draws, "must be at least 1000");
    }
    detail::sample_moments m;
    agreement found{.alarm_rate = alarm_rate, .message = {}};
    double share = alarm_rate;
    const char* verdict = "undecided";
    for (std::uint64_t next = first_look;; next = next < most_draws / 2 ? 2 * next : most_draws) {
        while (m.count() < next && m.first_bad() == m.none) {
            m.add(static_cast<double>(draw()));
        }
        found.samples = m.count();
        if (m.first_bad() != m.none) {
            return detail::spoilt(check, alarm_rate, m.first_bad(), detail::too_large);
        }
        share = (real(share) * 0.5).value;
        found.statistic = detail::t_statistic(m, expected_mean);
        found.p = detail::p_of_mean(m, expected_mean);
        if (m.standard_error() > 0 && detail::skewness_strain(m, share) <= 1) {
            const double low = (real(expected_mean) - tolerance).value;
            const double high = (real(expected_mean) + tolerance).value;
            if (found.p < share) {
                verdict = "does not agree";
                break;
            }
            if (m.mean() > low && m.mean() < high && detail::p_of_mean(m, low) < share &&
                detail::p_of_mean(m, high) < share) {
                found.agrees = true;
                verdict = "agrees";
                break;
            }
        }
        if (next == most_draws) {
            break;
        }
    }
    detail::message text;
    text.text("leat::").text(check).text(": ").text(verdict).text(" after ").value(found.samples);
    detail::describe_mean(text.text(" draws: "), m, expected_mean);
    text.text(" to within ").value(tolerance).text(", t = ");
    detail::rounded(text, found.statistic).text(", p = ");
    detail::rounded(text, found.p).text(", this look's share of the alarm rate ");
    text.value(alarm_rate).text(" being ");
    found.message = detail::rounded(text, share).c_str();
    return found;
}

} // namespace testing

using testing::agrees_with_bounded_mean;
using testing::agrees_with_mean;
using testing::agrees_with_mean_within;

} // namespace leat

#endif
