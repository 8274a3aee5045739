// The Poisson law: the number of events in a time in which `mean` of them are expected; mass
// mean^k e^-mean / k!, k = 0, 1, 2, ...
//
//   leat::poisson arrivals{4.5};      std::int64_t k = arrivals(g);
//   leat::poisson<int>{4.5};
//
// Domain: mean >= 0, and such that a draw passes the integer type with a chance of at most 2^-64;
// for std::int64_t some 9.2e18. Anything else throws invalid_parameter. Mean 0 gives 0.
// A draw consumes one word64 below a mean of 10 (inversion; small words are large values), else two
// a trial, 2.3 to 2.7 on average; engine_stuck after 64 trials. Methods, exactness and sources:
// detail/discrete_poisson.hpp and detail/discrete_inversion.hpp. Where a draw would pass the type's
// largest value it is that value (inversion) or is not made (rejection).
// Constructing costs an exponential function or a square root: cheap enough for one an event.
// Not for counts whose variance differs from their mean (negative_binomial, binomial).

#ifndef LEAT_DISTRIBUTIONS_POISSON_HPP
#define LEAT_DISTRIBUTIONS_POISSON_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp"
#include "leat/distributions/detail/discrete_poisson.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"

#include <cstdint>
#include <limits>
#include <span>

namespace leat {

template <detail::number_integer Int>
class poisson;

namespace detail {

/// Whether a Poisson count passes max with a chance of at most 2^-64.
constexpr bool poisson_fits(double mean, std::uint64_t max) noexcept {
    using real = strict<double>;
    const auto largest_count = static_cast<double>(max);
    if (real(2.0) * mean + 200.0 <= largest_count) { // by Chernoff's bound
        return true;
    }
    if (!(mean < largest_count)) {
        return false;
    }
    const real next = real(largest_count) + 1.0;
    // The masses from `next` on fall at least as fast as a geometric series, and nearly so.
    const real log_chance = real(log_poisson_mass(next.value, mean, (next - mean).value)) -
                            natural_log((real(1.0) - real(mean) / (next + 1.0)).value);
    return log_chance <= -smallest_refused_log;
}

} // namespace detail

/// The parameter of `poisson`.
template <detail::number_integer Int = std::int64_t>
struct poisson_parameters {
    using distribution_type = poisson<Int>;
    static constexpr const char* law_name = "poisson";

    double mean = 1; ///< >= 0

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const detail::fault found = detail::unless_non_negative("mean", mean);
        if (found.parameter == nullptr && !detail::poisson_fits(mean, detail::largest<Int>)) {
            return {"mean", mean,
                    "must be so small that a draw passes the integer type with a chance of at "
                    "most 2^-64"};
        }
        return found;
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
    }
    friend constexpr bool operator==(const poisson_parameters&,
                                     const poisson_parameters&) = default;
};

/// The Poisson law.
template <detail::number_integer Int = std::int64_t>
class poisson : public detail::law<poisson<Int>, poisson_parameters<Int>> {
    using base = detail::law<poisson, poisson_parameters<Int>>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// Mean 1.
    constexpr poisson() : poisson(param_type{}) {}
    constexpr explicit poisson(detail::number auto mean)
        : poisson(param_type{static_cast<double>(mean)}) {}
    constexpr explicit poisson(const param_type& p) : base(p), counts_(p.mean) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        return static_cast<Int>(counts_.draw(g, detail::largest<Int>, param_type::law_name));
    }
    /// For fills: the draws of the loop, by tables.
    template <class Words>
    constexpr void fill_from_words(std::span<Int> out, Words& words) const {
        if (out.size() < detail::worth_a_table) {
            detail::fill_one_by_one(out, *this, words);
        } else {
            counts_.fill(out, words, detail::largest<Int>, param_type::law_name,
                         [](std::uint64_t k) { return static_cast<Int>(k); });
        }
    }

    [[nodiscard]] constexpr double mean() const noexcept { return this->param().mean; }
    /// The mean again.
    [[nodiscard]] constexpr double variance() const noexcept { return mean(); }
    /// The mass at x: 0 but for whole x >= 0.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0) || !detail::finite(x) || !detail::whole(x)) {
            return 0;
        }
        if (mean() == 0) {
            return x == 0 ? 1 : 0;
        }
        return detail::or_zero(
            detail::exp_scaled(detail::log_poisson_mass(x, mean(), detail::held(x - mean()))));
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    [[nodiscard]] static constexpr Int max() noexcept { return std::numeric_limits<Int>::max(); }

private:
    detail::poisson_counts counts_;
};

} // namespace leat

#endif
