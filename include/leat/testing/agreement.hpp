// What a statistical check found: whether samples agree with what was expected of them, and why.
//
// Returned by agrees_with_mean and its like. It converts to bool, prints itself by <<, and hands
// its message to a test framework's own result type (one that is made from a bool and takes text by
// <<, as GoogleTest's AssertionResult), so that EXPECT_TRUE(leat::agrees_with_mean(...)) says what
// was found. Nothing of a framework is included.
//
// The alarm rate is how often the check fails although nothing is wrong, when the random numbers
// are new. With a fixed seed a check passes or fails for good; the rate then says how likely it is
// to fail after a harmless change that draws other numbers. Checks add up: n of them at a rate r
// raise a false alarm with a chance of at most n r.

#ifndef LEAT_TESTING_AGREEMENT_HPP
#define LEAT_TESTING_AGREEMENT_HPP

#include "leat/core/errors.hpp"

#include <concepts>
#include <cstdint>
#include <cstdio> // snprintf
#include <iosfwd>
#include <iterator> // begin, end of any list
#include <string>
#include <type_traits>

namespace leat {
namespace testing {
namespace detail {

/// A test framework's own result: made from a bool, and takes text.
template <class Result>
concept framework_result = !std::is_arithmetic_v<Result> && std::constructible_from<Result, bool> &&
                           requires(Result & r, const std::string& text) {
    { r << text } -> std::same_as<Result&>;
};

} // namespace detail

/// The outcome of a check.
struct agreement {
    bool agrees = false;   ///< whether nothing was found
    double statistic = 0;  ///< t, chi-square, distance: what the check says it is
    double p = 0;          ///< the chance of a statistic at least as extreme, if nothing is wrong
    double alarm_rate = 0; ///< as asked for: the check fails when p is below it
    std::uint64_t samples = 0; ///< how many were looked at
    std::string message;       ///< one line with all of it

    /// Whether it agrees.
    explicit operator bool() const noexcept { return agrees; }

    /// The same as a test framework's result, with the message.
    template <detail::framework_result Result>
    operator Result() const {
        Result r(agrees);
        r << message;
        return r;
    }

    /// Writes the message.
    template <class Traits>
    friend std::basic_ostream<char, Traits>& operator<<(std::basic_ostream<char, Traits>& os,
                                                        const agreement& a) {
        return os << a.message;
    }
};

namespace detail {

using leat::detail::message;

/// A list of numbers: an array, vector or span of any arithmetic type.
template <class List>
concept number_list = requires(const List& list) {
    std::end(list);
    requires std::is_arithmetic_v<std::remove_cvref_t<decltype(*std::begin(list))>>;
};

/// Appends x with four digits.
inline message& rounded(message& m, double x) {
    char digits[32];
    std::snprintf(digits, sizeof digits, "%.4g", x);
    for (char& c : digits) {
        c = c == ',' ? '.' : c; // the decimal point of some locales
    }
    return m.text(digits);
}

/// The alarm rate, unless no check could have it.
inline double alarm_rate_or_refuse(const char* check, double rate) {
    if (!(rate > 0 && rate < 1)) {
        leat::detail::refuse(check, "alarm_rate", rate, "must be > 0 and < 1");
    }
    return rate;
}

/// Completes what `found` lacks: the verdict, and a message about `what` was seen.
inline agreement judged(const char* check, agreement found, const message& what) {
    found.agrees = found.p >= found.alarm_rate;
    message m;
    m.text("leat::").text(check).text(found.agrees ? ": agrees: " : ": does not agree: ");
    m.text(what.c_str()).text("; ").value(found.samples).text(" samples, p = ");
    rounded(m, found.p).text(found.agrees ? ", not below" : ", below").text(" the alarm rate ");
    found.message = m.value(found.alarm_rate).c_str();
    return found;
}

} // namespace detail
} // namespace testing

using testing::agreement;

} // namespace leat

#endif
