// Polynomials of the logarithm of the gamma function, for core/log_gamma.hpp.
//
// Written by tests/reference/make_math_tables.py: do not edit.

#ifndef LEAT_CORE_LOG_GAMMA_TABLE_HPP
#define LEAT_CORE_LOG_GAMMA_TABLE_HPP

namespace leat::detail {

/// ln Gamma(3/2 + t) / (t^2 - 1/4) for |t| <= 1/2, lowest degree first.
inline constexpr double log_gamma_middle[24] = {
    0x1.eeb95b094c191p-2,  -0x1.2aed059bd608ap-3,  0x1.01af62a2929e9p-4,  -0x1.007aa83cee1e1p-5,
    0x1.1334235278be4p-6,  -0x1.34dbda148eef6p-7,  0x1.64f066528cd9bp-8,  -0x1.a503523aa8e93p-9,
    0x1.f814b793ba519p-10, -0x1.313e883c22a03p-10, 0x1.750aee15dde55p-11, -0x1.cb45751de412fp-12,
    0x1.1c738f7c6bcc4p-12, -0x1.62316175d744p-13,  0x1.bb23a2fc2e075p-14, -0x1.1637a53958dbap-14,
    0x1.5cf180d17742ap-15, -0x1.b8f9886378442p-16, 0x1.24db3d1cbdecep-16, -0x1.743f4a6b33b57p-17,
    0x1.4b78bd46746e8p-18, -0x1.a5ac06e896ffdp-19, 0x1.5fe008216fbe9p-18, -0x1.c36de923d02c4p-19,
};

/// B(2k) / (2k (2k - 1)), k = 1 to 9: Stirling's series in 1/x^(2k-1).
inline constexpr double stirling_series[9] = {
    0x1.5555555555555p-4,   -0x1.6c16c16c16c17p-9, 0x1.a01a01a01a01ap-11,
    -0x1.3813813813814p-11, 0x1.b951e2b18ff23p-11, -0x1.f6ab0d9993c7dp-10,
    0x1.a41a41a41a41ap-8,   -0x1.e4286cb0f5398p-6, 0x1.6fe96381e068p-3,
};

/// (ln Gamma(1 + 2x) - 2 ln Gamma(1 + x)) / x^2 as a power series in x: the coefficient of x^(n-2)
/// is (-1)^n zeta(n) (2^n - 2) / n (Abramowitz and Stegun, 6.1.33).
inline constexpr double weibull_spread[16] = {
    0x1.a51a6625307d3p0,  -0x1.33ba004f00621p1,  0x1.e4e17caddba7ep1,  -0x1.8e2e2562fbb35p2,
    0x1.5066c4b78bceep3,  -0x1.226793557692p4,   0x1.fe1240844e59fp4,  -0x1.c63e69fcea837p5,
    0x1.9934e294130dfp6,  -0x1.742f1004881a4p7,  0x1.554028d77d73dp8,  -0x1.3b09e546539bfp9,
    0x1.248dbacc24acfp10, -0x1.110ef02a16226p11, 0x1.fffe00c59a431p11, -0x1.e1e0f12f1599ep12,
};
inline constexpr double half_log_two_pi = 0x1.d67f1c864beb5p-1; // ln(2 pi) / 2

} // namespace leat::detail

#endif
