// The normal law with a mean and a standard deviation, kept between lo and hi: the normal law of
// those parameters on condition that it falls there. Either end may be infinite.
//
// Domain: mean finite; sd finite and > 0, or 0 where lo < mean < hi (every draw is then the mean);
// lo < hi with a normal number between them; anything else throws invalid_parameter. Any distance
// of the interval from the mean, and any width, will do: draws are made from the end nearer to the
// mean, so that their digits are those of the interval. No draw is lo or hi. By region, in standard
// deviations, a the distance of an interval that does not hold the mean:
//   narrow: at most 2 and holds the mean, or      uniforms, accepted by an exponential       3.4
//     at most 1 (the mean length of a far tail)
//   wider, holds the mean                         normals until one falls inside             2.2
//   wider, a <= 1/4                               normals without their sign, likewise       1.8
//   wider, farther                                shifted exponentials of the best rate      3.2
// with the mean number of word64 a draw, at most; 128 trials, then engine_stuck (a chance below
// 2^-110). A float is computed as a double and rounded.
// Source: C. P. Robert, Simulation of truncated normal variables, Statistics and Computing 5, 1995;
// the ziggurats: Marsaglia and Tsang, J. Stat. Software 5(8), 2000.
// Not for values that pile up at a limit (clamp a normal draw instead).

#ifndef LEAT_DISTRIBUTIONS_TRUNCATED_NORMAL_HPP
#define LEAT_DISTRIBUTIONS_TRUNCATED_NORMAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/normal_mass.hpp"
#include "leat/distributions/detail/quadrature.hpp"
#include "leat/distributions/detail/truncated_normal_pieces.hpp" // the moments
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/unit.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class truncated_normal;

/// The parameters of `truncated_normal`.
template <detail::portable_real Real = double>
struct truncated_normal_parameters {
    using distribution_type = truncated_normal<Real>;
    static constexpr const char* law_name = "truncated_normal";

    Real mean = 0; ///< before the cut
    Real sd = 1;   ///< before the cut; > 0, or 0 where lo < mean < hi
    Real lo = -1;  ///< may be -infinity
    Real hi = 1;   ///< above lo; may be infinity

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const auto centre = static_cast<double>(mean);
        const auto spread = static_cast<double>(sd);
        const auto low = static_cast<double>(lo);
        const auto high = static_cast<double>(hi);
        constexpr Real infinity = std::numeric_limits<Real>::infinity();
        if (!detail::finite(centre)) {
            return {"mean", centre, "must be finite"};
        }
        if (!(lo < infinity)) {
            return {"lo", low, "must be below hi"};
        }
        if (!(hi > -infinity) || !(detail::normal_above(lo) <= -detail::normal_above(-hi))) {
            return {"hi", high, "must be above lo with a normal number between them"};
        }
        if (!detail::finite(spread) || !(spread > 0 || (spread == 0 && lo < mean && mean < hi))) {
            return {"sd", spread, "must be finite and > 0, or 0 where lo < mean < hi"};
        }
        return {};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
        visit("sd", self.sd);
        visit("lo", self.lo);
        visit("hi", self.hi);
    }
    friend constexpr bool operator==(const truncated_normal_parameters&,
                                     const truncated_normal_parameters&) = default;
};

/// The normal law between two ends.
template <detail::portable_real Real = double>
class truncated_normal
    : public detail::law<truncated_normal<Real>, truncated_normal_parameters<Real>> {
    using base = detail::law<truncated_normal, truncated_normal_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// The standard normal law between -1 and 1.
    constexpr truncated_normal() : truncated_normal(param_type{}) {}
    constexpr truncated_normal(detail::number auto mean, detail::number auto sd,
                               detail::number auto lo, detail::number auto hi)
        : truncated_normal(param_type{static_cast<Real>(mean), static_cast<Real>(sd),
                                      static_cast<Real>(lo), static_cast<Real>(hi)}) {}
    constexpr explicit truncated_normal(const param_type& p)
        : base(p), first_(detail::normal_above(p.lo)), last_(-detail::normal_above(-p.hi)) {
        prepare();
    }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        for (int trial = 0; trial < 128; ++trial) {
            switch (method_) {
            case method::point: {
                static_cast<void>(detail::standard_normal(g)); // as many words as ever
                return this->param().mean;
            }
            case method::normal: {
                const double z = detail::standard_normal(g);
                if (z > near_ && z < far_) {
                    return from_standard(z);
                }
                break;
            }
            case method::folded: {
                const double z = detail::magnitude(detail::standard_normal(g));
                if (z > near_ && z < far_) {
                    return from_standard(downwards_ ? -z : z);
                }
                break;
            }
            case method::narrow: {
                const std::uint64_t word = word64(g);
                const real u = detail::open_unit(word);
                const real e = detail::standard_exponential(g);
                if (e >= exponent_at((u * width_).value)) {
                    return from_near_end((u * step_).value);
                }
                break;
            }
            case method::far: {
                const real e = detail::standard_exponential(g);
                if (e.value > far_) {
                    break;
                }
                const real accept = detail::standard_exponential(g);
                if ((e - 1.0) * (e - 1.0) <= accept * near_) {
                    return from_near_end((e * step_).value);
                }
                break;
            }
            }
        }
        detail::stuck("truncated_normal");
    }

    [[nodiscard]] constexpr Real sd() const noexcept { return this->param().sd; }
    [[nodiscard]] constexpr Real lo() const noexcept { return this->param().lo; }
    [[nodiscard]] constexpr Real hi() const noexcept { return this->param().hi; }
    /// The expectation of a draw (the parameter of that name is param().mean).
    [[nodiscard]] constexpr double mean() const noexcept { return moments_of_draws().mean; }
    /// The variance of a draw, to 10 digits; like the mean by quadrature.
    [[nodiscard]] constexpr double variance() const noexcept { return moments_of_draws().variance; }
    /// The least and the greatest number that a draw can be.
    [[nodiscard]] constexpr Real min() const noexcept { return first_; }
    [[nodiscard]] constexpr Real max() const noexcept { return last_; }

    /// The probability density at x; of sd 0 the largest finite number at the mean.
    [[nodiscard]] constexpr double density(double x) const;
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const;
    /// The least x with cumulative(x) >= p, 0 < p < 1, found by bisection.
    [[nodiscard]] constexpr double quantile(double p) const;

