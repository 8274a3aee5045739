// A trial of rejection: a point uniform in the square (-1, 1) x (-1, 1), and where it lies to the
// unit circle, known from integers before any real is computed.
//
// k being the upper 53 bits of a word (24 for float), a coordinate is (2 k + 1) / 2^53 - 1 (2^24):
// an odd multiple of 2^-53, symmetric about 0, never 0, never an end. It is handed out in steps of
// that size, an exact integer, so that an offset of half a width is rounded once.
// One trial consumes two word64 (word32 for float) of the engine: the first coordinate's first.
//
// A branch that the processor cannot foresee, taken by one trial in five, costs as long as its
// condition takes to compute. The upper halves of the words, squared and added as integers, decide
// all but a few trials in 2^28 early; the caller settles those by its own rounded arithmetic.

#ifndef LEAT_REGIONS_DETAIL_SQUARE_TRIAL_HPP
#define LEAT_REGIONS_DETAIL_SQUARE_TRIAL_HPP

#include "leat/core/concepts.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// 2^-53 (2^-24): steps times this lie in (-1, 1).
template <portable_real Real>
inline constexpr Real signed_unit_step = std::numeric_limits<Real>::epsilon() / 2;

template <portable_real Real>
class square_trial {
public:
    template <random_words G>
    explicit constexpr square_trial(G& g) : x_(signed_word(g)), y_(signed_word(g)) {}

    /// The coordinates in steps.
    [[nodiscard]] constexpr Real x() const noexcept { return steps(x_); }
    [[nodiscard]] constexpr Real y() const noexcept { return steps(y_); }

    /// The squared distance from the centre, 1 being `circle`, with an error below `error`.
    [[nodiscard]] constexpr std::uint64_t norm() const noexcept {
        constexpr int surplus = width - 32; // |upper half| <= 2^31
        const auto x = static_cast<std::int64_t>(x_ >> surplus);
        const auto y = static_cast<std::int64_t>(y_ >> surplus);
        return static_cast<std::uint64_t>(x * x) + static_cast<std::uint64_t>(y * y);
    }
    static constexpr std::uint64_t circle = std::uint64_t{1} << 62;
    static constexpr std::uint64_t error = std::uint64_t{1}
                                           << (std::is_same_v<Real, double> ? 34 : 41);

private:
    using integer = std::conditional_t<std::is_same_v<Real, double>, std::int64_t, std::int32_t>;
    static constexpr int width = 8 * static_cast<int>(sizeof(integer));

    template <class G>
    static constexpr integer signed_word(G& g) {
        if constexpr (width == 64) {
            return static_cast<integer>(word64(g) ^ (std::uint64_t{1} << 63));
        } else {
            return static_cast<integer>(word32(g) ^ (std::uint32_t{1} << 31));
        }
    }

    static constexpr Real steps(integer word) noexcept {
        return static_cast<Real>((word >> (width - std::numeric_limits<Real>::digits)) * 2 + 1);
    }

    integer x_; // drawn first
    integer y_;
};

} // namespace leat::detail

#endif
