// The geometric law: the number of failures before the first success of trials that each succeed
// with chance p; mass p (1 - p)^k, k = 0, 1, 2, ...
//
// Domain: 0 < p <= 1, and such that a draw passes the integer type with a chance of at most 2^-64,
// (1 - p)^(max + 1) <= 2^-64: for std::int64_t p >= 4.9e-18. Anything else throws
// invalid_parameter. p = 1 gives 0.
//
// Method: floor(E / rate) with E a standard exponential and rate = -ln(1 - p). Exponentials come in
// steps of up to 2^-49, so that for p >= 2^-24 each value's chance is right to 2^-24 of itself, and
// each chance of a value above k to about 2^-50. For smaller p such steps would span values, so a
// draw is put together from q 2^m + r: q a geometric number of blocks of 2^m values, from an
// exponential in the same way, and independently r uniform on a block, accepted with the chance
// (1 - p)^r, which a second exponential decides. m is such that this is above 77 %.
// Words consumed: 1.03 word64 on average, for p < 2^-24 about 3.5; engine_stuck after 64 trials (a
// chance below 2^-130). Draws beyond the type, so rare (see above), are given as its largest value.
// Source: L. Devroye, Non-Uniform Random Variate Generation, Springer 1986, X.2; the split: by
// the lack of memory.
// Not for the trial that succeeds, which is one more.

#ifndef LEAT_DISTRIBUTIONS_GEOMETRIC_HPP
#define LEAT_DISTRIBUTIONS_GEOMETRIC_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::number_integer Int>
class geometric;

/// The parameter of `geometric`.
template <detail::number_integer Int = std::int64_t>
struct geometric_parameters {
    using distribution_type = geometric<Int>;
    static constexpr const char* law_name = "geometric";

    double p = 0.5; ///< the chance of success, above 0, at most 1

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (!(p > 0 && p <= 1)) {
            return {"p", p, "must be > 0 and <= 1"};
        }
        using real = detail::strict<double>;
        const real values = real(static_cast<double>(detail::largest<Int>)) + 1.0;
        if (values * p < detail::smallest_refused_log && // or the logarithm is needless
            p < 1 && values * -real(detail::log_one_plus(-p)) < detail::smallest_refused_log) {
            return {"p", p,
                    "must be so large that a draw passes the integer type with a chance of at "
                    "most 2^-64"};
        }
        return {};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("p", self.p);
    }
    friend constexpr bool operator==(const geometric_parameters&,
                                     const geometric_parameters&) = default;
};

/// The geometric law.
template <detail::number_integer Int = std::int64_t>
class geometric : public detail::law<geometric<Int>, geometric_parameters<Int>> {
    using base = detail::law<geometric, geometric_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// p = 1/2.
    constexpr geometric() : geometric(param_type{}) {}
    constexpr explicit geometric(detail::number auto p)
        : geometric(param_type{static_cast<double>(p)}) {}
    constexpr explicit geometric(const param_type& p) : base(p), rate_(rate_of(p.p)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        const double e = detail::standard_exponential(g);
        return split() ? in_blocks(g, e) : from_standard(e);
    }
    /// For fills: the draw whose first 64-bit word is `word`, where that is accepted at once.
    constexpr bool from_word(std::uint64_t word, Int& x) const noexcept {
        double e = 0;
        const bool accepted = detail::exponential_at_once(word, e);
        x = from_standard(e);
        return accepted && !split();
    }

    [[nodiscard]] constexpr double p() const noexcept { return this->param().p; }
    /// (1 - p) / p.
    [[nodiscard]] constexpr double mean() const noexcept { return ((real(1.0) - p()) / p()).value; }
    /// (1 - p) / p^2.
    [[nodiscard]] constexpr double variance() const noexcept { return (real(mean()) / p()).value; }
    /// The mass at x: 0 but for whole x >= 0.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0) || !detail::finite(x) || !detail::whole(x)) {
            return 0;
        }
        if (p() == 1) {
            return x == 0 ? 1 : 0;
        }
        const detail::scaled all_fail = detail::exp_scaled((real(x) * -real(rate_)).value);
        return detail::or_zero(detail::split(p()) * all_fail);
    }
    /// The chance of a draw of at most x.
    [[nodiscard]] constexpr double cumulative(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0)) {
            return 0;
        }
        if (p() == 1 || !(x < 0x1p63)) {
            return 1; // all p of the domain have it
        }
        const real trials = real(static_cast<double>(static_cast<std::int64_t>(x))) + 1.0;
        return (-real(detail::exp_minus_one((trials * -real(rate_)).value))).value;
    }
    /// The least k with cumulative(k) >= chance.
    [[nodiscard]] constexpr double quantile(double chance) const {
        detail::chance_or_refuse(param_type::law_name, chance);
        const real trials = -real(detail::log_one_plus(-chance)) / rate_;
        double k = static_cast<double>(detail::floor_at_most(trials.value, detail::largest<Int>));
        // Rounding puts the quotient on either side of a whole number.
        while (k > 0 && cumulative(k - 1) >= chance) {
            k = detail::held(k - 1);
        }
        if (cumulative(k) < chance) {
            k = detail::held(k + 1);
        }
        return k;
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    [[nodiscard]] static constexpr Int max() noexcept { return std::numeric_limits<Int>::max(); }

private:
    static constexpr double rate_of(double p) noexcept {
        return p == 1 ? std::numeric_limits<double>::infinity()
                      : (-real(detail::log_one_plus(-p))).value;
    }
    constexpr bool split() const noexcept { return p() < 0x1p-24; }
    [[gnu::always_inline]] constexpr Int from_standard(double e) const noexcept {
        return static_cast<Int>(
            detail::floor_at_most(detail::held(e / rate_), detail::largest<Int>));
    }

    /// The draw whose number of blocks `e` gives.
    template <random_words G>
    [[gnu::noinline]] constexpr Int in_blocks(G& g, double e) const {
        const detail::scaled parts = detail::split(rate_);
        const auto m = static_cast<int>(-3 - parts.exponent); // rate 2^m in [1/8, 1/4)
        const real blocks = detail::held(e / detail::scaled{parts.factor, -3}.value());
        const std::uint64_t q = static_cast<std::uint64_t>(blocks.value);
        for (int trial = 0; trial < 64; ++trial) {
            const std::uint64_t word = word64(g);
            const std::uint64_t r = word >> (64 - m);
            const double bar = detail::standard_exponential(g);
            if (bar > (real(static_cast<double>(r)) * rate_).value) {
                const std::uint64_t most = detail::largest<Int>;
                return static_cast<Int>(q > ((most - r) >> m) ? most : (q << m) + r);
            }
        }
        detail::stuck(param_type::law_name);
    }

    double rate_;
};

} // namespace leat

#endif
