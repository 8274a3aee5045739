// Running moments: count, mean, variance, skewness, excess kurtosis, least and greatest of a row of
// values, in one pass and constant memory; two of them merge.
//
//   leat::running_moments wait;
//   for (...) { wait.add(w); }
//   wait.mean(); wait.standard_error(); wait.max();
//
// Domain: values up to 2^200 (1.6e60) in size; a larger one, an infinity or a NaN is refused. A
// distance from the running mean below 2^-200 (6e-61) counts as none in the variance and beyond.
// Up to 2^53 values.
// Bits: the same everywhere for the same values in the same order, and for the same merges. Another
// order or another tree of merges rounds otherwise: merge_tree.hpp and in_order.hpp fix the order,
// whoever finishes first; exact_sum.hpp needs none.
// Errors: invalid_parameter for a value outside the domain, and where too few values were added for
// what is asked (one for a mean, two for a variance; skewness and kurtosis ask values that differ).
//
// Sources: B. P. Welford, Technometrics 4(3), 1962; merging: T. F. Chan, G. H. Golub and R. J.
// LeVeque, The American Statistician 37(3), 1983; third and fourth moments: P. Pebay, Sandia report
// SAND2008-6212, 2008.
// Not for correlated values, as of one long run, when it comes to standard errors: batch_means.hpp.

#ifndef LEAT_ESTIMATE_RUNNING_MOMENTS_HPP
#define LEAT_ESTIMATE_RUNNING_MOMENTS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/core/text.hpp"

#include <cstdint>
#include <iosfwd>
#include <span>

namespace leat {

/// All that running moments hold: to be kept in a checkpoint, or sent to another process.
struct moments_state {
    std::uint64_t count = 0; ///< how many values were added, at most 2^53
    double mean = 0;         ///< their mean
    double second = 0;       ///< the sum of squared distances from the mean
    double third = 0;        ///< the sum of third powers of those distances
    double fourth = 0;       ///< the sum of fourth powers
    double min = 0;          ///< the least value
    double max = 0;          ///< the greatest value

    /// Whether all fields are the same.
    friend constexpr bool operator==(const moments_state&, const moments_state&) = default;
};

/// Count, mean and higher moments of the values added so far.
class running_moments {
    using real = detail::strict<double>;

public:
    /// Of no values.
    constexpr running_moments() noexcept = default;
    /// As they were when `state` was taken. Refused where no values can have led to it.
    constexpr explicit running_moments(const moments_state& state) : state_(state) {
        if (const char* fault = fault_of(state)) {
            detail::refuse("running_moments", fault);
        }
    }

    /// Takes one value in.
    constexpr void add(double x) {
        if (!(detail::magnitude(x) <= largest_)) {
            detail::refuse("running_moments", "value", x, "must be at most 2^200 in size");
        }
        if (state_.count >= most_) {
            detail::refuse("running_moments", "count", state_.count, "must be below 2^53");
        }
        const real before = static_cast<double>(state_.count);
        ++state_.count;
        state_.min = state_.count == 1 || x < state_.min ? x : state_.min;
        state_.max = state_.count == 1 || x > state_.max ? x : state_.max;
        const real n = static_cast<double>(state_.count);
        const real distance = real(x) - state_.mean;
        if (detail::magnitude(distance.value) < least_step_) {
            return;
        }
        const real step = distance / n;
        state_.mean = (step + state_.mean).value;
        if (detail::magnitude(distance.value) < least_distance_) {
            return;
        }
        const real square = step * step;
        const real term = distance * step * before;
        state_.fourth = (real(state_.fourth) + term * square * (n * n - n * 3.0 + 3.0) +
                         square * state_.second * 6.0 - step * state_.third * 4.0)
                            .value;
        state_.third =
            (real(state_.third) + term * step * (n - 2.0) - step * state_.second * 3.0).value;
        state_.second = (term + state_.second).value;
    }
    /// Takes values in, in their order.
    constexpr void add(std::span<const double> values) {
        for (const double x : values) {
            add(x);
        }
    }

    /// Takes in what `other` has: as if its values had been added, but for rounding.
    constexpr void merge(const running_moments& other) {
        const moments_state a = state_;
        const moments_state b = other.state_;
        if (b.count > most_ - a.count) {
            detail::refuse("running_moments", "count", a.count + b.count, "must be at most 2^53");
        }
        if (a.count == 0 || b.count == 0) {
            state_ = a.count == 0 ? b : a;
            return;
        }
        state_.count = a.count + b.count;
        state_.min = b.min < a.min ? b.min : a.min;
        state_.max = b.max > a.max ? b.max : a.max;
        const real of_a = static_cast<double>(a.count);
        const real of_b = static_cast<double>(b.count);
        const real n = of_a + of_b;
        real distance = real(b.mean) - a.mean;
        if (detail::magnitude(distance.value) >= least_step_) {
            state_.mean = (distance / n * of_b + a.mean).value;
        }
        if (detail::magnitude(distance.value) < least_distance_) {
            distance = 0.0;
        }
        const real step = distance / n;
        const real step_a = step * of_a;
        const real step_b = step * of_b;
        const real term = distance * step * of_a * of_b;
        state_.second = (term + (real(a.second) + b.second)).value;
        state_.third = (term * step * (of_a - of_b) + (real(a.third) + b.third) +
                        (step_a * b.second - step_b * a.second) * 3.0)
                           .value;
        state_.fourth = (term * step * step * (of_a * of_a - of_a * of_b + of_b * of_b) +
                         (real(a.fourth) + b.fourth) +
                         (step_a * step_a * b.second + step_b * step_b * a.second) * 6.0 +
                         (step_a * b.third - step_b * a.third) * 4.0)
                            .value;
    }

