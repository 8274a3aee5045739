// On which side of a line a point lies, and the area of a triangle: signs exact, whatever rounding.
//
// Points are doubles whose coordinates are 0 or from 2^-400 to 4 in size (see plane_frame), so that
// no product leaves the range in which products are exact in two parts.
// Method: rounded arithmetic with its error bound, and where that leaves doubt the sum of the six
// products as an expansion of doubles that do not overlap. Source: J. R. Shewchuk, Adaptive
// precision floating-point arithmetic and fast robust geometric predicates, Discrete Comput. Geom.
// 18, 1997: Theorem 10 (growing an expansion) and section 4.2 (the bound ccwerrboundA).

#ifndef LEAT_REGIONS_DETAIL_ORIENTATION_HPP
#define LEAT_REGIONS_DETAIL_ORIENTATION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/error_free.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

using plane_point = std::array<double, 2>;

/// A sum of doubles, exactly: parts that do not overlap, from the smallest.
template <std::size_t Terms>
class exact_sum {
public:
    constexpr void add(double x) noexcept {
        for (std::size_t i = 0; i < size_; ++i) {
            const two_part both = two_sum(x, parts_[i]);
            parts_[i] = both.low;
            x = both.high;
        }
        parts_[size_++] = x;
    }
    constexpr void add_product(double a, double b) noexcept {
        if (a != 0 && b != 0) {
            const two_part product = two_product(a, b);
            add(product.low);
            add(product.high);
        }
    }
    /// The sum within an ulp or two; its sign is exact.
    [[nodiscard]] constexpr double value() const noexcept {
        strict<double> sum = 0.0;
        for (std::size_t i = 0; i < size_; ++i) {
            sum = sum + parts_[i];
        }
        return sum.value;
    }

private:
    std::array<double, Terms> parts_{};
    std::size_t size_ = 0;
};

/// Twice the signed area of the triangle a b c, from its six products.
constexpr double doubled_area_by_expansion(const plane_point& a, const plane_point& b,
                                           const plane_point& c) noexcept {
    exact_sum<12> sum;
    sum.add_product(a[0], b[1]);
    sum.add_product(-a[1], b[0]);
    sum.add_product(b[0], c[1]);
    sum.add_product(-b[1], c[0]);
    sum.add_product(c[0], a[1]);
    sum.add_product(-c[1], a[0]);
    return sum.value();
}

/// The same; rounded arithmetic is trusted where its error is below `Doubt` times the two products
/// that it subtracts, and these are not that much larger than their difference.
constexpr double doubled_area_filtered(const plane_point& a, const plane_point& b,
                                       const plane_point& c, double doubt) noexcept {
    using real = strict<double>;
    const real left = (real(a[0]) - c[0]) * (real(b[1]) - c[1]);
    const real right = (real(a[1]) - c[1]) * (real(b[0]) - c[0]);
    const real area = left - right;
    const real sum = real(magnitude(left.value)) + magnitude(right.value);
    if (magnitude(area.value) > (sum * doubt).value) {
        return area.value;
    }
    return doubled_area_by_expansion(a, b, c);
}

/// Above 0 where a, b, c turn left (counterclockwise), 0 where they lie on one line: exactly. In
/// size it is twice the area, roughly.
constexpr double turn(const plane_point& a, const plane_point& b, const plane_point& c) noexcept {
    constexpr double rounding = 0x1p-53;
    return doubled_area_filtered(a, b, c, (3 + 16 * rounding) * rounding);
}

/// Twice the signed area of the triangle a b c, within 2^-30 of itself; its sign is exact.
constexpr double doubled_area(const plane_point& a, const plane_point& b,
                              const plane_point& c) noexcept {
    return doubled_area_filtered(a, b, c, 0x1p-21);
}

} // namespace leat::detail

#endif
