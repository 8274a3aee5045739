// The density that beta, Fisher's F and Student's t law share.
//
// Error: about 1e-14 relative near the mode at any shape: in deviance form, so that no huge
// logarithms of gamma functions are subtracted from one another.
// Source: C. Loader, Fast and accurate computation of binomial probabilities, 2000.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_BETA_DENSITY_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_BETA_DENSITY_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"

namespace leat::detail {

/// u^a v^b / B(a, b) for shapes from 1e-300 on and u, v > 0 with u + v = 1, each given with all its
/// digits.
constexpr scaled beta_kernel(double a, double b, double u, double v) noexcept {
    using real = strict<double>;
    // It is sqrt(a b / (2 pi n)) times exponentials of remainders and deviances, n = a + b. The
    // deviances are taken of quarters, where n cannot overflow.
    const real a4 = real(a) * 0.25;
    const real b4 = real(b) * 0.25;
    const real n4 = a4 + b4;
    const real excess = a4 * v - b4 * u; // of a over n u
    const real deviances = real(deviance(a4.value, (n4 * u).value, excess.value)) +
                           deviance(b4.value, (n4 * v).value, (-excess).value);
    const real remainders =
        real(stirling_remainder((n4 * 4.0).value)) - stirling_remainder(a) - stirling_remainder(b);
    const double smaller = a < b ? a : b;
    const real share = real(a < b ? b4 : a4) / n4; // 1/2 to 1
    constexpr double root = 0x1.9884533d43651p-2;  // 1 / sqrt(2 pi)
    return exp_scaled((remainders - deviances * 4.0).value) * split(root) *
           split(square_root((share * smaller).value));
}

} // namespace leat::detail

#endif