    /// How many values were added.
    [[nodiscard]] constexpr std::uint64_t count() const noexcept { return state_.count; }
    /// Their mean.
    [[nodiscard]] constexpr double mean() const {
        need(1);
        return state_.mean;
    }
    /// Their variance, by n - 1: unbiased for independent values.
    [[nodiscard]] constexpr double variance() const {
        need(2);
        return (real(state_.second) / static_cast<double>(state_.count - 1)).value;
    }
    /// The square root of the variance.
    [[nodiscard]] constexpr double standard_deviation() const {
        return detail::square_root(variance());
    }
    /// The standard error of the mean, for independent values.
    [[nodiscard]] constexpr double standard_error() const {
        return detail::square_root((real(variance()) / static_cast<double>(state_.count)).value);
    }
    /// The sample's skewness: its third central moment over the 3/2 power of its second (by n).
    [[nodiscard]] constexpr double skewness() const {
        need_spread();
        const real root = detail::square_root(state_.second);
        const real root_n = detail::square_root(static_cast<double>(state_.count));
        return (real(state_.third) / state_.second * root_n / root).value;
    }
    /// The sample's excess kurtosis: its fourth central moment over the square of its second (by
    /// n), less the 3 of a normal law.
    [[nodiscard]] constexpr double excess_kurtosis() const {
        need_spread();
        const real ratio = real(state_.fourth) / state_.second / state_.second;
        return (ratio * static_cast<double>(state_.count) - 3.0).value;
    }
    /// The least value.
    [[nodiscard]] constexpr double min() const {
        need(1);
        return state_.min;
    }
    /// The greatest value.
    [[nodiscard]] constexpr double max() const {
        need(1);
        return state_.max;
    }

    /// All there is, to be saved or sent.
    [[nodiscard]] constexpr const moments_state& state() const noexcept { return state_; }

    /// Whether all of the state is the same, to the bit but for the sign of 0.
    friend constexpr bool operator==(const running_moments&, const running_moments&) = default;

    /// Writes the state on one line: the count, then the reals, which come back to the bit.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const running_moments& m) {
        const moments_state& s = m.state_;
        detail::write_unsigned(os, s.count);
        for (const double x : {s.mean, s.second, s.third, s.fourth, s.min, s.max}) {
            detail::write_char(os, ' ');
            detail::write_real(os, x);
        }
        return os;
    }
    /// Reads what << wrote; on anything else sets failbit and leaves the moments untouched.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        running_moments& m) {
        moments_state s;
        if (!detail::read_unsigned(is, most_, s.count)) {
            return is;
        }
        for (double* x : {&s.mean, &s.second, &s.third, &s.fourth, &s.min, &s.max}) {
            if (!detail::read_real(is, *x)) {
                return is;
            }
        }
        if (fault_of(s) != nullptr) {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
            return is;
        }
        m.state_ = s;
        return is;
    }

private:
    static constexpr std::uint64_t most_ = std::uint64_t{1} << 53;
    static constexpr double largest_ = 0x1p200;
    // Below, powers of a distance would come near the subnormal numbers, which some processors are
    // told to take for 0.
    static constexpr double least_distance_ = 0x1p-200;
    static constexpr double least_step_ = 0x1p-900;

    /// What is wrong with a state, or null.
    static constexpr const char* fault_of(const moments_state& s) noexcept {
        if (s.count > most_) {
            return "the state's count passes 2^53";
        }
        if (s.count == 0) {
            return s == moments_state{} ? nullptr : "the state of no values must be all 0";
        }
        if (!(detail::magnitude(s.min) <= largest_ && detail::magnitude(s.max) <= largest_ &&
              s.min <= s.max)) {
            return "the state's least and greatest value must be ordered and at most 2^200 in size";
        }
        if (!(s.mean >= -largest_ && s.mean <= largest_)) {
            return "the state's mean must be at most 2^200 in size";
        }
        const bool sound = (s.second == 0 || s.second >= 0x1p-500) && s.second <= 0x1p460 &&
                           detail::magnitude(s.third) <= 0x1p660 &&
                           detail::magnitude(s.fourth) <= 0x1p860;
        if (!sound) {
            return "the state's sums of powers are out of range";
        }
        if (s.count == 1 && (s.min != s.max || s.mean != s.min || s.second != 0)) {
            return "the state of one value must have no spread";
        }
        return nullptr;
    }
    constexpr void need(std::uint64_t least) const {
        if (state_.count < least) {
            detail::refuse("running_moments", "count", state_.count,
                           least == 1 ? "must be at least 1" : "must be at least 2");
        }
    }
    constexpr void need_spread() const {
        need(2);
        if (state_.second == 0) {
            detail::refuse("running_moments", "variance", state_.second,
                           "must be > 0 for a skewness or kurtosis");
        }
    }

    moments_state state_;
};

} // namespace leat

#endif
