// The Bernoulli law: true with chance p.
//
//   leat::bernoulli fails{0.02};      if (fails(g)) ...
//
// Domain: 0 <= p <= 1; anything else throws invalid_parameter.
// Exact for every double p, 1e-300 too: a word64 is compared with the whole part of p 2^64; where
// they are equal, a further word64 with the next 64 binary digits of p, and so on while there are
// any (p has at most 1074). One word64 a draw; a second one in 2^64 draws at most. Small words are
// true.
// Source: common practice.
// Not for the number of successes in many trials (binomial) or trials up to one (geometric).

#ifndef LEAT_DISTRIBUTIONS_BERNOULLI_HPP
#define LEAT_DISTRIBUTIONS_BERNOULLI_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>

namespace leat {

class bernoulli;

/// The parameter of `bernoulli`.
struct bernoulli_parameters {
    using distribution_type = bernoulli;
    static constexpr const char* law_name = "bernoulli";

    double p = 0.5; ///< the chance of true, 0 to 1

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::unless_chance("p", p);
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("p", self.p);
    }
    friend constexpr bool operator==(const bernoulli_parameters&,
                                     const bernoulli_parameters&) = default;
};

/// The Bernoulli law.
class bernoulli : public detail::law<bernoulli, bernoulli_parameters> {
    using base = detail::law<bernoulli, bernoulli_parameters>;
    using real = detail::strict<double>;

public:
    using result_type = bool;
    using typename base::param_type;

    /// A fair coin.
    constexpr bernoulli() : bernoulli(param_type{}) {}
    constexpr explicit bernoulli(detail::number auto p)
        : bernoulli(param_type{static_cast<double>(p)}) {}
    constexpr explicit bernoulli(const param_type& p) : base(p), digits_(first_digits(p.p)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr bool operator()(G& g) const {
        const std::uint64_t word = word64(g);
        if (word != digits_.whole) [[likely]] {
            return word < digits_.whole;
        }
        return by_further_digits(g);
    }
    /// For fills: the draw whose first 64-bit word is `word`, where that decides.
    constexpr bool from_word(std::uint64_t word, bool& x) const noexcept {
        x = word < digits_.whole;
        return word != digits_.whole;
    }

    [[nodiscard]] constexpr double p() const noexcept { return this->param().p; }
    /// p.
    [[nodiscard]] constexpr double mean() const noexcept { return p(); }
    /// p (1 - p).
    [[nodiscard]] constexpr double variance() const noexcept {
        return (real(p()) * (real(1.0) - p())).value;
    }
    /// The mass at x: p at 1, 1 - p at 0.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        return x == 1 ? p() : x == 0 ? detail::held(1.0 - p()) : 0.0;
    }
    /// The chance of a draw of at most x.
    [[nodiscard]] constexpr double cumulative(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        return x < 0 ? 0.0 : x < 1 ? detail::held(1.0 - p()) : 1.0;
    }
    /// The least k with cumulative(k) >= chance.
    [[nodiscard]] constexpr double quantile(double chance) const {
        detail::chance_or_refuse(param_type::law_name, chance);
        return cumulative(0) >= chance ? 0 : 1;
    }
    [[nodiscard]] static constexpr bool min() noexcept { return false; }
    [[nodiscard]] static constexpr bool max() noexcept { return true; }

private:
    /// A number in [0, 2^64] as whole part and fraction; the end as (2^64 - 1) + 1.
    struct number {
        std::uint64_t whole;
        double fraction;
    };
    /// The next 64 binary digits of a fraction, and what follows them. All of it is exact.
    static constexpr number first_digits(double fraction) noexcept {
        if (fraction == 1) {
            return {~std::uint64_t{0}, 1};
        }
        const double moved = detail::held(fraction * 0x1p64);
        const auto whole = static_cast<std::uint64_t>(moved);
        return {whole, moved < 0x1p53 ? detail::held(moved - static_cast<double>(whole)) : 0.0};
    }

    /// Whether further words are below the digits of p that follow.
    template <random_words G>
    [[gnu::noinline]] constexpr bool by_further_digits(G& g) const {
        double fraction = digits_.fraction;
        while (fraction > 0) {
            if (fraction == 1) {
                return true;
            }
            const number digits = first_digits(fraction);
            const std::uint64_t word = word64(g);
            if (word != digits.whole) {
                return word < digits.whole;
            }
            fraction = digits.fraction;
        }
        return false;
    }

    number digits_; // of p
};

} // namespace leat

#endif
