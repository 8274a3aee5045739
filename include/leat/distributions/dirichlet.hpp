// The Dirichlet law with parameters alpha: n shares that sum to 1, with a density in proportion to
// the product of x[i]^(alpha[i] - 1).
//
//   leat::dirichlet mix({0.5, 2, 1});      std::vector share = mix(g);
//
// Domain: 1 value of alpha or more, each from 1e-300 to 1e300; anything else throws
// invalid_parameter, which names the entry. A draw is made of a gamma variate for each entry, in
// logarithms (see `gamma::draw_log`), so that small parameters give neither 0 / 0 nor a sum of 0:
// 2.1 word64 for an entry of 1 or more, 3.2 below. Shares sum to 1 but for rounding; one below the
// smallest normal number is given as that, one that rounds to 1 as the largest number below, unless
// it is the only one.
// Source: L. Devroye, Non-Uniform Random Variate Generation, 1986, ch. XI.4.
// Not for two shares (beta).

#ifndef LEAT_DISTRIBUTIONS_DIRICHLET_HPP
#define LEAT_DISTRIBUTIONS_DIRICHLET_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/evaluate.hpp" // quotient, product
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/gamma.hpp"

#include <cstddef>
#include <span>
#include <utility> // move
#include <vector>

namespace leat {

class dirichlet;

/// The parameters of `dirichlet`.
struct dirichlet_parameters {
    using distribution_type = dirichlet;
    static constexpr const char* law_name = "dirichlet";

    std::vector<double> alpha{1}; ///< each from 1e-300 to 1e300

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (alpha.empty()) {
            return {"size of alpha", 0, "must be at least 1"};
        }
        for (std::size_t i = 0; i < alpha.size(); ++i) {
            if (!(alpha[i] >= 1e-300 && alpha[i] <= 1e300)) {
                return {"alpha", alpha[i], "must be from 1e-300 to 1e300", i};
            }
        }
        return {};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("alpha", self.alpha);
    }
    friend bool operator==(const dirichlet_parameters&, const dirichlet_parameters&) = default;
};

/// The Dirichlet law.
class dirichlet : public detail::law<dirichlet, dirichlet_parameters> {
    using base = detail::law<dirichlet, dirichlet_parameters>;
    using real = detail::strict<double>;

public:
    using result_type = std::vector<double>;
    using base::param_type;

    /// One share, which is all.
    LEAT_VECTOR_CONSTEXPR dirichlet() : dirichlet(param_type{}) {}
    LEAT_VECTOR_CONSTEXPR explicit dirichlet(std::vector<double> alpha)
        : dirichlet(param_type{std::move(alpha)}) {}
    LEAT_VECTOR_CONSTEXPR explicit dirichlet(const param_type& p) : base(p) {
        real sum = 0.0;
        for (const double a : alpha()) {
            gammas_.push_back(gamma<double>(a, 1.0));
            sum = sum + a;
        }
        total_ = sum.value;
    }

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> operator()(G& g) const {
        std::vector<double> x(alpha().size(), 0.0);
        draw_into(std::span<double>(x), g);
        return x;
    }
    /// A draw, without allocating; an array of another size is refused.
    template <random_words G>
    constexpr void draw_into(std::span<double> x, G& g) const {
        if (x.size() != alpha().size()) {
            detail::refuse(param_type::law_name, "size of the array", std::uint64_t{x.size()},
                           "must be the size of alpha");
        }
        double largest = 0; // the logarithms of the gamma variates first
        for (std::size_t i = 0; i < x.size(); ++i) {
            x[i] = gammas_[i].draw_log(g);
            largest = i == 0 || x[i] > largest ? x[i] : largest;
        }
        real sum = 0.0;
        for (double& share : x) {
            share = detail::natural_exp((real(share) - largest).value); // at most 1, at one 1
            sum = sum + share;
        }
        const double below_one = x.size() > 1 ? 0x1.fffffffffffffp-1 : 1.0;
        for (double& share : x) {
            share = detail::quotient(share, sum.value);
            share = share < below_one ? share : below_one;
        }
    }

    [[nodiscard]] constexpr const std::vector<double>& alpha() const noexcept {
        return param().alpha;
    }
    /// alpha[i] over the sum of all.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> mean() const {
        std::vector<double> result;
        for (const double a : alpha()) {
            result.push_back(detail::quotient(a, total_));
        }
        return result;
    }
    /// m[i] (1 - m[i]) / (sum of alpha + 1), m the mean.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> variance() const {
        std::vector<double> result;
        for (std::size_t i = 0; i < alpha().size(); ++i) {
            result.push_back(covariance_of(i, i));
        }
        return result;
    }
    /// -m[i] m[j] / (sum of alpha + 1), and the variances.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<std::vector<double>> covariance() const {
        std::vector<std::vector<double>> result;
        for (std::size_t i = 0; i < alpha().size(); ++i) {
            std::vector<double> row;
            for (std::size_t j = 0; j < alpha().size(); ++j) {
                row.push_back(covariance_of(i, j));
            }
            result.push_back(std::move(row));
        }
        return result;
    }

private:
    constexpr double covariance_of(std::size_t i, std::size_t j) const noexcept {
        const double m = detail::quotient(alpha()[i], total_);
        const double other =
            detail::quotient(i == j ? detail::held(total_ - alpha()[i]) : alpha()[j], total_);
        const double size = detail::quotient(detail::product(m, other), detail::held(total_ + 1.0));
        return i == j ? size : -size;
    }

    std::vector<gamma<double>> gammas_;
    double total_ = 0;
};

} // namespace leat

#endif
