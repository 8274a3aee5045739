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
#include "leat/core/error_free.hpp" // two_product
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

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

    Int population = 2;
    Int successes = 1;
    Int draws = 1;

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const detail::fault found = detail::unless_count("population", population);
        return detail::first_of(found, detail::first_of(within_population("successes", successes),
                                                        within_population("draws", draws)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit(self.population);
        visit(self.successes);
        visit(self.draws);
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

namespace detail {

/// The ratio of successive masses.
struct hypergeometric_ratio {
    double marked_and_one;
    double drawn_and_one;
    double neither; // when none of the drawn is marked
    constexpr double operator()(std::uint64_t k) const noexcept {
        using real = strict<double>;
        const real count = static_cast<double>(k);
        return ((real(marked_and_one) - count) * reciprocal(k) *
                ((real(drawn_and_one) - count) / (count + neither)))
            .value;
    }
};

/// Hypergeometric counts where at most half is marked and at most half is drawn.
class hypergeometric_counts {
    using real = strict<double>;

public:
    static constexpr double smallest_rejection_mean = 10;

    constexpr hypergeometric_counts(double population, double marked, double drawn) noexcept
        : marked_(marked), drawn_(drawn), neither_((real(population) - marked - drawn).value) {
        if (population == 0) {
            return;
        }
        // The mean, marked * drawn / population, as a whole number and a fraction: the remainder of
        // the division is exact but for its last bits.
        const two_part product = two_product(marked, drawn);
        whole_ = static_cast<std::uint64_t>((real(product.high) / population).value);
        const two_part divided = two_product(static_cast<double>(whole_), population);
        fraction_ =
            (((real(product.high) - divided.high) + (real(product.low) - divided.low)) / population)
                .value;
        mean_ = (real(static_cast<double>(whole_)) + fraction_).value;
        if (inverts()) {
            first_ = first_threshold::from_log_mass(log_mass_of_none(population));
            return;
        }
        const real variance = real(mean_) * ((real(population) - marked) / population) *
                              ((real(population) - drawn) / (real(population) - 1.0));
        width_ = (real(0x1.b72cd3f331398p+0) * square_root((variance + 0.5).value) + // 2 sqrt(2/e)
                  0x1.cc3ebd3bc711ap-1) // 3 - 2 sqrt(3/e)
                     .value;
        const real mode = (real(marked) + 1.0) / (real(population) + 2.0) * (real(drawn) + 1.0);
        const auto from_whole = floor_to_integer((mode - static_cast<double>(whole_)).value);
        log_mode_ = log_of_cells(static_cast<double>(whole_) + static_cast<double>(from_whole),
                                 held(static_cast<double>(from_whole) - fraction_));
    }

    [[nodiscard]] constexpr bool inverts() const noexcept {
        return mean_ < smallest_rejection_mean;
    }
    /// The thresholds, where it inverts.
    [[nodiscard]] constexpr threshold_walk<hypergeometric_ratio> thresholds() const noexcept {
        return {first_, {held(marked_ + 1.0), held(drawn_ + 1.0), neither_}};
    }
    [[nodiscard]] constexpr std::uint64_t most() const noexcept {
        return static_cast<std::uint64_t>(marked_ < drawn_ ? marked_ : drawn_);
    }

    template <random_words G>
    [[nodiscard]] constexpr std::uint64_t draw(G& g) const {
        if (inverts()) {
            const std::uint64_t word = word64(g);
            const std::uint64_t k = thresholds()(word);
            return k < most() ? k : most();
        }
        const offsets_from counts(whole_, most());
        for (int trial = 0; trial < 110; ++trial) {
            const std::uint64_t first = word64(g);
            const std::uint64_t second = word64(g);
            const real x = open_unit(first);
            const real y = real(open_unit(second)) - 0.5;
            const real place = real(fraction_) + 0.5 + real(width_) * y / x;
            std::uint64_t k = 0;
            std::int64_t offset = 0;
            if (!counts.floor(place.value, offset, k)) {
                continue;
            }
            // Accepted where x^2 is at most the mass, as a share of the mode's.
            const real log_share =
                real(log_of_cells(static_cast<double>(k),
                                  held(static_cast<double>(offset) - fraction_))) -
                log_mode_;
            if (x * (real(4.0) - x) - 3.0 <= log_share) {
                return k;
            }
            if (x * (x - log_share) >= 1) {
                continue;
            }
            if (real(2.0) * natural_log(x.value) <= log_share) {
                return k;
            }
        }
        stuck("hypergeometric");
    }

    /// The logarithm of the mass at k, where the population is not 0.
    [[nodiscard]] constexpr double log_mass(double k) const noexcept {
        const real difference = (real(k) - static_cast<double>(whole_)) - fraction_;
        const real rest_marked = real(neither_) + drawn_;
        const real rest_drawn = real(neither_) + marked_;
        const real population = rest_marked + marked_;
        return (real(log_of_cells(k, difference.value)) -
                (real(log_poisson_mass_at_mean(marked_)) +
                 log_poisson_mass_at_mean(rest_marked.value) + log_poisson_mass_at_mean(drawn_) +
                 log_poisson_mass_at_mean(rest_drawn.value) -
                 log_poisson_mass_at_mean(population.value)))
            .value;
    }

private:
    /// log_mass(k) but for a constant; `difference` is k - mean. Half is the most that is marked
    /// or drawn, so the other cells' means lose no digits.
    [[nodiscard]] constexpr double log_of_cells(double k, double difference) const noexcept {
        const real only_marked = real(marked_) - mean_;
        const real only_drawn = real(drawn_) - mean_;
        const real none = real(neither_) + mean_;
        return (real(log_poisson_mass(k, mean_, difference)) +
                log_poisson_mass((real(marked_) - k).value, only_marked.value, -difference) +
                log_poisson_mass((real(drawn_) - k).value, only_drawn.value, -difference) +
                log_poisson_mass((real(neither_) + k).value, none.value, difference))
            .value;
    }

    /// log_mass(0), for means below 10: what cancels in it is left out, so that it is right
    /// relative to the mean, however small that is.
    [[nodiscard]] constexpr double log_mass_of_none(double population) const noexcept {
        if (mean_ == 0) {
            return 0;
        }
        if (neither_ == 0) { // half of fewer than 40, marked and drawn
            return log_mass(0);
        }
        const real rest_marked = real(neither_) + drawn_;
        const real rest_drawn = real(neither_) + marked_;
        const real deviances = real(deviance(marked_, (real(marked_) - mean_).value, mean_)) +
                               deviance(drawn_, (real(drawn_) - mean_).value, mean_) +
                               deviance(neither_, (real(neither_) + mean_).value, -mean_);
        const real remainders =
            (real(stirling_remainder(rest_marked.value)) - stirling_remainder(population)) +
            (real(stirling_remainder(rest_drawn.value)) - stirling_remainder(neither_));
        const real roots = real(0.5) * log_one_plus((real(mean_) / neither_).value);
        return ((remainders + roots) - deviances - mean_).value;
    }

    double marked_;
    double drawn_;
    double neither_;
    std::uint64_t whole_ = 0; // of the mean
    double fraction_ = 0;
    double mean_ = 0;
    first_threshold first_{}; // one or the other of this and the rest is in use
    double width_ = 0;
    double log_mode_ = 0;
};

} // namespace detail

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
    /// For fills: the draws of the loop, small means by a table of the same thresholds.
    template <class Words>
    constexpr void fill_from_words(std::span<Int> out, Words& words) const {
        if (counts_.inverts() && out.size() >= detail::worth_a_table) {
            const detail::threshold_table table(counts_.thresholds());
            const std::uint64_t most = counts_.most();
            detail::fill_by_table(out, words, table,
                                  [&](std::uint64_t k) { return from_rarer(k < most ? k : most); });
            return;
        }
        detail::fill_one_by_one(out, *this, words);
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
