// Undoing a linear map: the inverse of a small matrix, its determinant, and what is lost.

#ifndef LEAT_REGIONS_DETAIL_MATRIX_HPP
#define LEAT_REGIONS_DETAIL_MATRIX_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/scaled.hpp"

#include <array>
#include <cstddef>
#include <limits>

namespace leat::detail {

/// By rows.
template <std::size_t N>
using square_matrix = std::array<std::array<double, N>, N>;

/// Replaces a matrix by its inverse (Gauss and Jordan's elimination with the largest pivot of a
/// column), and gives the size of its determinant. False, with both useless, where it is singular.
template <std::size_t N>
constexpr bool invert(square_matrix<N>& matrix, scaled& determinant) noexcept {
    using real = strict<double>;
    square_matrix<N> a = matrix;
    square_matrix<N> inverse{};
    for (std::size_t i = 0; i < N; ++i) {
        inverse[i][i] = 1;
    }
    determinant = {1, 0};
    for (std::size_t k = 0; k < N; ++k) {
        std::size_t pivot = k;
        for (std::size_t i = k + 1; i < N; ++i) {
            pivot = magnitude(a[i][k]) > magnitude(a[pivot][k]) ? i : pivot;
        }
        if (!(magnitude(a[pivot][k]) >= 0x1p-900)) {
            return false;
        }
        const auto row = a[k];
        a[k] = a[pivot];
        a[pivot] = row;
        const auto inverse_row = inverse[k];
        inverse[k] = inverse[pivot];
        inverse[pivot] = inverse_row;
        const double p = a[k][k];
        determinant = determinant * split(magnitude(p));
        determinant = split(determinant.factor) * scaled{1, determinant.exponent};
        for (std::size_t j = 0; j < N; ++j) {
            a[k][j] = held(a[k][j] / p);
            inverse[k][j] = held(inverse[k][j] / p);
        }
        for (std::size_t i = 0; i < N; ++i) {
            const real factor = a[i][k];
            if (i == k || factor.value == 0) {
                continue;
            }
            for (std::size_t j = 0; j < N; ++j) {
                a[i][j] = (real(a[i][j]) - factor * a[k][j]).value;
                inverse[i][j] = (real(inverse[i][j]) - factor * inverse[k][j]).value;
            }
        }
    }
    matrix = inverse;
    return true;
}

/// Row i of the inverse times the matrix is a row of the unit matrix; how large the terms are that
/// cancel there is what undoing the map loses. Stretching an axis alone loses nothing.
template <std::size_t N>
constexpr double largest_terms(const square_matrix<N>& inverse,
                               const square_matrix<N>& matrix) noexcept {
    double largest = 0;
    for (std::size_t i = 0; i < N; ++i) {
        for (std::size_t j = 0; j < N; ++j) {
            strict<double> terms = 0.0;
            for (std::size_t k = 0; k < N; ++k) {
                terms = terms + magnitude((strict<double>(inverse[i][k]) * matrix[k][j]).value);
            }
            if (!(terms <= std::numeric_limits<double>::max())) {
                return std::numeric_limits<double>::infinity(); // NaN too
            }
            largest = terms > largest ? terms.value : largest;
        }
    }
    return largest;
}

} // namespace leat::detail

#endif
