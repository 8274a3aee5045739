// The beta law with shapes a and b: density x^(a-1) (1-x)^(b-1) / B(a, b), 0 < x < 1; shares,
// unknown probabilities, order statistics of uniforms.
//
// Domain: a and b finite and >= 1e-300 (below, the logarithms of the variates themselves pass the
// range of double); anything else throws invalid_parameter. By region, whichever is fastest, the
// first that fits:
//   b = 1 or a = 1     e^(-E/a) or 1 - e^(-E/b), E exponential                   1.03 word64
//   1/2 and 1 up       both shapes 1/2 or at least 1: as `others`, not in logarithms
//   a + b <= 1         Johnk's rejection in logarithms, x = e^(-E1/a), y = e^(-E2/b), accepted
//                      where x + y <= 1: 2.06 to 2.65 word64; at most 64 trials, then
//                      engine_stuck (a chance below 2^-140)
//   others             G1 / (G1 + G2) of two gamma variates: 2.04 (a = b = 1/2) to 4.2 word64; up
//                      to 6.4 with shapes below 1
// In logarithms where a shape is below 1 and not 1/2. No draw is 0 or 1: results below the smallest
// normal number are given as that, results that round to 1 as the largest number below. A float is
// computed as a double and rounded.
// Source: M. D. Johnk, Erzeugung von betaverteilten und gammaverteilten Zufallszahlen, Metrika 8,
// 1964; L. Devroye, Non-Uniform Random Variate Generation, 1986, ch. IX.3 and IX.4; the gamma
// variates: detail/unit_gamma.hpp.
// Not for 1 - x where x is nearly 1, which a double cannot tell: draw beta{b, a} for that.

#ifndef LEAT_DISTRIBUTIONS_BETA_HPP
#define LEAT_DISTRIBUTIONS_BETA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/beta_density.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/unit_gamma.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class beta;

/// The parameters of `beta`.
template <detail::portable_real Real = double>
struct beta_parameters {
    using distribution_type = beta<Real>;
    static constexpr const char* law_name = "beta";

    Real a = 1; ///< at least 1e-300
    Real b = 1; ///< at least 1e-300

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(unless_enough("a", static_cast<double>(a)),
                                unless_enough("b", static_cast<double>(b)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("a", self.a);
        visit("b", self.b);
    }
    friend constexpr bool operator==(const beta_parameters&, const beta_parameters&) = default;

private:
    static constexpr detail::fault unless_enough(const char* parameter, double x) noexcept {
        return detail::finite(x) && x >= 1e-300
                   ? detail::fault{}
                   : detail::fault{parameter, x, "must be finite and >= 1e-300"};
    }
};

/// The beta law.
template <detail::portable_real Real = double>
class beta : public detail::law<beta<Real>, beta_parameters<Real>> {
    using base = detail::law<beta, beta_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Shapes 1 and 1: the uniform law.
    constexpr beta() : beta(param_type{}) {}
    constexpr beta(detail::number auto a, detail::number auto b)
        : beta(param_type{static_cast<Real>(a), static_cast<Real>(b)}) {}
    constexpr explicit beta(const param_type& p)
        : base(p),
          first_(static_cast<double>(p.a)),
          second_(static_cast<double>(p.b)),
          ratio_(detail::held(second_.unit / first_.unit)),
          method_(p.b == 1                                        ? method::power
                  : p.a == 1                                      ? method::power_from_1
                  : first_.never_drops() && second_.never_drops() ? method::gammas
                  : detail::held(a_() + b_()) <= 1                ? method::johnk
                                                                  : method::boosted_gammas) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        switch (method_) {
        case method::power: {
            const real e = detail::standard_exponential(g);
            return into_support(detail::natural_exp((-e / a_()).value));
        }
        case method::power_from_1: {
            const real e = detail::standard_exponential(g);
            return into_support(-detail::exp_minus_one((-e / b_()).value));
        }
        case method::johnk:
            return into_support(by_johnk(g));
        case method::gammas: {
            const detail::gamma_pieces x = first_(g);
            const detail::gamma_pieces y = second_(g);
            return into_support(
                (real(x.factor) / (real(x.factor) + real(ratio_) * y.factor)).value);
        }
        default:
            return into_support(by_boosted_gammas(g));
        }
    }

    [[nodiscard]] constexpr Real a() const noexcept { return this->param().a; }
    [[nodiscard]] constexpr Real b() const noexcept { return this->param().b; }
    /// a / (a + b).
    [[nodiscard]] constexpr double mean() const noexcept { return share(a_(), b_()); }
    /// a b / ((a + b)^2 (a + b + 1)).
    [[nodiscard]] constexpr double variance() const noexcept {
        const real sum = real(a_()) + b_(); // the product of shares is 0 where this is infinite
        return (real(share(a_(), b_())) * share(b_(), a_()) / (sum + 1.0)).value;
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept {
        return Real{1} - std::numeric_limits<Real>::epsilon() / Real{2};
    }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// beta function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !(x < 1)) {
            return 0;
        }
        const double rest = (real(1.0) - x).value;
        return detail::or_zero(detail::beta_kernel(a_(), b_(), x, rest) *
                               detail::inverse(detail::split(x)) *
                               detail::inverse(detail::split(rest)));
    }

private:
    enum class method : unsigned char { power, power_from_1, johnk, gammas, boosted_gammas };

    constexpr double a_() const noexcept { return static_cast<double>(a()); }
    constexpr double b_() const noexcept { return static_cast<double>(b()); }

    /// x / (x + y), neither of them 0.
    static constexpr double share(double x, double y) noexcept {
        if (x < y) {
            const real ratio = real(x) / y;
            return (ratio / (ratio + 1.0)).value;
        }
        return (real(1.0) / (real(y) / x + 1.0)).value;
    }

    static constexpr Real into_support(double x) noexcept {
        const Real rounded = detail::into_positive<Real>(x);
        return rounded < 1 ? rounded : max();
    }

    template <random_words G>
    constexpr double by_johnk(G& g) const {
        for (int trial = 0; trial < 64; ++trial) { // 78.5 % are accepted or more
            const real e1 = detail::standard_exponential(g);
            const real e2 = detail::standard_exponential(g);
            const real x = e1 / a_(); // minus the logarithms
            const real y = e2 / b_();
            const real least = x < y ? x : y;
            const real ratio = detail::natural_exp(-detail::magnitude((x - y).value));
            // x + y is e^-least (1 + ratio), at most 1 from least = ln 2 on
            if (least < 0.69314718055994529 &&
                real(detail::natural_exp(-least.value)) * (ratio + 1.0) > 1.0) {
                continue;
            }
            return ((x < y ? real(1.0) : ratio) / (ratio + 1.0)).value;
        }
        detail::stuck("beta");
    }

    template <random_words G>
    constexpr double by_boosted_gammas(G& g) const {
        const detail::gamma_pieces x = first_(g);
        const detail::gamma_pieces y = second_(g);
        const detail::scaled odds = // of y against x
            detail::split(ratio_) * detail::split((real(y.factor) / x.factor).value) *
            detail::exp_scaled((real(x.drop) - y.drop).value);
        const double against = odds.value(); // saturates where x is out of range or rounds to 1
        return (real(1.0) / (real(against) + 1.0)).value;
    }

    detail::unit_gamma first_;
    detail::unit_gamma second_;
    double ratio_; // of the units
    method method_;
};

} // namespace leat

#endif
