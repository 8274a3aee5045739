// The inverse of the standard normal distribution function, the same bits everywhere.
//
// Method: rational approximations in p - 1/2 near the middle and in the root of -ln p in the tails.
// Argument: 0 < p < 1, subnormal numbers included. Error, measured against MPFR in tests/core: at
// most 8 ulp. Source: M. J. Wichura, Algorithm AS 241: the percentage points of the normal
// distribution, Appl. Statist. 37(3), 1988, PPND16 (coefficients from memory, pinned by the
// measurement).

#ifndef LEAT_CORE_NORMAL_QUANTILE_HPP
#define LEAT_CORE_NORMAL_QUANTILE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/logarithm.hpp"
#include "leat/core/polynomial.hpp"
#include "leat/core/square_root.hpp"

namespace leat::detail {

inline constexpr double probit_middle_above[] = {3.3871328727963666080e0, 1.3314166789178437745e2,
                                                 1.9715909503065514427e3, 1.3731693765509461125e4,
                                                 4.5921953931549871457e4, 6.7265770927008700853e4,
                                                 3.3430575583588128105e4, 2.5090809287301226727e3};
inline constexpr double probit_middle_below[] = {1.0,
                                                 4.2313330701600911252e1,
                                                 6.8718700749205790830e2,
                                                 5.3941960214247511077e3,
                                                 2.1213794301586595867e4,
                                                 3.9307895800092710610e4,
                                                 2.8729085735721942674e4,
                                                 5.2264952788528545610e3};
inline constexpr double probit_tail_above[] = {
    1.42343711074968357734e0,  4.63033784615654529590e0, 5.76949722146069140550e0,
    3.64784832476320460504e0,  1.27045825245236838258e0, 2.41780725177450611770e-1,
    2.27238449892691845833e-2, 7.74545014278341407640e-4};
inline constexpr double probit_tail_below[] = {1.0,
                                               2.05319162663775882187e0,
                                               1.67638483018380384940e0,
                                               6.89767334985100004550e-1,
                                               1.48103976427480074590e-1,
                                               1.51986665636164571966e-2,
                                               5.47593808499534494600e-4,
                                               1.05075007164441684324e-9};
inline constexpr double probit_far_above[] = {6.65790464350110377720e0,  5.46378491116411436990e0,
                                              1.78482653991729133580e0,  2.96560571828504891230e-1,
                                              2.65321895265761230930e-2, 1.24266094738807843860e-3,
                                              2.71155556874348757815e-5, 2.01033439929228813265e-7};
inline constexpr double probit_far_below[] = {1.0,
                                              5.99832206555887937690e-1,
                                              1.36929880922735805310e-1,
                                              1.48753612908506148525e-2,
                                              7.86869131145613259100e-4,
                                              1.84631831751005468180e-5,
                                              1.42151175831644588870e-7,
                                              2.04426310338993978564e-15};

/// The x with P(Z < x) = p for a standard normal Z.
constexpr double normal_quantile(double p) noexcept {
    using real = strict<double>;
    const real from_middle = real(p) - 0.5;
    if (magnitude(from_middle.value) <= 0.425) {
        const double r = (real(0.180625) - from_middle * from_middle).value;
        return (from_middle * polynomial(probit_middle_above, r) /
                polynomial(probit_middle_below, r))
            .value;
    }
    const double nearer = p < 0.5 ? p : held(1.0 - p); // exact
    const double root = square_root(held(-natural_log(nearer)));
    real size = 0.0;
    if (root <= 5) {
        const double r = held(root - 1.6);
        size = real(polynomial(probit_tail_above, r)) / polynomial(probit_tail_below, r);
    } else {
        const double r = held(root - 5.0);
        size = real(polynomial(probit_far_above, r)) / polynomial(probit_far_below, r);
    }
    return p < 0.5 ? -size.value : size.value;
}

} // namespace leat::detail

#endif
