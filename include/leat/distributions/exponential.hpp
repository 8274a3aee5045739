// The exponential law with a rate: density rate exp(-rate x), x > 0; the time between events that
// come at random, `rate` of them in a unit of time.
//
// Domain: rate finite and > 0; anything else throws invalid_parameter. A draw is E / rate, E from
// the 256-layer ziggurat of detail/ziggurat.hpp, and consumes 1.03 word64 on average: one in 97.8 %
// of draws, at most 32 trials of two, then engine_stuck. The tail is complete (a logarithm of a
// 53-bit uniform ends at 37 / rate). No draw is 0 or infinite: results out of range are given as
// the smallest normal and the largest finite number. A float is computed as a double and rounded.
// Source: Marsaglia and Tsang, J. Stat. Software 5(8), 2000.
// Not for whole numbers of trials (geometric).

#ifndef LEAT_DISTRIBUTIONS_EXPONENTIAL_HPP
#define LEAT_DISTRIBUTIONS_EXPONENTIAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class exponential;

/// The parameter of `exponential`.
template <detail::portable_real Real = double>
struct exponential_parameters {
    using distribution_type = exponential<Real>;
    static constexpr const char* law_name = "exponential";

    Real rate = 1; ///< events per unit of time, > 0

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::unless_positive("rate", static_cast<double>(rate));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("rate", self.rate);
    }
    friend constexpr bool operator==(const exponential_parameters&,
                                     const exponential_parameters&) = default;
};

/// The exponential law.
template <detail::portable_real Real = double>
class exponential : public detail::law<exponential<Real>, exponential_parameters<Real>> {
    using base = detail::law<exponential, exponential_parameters<Real>>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Rate 1.
    constexpr exponential() : exponential(param_type{}) {}
    constexpr explicit exponential(detail::number auto rate)
        : exponential(param_type{static_cast<Real>(rate)}) {}
    constexpr explicit exponential(const param_type& p) : base(p) {}

    /// The law with that mean: its rate is 1 / mean.
    [[nodiscard]] static constexpr exponential from_mean(detail::number auto mean) {
        const auto m = static_cast<double>(mean);
        const detail::fault found = detail::unless_positive("mean", m);
        if (found.parameter != nullptr) {
            detail::refuse(param_type::law_name, found.parameter, found.value, found.allowed);
        }
        return exponential(detail::held(1.0 / m));
    }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard, gnu::always_inline]] constexpr Real operator()(G& g) const {
        return from_standard(detail::standard_exponential(g));
    }
    /// For fills: the draw whose first 64-bit word is `word`, where that is accepted at once.
    [[gnu::always_inline]] constexpr bool from_word(std::uint64_t word, Real& x) const noexcept {
        double e = 0;
        const bool accepted = detail::exponential_at_once(word, e);
        x = from_standard(e);
        return accepted;
    }

    [[nodiscard]] constexpr Real rate() const noexcept { return this->param().rate; }
    /// 1 / rate. Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept { return scaled_mean().value(); }
    /// 1 / rate^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        return (scaled_mean() * scaled_mean()).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        const auto rate_ = static_cast<double>(rate());
        return in_support(x) ? detail::or_zero(detail::split(rate_) *
                                               detail::exp_scaled(-detail::product(rate_, x)))
                             : 0;
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 ? 1 : 0;
        }
        return -detail::exp_minus_one(-detail::product(static_cast<double>(rate()), x));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double chance = detail::chance_or_refuse(param_type::law_name, p);
        return detail::quotient(-detail::log_one_plus(-chance), static_cast<double>(rate()));
    }

private:
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > 0 && detail::finite(x);
    }
    [[gnu::always_inline]] constexpr Real from_standard(double e) const noexcept {
        return detail::into_positive<Real>(detail::held(e / static_cast<double>(rate())));
    }
    constexpr detail::scaled scaled_mean() const noexcept {
        const detail::scaled parts = detail::split(static_cast<double>(rate()));
        return {detail::held(1.0 / parts.factor), -parts.exponent};
    }
};

} // namespace leat

#endif
