// From a word to a point between two reals: a + (b - a) u, rounded once to nearest.
//
// u is the unit mapping of the word, taken as the exact number it is. a, b and u are integers times
// powers of two, and so is a + (b - a) u: it is computed in integers, where nothing overflows,
// cancels or is contracted. The route is fixed when the map is made:
//
//   from_zero   a = 0: the rounded product b u is the point
//   narrow      the sum fits in 127 bits: one or two multiplications. Nearly every interval:
//               {1, 2}, {-1, 1}, {0.001, 1000}, {-max, max}
//   wide        it does not, as for {1e-300, 1}: 384 bits, some fifteen times slower
//
// A point on an end that does not belong to the interval is moved to the neighbour inside.

#ifndef LEAT_UNIFORM_DETAIL_INTERVAL_MAP_HPP
#define LEAT_UNIFORM_DETAIL_INTERVAL_MAP_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/uniform/detail/exact_real.hpp"
#include "leat/uniform/unit.hpp"

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// The next real above x, for a finite x below the largest.
template <class Real>
constexpr Real next_up(Real x) noexcept {
    using format = binary_format<Real>;
    using word = typename format::word;
    if (x == 0) {
        return std::numeric_limits<Real>::denorm_min();
    }
    const word bits = std::bit_cast<word>(x);
    return std::bit_cast<Real>((bits & format::sign) != 0 ? bits - 1 : bits + 1);
}

/// u as numerator / 2^shift, exactly.
struct unit_fraction {
    std::uint64_t numerator;
    int shift;
};

/// The exact fraction behind unit_of<Real, Ends>(word).
template <class Real, ends Ends>
constexpr unit_fraction unit_fraction_of(std::uint64_t word) noexcept {
    constexpr int digits = std::numeric_limits<Real>::digits;
    if constexpr (Ends == ends::open) {
        return {((word >> (65 - digits)) << 1) | 1, digits};
    } else if constexpr (Ends == ends::closed_open) {
        return {word >> (64 - digits), digits};
    } else if constexpr (Ends == ends::open_closed) {
        return {(word >> (64 - digits)) + 1, digits};
    } else {
        const scaled_integer u = take_apart(unit_of<Real, Ends>(word));
        // Above 1/4 the shift is the usual one, or one more; 0 and 1 are fractions of any shift.
        const int room = digits + u.exponent;
        return room >= 0 ? unit_fraction{u.mantissa << room, digits}
                         : unit_fraction{u.mantissa, -u.exponent};
    }
}

/// The law that is factor * unit<Real, Ends>(g), rounded, then moved into lowest .. highest.
template <class Real, ends Ends>
struct unit_product {
    bool applies = false; // whether the law in question is one
    Real factor = 1;
    Real lowest = 0;
    Real highest = 1;
};

/// The map of words onto the interval between a < b, both finite and b - a not too small.
template <class Real, ends Ends>
class interval_map {
public:
    constexpr interval_map(Real a, Real b) noexcept
        : a_(a), b_(b), first_(lower_in ? a : next_up(a)), last_(upper_in ? b : -next_up(-b)) {
        if (a == 0) {
            return;
        }
        route_ = route::wide;
        const scaled_integer from = take_apart(a);
        const scaled_integer to = take_apart(b);
        exponent_ = to.mantissa == 0 || from.exponent < to.exponent ? from.exponent : to.exponent;
        const int to_top = to.mantissa == 0 ? exponent_ : to.top();
        const int top = from.top() > to_top ? from.top() : to_top;
        length_ = top + 1 - exponent_;
        // Scaling by 2^(top - 126) must stay clear of subnormal numbers.
        if (length_ + digits < 128 && top >= -850) {
            route_ = route::narrow;
            const word_pair start = shifted(from);
            const word_pair minus_start = add({~start.low, ~start.high}, {1, 0});
            const word_pair width =
                add(to.mantissa == 0 ? word_pair{0, 0} : shifted(to), minus_start);
            const int spare = Ends == ends::closed ? 0 : 127 - digits - length_;
            start_ = shift_left(start, digits + spare);
            width_ = shift_left(width, spare);
            exponent_ -= spare;
            scale_ = power_of_two(exponent_ - digits + 64);
        }
    }

    [[nodiscard]] constexpr Real a() const noexcept { return a_; }
    [[nodiscard]] constexpr Real b() const noexcept { return b_; }

    /// The same as a product, which it is where a = 0.
    [[nodiscard]] constexpr unit_product<Real, Ends> as_product() const noexcept {
        return {route_ == route::from_zero, b_, first_, last_};
    }

