// The running mean, variance and skewness of samples, in one pass.
//
// Source: P. Pebay, Formulas for robust, one-pass parallel computation of covariances and
// arbitrary-order statistical moments, Sandia Report SAND2008-6212, 2008, section 3.

#ifndef LEAT_TESTING_DETAIL_SAMPLE_MOMENTS_HPP
#define LEAT_TESTING_DETAIL_SAMPLE_MOMENTS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/law.hpp" // finite

#include <cstdint>

namespace leat::testing::detail {

/// Moments of the samples added so far. A sample that is not finite is remembered, not added.
class sample_moments {
    using real = leat::detail::strict<double>;

public:
    static constexpr std::uint64_t none = ~std::uint64_t{0};

    constexpr void add(double x) noexcept {
        if (!leat::detail::finite(x)) {
            first_bad_ = first_bad_ == none ? seen_ : first_bad_;
            ++seen_;
            return;
        }
        ++seen_;
        const real n = static_cast<double>(seen_);
        const real from_mean = real(x) - mean_;
        const real step = from_mean / n;
        const real growth = from_mean * step * (n - 1.0);
        mean_ = mean_ + step;
        cubes_ = cubes_ + growth * step * (n - 2.0) - step * squares_ * 3.0;
        squares_ = squares_ + growth;
    }

    [[nodiscard]] constexpr std::uint64_t count() const noexcept { return seen_; }
    /// Which sample was the first that is not finite, or `none`.
    [[nodiscard]] constexpr std::uint64_t first_bad() const noexcept { return first_bad_; }
    [[nodiscard]] constexpr double mean() const noexcept { return mean_.value; }
    /// The standard error of the mean, from at least two samples.
    [[nodiscard]] constexpr double standard_error() const noexcept {
        const real n = static_cast<double>(seen_);
        return leat::detail::square_root((squares_ / (n - 1.0) / n).value);
    }
    /// The third standardised moment; 0 where all samples are equal.
    [[nodiscard]] constexpr double skewness() const noexcept {
        if (squares_.value == 0) {
            return 0;
        }
        const real variance = squares_ / static_cast<double>(seen_);
        const real deviation = leat::detail::square_root(variance.value);
        return (cubes_ / static_cast<double>(seen_) / variance / deviation).value;
    }

private:
    std::uint64_t seen_ = 0;
    std::uint64_t first_bad_ = none;
    real mean_ = 0.0;
    real squares_ = 0.0; // sums of powers of the distances from the mean
    real cubes_ = 0.0;
};

} // namespace leat::testing::detail

#endif
