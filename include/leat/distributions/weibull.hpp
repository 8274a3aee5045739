// The Weibull law with a shape and a scale: P(X > x) = exp(-(x / scale)^shape), x > 0; lives of
// components that wear out (shape > 1), age without memory (1) or fail early (< 1). The scale is
// the life that 36.8 % survive.
//
// Domain: shape and scale finite and > 0; anything else throws invalid_parameter. A draw is
// scale E^(1/shape), E from the exponential's ziggurat: 1.03 word64 on average, as `exponential`,
// and as there the tail is complete. The power is taken with an exponent of its own, so only an
// end result out of range saturates, at the smallest normal and the largest finite number. A
// float is computed as a double and rounded.
// Source: by inversion of the exponential (common practice).
// Not for a law with a guaranteed life: add that to the draw.

#ifndef LEAT_DISTRIBUTIONS_WEIBULL_HPP
#define LEAT_DISTRIBUTIONS_WEIBULL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/log_gamma.hpp" // the moments
#include "leat/core/logarithm.hpp"
#include "leat/core/power.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class weibull;

/// The parameters of `weibull`.
template <detail::portable_real Real = double>
struct weibull_parameters {
    using distribution_type = weibull<Real>;
    static constexpr const char* law_name = "weibull";

    Real shape = 1; ///< > 0
    Real scale = 1; ///< > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_positive("shape", static_cast<double>(shape)),
                                detail::unless_positive("scale", static_cast<double>(scale)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("shape", self.shape);
        visit("scale", self.scale);
    }
    friend constexpr bool operator==(const weibull_parameters&,
                                     const weibull_parameters&) = default;
};

/// The Weibull law.
template <detail::portable_real Real = double>
class weibull : public detail::law<weibull<Real>, weibull_parameters<Real>> {
    using base = detail::law<weibull, weibull_parameters<Real>>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Shape 1, scale 1.
    constexpr weibull() : weibull(param_type{}) {}
    constexpr weibull(detail::number auto shape, detail::number auto scale)
        : weibull(param_type{static_cast<Real>(shape), static_cast<Real>(scale)}) {}
    constexpr explicit weibull(const param_type& p)
        : base(p),
          inverse_shape_(detail::held(1.0 / static_cast<double>(p.shape))),
          scale_(detail::split(static_cast<double>(p.scale))) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const double e = detail::standard_exponential(g);
        const detail::scaled x = scale_ * detail::power_scaled(e, inverse_shape_);
        return detail::into_positive<Real>(x.value());
    }

    [[nodiscard]] constexpr Real shape() const noexcept { return this->param().shape; }
    [[nodiscard]] constexpr Real scale() const noexcept { return this->param().scale; }
    /// scale Gamma(1 + 1/shape). Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept { return scaled_mean().value(); }
    /// scale^2 (Gamma(1 + 2/shape) - Gamma(1 + 1/shape)^2), to about 12 digits for every shape.
    [[nodiscard]] constexpr double variance() const noexcept;
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const double log = log_of_ratio(x);
        const auto k = static_cast<double>(shape());
        const double log_hazard = detail::held(k * log);
        return detail::or_zero(
            detail::exp_scaled(
                (detail::strict<double>(log_hazard) - detail::natural_exp(log_hazard)).value) *
            detail::split(k) * detail::inverse(detail::split(x)));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 ? 1 : 0;
        }
        const double log_hazard = detail::held(static_cast<double>(shape()) * log_of_ratio(x));
        return -detail::exp_minus_one(-detail::natural_exp(log_hazard));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double chance = detail::chance_or_refuse(param_type::law_name, p);
        const double hazard = -detail::log_one_plus(-chance);
        return (scale_ * detail::power_scaled(hazard, inverse_shape_)).value();
    }

private:
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > 0 && detail::finite(x);
    }
    /// ln(x / scale).
    constexpr double log_of_ratio(double x) const noexcept {
        const detail::scaled ratio = detail::split(x) * detail::inverse(scale_);
        const detail::strict<double> whole = static_cast<double>(ratio.exponent);
        constexpr double log_two = 0x1.62e42fefa39efp-1;
        return (whole * log_two + detail::natural_log(ratio.factor)).value;
    }
    constexpr detail::scaled scaled_mean() const noexcept {
        return scale_ * detail::exp_scaled(detail::log_gamma(detail::held(1.0 + inverse_shape_)));
    }

    double inverse_shape_;
    detail::scaled scale_;
};

template <detail::portable_real Real>
constexpr double weibull<Real>::variance() const noexcept {
    using real = detail::strict<double>;
    const double x = inverse_shape_;
    if (x > 32) { // the square of the mean is below 2^-53 of the mean square
        const real twice = real(x) + x;
        const double log_mean_square = detail::log_gamma((real(1.0) + twice).value);
        return (scale_ * scale_ * detail::exp_scaled(log_mean_square)).value();
    }
    // The squared coefficient of variation is e^s - 1 with s = ln Gamma(1 + 2x) - 2 ln Gamma(1 +
    // x). For small x that difference of two near equal numbers is summed as a series instead.
    const detail::scaled mean = scaled_mean();
    if (x < 0x1p-4) {
        const double s = detail::polynomial(detail::weibull_spread, x);
        // s x^2 may be out of range of double where x is tiny; e^s - 1 is s there.
        const real square = real(x) * x * s;
        const detail::scaled growth = x < 0x1p-30
                                          ? detail::split(x) * detail::split(x) * detail::split(s)
                                          : detail::split(detail::exp_minus_one(square.value));
        return (mean * mean * growth).value();
    }
    const real s = real(detail::log_gamma((real(1.0) + (real(x) + x)).value)) -
                   real(2.0) * detail::log_gamma((real(1.0) + x).value);
    return (mean * mean * detail::split(detail::exp_minus_one(s.value))).value();
}

} // namespace leat

#endif
