// Uniform reals in the unit interval, with either end in or out.
//
// `unit(g)` is a double strictly between 0 and 1. Every value is a fixed function of the upper
// bits of one word, so no end can be reached that is not meant to be, whatever the engine returns:
//
//   ends          double                float                 smallest   largest (double)
//   open          (k + 1/2) / 2^52      (k + 1/2) / 2^23      2^-53      1 - 2^-53
//   closed_open   k / 2^53              k / 2^24              0          1 - 2^-53
//   open_closed   (k + 1) / 2^53        (k + 1) / 2^24        2^-53      1
//   closed        k / (2^53 - 1)        k / (2^24 - 1)        0          1
//
// where k is the upper 52 or 53 (23 or 24) bits of the word. All are exact but the last, which is
// one correctly rounded division. The open mapping is symmetric about 1/2. Half a step added to 53
// bits would round to 1 at the top: hence 52.
//
// One draw consumes one `word64` (float: one `word32`). Nothing is rejected here.
// Source: common practice; the arithmetic is checked value by value in the tests.
// Not for the far tail: no value lies below 2^-53. A law with a tail draws from its own sampler,
// never from log(unit(g)).

#ifndef LEAT_UNIFORM_UNIT_HPP
#define LEAT_UNIFORM_UNIT_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>
#include <limits>

namespace leat {

/// Which ends of an interval belong to it; the lower end is named first.
enum class ends {
    open,        ///< (a, b)
    closed_open, ///< [a, b)
    open_closed, ///< (a, b]
    closed,      ///< [a, b]
};

namespace detail {

/// The unit mapping alone: the value that the 64-bit `word` stands for.
/// Multiplying an integer by a power of two is exact, so only the division needs the barrier.
template <class Real, ends Ends>
constexpr Real unit_of(std::uint64_t word) noexcept {
    constexpr int digits = std::numeric_limits<Real>::digits;
    constexpr Real step = Real{1} / static_cast<Real>(std::uint64_t{1} << digits);
    constexpr int kept = Ends == ends::open ? digits - 1 : digits;
    // Signed, because processors convert signed words faster.
    const auto k = static_cast<std::int64_t>(word >> (64 - kept));
    if constexpr (Ends == ends::open) {
        return static_cast<Real>(2 * k + 1) * step;
    } else if constexpr (Ends == ends::closed_open) {
        return static_cast<Real>(k) * step;
    } else if constexpr (Ends == ends::open_closed) {
        return static_cast<Real>(k + 1) * step;
    } else {
        constexpr auto last = static_cast<Real>((std::int64_t{1} << digits) - 1);
        return held(static_cast<Real>(k) / last);
    }
}

/// The double in (0, 1) that a word stands for: (k + 1/2) / 2^52, k its upper 52 bits.
constexpr double open_unit(std::uint64_t word) noexcept {
    return unit_of<double, ends::open>(word);
}

/// The word that one real consumes; for float the upper half counts.
template <class Real, random_words G>
constexpr std::uint64_t unit_word(G& g) {
    if constexpr (std::numeric_limits<Real>::digits > 32) {
        return word64(g);
    } else {
        return std::uint64_t{word32(g)} << 32;
    }
}

} // namespace detail

/// A uniform real in the unit interval: by default a double in the open interval (0, 1).
template <detail::portable_real Real = double, ends Ends = ends::open, random_words G>
constexpr Real unit(G& g) {
    const std::uint64_t word = detail::unit_word<Real>(g);
    return detail::unit_of<Real, Ends>(word);
}

} // namespace leat

#endif
