// Time, counted in whole seconds.
//
// The laws draw hours as real numbers; the simulation rounds each drawn duration once, to a whole
// second, and adds and compares integers from then on. So sums are exact, two events at the same
// second are ordered by a rule and not by rounding, and a time is the same on every machine.

#ifndef SKERRY_BANK_UNITS_HPP
#define SKERRY_BANK_UNITS_HPP

#include <algorithm>
#include <cmath>
#include <cstdint>

namespace skerry {

using seconds = std::int64_t;

inline constexpr seconds hour = 3600;
inline constexpr seconds day = 24 * hour;

/// A time that is never reached; a thousand of them can be added without overflow.
inline constexpr seconds never = seconds{1} << 52;

/// A drawn duration in whole seconds, at least one; what is longer than `never` is `never`.
inline seconds from_hours(double hours) {
    const double exact = hours * static_cast<double>(hour);
    return exact < static_cast<double>(never) ? std::max<seconds>(1, std::llround(exact)) : never;
}

/// The same duration in hours, for reports.
inline double to_hours(seconds t) { return static_cast<double>(t) / static_cast<double>(hour); }

} // namespace skerry

#endif
