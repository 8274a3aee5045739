// The law of Zipf: ranks 1 .. n with masses in proportion to k^-exponent; sizes of cities, calls to
// subscribers, popularity of files.
//
//   leat::zipf rank{1.1, 1000000};      // exponent, n
//
// Domain: exponent finite and >= 0 (0: uniform; 1: harmonic), n >= 1 and of the law's integer type,
// up to 2^63 - 1. Anything else throws invalid_parameter.
// Method: rejection-inversion, one word64 a trial, at least 80 % of them accepted; at most 64
// trials (a chance below 2^-140), then engine_stuck. Nothing is tabulated: n may be large, and
// constructing costs six logarithms and exponentials. Exponent 0 draws uniform integers
// (uniform_integer.hpp). A double holds no more than 53 digits of a rank: from 2^44 on a rank's
// leading 44 digits are drawn, which changes its chance by less than exponent / 2^43 of itself, and
// a second word64 gives the others. Chances are right to about 2^-50 of 1, and each mass above
// 2^-26 to 2^-24 of itself.
// Source: W. Hormann and G. Derflinger, Rejection-inversion to generate variates from monotone
// discrete distributions, ACM TOMACS 6(3), 1996.
// Not for masses other than powers (categorical).

#ifndef LEAT_DISTRIBUTIONS_ZIPF_HPP
#define LEAT_DISTRIBUTIONS_ZIPF_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/power.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/discrete_zipf.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/uniform_integer.hpp" // up_to
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <bit>
#include <cstdint>
#include <utility> // in_range

namespace leat {

template <detail::number_integer Int>
class zipf;

/// The parameters of `zipf`.
template <detail::number_integer Int = std::int64_t>
struct zipf_parameters {
    using distribution_type = zipf<Int>;
    static constexpr const char* law_name = "zipf";

    double exponent = 1; ///< >= 0
    Int n = 100;         ///< the greatest value, >= 1

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const bool sound = n >= 1 && std::in_range<std::int64_t>(n);
        return detail::first_of(
            detail::unless_non_negative("exponent", exponent),
            sound ? detail::fault{}
                  : detail::fault{"n", static_cast<double>(n), "must be >= 1 and below 2^63"});
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("exponent", self.exponent);
        visit("n", self.n);
    }
    friend constexpr bool operator==(const zipf_parameters&, const zipf_parameters&) = default;
};

/// The law of Zipf.
template <detail::number_integer Int = std::int64_t>
class zipf : public detail::law<zipf<Int>, zipf_parameters<Int>> {
    using base = detail::law<zipf, zipf_parameters<Int>>;
    using real = detail::strict<double>;

public:
    using result_type = Int;
    using typename base::param_type;

    /// Ranks 1 .. 100, exponent 1.
    constexpr zipf() : zipf(param_type{}) {}
    constexpr zipf(detail::number auto exponent, detail::number_integer auto n)
        : zipf(param_type{static_cast<double>(exponent),
                          detail::to_integer<Int>(param_type::law_name, "n", n)}) {}
    constexpr explicit zipf(const param_type& p) : base(p) {
        if (exponent() == 0) {
            return;
        }
        // The histogram's first bar is cut to its own area, 1, before 3/2.
        from_ = (real(detail::power_integral(1.5, exponent())) - 1.0).value;
        to_ = detail::power_integral(detail::held(last() + 0.5), exponent());
        const real second = real(detail::power_integral(2.5, exponent())) - mass_of(2);
        always_ = (real(2.0) - detail::power_integral_inverse(second.value, exponent())).value;
    }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        const auto most = static_cast<std::uint64_t>(n());
        if (exponent() == 0) {
            return static_cast<Int>(1 + detail::up_to(most - 1, g, param_type::law_name));
        }
        for (int trial = 0; trial < 64; ++trial) {
            const std::uint64_t word = word64(g);
            const real area = real(to_) + real(detail::open_unit(word)) * (real(from_) - to_);
            const double x = detail::power_integral_inverse(area.value, exponent());
            if (x >= all_digits) {
                const std::uint64_t k = with_further_digits(g, x);
                if (k <= most) {
                    return static_cast<Int>(k);
                }
                continue;
            }
            double k = static_cast<double>(detail::floor_to_integer(detail::held(x + 0.5)));
            k = k < 1 ? 1 : k > last() ? last() : k;
            if (real(k) - x <= always_ ||
                area >=
                    real(detail::power_integral(detail::held(k + 0.5), exponent())) - mass_of(k)) {
                return static_cast<Int>(k);
            }
        }
        detail::stuck(param_type::law_name);
    }

    [[nodiscard]] constexpr double exponent() const noexcept { return this->param().exponent; }
    [[nodiscard]] constexpr Int n() const noexcept { return this->param().n; }
    /// By sums of powers.
    [[nodiscard]] constexpr double mean() const noexcept {
        return (real(detail::harmonic(last(), detail::held(exponent() - 1))) /
                detail::harmonic(last(), exponent()))
            .value;
    }
    [[nodiscard]] constexpr double variance() const noexcept {
        const real second = real(detail::harmonic(last(), detail::held(exponent() - 2))) /
                            detail::harmonic(last(), exponent());
        const real first = mean();
        const real difference = second - first * first;
        return difference > 0 ? difference.value : 0;
    }
    /// The mass at x: 0 but for whole x in 1 .. n.
    [[nodiscard]] constexpr double density(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (!(x >= 1 && x <= last()) || !detail::whole(x)) {
            return 0;
        }
        const detail::scaled total = detail::split(detail::harmonic(last(), exponent()));
        return detail::or_zero(detail::power_scaled(x, -exponent()) * detail::inverse(total));
    }
    /// The chance of a draw of at most x.
    [[nodiscard]] constexpr double cumulative(double x) const {
        detail::number_or_refuse(param_type::law_name, x);
        if (x < 1) {
            return 0;
        }
        if (x >= last()) {
            return 1;
        }
        const double k = static_cast<double>(static_cast<std::int64_t>(x));
        return (real(detail::harmonic(k, exponent())) / detail::harmonic(last(), exponent())).value;
    }
    /// The least k with cumulative(k) >= chance.
    [[nodiscard]] constexpr double quantile(double chance) const {
        detail::chance_or_refuse(param_type::law_name, chance);
        std::uint64_t low = 0; // cumulative(low) < chance <= cumulative(high)
        auto high = static_cast<std::uint64_t>(n());
        while (high - low > 1) {
            const std::uint64_t middle = low + (high - low) / 2;
            (cumulative(static_cast<double>(middle)) < chance ? low : high) = middle;
        }
        return static_cast<double>(high);
    }
    [[nodiscard]] static constexpr Int min() noexcept { return 1; }
    /// n.
    [[nodiscard]] constexpr Int max() const noexcept { return n(); }

private:
    static constexpr double all_digits = 0x1p44;

    constexpr double last() const noexcept { return static_cast<double>(n()); }
    constexpr double mass_of(double k) const noexcept { return detail::power(k, -exponent()); }

    /// A whole number that begins with the first 44 binary digits of x >= 2^44.
    template <random_words G>
    static constexpr std::uint64_t with_further_digits(G& g, double x) {
        const std::uint64_t word = word64(g);
        // x is below 2^64: n + 1/2 rounded is at most 2^63, and inverting adds a few ulp.
        const auto whole = static_cast<std::uint64_t>(x);
        const int further = 20 - std::countl_zero(whole);
        if (further == 0) {
            return whole;
        }
        return (whole >> further << further) | (word >> (64 - further));
    }

    double from_ = 0;
    double to_ = 0;
    double always_ = 0;
};

} // namespace leat

#endif