    /// The point of `word`: monotone in it, always inside. Inlined by force, with the short route:
    /// clang takes the value barrier for a call and would not.
    [[nodiscard, gnu::always_inline]] constexpr Real operator()(std::uint64_t word) const noexcept {
        const Real x = rounded_point(word);
        return x < first_ ? first_ : x > last_ ? last_ : x;
    }

private:
    static constexpr int digits = std::numeric_limits<Real>::digits;
    static constexpr bool lower_in = Ends == ends::closed_open || Ends == ends::closed;
    static constexpr bool upper_in = Ends == ends::open_closed || Ends == ends::closed;
    enum class route : unsigned char { from_zero, narrow, wide };

    static constexpr word_pair shift_left(word_pair x, int bits) noexcept {
        if (bits >= 64) {
            return {0, x.low << (bits - 64)};
        }
        return {x.low << bits, (x.high << bits) | (x.low >> 1 >> (63 - bits))};
    }

    /// 2^k as a normal double.
    static constexpr double power_of_two(int k) noexcept {
        return std::bit_cast<double>(static_cast<std::uint64_t>(k + 1023) << 52);
    }

    /// x / 2^exponent_ in two's complement.
    [[nodiscard]] constexpr word_pair shifted(scaled_integer x) const noexcept {
        const word_pair m = shift_left({x.mantissa, 0}, x.exponent - exponent_);
        return x.negative ? add({~m.low, ~m.high}, {1, 0}) : m;
    }

    [[nodiscard, gnu::always_inline]] constexpr Real
    rounded_point(std::uint64_t word) const noexcept {
        if (route_ == route::from_zero) {
            return held(b_ * unit_of<Real, Ends>(word));
        }
        return exact_point(word);
    }

    [[nodiscard]] constexpr Real exact_point(std::uint64_t word) const noexcept {
        const unit_fraction u = unit_fraction_of<Real, Ends>(word);
        if constexpr (Ends == ends::closed) {
            if (route_ == route::narrow && length_ + u.shift < 128) {
                const word_pair start = shift_left(start_, u.shift - digits);
                return round_to<Real>(add(start, multiply(width_, word_pair{u.numerator, 0})),
                                      exponent_ - u.shift);
            }
        } else if (route_ == route::narrow) {
            return narrow_point(add(start_, multiply(width_, word_pair{u.numerator, 0})));
        }
        return wide_point(u);
    }

    /// The point v * 2^(exponent_ - digits). The larger end fills 127 bits, so that the upper word
    /// holds all that matters, unless the point is much nearer to 0 than that end.
    [[nodiscard]] constexpr Real narrow_point(word_pair v) const noexcept {
        const std::uint64_t flip = 0 - (v.high >> 63);
        if ((v.high ^ flip) < std::uint64_t{1} << 55) {
            return round_to<Real>(v, exponent_ - digits);
        }
        // Round to odd, twice for float, then once to nearest: Boldo and Melquiond, Emulation of
        // FMA and correctly rounded sums, IEEE Trans. Computers 57(4), 2008.
        auto top = static_cast<std::int64_t>(v.high | static_cast<std::uint64_t>(v.low != 0));
        if constexpr (digits < 53) {
            top = (top & ~std::int64_t{1023}) | static_cast<std::int64_t>((top & 1023) != 0) << 10;
        }
        // A product with a power of two is exact: it needs no barrier.
        return static_cast<Real>(static_cast<double>(top) * scale_);
    }

    [[nodiscard, gnu::noinline]] constexpr Real wide_point(unit_fraction u) const noexcept {
        if (u.numerator == 0) {
            return a_;
        }
        if (u.numerator == std::uint64_t{1} << digits && u.shift == digits) {
            return b_;
        }
        scaled_integer from = take_apart(a_);
        scaled_integer to = take_apart(b_);
        if (to.mantissa == 0) {
            to.exponent = from.exponent;
        }
        // An end smaller than the other by more than 2^200 can only break ties: any number as
        // small does it as well, and fits.
        constexpr int reach = 200;
        if (from.top() + reach < to.top()) {
            from = {1, to.top() - reach, from.negative};
        } else if (to.top() + reach < from.top()) {
            to = {1, from.top() - reach, to.negative};
        }
        const int grid = from.exponent < to.exponent ? from.exponent : to.exponent;
        wide_sum sum; // a + b u - a u, in units of 2^(grid - u.shift)
        sum.add({from.mantissa, 0}, from.exponent - grid + u.shift, from.negative);
        sum.add(multiply_wide(to.mantissa, u.numerator), to.exponent - grid, to.negative);
        sum.add(multiply_wide(from.mantissa, u.numerator), from.exponent - grid, !from.negative);
        return sum.template rounded<Real>(grid - u.shift);
    }

    Real a_;
    Real b_;
    Real first_;
    Real last_;
    word_pair start_{0, 0}; // a in units of 2^(exponent_ - digits)
    word_pair width_{0, 0}; // b - a in units of 2^exponent_
    double scale_ = 0;      // 2^(exponent_ - digits + 64)
    int exponent_ = 0;
    int length_ = 0; // bits of the larger end in units of 2^exponent_
    route route_ = route::from_zero;
};

} // namespace leat::detail

#endif
