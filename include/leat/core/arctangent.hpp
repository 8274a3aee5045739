// The angle of a point in the first quadrant, in radians, the same bits everywhere.
//
// Method: the smaller coordinate over the larger is j / 64 and a rest; a table holds the arctangent
// of j / 64, and the addition theorem leaves r = (small - t large) / (large + t small), t = j / 64,
// |r| <= 1 / 128 (below 1 / 32 the ratio itself), for the series of the arctangent (Abramowitz and
// Stegun, 4.4.34 and 4.4.42). Arguments: x, y >= 0, finite and at most 2^1022. Error, measured
// against MPFR in tests/core: at most 1.1 ulp. An angle below the smallest normal number is given
// as 0.

#ifndef LEAT_CORE_ARCTANGENT_HPP
#define LEAT_CORE_ARCTANGENT_HPP

#include "leat/core/arctangent_table.hpp" // by tests/reference/make_math_tables.py
#include "leat/core/barrier.hpp"

#include <bit>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// arctan(small / large), for 0 <= small <= large.
constexpr double arctangent_below_one(double small, double large) noexcept {
    using real = strict<double>;
    const double ratio = large == 0 ? 0.0 : held(small / large);
    if (ratio < std::numeric_limits<double>::min()) {
        return 0;
    }
    if (ratio < 0x1p-28) { // the next term is below half an ulp
        return ratio;
    }
    // Near 0 the ratio itself has the fewest roundings.
    const auto step =
        ratio < 0x1p-5 ? 0u : static_cast<std::uint32_t>((real(ratio) * 64.0 + 0.5).value);
    const real t = real(static_cast<double>(step)) * 0x1p-6;
    // t has 7 bits: its products with the upper 46 bits of `large` and with the rest are exact.
    const double high = std::bit_cast<double>(std::bit_cast<std::uint64_t>(large) >> 7 << 7);
    const real above = (real(small) - t * high) - t * (real(large) - high);
    const real r = step == 0 ? real(ratio) : above / (real(large) + t * small);
    const real square = r * r;
    const real series = square * (real(-0x1.5555555555555p-2) +
                                  square * (real(0x1.999999999999ap-3) +
                                            square * (real(-0x1.2492492492492p-3) +
                                                      square * (real(0x1.c71c71c71c71cp-4) -
                                                                square * 0x1.745d1745d1746p-4))));
    const arctangent_entry& entry = arctangent_table[step];
    return (real(entry.value) + (r + (r * series + entry.rest))).value;
}

/// The angle of (x, y) above the axis of x, between 0 and pi / 2.
constexpr double arctangent(double y, double x) noexcept {
    using real = strict<double>;
    return y <= x ? arctangent_below_one(y, x)
                  : (real(half_pi) + (real(half_pi_rest) - arctangent_below_one(x, y))).value;
}

} // namespace leat::detail

#endif
