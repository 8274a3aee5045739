// The inverse Gaussian law with a mean and a shape: density sqrt(shape / (2 pi x^3)) exp(-shape (x
// - mean)^2 / (2 mean^2 x)), x > 0; the time a Brownian motion with drift takes to a level, wear to
// failure.
//
// Domain: mean and shape finite and > 0; anything else throws invalid_parameter. A draw is one of
// the two roots that a squared normal belongs to, mean / s and mean s with s >= 1, the smaller with
// the chance s / (1 + s); s is computed without the cancellation of the published formula. It
// consumes 2.05 word64 on average and never more than those of a normal and an exponential; nothing
// is rejected. The greater root comes as often as it should however large s is: past s = 2^32 an
// exponential decides, since a 53-bit uniform would end. Where mean / shape passes 2^400, the
// greater root has a chance below 2^-280 and is left out. Results out of range are given as the
// smallest normal and the largest finite number. A float is computed as a double and rounded.
// Source: J. R. Michael, W. R. Schucany and R. W. Haas, Generating random variates using
// transformations with multiple roots, The American Statistician 30(2), 1976.
// Not for first passage without drift (its mean is infinite): use 1 / z^2.

#ifndef LEAT_DISTRIBUTIONS_INVERSE_GAUSSIAN_HPP
#define LEAT_DISTRIBUTIONS_INVERSE_GAUSSIAN_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/error_function.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/unit.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class inverse_gaussian;

/// The parameters of `inverse_gaussian`.
template <detail::portable_real Real = double>
struct inverse_gaussian_parameters {
    using distribution_type = inverse_gaussian<Real>;
    static constexpr const char* law_name = "inverse_gaussian";

    Real mean = 1;  ///< > 0
    Real shape = 1; ///< > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_positive("mean", static_cast<double>(mean)),
                                detail::unless_positive("shape", static_cast<double>(shape)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
        visit("shape", self.shape);
    }
    friend constexpr bool operator==(const inverse_gaussian_parameters&,
                                     const inverse_gaussian_parameters&) = default;
};

/// The inverse Gaussian law.
template <detail::portable_real Real = double>
class inverse_gaussian
    : public detail::law<inverse_gaussian<Real>, inverse_gaussian_parameters<Real>> {
    using base = detail::law<inverse_gaussian, inverse_gaussian_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Mean 1, shape 1.
    constexpr inverse_gaussian() : inverse_gaussian(param_type{}) {}
    constexpr inverse_gaussian(detail::number auto mean, detail::number auto shape)
        : inverse_gaussian(param_type{static_cast<Real>(mean), static_cast<Real>(shape)}) {}
    constexpr explicit inverse_gaussian(const param_type& p)
        : base(p), spread_(spread_of(static_cast<double>(p.mean), static_cast<double>(p.shape))) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const real z = detail::standard_normal(g);
        const real square = z * z;
        if (spread_ > widest) [[unlikely]] { // s is twice w to the last bit
            return detail::into_positive<Real>((real(shape_()) / square).value);
        }
        const real w = square * spread_;
        const real s = real(1.0) + (w + detail::square_root((w * (w + 2.0)).value));
        const bool greater = takes_greater(s.value, g);
        return detail::into_positive<Real>((greater ? s * mean() : real(mean()) / s).value);
    }

    [[nodiscard]] constexpr Real shape() const noexcept { return this->param().shape; }
    /// The expectation: the parameter of that name.
    [[nodiscard]] constexpr double mean() const noexcept {
        return static_cast<double>(this->param().mean);
    }
    /// mean^3 / shape. It saturates at the ends of double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        const detail::scaled m = detail::split(mean());
        return (m * m * ratio_of(mean(), shape_())).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !detail::finite(x)) {
            return 0;
        }
        constexpr double root = 0x1.9884533d43651p-2; // 1 / sqrt(2 pi)
        return detail::or_zero(root_of_shape_over(x) * detail::split(root) *
                               detail::exp_scaled(-exponent_at(x)) *
                               detail::inverse(detail::split(x)));
    }
    /// P(X <= x), in the form that cancels nowhere: both of its terms are multiples of the
    /// density's exponential. (It has no quantile in closed form: with_boost_math.hpp.)
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0)) {
            return 0;
        }
        if (!detail::finite(x)) {
            return 1;
        }
        constexpr double root_half = 0x1.6a09e667f3bcdp-1; // sqrt(1/2)
        const detail::scaled root = root_of_shape_over(x) * detail::split(root_half);
        const double away = detail::magnitude((real(x) - mean()).value);
        const double near = away == 0 ? 0.0 : (root * over_mean(away)).value();
        const real far =
            (root * over_mean((real(x) * 0.5 + real(mean()) * 0.5).value) * detail::scaled{1, 1})
                .value();
        const detail::scaled power = detail::exp_scaled(-exponent_at(x)) * detail::scaled{1, -1};
        const real first = detail::erfc_scaled(near);
        const real second = detail::erfc_scaled(far.value);
        const real tail = x < mean() ? first + second : first - second;
        if (!(tail.value > 0)) {
            return x < mean() ? 0.0 : 1.0;
        }
        const double chance = detail::or_zero(power * detail::split(tail.value));
        return x < mean() ? chance : (real(1.0) - chance).value;
    }

private:
    static constexpr double widest = 0x1p400;

    constexpr double shape_() const noexcept { return static_cast<double>(shape()); }

    static constexpr detail::scaled ratio_of(double x, double y) noexcept {
        const detail::scaled top = detail::split(x);
        const detail::scaled below = detail::split(y);
        return {detail::held(top.factor / below.factor), top.exponent - below.exponent};
    }
    constexpr detail::scaled over_mean(double x) const noexcept {
        return detail::split(x) * detail::inverse(detail::split(mean()));
    }
    /// sqrt(shape / x).
    constexpr detail::scaled root_of_shape_over(double x) const noexcept {
        detail::scaled square = ratio_of(shape_(), x);
        if (square.exponent % 2 != 0) {
            square = {detail::held(square.factor * 2.0), square.exponent - 1};
        }
        return {detail::square_root(square.factor), square.exponent / 2};
    }
    /// shape (x - mean)^2 / (2 mean^2 x).
    constexpr double exponent_at(double x) const noexcept {
        const double away = detail::magnitude((real(x) - mean()).value);
        if (away == 0) {
            return 0;
        }
        const detail::scaled places = root_of_shape_over(x) * over_mean(away);
        return (places * places * detail::scaled{1, -1}).value();
    }
    /// mean / (2 shape); below 2^-400, where s always rounds to 1, given as that.
    static constexpr double spread_of(double mean, double shape) noexcept {
        const double half = (ratio_of(mean, shape) * detail::scaled{1, -1}).value();
        return half < 0x1p-400 ? 0x1p-400 : half;
    }

    /// True with the chance 1 / (1 + s).
    template <random_words G>
    static constexpr bool takes_greater(double s, G& g) {
        if (s > 0x1p32) [[unlikely]] {
            const double e = detail::standard_exponential(g);
            return e > detail::natural_log((real(s) + 1.0).value);
        }
        const std::uint64_t word = word64(g);
        return real(detail::open_unit(word)) * (real(s) + 1.0) < 1.0;
    }

    double spread_; // mean / (2 shape)
};

} // namespace leat

#endif
