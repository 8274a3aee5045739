// What the laws of whole numbers share: their integer types, and the way between those and the
// doubles that they are computed in.
//
// A result type holds at most 64 bits. Where a law has no largest value, parameters that would pass
// the type's with a chance above 2^-64 are refused; the draws beyond, which are rarer, are not made
// (laws that reject) or given as the largest value (the others): headers say which.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_SUPPORT_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_SUPPORT_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/errors.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/uniform_integer.hpp" // number_integer, message_value

#include <cstdint>
#include <limits>
#include <utility> // in_range

namespace leat::detail {

/// 64 ln 2: a chance of 2^-64 is exp of minus this.
inline constexpr double smallest_refused_log = 0x1.62e42fefa39efp+5;

/// The largest value of an integer type, as draws of all types are computed.
template <number_integer Int>
inline constexpr auto largest = static_cast<std::uint64_t>(std::numeric_limits<Int>::max());

/// An integer argument of any type as the law's own type, or refused where that does not hold it.
template <number_integer Int>
constexpr Int to_integer(const char* law_name, const char* parameter, number_integer auto x) {
    if (!std::in_range<Int>(x)) {
        refuse(law_name, parameter, message_value(x), "must fit the law's integer type");
    }
    return static_cast<Int>(x);
}

/// The fault of a chance that must lie in [0, 1].
constexpr fault unless_chance(const char* parameter, double p) noexcept {
    return p >= 0 && p <= 1 ? fault{} : fault{parameter, p, "must be >= 0 and <= 1"};
}

/// The fault of a count that must lie in 0 .. 2^53, where doubles hold every whole number.
template <number_integer Int>
constexpr fault unless_count(const char* parameter, Int n) noexcept {
    const auto x = static_cast<double>(n);
    return x >= 0 && x <= 0x1p53 && std::in_range<std::int64_t>(n) &&
                   static_cast<std::int64_t>(n) <= (std::int64_t{1} << 53)
               ? fault{}
               : fault{parameter, x, "must be >= 0 and <= 2^53"};
}

/// The largest integer up to x, for |x| < 2^62.
constexpr std::int64_t floor_to_integer(double x) noexcept {
    const auto towards_zero = static_cast<std::int64_t>(x);
    return towards_zero - (static_cast<double>(towards_zero) > x ? 1 : 0);
}

/// The counts 0 .. max as offsets from one of them.
class offsets_from {
public:
    constexpr offsets_from(std::uint64_t base, std::uint64_t max) noexcept
        : base_(base), low_(-up_to_bound(base)), high_(up_to_bound(max - base)) {}

    /// Sets the offset to floor(x) and k to that count; false where there is none. No branch on the
    /// sign of the offset: it is a coin toss.
    [[nodiscard]] constexpr bool floor(double x, std::int64_t& offset,
                                       std::uint64_t& k) const noexcept {
        if (!(x > -0x1p62 && x < 0x1p62)) [[unlikely]] {
            return false;
        }
        offset = floor_to_integer(x);
        k = base_ + static_cast<std::uint64_t>(offset);
        return offset >= low_ && offset <= high_;
    }

private:
    static constexpr std::int64_t up_to_bound(std::uint64_t n) noexcept {
        constexpr std::int64_t bound = std::int64_t{1} << 62;
        return n < static_cast<std::uint64_t>(bound) ? static_cast<std::int64_t>(n) : bound;
    }

    std::uint64_t base_;
    std::int64_t low_;
    std::int64_t high_;
};

/// x >= 0 without its fraction, at most max.
constexpr std::uint64_t floor_at_most(double x, std::uint64_t max) noexcept {
    if (x < 0x1p63) [[likely]] { // processors convert to signed words faster
        const auto k = static_cast<std::uint64_t>(static_cast<std::int64_t>(x));
        return k < max ? k : max;
    }
    // As a double max may be max + 1; from there on x does not fit.
    return x < static_cast<double>(max) ? static_cast<std::uint64_t>(x) : max;
}

/// True for a whole number.
constexpr bool whole(double x) noexcept {
    constexpr double all_whole = 0x1p52;
    return x >= all_whole || x <= -all_whole ||
           static_cast<double>(static_cast<std::int64_t>(x)) == x;
}

} // namespace leat::detail

#endif
