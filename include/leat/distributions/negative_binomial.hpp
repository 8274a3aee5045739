// The negative binomial law: the number of failures before the r-th success of trials that each
// succeed with chance p, r any real number > 0; mass Gamma(k + r) / (k! Gamma(r)) p^r (1 - p)^k,
// k = 0, 1, 2, ... Also counts that vary more than Poisson's do.
//
// Domain: r finite and > 0 (tested from 1e-6 to 1e9), 0 < p <= 1, and such that a draw passes the
// integer type with a chance of at most 2^-64 (for p below 2^-53 by a bound, which asks a little
// more); anything else throws invalid_parameter. p = 1 gives
// 0. A draw is a Poisson count whose mean is a gamma draw of shape r and scale (1 - p) / p; one
// beyond the type is given as its largest value.
// Words consumed: those of gamma and of the Poisson count, 3.1 to 6 word64 on average; engine_stuck
// as these. Source: M. Greenwood and G. U. Yule, J. Royal Statist. Soc. 83, 1920 (the mixture);
// methods and their sources in gamma.hpp and detail/discrete_poisson.hpp.
// Not for r = 1 (geometric is faster).

#ifndef LEAT_DISTRIBUTIONS_NEGATIVE_BINOMIAL_HPP
#define LEAT_DISTRIBUTIONS_NEGATIVE_BINOMIAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // two_sum, two_product
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_poisson.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/gamma.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::number_integer Int>
class negative_binomial;

namespace detail {

/// The logarithm of a negative binomial mass, for 0 < p < 1.
constexpr double log_negative_binomial_mass(double k, double r, double p) noexcept {
    using real = strict<double>;
    const real q = real(1.0) - p;
    const real all = real(k) + r;
    // k - (k + r) q, as (k + r) p - r: the products are large beside their difference.
    const two_part sum = two_sum(k, r);
    const two_part successes = two_product(sum.high, p);
    const real difference = (real(successes.high) - r) + (real(sum.low) * p + successes.low);
    return (real(log_poisson_mass(k, (all * q).value, difference.value)) +
            log_poisson_mass(r, (all * p).value, -difference.value) -
            log_poisson_mass_at_mean(all.value) + natural_log((real(r) / all).value))
        .value;
}

/// Whether a negative binomial count passes max with a chance of at most 2^-64.
constexpr bool negative_binomial_fits(double r, double p, std::uint64_t max) noexcept {
    using real = strict<double>;
    const auto largest_count = static_cast<double>(max);
    // Chernoff's bound at (1 + 1/q) / 2: the chance is at most 2^r exp(-max p / 2).
    if (p == 1 || real(largest_count) * p >= real(1.4) * (real(r) + 64.0)) {
        return true;
    }
    const real next = real(largest_count) + 1.0;
    const real q = real(1.0) - p;
    const real ratio = (next + r) / (next + 1.0) * q; // falls to q, or for r < 1 rises to it
    const real worst = ratio < q ? q : ratio;
    if (!(worst < 1)) {
        return false;
    }
    const real log_chance =
        real(log_negative_binomial_mass(next.value, r, p)) - natural_log((real(1.0) - worst).value);
    return log_chance <= -smallest_refused_log;
}

} // namespace detail

/// The parameters of `negative_binomial`.
template <detail::number_integer Int = std::int64_t>
struct negative_binomial_parameters {
    using distribution_type = negative_binomial<Int>;
    static constexpr const char* law_name = "negative_binomial";

    double r = 1;   ///< successes waited for, > 0; any real number
    double p = 0.5; ///< the chance of success, above 0, at most 1

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (!(p > 0 && p <= 1)) {
            return detail::first_of(detail::unless_positive("r", r),
                                    {"p", p, "must be > 0 and <= 1"});
        }
        const detail::fault found = detail::unless_positive("r", r);
        if (found.parameter == nullptr &&
            !detail::negative_binomial_fits(r, p, detail::largest<Int>)) {
            return {"p", p,
                    "must be so large for this r that a draw passes the integer type with a "
                    "chance of at most 2^-64"};
        }
        return found;
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("r", self.r);
        visit("p", self.p);
    }
    friend constexpr bool operator==(const negative_binomial_parameters&,
                                     const negative_binomial_parameters&) = default;
};

/// The negative binomial law.
template <detail::number_integer Int = std::int64_t>
class negative_binomial
    : public detail::law<negative_binomial<Int>, negative_binomial_parameters<Int>> {
    using base = detail::law<negative_binomial, negative_binomial_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// r = 1, p = 1/2.
    constexpr negative_binomial() : negative_binomial(param_type{}) {}
    constexpr negative_binomial(detail::number auto r, detail::number auto p)
        : negative_binomial(param_type{static_cast<double>(r), static_cast<double>(p)}) {}
    constexpr explicit negative_binomial(const param_type& p)
        : base(p), rate_(p.r, 1), odds_against_(((real(1.0) - p.p) / p.p).value) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        const double rate = rate_(g);
        const double mean = detail::product(rate, odds_against_);
        if (!(mean < static_cast<double>(detail::largest<Int>))) {
            return max();
        }
        const detail::poisson_counts counts(mean);
        return static_cast<Int>(counts.draw(g, detail::largest<Int>, param_type::law_name));
    }

    [[nodiscard]] constexpr double r() const noexcept { return this->param().r; }
    [[nodiscard]] constexpr double p() const noexcept { return this->param().p; }
    /// r (1 - p) / p.
    [[nodiscard]] constexpr double mean() const noexcept {
        return detail::product(r(), odds_against_);
    }
    /// r (1 - p) / p^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        return detail::quotient(mean(), p());
    }
    /// The mass at x: 0 but for whole x >= 0.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0) || !detail::finite(x) || !detail::whole(x)) {
            return 0;
        }
        if (p() == 1) {
            return x == 0 ? 1 : 0;
        }
        if (x == 0) {
            const real log_chance = p() > 0.5 ? detail::log_one_plus((real(p()) - 1.0).value)
                                              : detail::natural_log(p());
            return detail::or_zero(detail::exp_scaled((real(r()) * log_chance).value));
        }
        return detail::or_zero(detail::exp_scaled(detail::log_negative_binomial_mass(x, r(), p())));
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    [[nodiscard]] static constexpr Int max() noexcept { return std::numeric_limits<Int>::max(); }

private:
    gamma<double> rate_;
    double odds_against_;
};

} // namespace leat

#endif