private:
    enum class method : unsigned char { point, normal, folded, narrow, far };

    constexpr double centre() const noexcept { return static_cast<double>(this->param().mean); }
    constexpr double sd_() const noexcept { return static_cast<double>(sd()); }

    /// (x - y) / sd, whatever its size: perhaps infinite.
    constexpr double over_sd(double x, double y) const noexcept {
        if (!detail::finite(x) || !detail::finite(y)) {
            return x < y ? -std::numeric_limits<double>::infinity()
                         : std::numeric_limits<double>::infinity();
        }
        const double shrink = detail::magnitude(x) > 0x1p1000 || detail::magnitude(y) > 0x1p1000
                                  ? 0.25 // the difference might overflow
                                  : 1.0;
        const real difference = real(x) * shrink - real(y) * shrink;
        return (difference / sd_() / shrink).value;
    }

    /// The best rate of the exponential for the tail from `a` on: (a + sqrt(a^2 + 4)) / 2.
    static constexpr double tail_rate(double a) noexcept {
        if (a > 0x1p30) {
            return detail::into_positive<double>(a);
        }
        return ((real(a) + detail::square_root((real(a) * a + 4.0).value)) * 0.5).value;
    }

    constexpr void prepare() noexcept {
        const auto low = static_cast<double>(lo());
        const auto high = static_cast<double>(hi());
        if (sd() == 0) {
            method_ = method::point;
            return;
        }
        const double a = over_sd(low, centre());
        const double b = over_sd(high, centre());
        width_ = over_sd(high, low);
        holds_mean_ = a < 0 && b > 0;
        downwards_ = !holds_mean_ && b <= 0;
        near_end_ = downwards_ ? high : low;
        near_ = downwards_ ? -b : a;
        far_ = downwards_ ? -a : b;
        // Within these bounds high - low is finite.
        const bool is_narrow = holds_mean_     ? width_ <= 2 && sd_() < 0x1p1000
                               : near_ <= 0.25 ? width_ <= 1
                                               : real(tail_rate(near_)) * width_ <= 1.0;
        if (is_narrow) {
            method_ = method::narrow;
            step_ = (real(high) - low).value;
            return;
        }
        if (holds_mean_ || near_ <= 0.25) {
            method_ = holds_mean_ ? method::normal : method::folded;
            // sd z alone might overflow
            grow_ = detail::magnitude(centre()) > 0x1p1000 || sd_() > 0x1p1000 ? 64.0 : 1.0;
            near_end_ = (real(centre()) / grow_).value;
            step_ = (real(sd_()) / grow_).value;
            return;
        }
        method_ = method::far;
        const real rate = tail_rate(near_);
        step_ = detail::into_positive<double>((real(sd_()) / rate).value);
        far_ = (rate * width_).value;
        near_ = (rate * rate * 2.0).value; // a trial e is accepted by (e - 1)^2 <= near accept
    }

    /// Minus the logarithm of the density a distance v from the near end, over its greatest value.
    constexpr double exponent_at(double v) const noexcept {
        const real x = v;
        if (holds_mean_) {
            return ((x + near_) * (x + near_) * 0.5).value;
        }
        return (x * (x * 0.5 + near_)).value;
    }

    constexpr Real from_standard(double z) const noexcept {
        const real x = real(near_end_) + real(step_) * z;
        return inside((x * grow_).value);
    }
    constexpr Real from_near_end(double distance) const noexcept {
        const real end = near_end_;
        return inside((downwards_ ? end - distance : end + distance).value);
    }
    constexpr Real inside(double x) const noexcept {
        const Real rounded = detail::into_signed<Real>(x);
        return rounded < first_ ? first_ : rounded > last_ ? last_ : rounded;
    }

    constexpr detail::moments moments_of_draws() const noexcept;

    /// A distance in sd, kept where its square means something.
    static constexpr double kept(double distance) noexcept {
        return distance > 0x1p400 ? 0x1p400 : distance;
    }
    /// Of an interval that does not hold the mean: how far it is from there.
    constexpr double gap() const noexcept {
        return downwards_ ? kept(over_sd(centre(), static_cast<double>(hi())))
                          : kept(over_sd(static_cast<double>(lo()), centre()));
    }
    /// The mass of the interval, in units of exp(-gap^2 / 2).
    constexpr double whole_mass() const noexcept {
        if (!holds_mean_) {
            return detail::normal_mass(gap(), kept(width_));
        }
        return (real(detail::normal_mass(0, kept(over_sd(centre(), static_cast<double>(lo()))))) +
                detail::normal_mass(0, kept(over_sd(static_cast<double>(hi()), centre()))))
            .value;
    }

    // What these mean depends on the method: see prepare().
    double near_ = 0;
    double far_ = 0;
    double width_ = 0;
    double step_ = 0;
    double near_end_ = 0;
    double grow_ = 1;
    Real first_;
    Real last_;
    method method_ = method::point;
    bool holds_mean_ = false;
    bool downwards_ = false;
};

