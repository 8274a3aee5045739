// The lognormal law with the mean and standard deviation of its logarithm: X = exp(log_mean +
// log_sd z), z standard normal; repair times, sizes, incomes: products of many factors.
//
// Domain: log_mean finite, log_sd finite and >= 0 (0: every draw is exp(log_mean)); anything else
// throws invalid_parameter. `from_mean_sd` takes the mean and standard deviation of X itself, which
// people often know instead. A draw consumes what `normal` does, 1.02 word64 on average. Results
// out of range are given as the smallest normal and the largest finite number. A float is
// computed as a double and rounded.
// Source: by definition; the normal is Marsaglia and Tsang's, J. Stat. Software 5(8), 2000.
// Not for a sum of lognormals, which is none.

#ifndef LEAT_DISTRIBUTIONS_LOGNORMAL_HPP
#define LEAT_DISTRIBUTIONS_LOGNORMAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_function.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/normal_quantile.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class lognormal;

/// The parameters of `lognormal`.
template <detail::portable_real Real = double>
struct lognormal_parameters {
    using distribution_type = lognormal<Real>;
    static constexpr const char* law_name = "lognormal";

    Real log_mean = 0; ///< the mean of the logarithm
    Real log_sd = 1;   ///< the standard deviation of the logarithm, >= 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_finite("log_mean", static_cast<double>(log_mean)),
                                detail::unless_non_negative("log_sd", static_cast<double>(log_sd)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("log_mean", self.log_mean);
        visit("log_sd", self.log_sd);
    }
    friend constexpr bool operator==(const lognormal_parameters&,
                                     const lognormal_parameters&) = default;
};

/// The lognormal law.
template <detail::portable_real Real = double>
class lognormal : public detail::law<lognormal<Real>, lognormal_parameters<Real>> {
    using base = detail::law<lognormal, lognormal_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// The exponential function of a standard normal.
    constexpr lognormal() : lognormal(param_type{}) {}
    constexpr lognormal(detail::number auto log_mean, detail::number auto log_sd)
        : lognormal(param_type{static_cast<Real>(log_mean), static_cast<Real>(log_sd)}) {}
    constexpr explicit lognormal(const param_type& p) : base(p) {}

    /// The law whose draws themselves have that mean (> 0) and standard deviation (>= 0).
    [[nodiscard]] static constexpr lognormal from_mean_sd(detail::number auto mean,
                                                          detail::number auto sd);

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const double z = detail::standard_normal(g);
        const real log = real(mu()) + real(sigma()) * z;
        return detail::into_positive<Real>(detail::natural_exp(log.value));
    }

    [[nodiscard]] constexpr Real log_mean() const noexcept { return this->param().log_mean; }
    [[nodiscard]] constexpr Real log_sd() const noexcept { return this->param().log_sd; }
    /// exp(log_mean + log_sd^2 / 2). Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept { return scaled_mean().value(); }
    /// (exp(log_sd^2) - 1) mean^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        if (sigma() == 0) {
            return 0;
        }
        const real square = real(sigma()) * sigma();
        if (square.value > 40) { // the 1 is below half an ulp
            return detail::natural_exp(((square + mu()) + (square + mu())).value);
        }
        const detail::scaled growth = // e^s - 1 is s for small s
            sigma() < 0x1p-30 ? detail::split(sigma()) * detail::split(sigma())
                              : detail::split(detail::exp_minus_one(square.value));
        return (growth * scaled_mean() * scaled_mean()).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x; of log_sd 0 the largest finite number at the one value.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        if (sigma() == 0) {
            return x == detail::natural_exp(mu()) ? std::numeric_limits<double>::max() : 0.0;
        }
        const double z = standard_place(x);
        if (!(detail::magnitude(z) < 0x1p300)) {
            return 0;
        }
        constexpr detail::scaled root{0x1.9884533d43651p-2, 0}; // 1 / sqrt(2 pi)
        return detail::or_zero(root * detail::standard_bell(z) *
                               detail::inverse(detail::split(sigma()) * detail::split(x)));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 ? 1 : 0;
        }
        if (sigma() == 0) {
            return x < detail::natural_exp(mu()) ? 0 : 1;
        }
        return detail::normal_below(standard_place(x));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double z = detail::normal_quantile(detail::chance_or_refuse(param_type::law_name, p));
        return detail::natural_exp((real(mu()) + real(sigma()) * z).value);
    }

private:
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > 0 && detail::finite(x);
    }
    constexpr double standard_place(double x) const noexcept {
        return detail::standardised(detail::natural_log(x), mu(), sigma());
    }
    constexpr double mu() const noexcept { return static_cast<double>(log_mean()); }
    constexpr double sigma() const noexcept { return static_cast<double>(log_sd()); }
    constexpr detail::scaled scaled_mean() const noexcept {
        return detail::exp_scaled((real(mu()) + real(sigma()) * sigma() * 0.5).value);
    }
};

template <detail::portable_real Real>
constexpr lognormal<Real> lognormal<Real>::from_mean_sd(detail::number auto mean,
                                                        detail::number auto sd) {
    const auto m = static_cast<double>(mean);
    const auto s = static_cast<double>(sd);
    const detail::fault found =
        detail::first_of(detail::unless_positive("mean", m), detail::unless_non_negative("sd", s));
    if (found.parameter != nullptr) {
        detail::refuse(param_type::law_name, found.parameter, found.value, found.allowed);
    }
    if (s == 0) {
        return lognormal(detail::natural_log(m), 0.0);
    }
    // log_sd^2 = ln(1 + ratio^2), where the square may be out of the range of double.
    const detail::scaled top = detail::split(s);
    const detail::scaled bottom = detail::split(m);
    const double ratio =
        detail::scaled{detail::held(top.factor / bottom.factor), top.exponent - bottom.exponent}
            .value();
    real square = 0.0;
    real log_sd = ratio; // where 1 + ratio^2 rounds to 1
    if (ratio > 0x1p30) {
        const real log_ratio = real(detail::natural_log(s)) - detail::natural_log(m);
        square = log_ratio + log_ratio;
        log_sd = detail::square_root(square.value);
    } else if (ratio > 0x1p-30) {
        square = detail::log_one_plus((real(ratio) * ratio).value);
        log_sd = detail::square_root(square.value);
    }
    return lognormal((real(detail::natural_log(m)) - square * 0.5).value, log_sd.value);
}

} // namespace leat

#endif
