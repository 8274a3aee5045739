// A covariance matrix taken apart: A = D L L' D, D the standard deviations and L the factor of the
// correlation matrix by Cholesky's method with diagonal pivoting, so that semidefinite matrices
// have one too.
//
// Tolerances, for n variables, all in units of correlation: a pivot up to t = n 2^-45 counts as 0
// (rounding gives a singular matrix pivots of that order); what is then left of the matrix must be
// 0 to within 2 t, and no pivot below -t, or the matrix is not positive semidefinite; two entries
// that should be equal may differ by 2^-40, the one below the diagonal is used.
// Domain: variances 0 or from 2^-1000; entries finite. Source: N. J. Higham, Accuracy and Stability
// of Numerical Algorithms, 2nd ed. 2002, 10.3.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_COVARIANCE_FACTOR_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_COVARIANCE_FACTOR_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/evaluate.hpp" // or_zero, inverse
#include "leat/distributions/detail/law.hpp"      // fault

#include <cstddef>
#include <utility> // swap
#include <vector>

namespace leat::detail {

/// See above. Where `fault` names a parameter, the rest is not to be used.
class covariance_factor {
    using real = strict<double>;
    using matrix = std::vector<std::vector<double>>;

public:
    LEAT_VECTOR_CONSTEXPR explicit covariance_factor(const matrix& covariance)
        : n_(covariance.size()), tolerance_(held(static_cast<double>(n_) * 0x1p-45)) {
        take_deviations(covariance);
        if (fault_.parameter == nullptr) {
            take_correlations(covariance);
        }
        if (fault_.parameter == nullptr) {
            factorise(covariance);
        }
    }

    [[nodiscard]] constexpr const fault& found() const noexcept { return fault_; }
    /// How many independent normals the law is made of.
    [[nodiscard]] constexpr std::size_t rank() const noexcept { return columns_.size(); }
    /// Column k of L, by variables in the order of the matrix.
    [[nodiscard]] constexpr const std::vector<double>& column(std::size_t k) const noexcept {
        return columns_[k];
    }
    /// The diagonal of D.
    [[nodiscard]] constexpr const std::vector<double>& deviations() const noexcept {
        return deviations_;
    }

private:
    static constexpr const char* parameter = "covariance";

    constexpr void blame(std::size_t row, std::size_t column, double value, const char* allowed) {
        if (fault_.parameter == nullptr) {
            fault_ = {parameter, value, allowed, row, column};
        }
    }

    constexpr void take_deviations(const matrix& covariance) {
        for (std::size_t i = 0; i < n_; ++i) {
            if (covariance[i].size() != n_) {
                fault_ = {"size of a row of covariance", static_cast<double>(covariance[i].size()),
                          "must be the number of rows"};
                return;
            }
            for (std::size_t j = 0; j < n_; ++j) {
                if (!finite(covariance[i][j])) {
                    return blame(i, j, covariance[i][j], "must be finite");
                }
            }
            const double variance = covariance[i][i];
            if (!(variance == 0 || variance >= 0x1p-1000)) {
                return blame(i, i, variance, "must be 0 or at least 2^-1000");
            }
            deviations_.push_back(square_root(variance));
        }
    }

    /// covariance[i][j] over both standard deviations; too small to matter gives 0.
    [[nodiscard]] constexpr double correlation(double covariance, std::size_t i,
                                               std::size_t j) const noexcept {
        if (covariance == 0) {
            return 0;
        }
        const double size = or_zero(split(magnitude(covariance)) * inverse(split(deviations_[i])) *
                                    inverse(split(deviations_[j])));
        return size < 0x1p-200 ? 0 : covariance < 0 ? -size : size;
    }

    LEAT_VECTOR_CONSTEXPR void take_correlations(const matrix& covariance) {
        rest_ = matrix(n_, std::vector<double>(n_, 0.0));
        for (std::size_t i = 0; i < n_; ++i) {
            for (std::size_t j = 0; j < i; ++j) {
                const double below = covariance[i][j];
                const double above = covariance[j][i];
                if (deviations_[i] == 0 || deviations_[j] == 0) {
                    constexpr const char* allowed = "must be 0, as a variance is";
                    if (above != 0) {
                        return blame(j, i, above, allowed);
                    }
                    if (below != 0) {
                        return blame(i, j, below, allowed);
                    }
                    continue;
                }
                const double c = correlation(below, i, j);
                const real difference = real(c) - correlation(above, i, j);
                if (magnitude(difference.value) > 0x1p-40) {
                    return blame(i, j, below, "must equal the entry across the diagonal");
                }
                if (magnitude(c) > held(1.0 + tolerance_)) {
                    return blame(i, j, below,
                                 "must not exceed the geometric mean of the two variances in size");
                }
                rest_[i][j] = c;
                rest_[j][i] = c;
            }
            rest_[i][i] = deviations_[i] == 0 ? 0.0 : 1.0;
        }
    }

    /// One column of L for each pivot; what is left of the matrix is in rest_.
    LEAT_VECTOR_CONSTEXPR void factorise(const matrix& covariance) {
        std::vector<std::size_t> open; // the variables without a pivot
        for (std::size_t i = 0; i < n_; ++i) {
            open.push_back(i);
        }
        while (!open.empty()) {
            std::size_t best = 0;
            for (std::size_t a = 1; a < open.size(); ++a) {
                best = rest_[open[a]][open[a]] > rest_[open[best]][open[best]] ? a : best;
            }
            const std::size_t pivot = open[best];
            const double square = rest_[pivot][pivot];
            if (!(square > tolerance_)) {
                break;
            }
            const double root = square_root(square);
            open.erase(open.begin() + static_cast<std::ptrdiff_t>(best));
            std::vector<double> column(n_, 0.0);
            column[pivot] = root;
            for (const std::size_t i : open) {
                const double entry = held(rest_[i][pivot] / root);
                column[i] = magnitude(entry) < 0x1p-100 ? 0.0 : entry; // beside 1: not to be seen
            }
            for (const std::size_t i : open) {
                for (const std::size_t j : open) {
                    rest_[i][j] = (real(rest_[i][j]) - real(column[i]) * column[j]).value;
                }
            }
            columns_.push_back(std::move(column));
        }
        for (const std::size_t i : open) {
            for (const std::size_t j : open) {
                const double left = rest_[i][j];
                if (i == j ? left < -tolerance_ : magnitude(left) > held(2 * tolerance_)) {
                    return blame(i, j, covariance[i][j],
                                 "must leave the matrix positive semidefinite");
                }
            }
        }
    }

    std::size_t n_;
    double tolerance_;
    fault fault_;
    std::vector<double> deviations_;
    matrix columns_;
    matrix rest_;
};

} // namespace leat::detail

#endif
