// Error-free transformations: a sum or a product together with exactly what rounding cut off.
//
// Domain: finite doubles whose sum or product does not overflow; for a product, factors below 2^996
// in size and a product above 2^-960, or the error part is not exact. No fused multiply-add is
// used, so that the bits are the same with and without one. Source: T. J. Dekker, A floating-point
// technique for extending the available precision, Numer. Math. 18, 1971; D. E. Knuth, TAOCP vol.
// 2, 4.2.2, Theorem B (the sum).

#ifndef LEAT_CORE_ERROR_FREE_HPP
#define LEAT_CORE_ERROR_FREE_HPP

#include "leat/core/barrier.hpp"

#include <bit>
#include <cstdint>

namespace leat::detail {

/// A real as the exact sum of two doubles, the second small beside the first.
struct two_part {
    double high;
    double low;
};

/// |x|, without the branch on a sign that comparing with two bounds may become.
constexpr double magnitude(double x) noexcept {
    return std::bit_cast<double>(std::bit_cast<std::uint64_t>(x) & ~(std::uint64_t{1} << 63));
}

/// a + b, exactly; no order of size asked.
constexpr two_part two_sum(double a, double b) noexcept {
    using real = strict<double>;
    const real sum = real(a) + b;
    const real b_seen = sum - a;
    const real a_seen = sum - b_seen;
    return {sum.value, ((real(a) - a_seen) + (real(b) - b_seen)).value};
}

/// a + b, exactly, where a = 0 or |a| >= |b|.
constexpr two_part ordered_two_sum(double a, double b) noexcept {
    using real = strict<double>;
    const real sum = real(a) + b;
    return {sum.value, (real(b) - (sum - a)).value};
}

/// x as the sum of two doubles of 26 bits each (Veltkamp's splitting).
constexpr two_part halves(double x) noexcept {
    using real = strict<double>;
    const real scaled = real(x) * 134217729.0; // 2^27 + 1
    const real high = scaled - (scaled - x);
    return {high.value, (real(x) - high).value};
}

/// a * b, exactly.
constexpr two_part two_product(double a, double b) noexcept {
    using real = strict<double>;
    const real product = real(a) * b;
    const two_part x = halves(a);
    const two_part y = halves(b);
    const real first = real(x.high) * y.high - product;
    const real middle = (first + real(x.high) * y.low) + real(x.low) * y.high;
    return {product.value, (middle + real(x.low) * y.low).value};
}

} // namespace leat::detail

#endif
