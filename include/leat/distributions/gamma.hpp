// The gamma law with a shape and a scale: density x^(shape-1) exp(-x / scale) / (Gamma(shape)
// scale^shape), x > 0; sums of exponential times, waits, random rates.
//
// Domain: shape and scale finite and > 0 (tested from 1e-8 to 1e12); anything else throws
// invalid_parameter. For shape >= 1 a draw is d (1 + c z)^3 with d = shape - 1/3, c = 1 / (3
// sqrt d), z standard normal, accepted with a probability of 95.2 % (shape 1) or more: 2.1
// word64 on average, at most 32 trials, then engine_stuck (a chance below 2^-130). For shape < 1 it
// is G exp(-E / shape), G a draw for shape + 1, then E a standard exponential: the usual factor
// U^(1/shape) without its end at 2^-53. For a small shape most draws lie below the smallest
// normal number and are given as that; `draw_log` gives their logarithm instead. Results that
// overflow are given as the largest finite number. A float is computed as a double and rounded.
// The acceptance test is computed without the cancellation that large shapes would bring, after
// C. Loader, Fast and accurate computation of binomial probabilities, 2000.
// Source: G. Marsaglia and W. W. Tsang, A simple method for generating gamma variables, ACM TOMS
// 26(3), 2000.
// Not for the waiting time of one event (exponential is faster).

#ifndef LEAT_DISTRIBUTIONS_GAMMA_HPP
#define LEAT_DISTRIBUTIONS_GAMMA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/polynomial.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/unit.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class gamma;

/// The parameters of `gamma`.
template <detail::portable_real Real = double>
struct gamma_parameters {
    using distribution_type = gamma<Real>;
    static constexpr const char* law_name = "gamma";

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
    friend constexpr bool operator==(const gamma_parameters&, const gamma_parameters&) = default;
};

namespace detail {

/// ln(1 + t) - (t - t^2/2 + t^3/3) for t > -1: the exponent of the acceptance test over 3 d.
constexpr double log_beyond_cube(double t) noexcept {
    using real = strict<double>;
    const real x = t;
    if (magnitude(t) < 0x1p-4) {
        real sum = 0.0;
        for (int n = 16; n >= 4; --n) { // the series of the logarithm from t^4 on
            sum = real(1.0) / static_cast<double>(n) - x * sum;
        }
        return (-(x * x * x * x * sum)).value;
    }
    const real cubic = x - x * x * (real(0.5) - x / 3.0);
    return (real(log_one_plus(t)) - cubic).value;
}

/// The density of a gamma law at x > 0. From a shape of 10 on it is the density at the mean times
/// the exponential of a deviance, after C. Loader as above.
constexpr scaled gamma_density(double shape, double scale, double x) noexcept {
    using real = strict<double>;
    const scaled place = split(x) * inverse(split(scale));
    const double z = place.value();
    const scaled per_x = inverse(split(x));
    if (shape < 10) { // z^shape e^-z / Gamma(shape) / x
        const real log = real(shape) * natural_log(z) - z - log_gamma(shape);
        return exp_scaled(log.value) * per_x;
    }
    // (z - shape) - shape ln(z / shape) = shape (t - ln(1 + t)), t = z / shape - 1
    const real t = (real(z) - shape) / shape;
    real deviance = 0.0;
    if (magnitude(t.value) < 0x1p-4) {
        const real cubic = t * t * (real(0.5) - t / 3.0);
        deviance = cubic - log_beyond_cube(t.value);
    } else {
        deviance = t - natural_log((place * inverse(split(shape))).value());
    }
    const real inverse_shape = real(1.0) / shape;
    const real stirling =
        inverse_shape * polynomial(stirling_series, (inverse_shape * inverse_shape).value);
    constexpr double root = 0x1.9884533d43651p-2; // 1 / sqrt(2 pi)
    return exp_scaled((-(real(shape) * deviance + stirling)).value) * split(root) *
           split(square_root(shape)) * per_x;
}

/// Gamma laws of scale 1 and any shape >= 1, as d * factor.
class gamma_from_one {
public:
    constexpr explicit gamma_from_one(double shape) noexcept
        : d((strict<double>(shape) - 0x1.5555555555555p-2).value), // 1/3
          c_((strict<double>(1.0) / (strict<double>(3.0) * square_root(d))).value) {}

