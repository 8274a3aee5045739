// A choice among outcomes 0 .. n - 1 of given weights: P(k) = weights[k] / (sum of weights).
//
//   leat::categorical fuel({12.5, 3, 0, 1e-7});       auto k = fuel(g);
//
// Domain: 1 to 2^32 weights, each finite and >= 0, not all 0; they need not sum to 1, may span the
// whole range of double, and may sum to more than it. Anything else throws invalid_parameter, which
// names the entry, and so do more outcomes than the integer type can number. A draw takes constant
// time and one word64; an outcome of weight 0 is never drawn. The chances are right to about 2^-64
// (uniform/alias_table.hpp says how exactly): an outcome of a chance below that may never come.
// Constructing is linear in n, at some 40 ns a weight; the law holds the weights and 8 to 16 bytes
// for each. Copying copies all of it.
// Source: Walker, ACM TOMS 3(3), 1977; Vose, IEEE Trans. Software Eng. 17(9), 1991.
// Not for weights that change (weighted_index), nor for equal ones (uniform_integer).

#ifndef LEAT_DISTRIBUTIONS_CATEGORICAL_HPP
#define LEAT_DISTRIBUTIONS_CATEGORICAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/discrete_support.hpp" // whole
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/weights.hpp"
#include "leat/uniform/alias_table.hpp"
#include "leat/uniform/uniform_integer.hpp" // number_integer

#include <bit>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <span>
#include <utility> // move
#include <vector>

namespace leat {

template <detail::number_integer Int>
class categorical;

/// The parameters of `categorical`.
template <detail::number_integer Int = std::int64_t>
struct categorical_parameters {
    using distribution_type = categorical<Int>;
    static constexpr const char* law_name = "categorical";

    std::vector<double> weights{1}; ///< >= 0, not all 0; they need not sum to 1

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const detail::fault found = detail::weights_fault(weights);
        constexpr auto most = static_cast<std::uint64_t>(std::numeric_limits<Int>::max());
        if (found.parameter == nullptr && weights.size() - 1 > most) {
            return {"size of weights", static_cast<double>(weights.size()),
                    "must be at most what the integer type can number"};
        }
        return found;
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("weights", self.weights);
    }
    friend bool operator==(const categorical_parameters&, const categorical_parameters&) = default;
};

/// A choice by weight.
template <detail::number_integer Int = std::int64_t>
class categorical : public detail::law<categorical<Int>, categorical_parameters<Int>> {
    using base = detail::law<categorical, categorical_parameters<Int>>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// One outcome: always 0.
    constexpr categorical() : categorical(param_type{}) {}
    LEAT_VECTOR_CONSTEXPR explicit categorical(std::vector<double> weights)
        : categorical(param_type{std::move(weights)}) {}
    constexpr explicit categorical(const param_type& p) : base(p), table_(weights()) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        return static_cast<Int>(table_(g));
    }
    /// For fills: all of the draws, from a cursor on the engine's words.
    template <class Words>
    constexpr void fill_from_words(std::span<Int> out, Words& words) const {
        for (std::size_t i = 0; i < out.size();) {
            const std::span<const std::uint64_t> ahead = words.ahead(out.size() - i);
            table_.at_each(ahead, out.data() + i);
            words.skip(ahead.size());
            i += ahead.size();
        }
    }

    [[nodiscard]] constexpr const std::vector<double>& weights() const noexcept {
        return this->param().weights;
    }
    /// The mass at x: 0 but for the number of an outcome.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0 && x <= static_cast<double>(max())) || !detail::whole(x)) {
            return 0;
        }
        const double weight = weights()[static_cast<std::size_t>(x)];
        return weight == 0 ? 0.0 : share_of(weight, detail::whole_weights(weights()));
    }
    /// P(X <= x), from an exact sum.
    [[nodiscard]] constexpr double cumulative(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 0)) {
            return 0;
        }
        if (x >= static_cast<double>(max())) {
            return 1;
        }
        const detail::whole_weights whole(weights());
        detail::word_pair sum{0, 0};
        for (std::size_t i = 0; i <= static_cast<std::size_t>(x); ++i) {
            sum = add(sum, whole(weights()[i]));
        }
        return ratio(sum, whole.total());
    }
    /// The smallest outcome k with cumulative(k) >= p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        detail::chance_or_refuse(param_type::law_name, p);
        const detail::whole_weights whole(weights());
        detail::word_pair sum{0, 0};
        std::size_t k = 0;
        for (; k + 1 < weights().size(); ++k) {
            sum = add(sum, whole(weights()[k]));
            if (ratio(sum, whole.total()) >= p) {
                break;
            }
        }
        return static_cast<double>(k);
    }
    /// The expectation of the outcome's number.
    [[nodiscard]] constexpr double mean() const noexcept {
        return moment([](real k) { return k; });
    }
    /// The variance of the outcome's number.
    [[nodiscard]] constexpr double variance() const noexcept {
        const real centre = mean();
        return moment([centre](real k) { return (k - centre) * (k - centre); });
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    [[nodiscard]] constexpr Int max() const noexcept {
        return static_cast<Int>(weights().size() - 1);
    }

private:
    using real = detail::strict<double>;

    /// A positive sum in units as a factor in [1, 2] and a power of two.
    static constexpr detail::scaled as_scaled(detail::word_pair sum) noexcept {
        const int shift =
            sum.high != 0 ? std::countl_zero(sum.high) : 64 + std::countl_zero(sum.low);
        const std::uint64_t top = shift == 0   ? sum.high
                                  : shift < 64 ? sum.high << shift | sum.low >> (64 - shift)
                                               : sum.low << (shift - 64);
        return {static_cast<double>(top) * 0x1p-63, 127 - shift};
    }
    static constexpr double ratio(detail::word_pair part, detail::word_pair total) noexcept {
        if (part == detail::word_pair{0, 0}) {
            return 0;
        }
        return detail::or_zero(as_scaled(part) * detail::inverse(as_scaled(total)));
    }
    /// weight / total, also where the weight is less than a unit.
    static constexpr double share_of(double weight, const detail::whole_weights& whole) noexcept {
        detail::scaled total = as_scaled(whole.total());
        total.exponent += whole.exponent();
        return detail::or_zero(detail::split(weight) * detail::inverse(total));
    }
    template <class Function>
    constexpr double moment(Function f) const noexcept {
        const detail::whole_weights whole(weights());
        real sum = 0.0;
        for (std::size_t i = 0; i < weights().size(); ++i) {
            const double w = weights()[i];
            if (w > 0) {
                sum = sum + f(real(static_cast<double>(i))) * share_of(w, whole);
            }
        }
        return sum.value;
    }

    detail::alias_table<> table_;
};

categorical(std::vector<double>)->categorical<>;

} // namespace leat

#endif
