// The Erlang law with a whole number k and a rate: the sum of k independent exponential times of
// that rate; service in k stages, the k-th event of a Poisson process.
//
// Domain: k a whole number from 1 to 2^53, rate finite and > 0; anything else throws
// invalid_parameter. A draw is a gamma variate of shape k over the rate and consumes, on average,
// 1.03 word64 for k = 1, 2.06 for 2, at most 2.2 from there on, however large k is. Throws
// engine_stuck as `gamma` does. Results out of range are given as the smallest normal and the
// largest finite number. A float is computed as a double and rounded.
// Source: detail/unit_gamma.hpp; Marsaglia and Tsang, ACM TOMS 26(3), 2000.
// Not for a number of stages that is not whole (gamma).

#ifndef LEAT_DISTRIBUTIONS_ERLANG_HPP
#define LEAT_DISTRIBUTIONS_ERLANG_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/unit_gamma.hpp"
#include "leat/distributions/gamma.hpp"

#include <concepts>
#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class erlang;

/// The parameters of `erlang`.
template <detail::portable_real Real = double>
struct erlang_parameters {
    using distribution_type = erlang<Real>;
    static constexpr const char* law_name = "erlang";
    /// What messages say of k.
    static constexpr const char* allowed_k = "must be a whole number from 1 to 2^53";

    std::int64_t k = 1; ///< events waited for, 1 to 2^53
    Real rate = 1;      ///< events per unit of time, > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (k < 1 || k > std::int64_t{1} << 53) {
            return {"k", static_cast<double>(k), allowed_k};
        }
        return detail::unless_positive("rate", static_cast<double>(rate));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("k", self.k);
        visit("rate", self.rate);
    }
    friend constexpr bool operator==(const erlang_parameters&, const erlang_parameters&) = default;
};

/// The Erlang law.
template <detail::portable_real Real = double>
class erlang : public detail::law<erlang<Real>, erlang_parameters<Real>> {
    using base = detail::law<erlang, erlang_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// One stage of rate 1.
    constexpr erlang() : erlang(param_type{}) {}
    /// k may be of any type, but must be whole.
    constexpr erlang(detail::number auto k, detail::number auto rate)
        : erlang(param_type{whole(k), static_cast<Real>(rate)}) {}
    constexpr explicit erlang(const param_type& p)
        : base(p), gamma_(static_cast<double>(p.k)), rate_(static_cast<double>(p.rate)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const detail::gamma_pieces x = gamma_(g); // k >= 1: nothing drops
        return detail::into_positive<Real>((real(gamma_.unit) * x.factor / rate_).value);
    }

    [[nodiscard]] constexpr std::int64_t k() const noexcept { return this->param().k; }
    [[nodiscard]] constexpr Real rate() const noexcept { return this->param().rate; }
    /// k / rate. Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept {
        return (stages() * scaled_mean()).value();
    }
    /// k / rate^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        return (stages() * scaled_mean() * scaled_mean()).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// gamma function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !detail::finite(x)) {
            return 0;
        }
        return detail::or_zero(
            detail::gamma_density(static_cast<double>(k()), detail::quotient(1, rate_), x));
    }

private:
    template <class T>
    static constexpr std::int64_t whole(T k) {
        bool fits = false;
        if constexpr (std::integral<T>) {
            fits = k >= 1 && static_cast<std::uint64_t>(k) <= std::uint64_t{1} << 53;
        } else {
            fits = k >= 1 && k <= static_cast<T>(0x1p53) &&
                   static_cast<T>(static_cast<std::int64_t>(k)) == k;
        }
        if (!fits) {
            detail::refuse(param_type::law_name, "k", static_cast<double>(k),
                           param_type::allowed_k);
        }
        return static_cast<std::int64_t>(k);
    }
    constexpr detail::scaled stages() const noexcept {
        return detail::split(static_cast<double>(k()));
    }
    constexpr detail::scaled scaled_mean() const noexcept { // of one stage
        const detail::scaled parts = detail::split(rate_);
        return {detail::held(1.0 / parts.factor), -parts.exponent};
    }

    detail::unit_gamma gamma_;
    double rate_;
};

} // namespace leat

#endif
