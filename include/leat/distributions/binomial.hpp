// The binomial law: the number of successes in n independent trials that each succeed with chance
// p; mass n! / (k! (n - k)!) p^k (1 - p)^(n - k), k = 0 .. n.
//
//   leat::binomial defects{100, 0.3};      std::int64_t k = defects(g);
//
// Domain: n in 0 .. 2^53 (and of the law's integer type), 0 <= p <= 1; anything else throws
// invalid_parameter. n = 0, p = 0 and p = 1 give constants. For p > 1/2 failures are drawn, with
// 1 - p, and subtracted from n. Below, p is the smaller of the two.
// n p < 10: inversion on the thresholds of detail/discrete_inversion.hpp, one word64 a draw; small
// words give large counts (p > 1/2: small ones). Else transformed rejection with squeeze (BTRS),
// two word64 a trial, 2.3 to 2.8 on average, at most 64 trials (a chance below 2^-120), then
// engine_stuck. A trial's place is kept as an offset from the whole part of n p, its mass is
// computed in deviance form: n = 2^53 is as exact as n = 100.
// Source: W. Hormann, The generation of binomial random variates, J. Statist. Comput. Simul. 46,
// 1993; C. Loader, Fast and accurate computation of binomial probabilities, 2000.
// Not for draws without replacement (hypergeometric).

#ifndef LEAT_DISTRIBUTIONS_BINOMIAL_HPP
#define LEAT_DISTRIBUTIONS_BINOMIAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // two_product
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/discrete_transformed.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>
#include <span>

namespace leat {

template <detail::number_integer Int>
class binomial;

/// The parameters of `binomial`.
template <detail::number_integer Int = std::int64_t>
struct binomial_parameters {
    using distribution_type = binomial<Int>;
    static constexpr const char* law_name = "binomial";

    Int n = 1;      ///< trials, >= 0
    double p = 0.5; ///< the chance of success, 0 to 1

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_count("n", n), detail::unless_chance("p", p));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("n", self.n);
        visit("p", self.p);
    }
    friend constexpr bool operator==(const binomial_parameters&,
                                     const binomial_parameters&) = default;
};

namespace detail {

/// The ratio of successive masses.
struct binomial_ratio {
    double trials_and_one;
    double odds;
    constexpr double operator()(std::uint64_t k) const noexcept {
        using real = strict<double>;
        const real count = static_cast<double>(k);
        return ((real(trials_and_one) - count) * odds * reciprocal(k)).value;
    }
};

/// Binomial counts for p <= 1/2.
class binomial_counts {
    using real = strict<double>;

public:
    static constexpr double smallest_rejection_mean = 10;

    constexpr binomial_counts(double n, double p) noexcept
        : n_(n),
          p_(p),
          odds_((real(p) / (real(1.0) - p)).value),
          inverse_(inverts() ? chance_of_none(n, p) : first_threshold{}),
          rejection_(inverts() ? transformed_rejection::parameters{} : hat(n, p)) {
        if (!inverts()) {
            const auto& hat = rejection_.param();
            const std::int64_t mode = floor_to_integer((real(hat.fraction) + p).value);
            mode_ = hat.whole + static_cast<std::uint64_t>(mode);
            log_mode_ = log_of_cells(static_cast<double>(mode_),
                                     held(static_cast<double>(mode) - hat.fraction));
        }
    }

    template <random_words G>
    [[nodiscard]] constexpr std::uint64_t draw(G& g) const {
        if (inverts()) {
            const std::uint64_t word = word64(g);
            const std::uint64_t k = thresholds()(word);
            return k < trials() ? k : trials();
        }
        return rejection_.draw(g, trials(), log_shares{*this}, name);
    }

    /// The draws of a loop; `finish` makes results of them.
    template <class T, class Words, class Finish>
    constexpr void fill(std::span<T> out, Words& words, Finish finish) const {
        const std::uint64_t max = trials();
        if (inverts()) {
            const threshold_table table(thresholds());
            fill_by_table(out, words, table,
                          [&](std::uint64_t k) { return finish(k < max ? k : max); });
        } else {
            const nearby_masses masses(mode_, 1, max, ratio());
            rejection_.fill(out, words, max, log_shares{*this}, masses, name, finish);
        }
    }

    /// The logarithm of the mass at k, for 0 < p < 1 and n > 0.
    [[nodiscard]] constexpr double log_mass(double k) const noexcept {
        const two_part mean = two_product(n_, p_);
        return (real(log_of_cells(k, ((real(k) - mean.high) - mean.low).value)) -
                log_poisson_mass_at_mean(n_))
            .value;
    }

private:
    /// log_mass(k) but for a constant; `difference` is k - n p.
    [[nodiscard]] constexpr double log_of_cells(double k, double difference) const noexcept {
        const real mean = real(n_) * p_;
        const real others = real(n_) * (real(1.0) - p_);
        return (real(log_poisson_mass(k, mean.value, difference)) +
                log_poisson_mass((real(n_) - k).value, others.value, -difference))
            .value;
    }

