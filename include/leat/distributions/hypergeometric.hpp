// The hypergeometric law: how many of `draws` things taken at random, without replacement, from a
// population of which `successes` are marked, are marked themselves.
//
//   leat::hypergeometric found{1000, 300, 100};      // population, successes, draws
//
// Domain: population in 0 .. 2^53 (and of the law's integer type), successes and draws in 0 ..
// population; anything else throws invalid_parameter.
// By symmetry at most half the population is marked and at most half is drawn; where it is not, the
// others are counted. Then, for a mean below 10, inversion on the thresholds of
// detail/discrete_inversion.hpp: one word64 a draw. Else ratio of uniforms with a table-mountain
// hat (HRUA): two word64 a trial, 2.7 to 3.9 on average, at most 110 trials (a chance below
// 2^-100), then engine_stuck. Masses are sums of four terms in deviance form, one for each cell of
// the table of marked and drawn, so that a population of 2^53 is as exact as one of a hundred.
// Source: E. Stadlober, The ratio of uniforms approach for generating discrete random variates,
// J. Comput. Appl. Math. 31, 1990; C. Loader, 2000 (see detail/discrete_deviance.hpp).
// Not for which things are drawn (sample_without_replacement), nor with replacement (binomial).

#ifndef LEAT_DISTRIBUTIONS_HYPERGEOMETRIC_HPP
#define LEAT_DISTRIBUTIONS_HYPERGEOMETRIC_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/distributions/detail/discrete_hypergeometric.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp" // fill_one_by_one
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"

#include <cstdint>
#include <span>

namespace leat {

template <detail::number_integer Int>
class hypergeometric;

/// The parameters of `hypergeometric`.
template <detail::number_integer Int = std::int64_t>
struct hypergeometric_parameters {
    using distribution_type = hypergeometric<Int>;
    static constexpr const char* law_name = "hypergeometric";

    Int population = 2; ///< all there are, >= 0
    Int successes = 1;  ///< those that count, 0 to population
    Int draws = 1;      ///< how many are drawn, 0 to population

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const detail::fault found = detail::unless_count("population", population);
        return detail::first_of(found, detail::first_of(within_population("successes", successes),
                                                        within_population("draws", draws)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("population", self.population);
        visit("successes", self.successes);
        visit("draws", self.draws);
    }
    friend constexpr bool operator==(const hypergeometric_parameters&,
                                     const hypergeometric_parameters&) = default;

private:
    constexpr detail::fault within_population(const char* parameter, Int n) const noexcept {
        return n >= 0 && n <= population
                   ? detail::fault{}
                   : detail::fault{parameter, static_cast<double>(n),
                                   "must be >= 0 and not above the population"};
    }
};

/// The hypergeometric law.
template <detail::number_integer Int = std::int64_t>
class hypergeometric : public detail::law<hypergeometric<Int>, hypergeometric_parameters<Int>> {
    using base = detail::law<hypergeometric, hypergeometric_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// One of two, of which one is marked.
    constexpr hypergeometric() : hypergeometric(param_type{}) {}
    constexpr hypergeometric(detail::number_integer auto population,
                             detail::number_integer auto successes,
                             detail::number_integer auto draws)
        : hypergeometric(
              param_type{detail::to_integer<Int>(param_type::law_name, "population", population),
                         detail::to_integer<Int>(param_type::law_name, "successes", successes),
                         detail::to_integer<Int>(param_type::law_name, "draws", draws)}) {}
    constexpr explicit hypergeometric(const param_type& p)
        : base(p),
          counts_(static_cast<double>(p.population),
                  static_cast<double>(rarer(p.population, p.successes)),
                  static_cast<double>(rarer(p.population, p.draws))) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        return from_rarer(counts_.draw(g));
    }
    /// For fills: the draws of the loop, by tables.
    template <class Words>
    constexpr void fill_from_words(std::span<Int> out, Words& words) const {
        if (out.size() < detail::worth_a_table) {
            detail::fill_one_by_one(out, *this, words);
        } else {
            counts_.fill(out, words, [this](std::uint64_t k) { return from_rarer(k); });
        }
    }

    [[nodiscard]] constexpr Int population() const noexcept { return this->param().population; }
    [[nodiscard]] constexpr Int successes() const noexcept { return this->param().successes; }
    [[nodiscard]] constexpr Int draws() const noexcept { return this->param().draws; }
    /// draws * successes / population; 0 for an empty population.
    [[nodiscard]] constexpr double mean() const noexcept {
        return population() == 0 ? 0.0 : (drawn() * (marked() / all())).value;
    }
    /// The binomial law's, times (population - draws) / (population - 1).
    [[nodiscard]] constexpr double variance() const noexcept {
        return population() <= 1 ? 0.0
                                 : (drawn() * (marked() / all()) * ((all() - marked()) / all()) *
                                    ((all() - drawn()) / (all() - 1.0)))
                                       .value;
    }
    /// The mass at x: 0 but for whole x in min() .. max().
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= static_cast<double>(min()) && x <= static_cast<double>(max())) ||
            !detail::whole(x)) {
            return 0;
        }
        if (min() == max()) {
            return 1;
        }
        const std::uint64_t k = to_rarer(static_cast<std::uint64_t>(x));
        return detail::or_zero(detail::exp_scaled(counts_.log_mass(static_cast<double>(k))));
    }
    /// How many marked ones there must be, since no more than the others can be left out.
    [[nodiscard]] constexpr Int min() const noexcept {
        const Int left = static_cast<Int>(population() - draws());
        return successes() > left ? static_cast<Int>(successes() - left) : Int{0};
    }
    [[nodiscard]] constexpr Int max() const noexcept {
        return successes() < draws() ? successes() : draws();
    }

private:
    static constexpr bool flips(Int population, Int n) noexcept { return n > population / 2; }
    static constexpr Int rarer(Int population, Int n) noexcept {
        return flips(population, n) ? static_cast<Int>(population - n) : n;
    }
    // The count of marked and drawn from that of what is rarer of each pair, and back.
    constexpr Int from_rarer(std::uint64_t k) const noexcept {
        if (flips(population(), successes())) {
            k = static_cast<std::uint64_t>(rarer(population(), draws())) - k;
        }
        if (flips(population(), draws())) {
            k = static_cast<std::uint64_t>(successes()) - k;
        }
        return static_cast<Int>(k);
    }
    constexpr std::uint64_t to_rarer(std::uint64_t k) const noexcept {
        if (flips(population(), draws())) {
            k = static_cast<std::uint64_t>(successes()) - k;
        }
        if (flips(population(), successes())) {
            k = static_cast<std::uint64_t>(rarer(population(), draws())) - k;
        }
        return k;
    }
    constexpr real all() const noexcept { return static_cast<double>(population()); }
    constexpr real marked() const noexcept { return static_cast<double>(successes()); }
    constexpr real drawn() const noexcept { return static_cast<double>(draws()); }

    detail::hypergeometric_counts counts_;
};

} // namespace leat

#endif
