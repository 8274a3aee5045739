// Numbers to and from iostreams, independent of locale and stream flags.
//
// ISO C++ asks every engine for << and >>. These helpers write plain decimal digits (and hex
// for reals, so that they return to the bit), whatever locale, base or width the stream has,
// and on garbage set failbit. Only <iosfwd> is needed here: a program that prints has <ostream>.

#ifndef LEAT_CORE_TEXT_HPP
#define LEAT_CORE_TEXT_HPP

#include <array>
#include <bit>
#include <cstdint>
#include <iosfwd>
#include <limits>

namespace leat::detail {

template <class Char, class Traits>
void write_char(std::basic_ostream<Char, Traits>& os, char c) {
    os.put(os.widen(c));
}

/// Writes x in decimal.
template <class Char, class Traits>
void write_unsigned(std::basic_ostream<Char, Traits>& os, std::uint64_t x) {
    char digits[20];
    int n = 0;
    do {
        digits[n++] = static_cast<char>('0' + static_cast<int>(x % 10));
        x /= 10;
    } while (x != 0);
    while (n > 0) {
        write_char(os, digits[--n]);
    }
}

/// Writes a real as the hex digits of its bits: exact, and the same in any locale.
template <class Char, class Traits>
void write_real(std::basic_ostream<Char, Traits>& os, double x) {
    write_char(os, 'x');
    const std::uint64_t bits = std::bit_cast<std::uint64_t>(x);
    for (int shift = 60; shift >= 0; shift -= 4) {
        write_char(os, "0123456789abcdef"[(bits >> shift) & 15u]);
    }
}

/// Skips blanks, tabs and line ends.
template <class Char, class Traits>
void skip_space(std::basic_istream<Char, Traits>& is) {
    for (;;) {
        const auto c = is.peek();
        if (Traits::eq_int_type(c, Traits::eof())) {
            return;
        }
        const char narrow = is.narrow(Traits::to_char_type(c), '\0');
        if (narrow != ' ' && narrow != '\t' && narrow != '\n' && narrow != '\r') {
            return;
        }
        is.get();
    }
}

/// The next character as a digit value below `base`, or -1; consumes it only when it is one.
template <class Char, class Traits>
int read_digit(std::basic_istream<Char, Traits>& is, int base) {
    const auto c = is.peek();
    if (Traits::eq_int_type(c, Traits::eof())) {
        // Reading up to the end of the text is no failure: keep eofbit, nothing more.
        return -1;
    }
    const char narrow = is.narrow(Traits::to_char_type(c), '\0');
    int digit = -1;
    if (narrow >= '0' && narrow <= '9') {
        digit = narrow - '0';
    } else if (narrow >= 'a' && narrow <= 'f') {
        digit = narrow - 'a' + 10;
    }
    if (digit < 0 || digit >= base) {
        return -1;
    }
    is.get();
    return digit;
}

/// Reads a decimal number of at most `max`; on anything else sets failbit and returns false.
template <class Char, class Traits>
bool read_unsigned(std::basic_istream<Char, Traits>& is, std::uint64_t max, std::uint64_t& x) {
    if (is.good()) {
        skip_space(is);
        std::uint64_t value = 0;
        int digit = read_digit(is, 10);
        bool sound = digit >= 0;
        for (; sound && digit >= 0; digit = read_digit(is, 10)) {
            const auto d = static_cast<std::uint64_t>(digit);
            sound = value <= (max - d) / 10 && d <= max;
            value = value * 10 + d;
        }
        if (sound) {
            x = value;
            return true;
        }
    }
    is.setstate(std::basic_istream<Char, Traits>::failbit);
    return false;
}

/// Writes whole numbers, one space between two.
template <class Char, class Traits, class Word, std::size_t N>
void write_words(std::basic_ostream<Char, Traits>& os, const std::array<Word, N>& words) {
    for (std::size_t i = 0; i < N; ++i) {
        if (i != 0) {
            write_char(os, ' ');
        }
        write_unsigned(os, words[i]);
    }
}

/// Reads whole numbers that fit in a word; on anything else sets failbit and returns false.
template <class Char, class Traits, class Word, std::size_t N>
bool read_words(std::basic_istream<Char, Traits>& is, std::array<Word, N>& words) {
    for (Word& word : words) {
        std::uint64_t x = 0;
        if (!read_unsigned(is, std::numeric_limits<Word>::max(), x)) {
            return false;
        }
        word = static_cast<Word>(x);
    }
    return true;
}

/// Writes an integer of either sign in decimal.
template <class Char, class Traits, class Int>
void write_integer(std::basic_ostream<Char, Traits>& os, Int x) {
    if (x < 0) {
        write_char(os, '-');
        write_unsigned(os, 0 - static_cast<std::uint64_t>(x));
    } else {
        write_unsigned(os, static_cast<std::uint64_t>(x));
    }
}

/// Reads a decimal integer within Int; on anything else sets failbit and returns false.
template <class Char, class Traits, class Int>
bool read_integer(std::basic_istream<Char, Traits>& is, Int& x) {
    auto max = static_cast<std::uint64_t>(std::numeric_limits<Int>::max());
    bool negative = false;
    if (std::numeric_limits<Int>::is_signed && is.good()) {
        skip_space(is);
        const auto next = [&is] { // '\0' at the end of the text
            const auto c = is.peek();
            return Traits::eq_int_type(c, Traits::eof()) ? '\0'
                                                         : is.narrow(Traits::to_char_type(c), '\0');
        };
        if (next() == '-') {
            is.get();
            negative = true;
            ++max;
            if (next() < '0' || next() > '9') { // read_unsigned would skip white space
                is.setstate(std::basic_istream<Char, Traits>::failbit);
                return false;
            }
        }
    }
    std::uint64_t magnitude = 0;
    if (!read_unsigned(is, max, magnitude)) {
        return false;
    }
    x = static_cast<Int>(negative ? 0 - magnitude : magnitude);
    return true;
}

/// Reads what write_real wrote; on anything else sets failbit and returns false.
template <class Char, class Traits>
bool read_real(std::basic_istream<Char, Traits>& is, double& x) {
    if (is.good()) {
        skip_space(is);
        const auto c = is.peek();
        if (!Traits::eq_int_type(c, Traits::eof()) &&
            is.narrow(Traits::to_char_type(c), '\0') == 'x') {
            is.get();
            std::uint64_t bits = 0;
            int count = 0;
            for (; count < 16; ++count) {
                const int digit = read_digit(is, 16);
                if (digit < 0) {
                    break;
                }
                bits = (bits << 4) | static_cast<std::uint64_t>(digit);
            }
            if (count == 16) {
                x = std::bit_cast<double>(bits);
                return true;
            }
        }
    }
    is.setstate(std::basic_istream<Char, Traits>::failbit);
    return false;
}

} // namespace leat::detail

#endif