    [[nodiscard]] constexpr bool inverts() const noexcept {
        return (real(n_) * p_).value < smallest_rejection_mean;
    }
    [[nodiscard]] constexpr std::uint64_t trials() const noexcept {
        return static_cast<std::uint64_t>(n_);
    }
    [[nodiscard]] constexpr binomial_ratio ratio() const noexcept {
        return {held(n_ + 1.0), odds_};
    }
    [[nodiscard]] constexpr threshold_walk<binomial_ratio> thresholds() const noexcept {
        return {inverse_, ratio()};
    }
    /// The logarithms of masses as shares of the mode's.
    struct log_shares {
        const binomial_counts& of;
        constexpr double operator()(std::uint64_t k, double difference) const noexcept {
            return held(of.log_of_cells(static_cast<double>(k), difference) - of.log_mode_);
        }
    };
    /// (1 - p)^n, where a few trials are concerned by multiplication: quicker, and the rest to 1 is
    /// right to 2^-42 of itself.
    static constexpr first_threshold chance_of_none(double n, double p) noexcept {
        if (n <= 32 && p >= 0x1p-6) {
            real power = 1.0;
            real square = real(1.0) - p;
            for (auto left = static_cast<std::uint32_t>(n);;) {
                if (left % 2 != 0) {
                    power = power * square;
                }
                left /= 2;
                if (left == 0) {
                    return first_threshold::from_mass(power.value);
                }
                square = square * square;
            }
        }
        return first_threshold::from_log_mass((real(n) * log_one_plus(-p)).value);
    }
    static constexpr transformed_rejection::parameters hat(double n, double p) noexcept {
        const two_part mean = two_product(n, p);
        const auto whole = static_cast<std::uint64_t>(mean.high);
        const real root = square_root((real(mean.high) * (real(1.0) - p)).value);
        const real b = real(1.15) + real(2.53) * root;
        return {.whole = whole,
                .fraction = ((real(mean.high) - static_cast<double>(whole)) + mean.low).value,
                .shift = 0.5,
                .a = (real(0.0248) * b - 0.0873 + real(0.01) * p).value,
                .b = b.value,
                .squeeze = (real(0.92) - real(4.2) / b).value,
                .scale = ((real(2.83) + real(5.1) / b) * root).value};
    }

    static constexpr const char* name = "binomial";

    double n_;
    double p_;
    double odds_;
    first_threshold inverse_; // one or the other of this and the rest is in use
    transformed_rejection rejection_;
    std::uint64_t mode_ = 0;
    double log_mode_ = 0;
};

} // namespace detail

/// The binomial law.
template <detail::number_integer Int = std::int64_t>
class binomial : public detail::law<binomial<Int>, binomial_parameters<Int>> {
    using base = detail::law<binomial, binomial_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// One trial of chance 1/2.
    constexpr binomial() : binomial(param_type{}) {}
    constexpr binomial(detail::number_integer auto n, detail::number auto p)
        : binomial(param_type{detail::to_integer<Int>(param_type::law_name, "n", n),
                              static_cast<double>(p)}) {}
    constexpr explicit binomial(const param_type& p)
        : base(p), counts_(static_cast<double>(p.n), p.p > 0.5 ? detail::held(1.0 - p.p) : p.p) {}

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

    [[nodiscard]] constexpr Int n() const noexcept { return this->param().n; }
    [[nodiscard]] constexpr double p() const noexcept { return this->param().p; }
    /// n p.
    [[nodiscard]] constexpr double mean() const noexcept {
        return (real(static_cast<double>(n())) * p()).value;
    }
    /// n p (1 - p).
    [[nodiscard]] constexpr double variance() const noexcept {
        return (real(mean()) * (real(1.0) - p())).value;
    }
    /// The mass at x: 0 but for whole x in 0 .. n.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        const auto trials = static_cast<double>(n());
        if (!(x >= 0 && x <= trials) || !detail::whole(x)) {
            return 0;
        }
        if (p() == 0 || p() == 1 || trials == 0) {
            return x == mean() ? 1 : 0;
        }
        const double rarer = flips() ? detail::held(trials - x) : x;
        return detail::or_zero(detail::exp_scaled(counts_.log_mass(rarer)));
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    /// n.
    [[nodiscard]] constexpr Int max() const noexcept { return n(); }

private:
    constexpr bool flips() const noexcept { return p() > 0.5; }
    constexpr Int from_rarer(std::uint64_t k) const noexcept {
        return flips() ? static_cast<Int>(static_cast<std::uint64_t>(n()) - k)
                       : static_cast<Int>(k);
    }

    detail::binomial_counts counts_;
};

} // namespace leat

#endif
