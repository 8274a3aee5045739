#include "text.hpp"

#include <charconv>
#include <cmath>

namespace skerry {
namespace {

/// How many characters of UTF-8 text a reader sees: continuation bytes are not counted.
std::size_t columns(std::string_view text) {
    std::size_t n = 0;
    for (const char c : text) {
        n += (static_cast<unsigned char>(c) & 0xC0u) != 0x80u ? 1u : 0u;
    }
    return n;
}

std::string padding(std::string_view text, std::size_t width) {
    const std::size_t used = columns(text);
    return std::string(used < width ? width - used : 0, ' ');
}

} // namespace

std::string fixed(double x, int digits) {
    char buffer[400]; // the largest double has 309 digits before its point
    const auto end =
        std::to_chars(buffer, buffer + sizeof buffer, x, std::chars_format::fixed, digits).ptr;
    return std::string(buffer, end);
}

std::string shortest(double x) {
    char buffer[40];
    return std::string(buffer, std::to_chars(buffer, buffer + sizeof buffer, x).ptr);
}

std::string hexadecimal(std::uint64_t x) {
    char buffer[16];
    return std::string(buffer, std::to_chars(buffer, buffer + sizeof buffer, x, 16).ptr);
}

double rounded(double x, int digits) {
    const double power = std::pow(10.0, digits);
    return std::round(x * power) / power;
}

std::optional<long long> whole_number(std::string_view text, long long lo, long long hi) {
    long long value = 0;
    const auto [end, problem] = std::from_chars(text.data(), text.data() + text.size(), value);
    if (problem != std::errc{} || end != text.data() + text.size() || value < lo || value > hi) {
        return std::nullopt;
    }
    return value;
}

std::string quoted(std::string_view text) {
    constexpr std::size_t most = 80;
    constexpr char digits[] = "0123456789abcdef";
    std::string safe = "\"";
    for (const char c : text.substr(0, most)) {
        const auto byte = static_cast<unsigned char>(c);
        if (byte >= 0x20u && byte < 0x7Fu) {
            safe += c;
        } else {
            safe += "\\x";
            safe += digits[byte >> 4];
            safe += digits[byte & 15u];
        }
    }
    return safe + (text.size() > most ? "...\"" : "\"");
}

std::string left(std::string_view text, std::size_t width) {
    return std::string(text) + padding(text, width);
}

std::string right(std::string_view text, std::size_t width) {
    return padding(text, width) + std::string(text);
}

} // namespace skerry
