// The von Mises law with a mean direction and a concentration: density exp(concentration cos(x -
// mean)) / (2 pi I0(concentration)) for x within pi of the mean; headings, phases, times of day.
// Radians.
//
// Domain: mean finite, concentration finite and >= 0 (0: uniform on the circle); anything else
// throws invalid_parameter. A draw lies in [mean - pi, mean + pi] and is not brought back to a
// fixed turn, so that `mean()` and `variance()` are those of the number drawn, and narrow laws keep
// their digits. A trial takes a uniform, which gives a wrapped Cauchy angle and the sign, and an
// exponential; accepted are 65.7 % (large concentrations) to 100 %: 2.03 to 3.1 word64 on average;
// at most 80 trials, then engine_stuck (a chance below 2^-120). The formulas are rearranged so
// that neither tiny nor huge concentrations cancel: the angle is 2 arctan(q tan(pi u / 2)), and the
// exponential (not the logarithm of a uniform) keeps the tail complete. A float is computed as a
// double and rounded.
// Source: D. J. Best and N. I. Fisher, Efficient simulation of the von Mises distribution, Applied
// Statistics 28(2), 1979.
// Not for directions in space.

#ifndef LEAT_DISTRIBUTIONS_VON_MISES_HPP
#define LEAT_DISTRIBUTIONS_VON_MISES_HPP

#include "leat/core/arctangent.hpp"
#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/quadrature.hpp" // the variance, the cumulative chance
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/unit.hpp"

#include <cstdint>

namespace leat {

template <detail::portable_real Real>
class von_mises;

/// The parameters of `von_mises`.
template <detail::portable_real Real = double>
struct von_mises_parameters {
    using distribution_type = von_mises<Real>;
    static constexpr const char* law_name = "von_mises";

    Real mean = 0;          ///< an angle, in radians
    Real concentration = 1; ///< >= 0; 0 is uniform

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(
            detail::unless_finite("mean", static_cast<double>(mean)),
            detail::unless_non_negative("concentration", static_cast<double>(concentration)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
        visit("concentration", self.concentration);
    }
    friend constexpr bool operator==(const von_mises_parameters&,
                                     const von_mises_parameters&) = default;
};

/// The von Mises law.
template <detail::portable_real Real = double>
class von_mises : public detail::law<von_mises<Real>, von_mises_parameters<Real>> {
    using base = detail::law<von_mises, von_mises_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Mean 0, concentration 1.
    constexpr von_mises() : von_mises(param_type{}) {}
    constexpr von_mises(detail::number auto mean, detail::number auto concentration)
        : von_mises(param_type{static_cast<Real>(mean), static_cast<Real>(concentration)}) {}
    constexpr explicit von_mises(const param_type& p) : base(p) { prepare(); }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        for (int trial = 0; trial < 80; ++trial) {
            const std::uint64_t word = word64(g);
            // Half the angle before it is narrowed by q, in turns; its cosine is above 0.
            const detail::sine_and_cosine half =
                detail::sine_cosine((real(detail::open_unit(word)) * 0.25).value);
            const real cosine = half.cosine;
            const real c = real(top_) / (real(bottom_) + real(half_) * cosine * cosine);
            const real excess = c - 1.0;
            const real e = detail::standard_exponential(g);
            // Accepted where e >= c - 1 - ln c, which is at most (c - 1)^2 / c.
            if (e * c >= excess * excess || e >= excess - detail::natural_log(c.value)) {
                const real turned =
                    real(2.0) * detail::arctangent((real(q_) * half.sine).value, half.cosine);
                const double angle = detail::with_sign_of(word, turned.value);
                return detail::into_signed<Real>((real(mean()) + angle).value);
            }
        }
        detail::stuck("von_mises");
    }

    [[nodiscard]] constexpr Real concentration() const noexcept {
        return this->param().concentration;
    }
    /// The expectation: the parameter of that name.
    [[nodiscard]] constexpr double mean() const noexcept {
        return static_cast<double>(this->param().mean);
    }
    /// The expectation of (x - mean)^2, in square radians, to 12 digits.
    [[nodiscard]] constexpr double variance() const noexcept;
    [[nodiscard]] constexpr Real min() const noexcept {
        return detail::into_signed<Real>((real(mean()) - pi).value);
    }
    [[nodiscard]] constexpr Real max() const noexcept {
        return detail::into_signed<Real>((real(mean()) + pi).value);
    }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const;
    /// P(X <= x), by quadrature: some ten microseconds.
    [[nodiscard]] constexpr double cumulative(double x) const;
    /// The x with cumulative(x) = p, 0 < p < 1, by bisection: some half a millisecond.
    [[nodiscard]] constexpr double quantile(double p) const;

private:
    static constexpr double pi = 2 * detail::half_pi;

    /// The chance of being further from the mean than `away`, in [0, pi], and on one side.
    [[nodiscard]] constexpr double tail(double away) const;
    /// The density at this distance from the mean.
    [[nodiscard]] constexpr double density_away(double away) const;

    /// With t = 1 + sqrt(1 + 4 k^2), the published r is t / (2 k). Here are t / 8, (t - 2 k) / 8,
    /// k / 2 and q = sqrt((r - 1) / (r + 1)).
    constexpr void prepare() noexcept {
        const real k = static_cast<double>(concentration());
        half_ = (k * 0.5).value;
        if (k.value > 0x1p60) { // the 1 is below half an ulp
            top_ = (k * 0.25).value;
            bottom_ = 0.125;
            q_ = (real(0.5) / detail::square_root(k.value)).value;
            return;
        }
        const real twice = k + k;
        const real root = detail::square_root((real(1.0) + twice * twice).value);
        const real difference = real(1.0) + real(1.0) / (root + twice);
        top_ = ((root + 1.0) * 0.125).value;
        bottom_ = (difference * 0.125).value;
        q_ = detail::square_root((difference / (root + 1.0 + twice)).value);
    }

