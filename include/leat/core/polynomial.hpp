// Polynomials by Horner's rule, every operation rounded by itself.

#ifndef LEAT_CORE_POLYNOMIAL_HPP
#define LEAT_CORE_POLYNOMIAL_HPP

#include "leat/core/barrier.hpp"

#include <cstddef>

namespace leat::detail {

/// The value at x; the coefficients stand lowest degree first.
template <std::size_t Terms>
constexpr double polynomial(const double (&coefficients)[Terms], double x) noexcept {
    using real = strict<double>;
    real sum = coefficients[Terms - 1];
    for (std::size_t i = Terms - 1; i > 0; --i) {
        sum = sum * x + coefficients[i - 1];
    }
    return sum.value;
}

} // namespace leat::detail

#endif