    double d;

    /// (1 + c z)^3 of an accepted z.
    template <random_words G>
    [[nodiscard]] constexpr double factor(G& g) const {
        using real = strict<double>;
        for (int trial = 0; trial < 32; ++trial) {
            const real z = standard_normal(g);
            const real t = z * c_;
            const real root = real(1.0) + t;
            if (!(root.value > 0)) {
                continue;
            }
            const real square = z * z;
            const std::uint64_t word = word64(g);
            const real u = open_unit(word);
            const real three_d = into_positive<double>((real(3.0) * d).value); // never infinite
            if (u < real(1.0) - square * square * 0.0331 ||
                real(natural_log(u.value)) < three_d * log_beyond_cube(t.value)) {
                return (root * root * root).value;
            }
        }
        stuck("gamma");
    }

private:
    double c_;
};

} // namespace detail

/// The gamma law.
template <detail::portable_real Real = double>
class gamma : public detail::law<gamma<Real>, gamma_parameters<Real>> {
    using base = detail::law<gamma, gamma_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Shape 1, scale 1.
    constexpr gamma() : gamma(param_type{}) {}
    constexpr gamma(detail::number auto shape, detail::number auto scale)
        : gamma(param_type{static_cast<Real>(shape), static_cast<Real>(scale)}) {}
    constexpr explicit gamma(const param_type& p)
        : base(p),
          core_(p.shape < 1 ? detail::held(static_cast<double>(p.shape) + 1.0)
                            : static_cast<double>(p.shape)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const double factor = core_.factor(g);
        if (boosted()) {
            const real e = detail::standard_exponential(g);
            const detail::scaled x = detail::split(factor) * detail::split(core_.d) *
                                     detail::split(scale_()) *
                                     detail::exp_scaled((-e / shape_()).value);
            return detail::into_positive<Real>(x.value());
        }
        const real x = real(core_.d) * factor * scale_();
        if (x.value > std::numeric_limits<double>::max()) { // perhaps on the way only
            const detail::scaled product =
                detail::split(factor) * detail::split(core_.d) * detail::split(scale_());
            return detail::into_positive<Real>(product.value());
        }
        return detail::into_positive<Real>(x.value);
    }

    /// The logarithm of a draw, from the same words; also where the draw itself would be out of
    /// range. Never infinite.
    template <random_words G>
    [[nodiscard]] constexpr Real draw_log(G& g) const {
        const double factor = core_.factor(g);
        real log = real(detail::natural_log(factor)) +
                   (real(detail::natural_log(core_.d)) + detail::natural_log(scale_()));
        if (boosted()) {
            const real e = detail::standard_exponential(g);
            log = log - e / shape_();
        }
        return detail::into_signed<Real>(log.value);
    }

    [[nodiscard]] constexpr Real shape() const noexcept { return this->param().shape; }
    [[nodiscard]] constexpr Real scale() const noexcept { return this->param().scale; }
    /// shape * scale. Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept {
        return (detail::split(shape_()) * detail::split(scale_())).value();
    }
    /// shape * scale^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        return (detail::split(shape_()) * detail::split(scale_()) * detail::split(scale_()))
            .value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// gamma function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !detail::finite(x)) {
            return 0;
        }
        return detail::or_zero(detail::gamma_density(shape_(), scale_(), x));
    }

private:
    constexpr double shape_() const noexcept { return static_cast<double>(shape()); }
    constexpr double scale_() const noexcept { return static_cast<double>(scale()); }
    constexpr bool boosted() const noexcept { return shape() < 1; }

    detail::gamma_from_one core_;
};

} // namespace leat

#endif
