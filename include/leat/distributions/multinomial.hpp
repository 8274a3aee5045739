// The multinomial law: how often each of k outcomes of given weights comes in n independent
// choices. The counts sum to n exactly.
//
//   leat::multinomial seats(120, {0.5, 0.3, 0.2});      std::vector count = seats(g);
//
// Domain: n from 0 to 2^53; weights as `categorical` takes them, k of them; anything else throws
// invalid_parameter, which names the entry. A draw is a chain of binomial counts, each of the
// choices that are left: at most k - 1 of them, none for weights of 0 nor when no choice is left.
// An outcome of weight 0 has the count 0. An outcome below 2^-900 of the largest weight counts as
// one of weight 0. Takes any weights in linear time; see `binomial` for the words that a count
// consumes.
// Source: L. Devroye, Non-Uniform Random Variate Generation, 1986, ch. XI.1.4 (the conditional
// method).
// Not for the choices in their order (categorical), nor for few choices among very many outcomes
// (categorical, counted).

#ifndef LEAT_DISTRIBUTIONS_MULTINOMIAL_HPP
#define LEAT_DISTRIBUTIONS_MULTINOMIAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp" // or_zero
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/weights.hpp"

#include <cstddef>
#include <cstdint>
#include <span>
#include <utility> // move
#include <vector>

namespace leat {

template <detail::number_integer Int>
class multinomial;

/// The parameters of `multinomial`.
template <detail::number_integer Int = std::int64_t>
struct multinomial_parameters {
    using distribution_type = multinomial<Int>;
    static constexpr const char* law_name = "multinomial";

    Int n = 1;                      ///< trials, >= 0
    std::vector<double> weights{1}; ///< >= 0, not all 0; they need not sum to 1

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_count("n", n), detail::weights_fault(weights));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("n", self.n);
        visit("weights", self.weights);
    }
    friend bool operator==(const multinomial_parameters&, const multinomial_parameters&) = default;
};

/// The multinomial law.
template <detail::number_integer Int = std::int64_t>
class multinomial : public detail::law<multinomial<Int>, multinomial_parameters<Int>> {
    using base = detail::law<multinomial, multinomial_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = std::vector<Int>;
    using typename base::param_type;

    /// One choice of one outcome.
    constexpr multinomial() : multinomial(param_type{}) {}
    LEAT_VECTOR_CONSTEXPR multinomial(detail::number_integer auto n, std::vector<double> weights)
        : multinomial(param_type{detail::to_integer<Int>(param_type::law_name, "n", n),
                                 std::move(weights)}) {}
    constexpr explicit multinomial(const param_type& p) : base(p) { build(); }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr std::vector<Int> operator()(G& g) const {
        std::vector<Int> counts(weights().size(), Int{0});
        draw_into(std::span<Int>(counts), g);
        return counts;
    }
    /// A draw, without allocating; an array of another size is refused.
    template <random_words G>
    constexpr void draw_into(std::span<Int> counts, G& g) const {
        if (counts.size() != weights().size()) {
            detail::refuse(param_type::law_name, "size of the array", std::uint64_t{counts.size()},
                           "must be the number of weights");
        }
        Int left = n();
        for (std::size_t i = 0; i < counts.size(); ++i) {
            const step& next = steps_[i];
            counts[i] = 0;
            if (left == 0 || next.kind == kind::nothing) {
                continue;
            }
            if (next.kind == kind::all) {
                counts[i] = left;
            } else {
                const binomial<Int> rarer(left, next.chance);
                const Int k = rarer(g);
                counts[i] = next.kind == kind::these ? k : static_cast<Int>(left - k);
            }
            left = static_cast<Int>(left - counts[i]);
        }
    }

    [[nodiscard]] constexpr Int n() const noexcept { return this->param().n; }
    [[nodiscard]] constexpr const std::vector<double>& weights() const noexcept {
        return this->param().weights;
    }
    /// n p[i], p the weights over their sum.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> mean() const {
        std::vector<double> result;
        for (const double p : chances_) {
            result.push_back(detail::product(static_cast<double>(n()), p));
        }
        return result;
    }
    /// n p[i] (1 - p[i]).
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> variance() const {
        std::vector<double> result;
        for (std::size_t i = 0; i < chances_.size(); ++i) {
            result.push_back(covariance_of(i, i));
        }
        return result;
    }
    /// -n p[i] p[j], and the variances.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<std::vector<double>> covariance() const {
        std::vector<std::vector<double>> result;
        for (std::size_t i = 0; i < chances_.size(); ++i) {
            std::vector<double> row;
            for (std::size_t j = 0; j < chances_.size(); ++j) {
                row.push_back(covariance_of(i, j));
            }
            result.push_back(std::move(row));
        }
        return result;
    }

private:
    // Of the choices left: none is this outcome; all are; those that are, or those that are not,
    // have a binomial count, whichever are rarer. So no chance near 1 hides what is beside it.
    enum class kind : std::uint8_t { nothing, all, these, others };
    struct step {
        double chance = 0;
        multinomial::kind kind = kind::nothing;
    };

    constexpr double covariance_of(std::size_t i, std::size_t j) const noexcept {
        const double p = detail::product(static_cast<double>(n()), chances_[i]);
        const double other = i == j ? detail::held(1.0 - chances_[i]) : chances_[j];
        const double size = detail::product(p, other);
        return i == j || size == 0 ? size : -size;
    }

    LEAT_VECTOR_CONSTEXPR void build() {
        double largest = 0;
        for (const double w : weights()) {
            largest = w > largest ? w : largest;
        }
        const detail::scaled unit{1.0, -detail::split(largest).exponent};
        std::vector<double> parts; // in units of the largest's power of two: no sum overflows
        for (const double w : weights()) {
            const double part = w == 0 ? 0.0 : detail::or_zero(detail::split(w) * unit);
            parts.push_back(part < 0x1p-900 ? 0.0 : part);
        }
        steps_ = std::vector<step>(parts.size(), step{});
        double after = 0; // the sum of what comes later
        for (std::size_t i = parts.size(); i-- > 0;) {
            const double own = parts[i];
            const double sum = (real(own) + after).value;
            if (own == 0) {
                continue;
            }
            if (after == 0) {
                steps_[i] = {1.0, kind::all};
            } else if (own <= after) {
                steps_[i] = {detail::quotient(own, sum), kind::these};
            } else {
                steps_[i] = {detail::quotient(after, sum), kind::others};
            }
            after = sum;
        }
        for (const double part : parts) {
            chances_.push_back(detail::quotient(part, after));
        }
    }

    std::vector<step> steps_;
    std::vector<double> chances_;
};

template <detail::number_integer N>
multinomial(N, std::vector<double>) -> multinomial<>;

} // namespace leat

#endif
