// The multivariate normal law with a mean vector and a covariance matrix, which may be singular.
//
//   leat::multivariate_normal law({1, 2}, {{4, 1.2}, {1.2, 9}});      std::vector x = law(g);
//
// Domain: n >= 1 finite means; covariances n by n, finite, symmetric and positive semidefinite to
// within rounding (detail/covariance_factor.hpp has the tolerances), each variance 0 or at least
// 2^-1000. Anything else throws invalid_parameter, which names the entry. A draw is mean + D L z,
// z one standard normal for each dimension that the covariance spans, `rank()` of them: so many
// word64 and 2 % more. A draw that comes out as 0 is given as the smallest normal number, but for
// components without variance. Draws of a singular law keep to its plane but for rounding.
// Constructing takes some n^3 operations, a draw n times the rank.
// Source: A = L L' by Cholesky's method with pivoting (N. J. Higham, Accuracy and Stability of
// Numerical Algorithms, 2nd ed. 2002, 10.3); z: see `normal`.
// Not for independent components (normal, faster).

#ifndef LEAT_DISTRIBUTIONS_MULTIVARIATE_NORMAL_HPP
#define LEAT_DISTRIBUTIONS_MULTIVARIATE_NORMAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/covariance_factor.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <cstddef>
#include <span>
#include <utility> // move
#include <vector>

namespace leat {

class multivariate_normal;

/// The parameters of `multivariate_normal`.
struct multivariate_normal_parameters {
    using distribution_type = multivariate_normal;
    static constexpr const char* law_name = "multivariate_normal";

    std::vector<double> mean{0}; ///< as many as there are dimensions
    std::vector<std::vector<double>> covariance{
        {1}}; ///< its rows; symmetric, positive semidefinite

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const {
        if (mean.empty()) {
            return {"size of mean", 0, "must be at least 1"};
        }
        if (covariance.size() != mean.size()) {
            return {"size of covariance", static_cast<double>(covariance.size()),
                    "must be the size of mean"};
        }
        for (std::size_t i = 0; i < mean.size(); ++i) {
            if (!detail::finite(mean[i])) {
                return {"mean", mean[i], "must be finite", i};
            }
        }
        return detail::covariance_factor(covariance).found();
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
        visit("covariance", self.covariance);
    }
    friend bool operator==(const multivariate_normal_parameters&,
                           const multivariate_normal_parameters&) = default;
};

/// The multivariate normal law.
class multivariate_normal
    : public detail::law<multivariate_normal, multivariate_normal_parameters> {
    using base = detail::law<multivariate_normal, multivariate_normal_parameters>;
    using real = detail::strict<double>;

public:
    using result_type = std::vector<double>;
    using base::param_type;

    /// The standard normal law in one dimension.
    LEAT_VECTOR_CONSTEXPR multivariate_normal() : multivariate_normal(param_type{}) {}
    LEAT_VECTOR_CONSTEXPR multivariate_normal(std::vector<double> mean,
                                              std::vector<std::vector<double>> covariance)
        : multivariate_normal(param_type{std::move(mean), std::move(covariance)}) {}
    LEAT_VECTOR_CONSTEXPR explicit multivariate_normal(const param_type& p)
        : base(p), factor_(p.covariance) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> operator()(G& g) const {
        std::vector<double> x(dimension(), 0.0);
        draw_into(std::span<double>(x), g);
        return x;
    }
    /// A draw, without allocating; an array of another size is refused.
    template <random_words G>
    constexpr void draw_into(std::span<double> x, G& g) const {
        if (x.size() != dimension()) {
            detail::refuse(param_type::law_name, "size of the array", std::uint64_t{x.size()},
                           "must be the dimension of the law");
        }
        for (double& component : x) {
            component = 0;
        }
        // Column by column, each as its normal comes, so that no normals need be kept.
        for (std::size_t k = 0; k < rank(); ++k) {
            const real z = detail::standard_normal(g);
            const std::vector<double>& column = factor_.column(k);
            for (std::size_t i = 0; i < x.size(); ++i) {
                x[i] = (real(x[i]) + z * column[i]).value;
            }
        }
        for (std::size_t i = 0; i < x.size(); ++i) {
            const double deviation = factor_.deviations()[i];
            x[i] =
                deviation == 0
                    ? mean()[i]
                    : detail::into_signed<double>((real(mean()[i]) + real(deviation) * x[i]).value);
        }
    }

    [[nodiscard]] constexpr const std::vector<double>& mean() const noexcept {
        return param().mean;
    }
    [[nodiscard]] constexpr const std::vector<std::vector<double>>& covariance() const noexcept {
        return param().covariance;
    }
    /// The number of components.
    [[nodiscard]] constexpr std::size_t dimension() const noexcept { return mean().size(); }
    /// The dimension of the plane that draws lie in: below `dimension()` where the law is singular.
    [[nodiscard]] constexpr std::size_t rank() const noexcept { return factor_.rank(); }

private:
    detail::covariance_factor factor_;
};

} // namespace leat

#endif
