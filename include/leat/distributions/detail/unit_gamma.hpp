// Gamma variates of scale 1 for the laws made of them: chi-squared, Student's t, Fisher's F, beta,
// Erlang.
//
// A variate comes in pieces, unit * factor * e^-drop, so that ratios and products of several stay
// in range whatever the shapes: `unit` is the shape where that is at least 1 (the factor then has
// the mean 1) and 1 below.
//
// Shapes 1/2, 1, 3/2 and 2 are sums of half a squared normal and exponentials: 1.03 to 2.07 word64
// on average. Others are Marsaglia and Tsang's, with the boost in logarithms below 1: see
// `gamma`; 2.1 word64 from shape 1 on, 3.2 below. A normal or exponential below 2^-8 (one in 321,
// one in 257) is drawn again on that condition, by a logarithm that is exponential: steps of
// 2^-53 would end the tails of t and F, which the reciprocals of these variates make.
// Source: Marsaglia and Tsang, ACM TOMS 26(3), 2000; the sums: N. L. Johnson, S. Kotz and N.
// Balakrishnan, Continuous Univariate Distributions 1, 2nd ed. 1994, ch. 17 and 18.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_UNIT_GAMMA_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_UNIT_GAMMA_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/distributions/gamma.hpp" // gamma_from_one

namespace leat::detail {

/// A gamma variate over its unit: factor * e^-drop, drop >= 0.
struct gamma_pieces {
    double factor;
    double drop;
};

/// The gamma law of a shape, normal and positive, and scale 1.
class unit_gamma {
public:
    constexpr explicit unit_gamma(double shape) noexcept
        : unit(shape < 1 ? 1.0 : shape),
          core_(shape < 1 ? held(shape + 1.0) : shape),
          shape_(shape),
          halves_(shape == 0.5   ? 1
                  : shape == 1   ? 2
                  : shape == 1.5 ? 3
                  : shape == 2   ? 4
                                 : 0),
          per_unit_(held((halves_ == 0 ? core_.d : 1.0) / unit)) {}

    double unit;

    /// Whether every drop is 0.
    [[nodiscard]] constexpr bool never_drops() const noexcept {
        return shape_ >= 1 || halves_ != 0;
    }

    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr gamma_pieces operator()(G& g) const {
        using real = strict<double>;
        if (halves_ != 0) {
            return {sum_of_halves(g), 0};
        }
        const real factor = real(core_.factor(g)) * per_unit_;
        if (shape_ >= 1) {
            return {factor.value, 0};
        }
        const real e = standard_exponential(g);
        return {factor.value, (e / shape_).value};
    }

private:
    /// A variate below 2^-8 whose density falls from 0 on as e^-fall(x): 2^-8 times a uniform
    /// e^-e, which has no least step, accepted by an exponential.
    template <random_words G, class Fall>
    [[gnu::noinline]] static constexpr double near_zero(G& g, Fall fall) {
        using real = strict<double>;
        for (int trial = 0; trial < ziggurat_trials; ++trial) {
            const double e = standard_exponential(g);
            const double wait = standard_exponential(g);
            const real x = real(0x1p-8) * natural_exp(-e);
            if (wait > fall(x).value) {
                return x.value;
            }
        }
        stuck("gamma");
    }

    template <random_words G>
    constexpr double sum_of_halves(G& g) const {
        using real = strict<double>;
        real sum = 0.0;
        if (halves_ % 2 != 0) {
            real z = standard_normal(g);
            if (halves_ == 1 && magnitude(z.value) < 0x1p-8) [[unlikely]] {
                z = near_zero(g, [](real x) { return x * x * 0.5; });
            }
            sum = z * z * 0.5;
        }
        if (halves_ >= 2) {
            real e = standard_exponential(g);
            if (halves_ == 2 && e < 0x1p-8) [[unlikely]] {
                e = near_zero(g, [](real x) { return x; });
            }
            sum = sum + e;
        }
        if (halves_ == 4) {
            const real e = standard_exponential(g);
            sum = sum + e;
        }
        return (sum * per_unit_).value;
    }

    gamma_from_one core_;
    double shape_;
    int halves_; // twice the shape, where the variate is a sum
    double per_unit_;
};

} // namespace leat::detail

#endif
