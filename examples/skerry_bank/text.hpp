// Numbers as text, the same in every locale.

#ifndef SKERRY_BANK_TEXT_HPP
#define SKERRY_BANK_TEXT_HPP

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace skerry {

/// x with so many digits after the point.
std::string fixed(double x, int digits);

/// x as short as it can be said and still read back.
std::string shortest(double x);

/// x in base 16.
std::string hexadecimal(std::uint64_t x);

/// x rounded to so many digits after the point: what goes into results.json where a last bit
/// could depend on the compiler (sums that may be contracted, the t quantile).
double rounded(double x, int digits);

/// The whole of `text` as a decimal number from lo to hi, or nothing.
std::optional<long long> whole_number(std::string_view text, long long lo, long long hi);

/// `text` in quotes, as it may stand in a one-line message: what is not printable ASCII as \xNN,
/// and no more than the first 80 characters.
std::string quoted(std::string_view text);

/// `text` in a field of `width` characters, at its left or right edge.
std::string left(std::string_view text, std::size_t width);
std::string right(std::string_view text, std::size_t width);

} // namespace skerry

#endif
