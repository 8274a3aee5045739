// Do counts agree with the chances of their cells? Pearson's chi-square test.
//
//   EXPECT_TRUE(leat::agrees_with_counts(times_drawn, weights, 1e-6));
//
// `observed` is a list of counts; `expected` a list of as many numbers, not negative: counts,
// chances or weights, which are scaled to the total observed. What belongs to no cell needs one of
// its own. A cell that expects 0 must count 0.
//
// Both sides count: counts that fit too well, as from a grid in place of random points, do not
// agree either. So stratified or antithetic samples are not for this check. (Counts are whole
// numbers, and few cells may fit perfectly by chance: the lower side is the area below the
// statistic of counts half a unit farther out.)
//
// Assumes independent samples and cells chosen without looking at them. The chi-square law is an
// approximation: neighbouring cells are joined until each expects at least max(5, z^6 / 36), z
// being the normal quantile of the alarm rate (8 at 0.01, 35 at 0.001, 380 at 1e-6, 2000 at 1e-10).
// Then the rate is right within a factor of e even where all of the deviation is in one cell; it is
// nearer where it is spread. The message says how many cells are left.
//
// Errors: invalid_parameter for lists of different lengths, negative entries, an alarm rate outside
// (0, 1), or fewer than two cells left after joining: draw more samples.
// Sources: K. Pearson, Phil. Mag. 50, 1900; the 5: W. G. Cochran, Biometrics 10, 1954. z^6 / 36:
// the first skewness term of a Poisson count's tail is z^3 / (6 sqrt(count)).

#ifndef LEAT_TESTING_AGREES_WITH_COUNTS_HPP
#define LEAT_TESTING_AGREES_WITH_COUNTS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/normal_quantile.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/law.hpp" // finite
#include "leat/testing/agreement.hpp"
#include "leat/testing/detail/tail_areas.hpp"

#include <cstddef>
#include <cstdint>
#include <iterator> // size
#include <span>
#include <vector>

namespace leat {
namespace testing {
namespace detail {

/// How many samples a cell must expect at this alarm rate.
inline double least_expected(double alarm_rate) {
    const real z = leat::detail::normal_quantile((real(alarm_rate) * 0.5).value);
    const real needed = z * z * z * z * z * z / 36.0;
    return needed.value > 5 ? needed.value : 5.0;
}

inline agreement judge_counts(std::span<const double> observed, std::span<const double> expected,
                              double alarm_rate) {
    constexpr const char* check = "agrees_with_counts";
    alarm_rate_or_refuse(check, alarm_rate);
    if (observed.size() != expected.size()) {
        leat::detail::refuse(check, "number of expected cells", expected.size(),
                             "must be that of the observed ones");
    }
    real total = 0.0;
    real weight = 0.0;
    for (std::size_t i = 0; i < observed.size(); ++i) {
        if (!(observed[i] >= 0 && leat::detail::finite(observed[i]))) {
            leat::detail::refuse_entry(check, "observed", i, observed[i], "must be a count");
        }
        if (!(expected[i] >= 0 && leat::detail::finite(expected[i]))) {
            leat::detail::refuse_entry(check, "expected", i, expected[i],
                                       "must be finite and >= 0");
        }
        total = total + observed[i];
        weight = weight + expected[i];
    }
    if (!(weight.value > 0) || !leat::detail::finite(weight.value)) {
        leat::detail::refuse(check, "sum of expected", weight.value, "must be finite and > 0");
    }
    agreement found{.alarm_rate = alarm_rate,
                    .samples = static_cast<std::uint64_t>(total.value),
                    .message = {}};
    message what;
    for (std::size_t i = 0; i < observed.size(); ++i) {
        if (expected[i] == 0 && observed[i] > 0) {
            what.text("cell ").value(i).text(" (counted from 0) has samples and expects none");
            return judged(check, found, what);
        }
    }

    // Join neighbours from the left; what is left over at the end goes to the last cell.
    struct cell {
        real seen = 0.0;
        real wanted = 0.0;
    };
    const double least = least_expected(alarm_rate);
    std::vector<cell> cells;
    cell open;
    for (std::size_t i = 0; i < observed.size(); ++i) {
        open.seen = open.seen + observed[i];
        open.wanted = open.wanted + total / weight * expected[i];
        if (open.wanted.value >= least) {
            cells.push_back(open);
            open = cell{};
        }
    }
    if (cells.size() < 2) {
        message m;
        m.text("leat::").text(check).text(": fewer than two cells expect ");
        rounded(m, least).text(" samples, which this alarm rate needs, even when joined: ");
        leat::detail::raise<invalid_parameter>(m.text("draw more samples, or use other cells"));
    }
    cells.back().seen = cells.back().seen + open.seen;
    cells.back().wanted = cells.back().wanted + open.wanted;

    real sum = 0.0;
    real grain = 0.0; // the square of how far apart counts are, in the statistic's measure, halved
    for (const cell& c : cells) {
        const real excess = c.seen - c.wanted;
        sum = sum + excess * excess / c.wanted;
        grain = grain + real(0.25) / c.wanted;
    }
    const auto degrees = static_cast<double>(cells.size() - 1);
    const real reach =
        real(leat::detail::square_root(sum.value)) + leat::detail::square_root(grain.value);
    const double above = chi_squared_tails(sum.value, degrees).above;
    const double below = chi_squared_tails((reach * reach).value, degrees).below;
    const double p = 2 * (above < below ? above : below);
    found.statistic = sum.value;
    found.p = p < 1 ? p : 1.0;
    rounded(what.text("chi-square "), sum.value).text(" with ").value(cells.size() - 1);
    what.text(cells.size() == 2 ? " degree" : " degrees").text(" of freedom");
    if (cells.size() != observed.size()) {
        what.text(" (").value(observed.size()).text(" cells joined to ").value(cells.size());
        what.text(")");
    }
    return judged(check, found, what);
}

/// The numbers of a list as doubles.
template <number_list List>
std::vector<double> as_doubles(const List& list) {
    std::vector<double> numbers;
    for (const auto x : list) {
        numbers.push_back(static_cast<double>(x));
    }
    return numbers;
}

} // namespace detail

/// Pearson's chi-square test of counts against expected counts, chances or weights.
template <detail::number_list Observed, detail::number_list Expected>
[[nodiscard]] agreement agrees_with_counts(const Observed& observed, const Expected& expected,
                                           double alarm_rate) {
    return detail::judge_counts(detail::as_doubles(observed), detail::as_doubles(expected),
                                alarm_rate);
}

} // namespace testing

using testing::agrees_with_counts;

} // namespace leat

#endif
