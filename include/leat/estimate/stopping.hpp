// Stopping when a mean is known well enough: replicate until the interval is as narrow as wanted.
//
//   const leat::stopping_rule rule{.half_width = 0.5, .level = 0.95, .at_least = 100};
//   leat::running_moments wait;
//   do { wait.add(replicate(i++)); } while (!rule.enough(wait));
//   leat::interval ci = leat::student_interval(wait, rule.level);
//
// Stops at the first count of `at_least` or more where Student's half-width is at most half_width,
// or at most relative * |mean|, if either is wanted (both: both must hold). It never stops while
// the values do not vary (rare events not yet seen); it stops at `at_most` whatever the width. Give
// at_most with `relative`: a mean near 0 asks for no width at all.
//
// The price: such a run stops rather where the variance looks small, so the interval covers less
// often than its level says. As the wanted width goes to 0 the coverage comes to the level; at a
// finite width it falls short, the more the smaller at_least is. Measured for a level of 95 % and a
// width that takes 43 values on average (a half-width of 0.3 standard deviations):
//
//   at_least              2       5       10      30
//   normal values         90.5 %  93.5 %  94.0 %  94.5 %
//   exponential values    77 %    83 %    86 %    92 %
//
// On several threads: let the rule see results in the order of their index (in_order.hpp), or after
// rounds of a fixed size; otherwise the stopping point depends on who finished first.
// Errors: invalid_parameter where the rule asks for nothing, or for what cannot be.
// Source: Y. S. Chow and H. Robbins, On the asymptotic theory of fixed-width sequential confidence
// intervals for the mean, Ann. Math. Stat. 36, 1965.
// Not for one long run of correlated values (batch_means.hpp says how wide its interval is).

#ifndef LEAT_ESTIMATE_STOPPING_HPP
#define LEAT_ESTIMATE_STOPPING_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/estimate/detail/student_point.hpp"
#include "leat/estimate/interval.hpp"
#include "leat/estimate/running_moments.hpp"

#include <cstdint>
#include <limits>

namespace leat {

/// When a mean is known well enough.
struct stopping_rule {
    double half_width = 0;       ///< the half-width wanted; 0: none
    double relative = 0;         ///< the half-width wanted, as a share of the mean's size; 0: none
    double level = 0.95;         ///< the interval's level
    std::uint64_t at_least = 30; ///< how many values come before the first look, 2 or more
    std::uint64_t at_most = std::uint64_t{1} << 53; ///< how many values end it in any case

    /// Whether the mean is known well enough, or at_most is reached.
    [[nodiscard]] constexpr bool enough(const running_moments& m) const {
        check();
        if (m.count() >= at_most) {
            return true;
        }
        if (m.count() < at_least || m.variance() == 0) {
            return false;
        }
        const double half = wanted(m);
        const double error = m.standard_error();
        // t is above z, and z much cheaper: most looks end here.
        if (detail::held(detail::normal_point(level) * error) > half) {
            return false;
        }
        const double t = detail::student_point(static_cast<double>(m.count() - 1), level);
        return detail::held(t * error) <= half;
    }

    /// About how many values will be needed in all, judged by the moments so far and the normal
    /// law: to plan with, not to stop by. Refused for fewer than two values; at_most where the
    /// width is out of reach.
    [[nodiscard]] constexpr std::uint64_t expected_count(const running_moments& m) const {
        using real = detail::strict<double>;
        check();
        const real half = wanted(m);
        const real spread = real(m.standard_deviation()) * detail::normal_point(level);
        // sqrt(2^53) = 9.5e7: beyond, no count is left
        if (!(spread < half * 9e7)) {
            return at_most;
        }
        const real root = spread.value == 0 ? real(0.0) : spread / half;
        const auto count = static_cast<std::uint64_t>((root * root).value) + 1;
        return count < at_least ? at_least : count < at_most ? count : at_most;
    }

private:
    [[nodiscard]] constexpr double wanted(const running_moments& m) const {
        double half = half_width > 0 ? half_width : std::numeric_limits<double>::max();
        if (relative > 0) {
            const double share = detail::held(relative * detail::magnitude(m.mean()));
            half = share < half ? share : half;
        }
        return half;
    }
    constexpr void check() const {
        const auto fits = [](double x) { return x >= 0 && x <= 0x1p200; };
        if (!fits(half_width)) {
            detail::refuse("stopping_rule", "half_width", half_width,
                           "must be >= 0, at most 2^200");
        }
        if (!fits(relative)) {
            detail::refuse("stopping_rule", "relative", relative, "must be >= 0, at most 2^200");
        }
        if (half_width == 0 && relative == 0) {
            detail::refuse("stopping_rule", "half_width", half_width,
                           "must be > 0, unless relative is");
        }
        detail::level_or_refuse("stopping_rule", level);
        if (at_least < 2) {
            detail::refuse("stopping_rule", "at_least", at_least, "must be at least 2");
        }
        if (at_most < at_least) {
            detail::refuse("stopping_rule", "at_most", at_most, "must not be below at_least");
        }
    }
};

} // namespace leat

#endif
