// The logistic law with a location and a scale: P(X <= x) = 1 / (1 + exp(-z)), z = (x - location) /
// scale; growth, and odds on a logarithmic scale.
//
// Domain: location finite, scale finite and > 0; anything else throws invalid_parameter. A draw is
// location + scale ln(u / (1 - u)), u an open unit uniform of one word64. Where u is within 2^-8 of
// an end (one draw in 128), only that is kept and the distance is drawn again as 2^-8 exp(-E), E
// from the exponential's ziggurat: so the tails, which u in steps of 2^-52 would end at |z| = 37,
// are complete. 1.01 word64 on average. Draws beyond the range are given as the largest finite
// number of their sign. A float is computed as a double and rounded.
// Source: by inversion (common practice; N. L. Johnson, S. Kotz and N. Balakrishnan, Continuous
// univariate distributions 2, 1995, ch. 23).
// Not for sigmoid growth curves with noise of their own.

#ifndef LEAT_DISTRIBUTIONS_LOGISTIC_HPP
#define LEAT_DISTRIBUTIONS_LOGISTIC_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/distributions/detail/location_scale.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/unit.hpp"

#include <cstdint>

namespace leat {

template <detail::portable_real Real>
class logistic;

/// The parameters of `logistic`.
template <detail::portable_real Real = double>
struct logistic_parameters {
    using distribution_type = logistic<Real>;
    static constexpr const char* law_name = "logistic";

    Real location = 0; ///< the mean
    Real scale = 1;    ///< > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::location_scale_fault(static_cast<double>(location),
                                            static_cast<double>(scale));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("location", self.location);
        visit("scale", self.scale);
    }
    friend constexpr bool operator==(const logistic_parameters&,
                                     const logistic_parameters&) = default;
};

/// The logistic law.
template <detail::portable_real Real = double>
class logistic : public detail::location_scale<logistic<Real>, logistic_parameters<Real>> {
    using base = detail::location_scale<logistic, logistic_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using typename base::param_type;

    /// Location 0, scale 1.
    constexpr logistic() : logistic(param_type{}) {}
    constexpr logistic(detail::number auto location, detail::number auto scale)
        : logistic(param_type{static_cast<Real>(location), static_cast<Real>(scale)}) {}
    constexpr explicit logistic(const param_type& p) : base(p) {}

    /// The expectation: the location.
    [[nodiscard]] constexpr double mean() const noexcept { return this->location_(); }
    /// pi^2 scale^2 / 3. Saturates at the ends of double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        return this->times_square_of_scale(0x1.a51a6625307d3p1);
    }

    /// ln(u / (1 - u)), with its whole tails.
    template <random_words G>
    [[nodiscard]] static constexpr double standard(G& g) {
        const std::uint64_t word = word64(g);
        const double u = detail::open_unit(word);
        if (u < 0x1p-8) {
            return -upper_tail(g);
        }
        if (u > 1 - 0x1p-8) {
            return upper_tail(g);
        }
        return detail::natural_log((real(u) / (real(1.0) - u)).value); // 1 - u is exact
    }
    [[nodiscard]] static constexpr detail::scaled standard_density(double z) noexcept {
        const detail::scaled power = detail::exp_scaled(-detail::magnitude(z));
        const double sum = detail::held(1.0 + detail::or_zero(power));
        return power * detail::inverse(detail::split(detail::held(sum * sum)));
    }
    [[nodiscard]] static constexpr double standard_cumulative(double z) noexcept {
        const detail::scaled power = detail::exp_scaled(-detail::magnitude(z));
        const double sum = detail::held(1.0 + detail::or_zero(power));
        return z < 0 ? detail::or_zero(power * detail::inverse(detail::split(sum)))
                     : detail::held(1.0 / sum);
    }
    [[nodiscard]] static constexpr double standard_quantile(double p) noexcept {
        if (p > 0.25 && p < 0.75) { // u / (1 - u) = 1 + (2 u - 1) / (1 - u)
            return detail::log_one_plus(((real(p) - 0.5) * 2.0 / (real(1.0) - p)).value);
        }
        return p < 0.5 ? detail::held(detail::natural_log(p) - detail::log_one_plus(-p))
                       : detail::natural_log((real(p) / (real(1.0) - p)).value);
    }

private:
    template <random_words G>
    [[gnu::noinline]] static constexpr double upper_tail(G& g) {
        constexpr double bound = 0x1.62e42fefa39efp2; // 8 ln 2
        const double beyond = detail::standard_exponential(g);
        const double rest = detail::held(0x1p-8 * detail::natural_exp(-beyond)); // 1 - u
        return (real(bound) + beyond + detail::log_one_plus(-rest)).value;
    }
};

} // namespace leat

#endif
