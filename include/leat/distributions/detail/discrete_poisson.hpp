// Poisson counts of a mean known only when they are drawn: what `poisson` and `negative_binomial`
// share.
//
// Below a mean of 10 inversion on the thresholds of discrete_inversion.hpp, one word64 a draw. From
// 10 on transformed rejection with squeeze (PTRS; discrete_transformed.hpp), two word64 a trial; 74
// of 100 trials are accepted at mean 10 and 89 at large ones, most of them without a logarithm.
// Masses are computed in deviance form, so that means of 1e15 and more are as exact as small ones.
// At most 64 trials (a chance below 2^-120).
//
// The published constants were fitted: below a mean of 1000 the hat falls short of some masses, by
// up to 0.5 %, which would make those too rare, and below 56 the squeeze passes some by up to 0.4
// %. Here the hat is lifted by 0.03 / sqrt(mean) of itself and the squeeze lowered by as much and
// by 0.03 / sqrt(mean), which is enough at every mean (0.0243 and 0.0215 are needed).
//
// Source: W. Hormann, The transformed rejection method for generating Poisson random variables,
// Insurance: Mathematics and Economics 12, 1993; discrete_deviance.hpp for the mass.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_POISSON_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_POISSON_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp"
#include "leat/distributions/detail/discrete_transformed.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>
#include <span>

namespace leat::detail {

/// The ratio of successive masses.
struct poisson_ratio {
    double mean;
    constexpr double operator()(std::uint64_t k) const noexcept {
        return held(mean * reciprocal(k));
    }
};

/// The logarithms of masses.
struct log_poisson_masses {
    double mean;
    constexpr double operator()(std::uint64_t k, double difference) const noexcept {
        return log_poisson_mass(static_cast<double>(k), mean, difference);
    }
};

/// Poisson counts of one mean, in 0 .. 2^64 - 1.
class poisson_counts {
    using real = strict<double>;

public:
    static constexpr double smallest_rejection_mean = 10;

    /// A mean in 0 .. 2^64, the end excluded.
    constexpr explicit poisson_counts(double mean) noexcept
        : mean_(mean),
          inverse_(inverts() ? first_threshold::from_log_mass(-mean) : first_threshold{}),
          rejection_(inverts() ? transformed_rejection::parameters{} : hat(mean)) {}

    [[nodiscard]] constexpr double mean() const noexcept { return mean_; }
    [[nodiscard]] constexpr bool inverts() const noexcept {
        return mean_ < smallest_rejection_mean;
    }

    /// A draw in 0 .. max, where a larger one has no chance to speak of.
    template <random_words G>
    [[nodiscard]] constexpr std::uint64_t draw(G& g, std::uint64_t max, const char* name) const {
        if (inverts()) {
            const std::uint64_t word = word64(g);
            const std::uint64_t k = thresholds()(word);
            return k < max ? k : max;
        }
        return rejection_.draw(g, max, log_mass(), name);
    }

    /// The draws of a loop; `finish` makes results of them.
    template <class T, class Words, class Finish>
    constexpr void fill(std::span<T> out, Words& words, std::uint64_t max, const char* name,
                        Finish finish) const {
        if (inverts()) {
            const threshold_table table(thresholds());
            fill_by_table(out, words, table,
                          [&](std::uint64_t k) { return finish(k < max ? k : max); });
        } else {
            const auto& p = rejection_.param();
            const double middle = natural_exp(log_mass()(p.whole, -p.fraction));
            const nearby_masses masses(p.whole, middle, max, poisson_ratio{mean_});
            rejection_.fill(out, words, max, log_mass(), masses, name, finish);
        }
    }

private:
    [[nodiscard]] constexpr threshold_walk<poisson_ratio> thresholds() const noexcept {
        return {inverse_, poisson_ratio{mean_}};
    }
    [[nodiscard]] constexpr log_poisson_masses log_mass() const noexcept { return {mean_}; }
    static constexpr transformed_rejection::parameters hat(double mean) noexcept {
        const auto whole = static_cast<std::uint64_t>(mean);
        const real root = square_root(mean);
        const real b = real(0.931) + real(2.53) * root;
        const real lift = real(1.0) + real(0.03) / root;
        return {.whole = whole,
                .fraction = held(mean - static_cast<double>(whole)),
                .shift = 0.43,
                .a = (real(0.02483) * b - 0.059).value,
                .b = b.value,
                .squeeze =
                    ((real(0.9277) - real(3.6224) / (b - 2.0)) / lift - real(0.03) / root).value,
                .scale = ((real(1.1239) + real(1.1328) / (b - 3.4)) * lift).value};
    }

    double mean_;
    first_threshold inverse_; // one or the other is in use
    transformed_rejection rejection_;
};

} // namespace leat::detail

#endif