    double top_ = 0;
    double bottom_ = 0;
    double half_ = 0;
    double q_ = 0;
};

template <detail::portable_real Real>
constexpr double von_mises<Real>::variance() const noexcept {
    const double k = static_cast<double>(concentration());
    // Beyond `reach` the density is below e^-80 of its greatest value.
    const double reach = k < 40 ? pi : (real(20.0) / detail::square_root(k)).value;
    const real quarter_turns = real(reach) / (real(4.0) * pi); // half the reach, in turns
    const detail::moments m = detail::moments_on_unit([&](double t) {
        const real sine = detail::sine_cosine((quarter_turns * t).value).sine;
        return detail::natural_exp((real(-2.0) * k * sine * sine).value);
    });
    const real mean_square = real(m.variance) + real(m.mean) * m.mean;
    return (detail::split(reach) * detail::split(reach) * detail::split(mean_square.value)).value();
}

template <detail::portable_real Real>
constexpr double von_mises<Real>::density(double x) const {
    const real away = real(detail::number_or_refuse(param_type::law_name, x)) - mean();
    return density_away(detail::magnitude(away.value));
}

template <detail::portable_real Real>
constexpr double von_mises<Real>::density_away(double away) const {
    if (!(away <= pi)) {
        return 0;
    }
    const auto k = static_cast<double>(concentration());
    real scaled_bessel = 1.0; // e^-k I0(k)
    if (k > 50) {             // Abramowitz and Stegun, 9.7.1
        real term = 1.0;
        for (int i = 1; i <= 16; ++i) {
            const real odd = static_cast<double>(2 * i - 1);
            term = term * odd * odd / (real(static_cast<double>(8 * i)) * k);
            scaled_bessel = scaled_bessel + term;
        }
        constexpr double root = 0x1.9884533d43651p-2; // 1 / sqrt(2 pi)
        scaled_bessel = scaled_bessel * root / detail::square_root(k);
    } else { // 9.6.12
        const real square = k < 0x1p-500 ? 0.0 : (real(k) * 0.25 * k).value;
        real term = 1.0;
        for (int i = 1; i <= 110; ++i) {
            term = term * square / static_cast<double>(i * i);
            if (term < 0x1p-60) {
                break;
            }
            scaled_bessel = scaled_bessel + term;
        }
        scaled_bessel = scaled_bessel * detail::natural_exp(-k);
    }
    // cos t - 1 is -2 sin^2(t / 2)
    const double turns = (real(away) / (real(4.0) * pi)).value;
    const real sine = turns < 0x1p-900 ? 0.0 : detail::sine_cosine(turns).sine;
    const real exponent = real(k) * sine * sine * -2.0;
    return detail::or_zero(
        detail::exp_scaled(exponent.value) *
        detail::inverse(detail::split((scaled_bessel * (real(2.0) * pi)).value)));
}

template <detail::portable_real Real>
constexpr double von_mises<Real>::tail(double away) const {
    const double here = density_away(away);
    if (here == 0) {
        return 0;
    }
    const real k = static_cast<double>(concentration());
    const real turns = real(1.0) / (real(4.0) * pi); // of half an angle
    const real start = (real(away) * turns).value < 0x1p-900 ? real(0.0) : real(away) * turns;
    // Up to pi, or to where the density is e^-40 of what it is here.
    const real sine = detail::sine_cosine(start.value).sine;
    real end = pi;
    if (k > 20) {
        const real square = sine * sine + real(20.0) / k;
        if (square < 1) {
            end = real(2.0) * detail::arctangent(detail::square_root(square.value),
                                                 detail::square_root((real(1.0) - square).value));
        }
    }
    const real reach = end - away;
    if (!(reach > 0)) {
        return 0;
    }
    // The density u further on is e^(-2 k sin(away + u/2) sin(u/2)) of it, without cancellation.
    constexpr int panels = 32;
    constexpr double width = 1.0 / panels;
    real mean_share = 0.0;
    for (int panel = 0; panel < panels; ++panel) {
        mean_share = mean_share + detail::mean_on_unit([&](double t) {
                         const real u = reach * (real(static_cast<double>(panel)) + t) * width;
                         const real half = u * turns;
                         const real far = detail::sine_cosine((start + start + half).value).sine;
                         const real near = detail::sine_cosine(half.value).sine;
                         return detail::natural_exp((real(-2.0) * (k * near) * far).value);
                     });
    }
    const double chance = detail::or_zero(detail::split(here) * detail::split(reach.value) *
                                          detail::split((mean_share * width).value));
    return chance < 0.5 ? chance : 0.5;
}

template <detail::portable_real Real>
constexpr double von_mises<Real>::cumulative(double x) const {
    const real away = real(detail::number_or_refuse(param_type::law_name, x)) - mean();
    if (away.value == 0) {
        return 0.5;
    }
    const double beyond = tail(detail::magnitude(away.value));
    return away < 0 ? beyond : (real(1.0) - beyond).value;
}

template <detail::portable_real Real>
constexpr double von_mises<Real>::quantile(double p) const {
    detail::chance_or_refuse(param_type::law_name, p);
    if (p == 0.5) {
        return mean();
    }
    const real nearer = p < 0.5 ? real(p) : real(1.0) - p; // exact
    const real away =
        detail::least_reaching(-nearer.value, [this](double at) { return -tail(at); });
    return detail::kept_normal((p < 0.5 ? real(mean()) - away : real(mean()) + away).value);
}

} // namespace leat

#endif