template <detail::portable_real Real>
constexpr double truncated_normal<Real>::density(double x) const {
    detail::number_or_refuse(param_type::law_name, x);
    if (sd() == 0) {
        return x == centre() ? std::numeric_limits<double>::max() : 0.0;
    }
    const auto low = static_cast<double>(lo());
    const auto high = static_cast<double>(hi());
    if (!(x > low && x < high)) {
        return 0;
    }
    const double height =
        holds_mean_
            ? detail::normal_fall(0, kept(detail::magnitude(over_sd(x, centre()))))
            : detail::normal_fall(gap(), kept(downwards_ ? over_sd(high, x) : over_sd(x, low)));
    if (height == 0) {
        return 0;
    }
    return detail::or_zero(detail::split(height) *
                           detail::inverse(detail::split(whole_mass()) * detail::split(sd_())));
}

template <detail::portable_real Real>
constexpr double truncated_normal<Real>::cumulative(double x) const {
    detail::number_or_refuse(param_type::law_name, x);
    const auto low = static_cast<double>(lo());
    const auto high = static_cast<double>(hi());
    if (sd() == 0) {
        return x < centre() ? 0.0 : 1.0;
    }
    if (!(x > low)) {
        return 0;
    }
    if (!(x < high)) {
        return 1;
    }
    real below = 0.0;
    if (!holds_mean_) {
        const double a = gap();
        const double v = kept(downwards_ ? over_sd(high, x) : over_sd(x, low));
        below = downwards_ ? real(detail::normal_fall(a, v)) *
                                 detail::normal_mass((real(a) + v).value, kept(over_sd(x, low)))
                           : real(detail::normal_mass(a, v));
    } else {
        const double z = kept(detail::magnitude(over_sd(x, centre())));
        below = x < centre() ? real(detail::normal_fall(0, z)) *
                                   detail::normal_mass(z, kept(over_sd(x, low)))
                             : real(detail::normal_mass(0, kept(over_sd(centre(), low)))) +
                                   detail::normal_mass(0, z);
    }
    const double chance = (below / whole_mass()).value;
    return chance < std::numeric_limits<double>::min() ? 0.0 : chance > 1 ? 1.0 : chance;
}

template <detail::portable_real Real>
constexpr double truncated_normal<Real>::quantile(double p) const {
    detail::chance_or_refuse(param_type::law_name, p);
    if (sd() == 0) {
        return centre();
    }
    const double x =
        detail::quantile_by_bisection(static_cast<double>(first_), static_cast<double>(last_), p,
                                      [this](double y) { return cumulative(y); });
    return detail::into_signed<double>(x);
}

template <detail::portable_real Real>
constexpr detail::moments truncated_normal<Real>::moments_of_draws() const noexcept {
    if (sd() == 0) {
        return {centre(), 0};
    }
    const auto low = static_cast<double>(lo());
    const auto high = static_cast<double>(hi());
    const detail::normal_piece piece =
        holds_mean_ ? detail::middle_piece(over_sd(low, centre()), over_sd(high, centre()))
                    : detail::far_piece(
                          downwards_ ? over_sd(centre(), high) : over_sd(low, centre()), width_);
    const detail::scaled span = detail::split(piece.length) * detail::split(sd_());
    const double variance = (span * span * detail::split(piece.on_unit.variance)).value();
    if (holds_mean_) {
        const real mean = real(piece.from) + real(piece.length) * piece.on_unit.mean;
        return {static_cast<double>(inside((real(centre()) + mean * sd_()).value)), variance};
    }
    const double step = (span * detail::split(piece.on_unit.mean)).value();
    const real end = downwards_ ? high : low;
    return {static_cast<double>(inside((downwards_ ? end - step : end + step).value)), variance};
}

} // namespace leat

#endif
