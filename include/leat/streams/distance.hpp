// Distances: how jump, rewind, block and leapfrog take a number of steps.
//
// An integer of any type, a wide_integer, pow2(k) for any k, or decimal text. Whatever it is, it is
// reduced modulo the engine's period exactly. A negative integer is refused.

#ifndef LEAT_STREAMS_DISTANCE_HPP
#define LEAT_STREAMS_DISTANCE_HPP

#include "leat/core/errors.hpp"
#include "leat/core/montgomery.hpp" // powers of two modulo a period
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <string_view> // decimal text
#include <type_traits>

namespace leat {

namespace detail {

template <class Int>
concept step_integer = std::integral<Int> && !std::same_as<Int, bool> && sizeof(Int) <= 8;

/// What may be given as a number of steps.
template <class Distance>
concept step_distance = step_integer<std::remove_cvref_t<Distance>> ||
    std::same_as<std::remove_cvref_t<Distance>, wide_integer> ||
    std::same_as<std::remove_cvref_t<Distance>, power_of_two_distance> ||
    std::convertible_to<Distance, std::string_view>;

/// An engine that can move by any number of steps.
template <class Engine>
concept jumpable = requires(Engine& e, const wide_integer& distance) {
    e.advance(distance);
    { Engine::period() } -> std::same_as<wide_integer>;
};

/// The period, as a constant: some engines work it out, which is done once, by the compiler.
template <class Engine>
inline constexpr wide_integer period_of = Engine::period();

/// An engine's period as 2^twos times an odd number, which is given in 64-bit words too.
template <class Engine>
struct period_parts {
    static constexpr wide_integer whole = Engine::period();
    static constexpr unsigned twos = [] {
        unsigned n = 0;
        while (!whole.bit(static_cast<int>(n))) {
            ++n;
        }
        return n;
    }();
    static constexpr wide_integer odd = whole >> twos;
    static constexpr std::size_t size = static_cast<std::size_t>(odd.bit_width() + 63) / 64;
    static constexpr std::array<std::uint64_t, size> words = [] {
        std::array<std::uint64_t, size> low{};
        for (std::size_t i = 0; i < size; ++i) {
            low[i] = odd.word(static_cast<int>(i));
        }
        return low;
    }();
};

/// 2^k modulo an engine's period, for any k.
template <class Engine>
constexpr wide_integer power_of_two_modulo_period(std::uint64_t k) {
    using parts = period_parts<Engine>;
    if (k < static_cast<std::uint64_t>(parts::whole.bit_width()) - 1) {
        return wide_integer::power_of_two(static_cast<unsigned>(k));
    }
    if constexpr (parts::odd == wide_integer{1}) {
        return {};
    } else {
        // 2^twos divides both 2^k and the period; the rest is a power modulo an odd number.
        constexpr montgomery<parts::size> field{parts::words};
        constexpr std::array<std::uint64_t, parts::size> two = field.to_form({2});
        const std::array<std::uint64_t, parts::size> power =
            field.from_form(field.power_form(two, wide_integer{k - parts::twos}));
        return wide_integer{power} << parts::twos;
    }
}

/// Appends a wide integer in decimal to a message.
inline message& print(message& m, wide_integer x) {
    char digits[310]; // 2^1024 has 309
    char* first = digits + sizeof digits - 1;
    *first = '\0';
    const wide_integer ten{10};
    do {
        const wide_integer quotient = x / ten;
        *--first = static_cast<char>('0' + (x - quotient * ten).word(0));
        x = quotient;
    } while (x != wide_integer{});
    return m.text(first);
}

/// Writes a wide integer to a stream, in decimal.
template <class Char, class Traits>
void write_wide(std::basic_ostream<Char, Traits>& os, const wide_integer& x) {
    message m;
    for (const char* c = print(m, x).c_str(); *c != '\0'; ++c) {
        write_char(os, *c);
    }
}

/// Reads decimal digits, at most 308 of them: such a number is below 2^1024, and above all periods.
/// On anything else sets failbit and returns false.
template <class Char, class Traits>
bool read_wide(std::basic_istream<Char, Traits>& is, wide_integer& x) {
    if (is.good()) {
        skip_space(is);
        char digits[309];
        std::size_t count = 0;
        for (int digit = 0; count < 309 && (digit = read_digit(is, 10)) >= 0; ++count) {
            digits[count] = static_cast<char>('0' + digit);
        }
        if (count != 0 && count < 309) {
            x = wide_integer{std::string_view(digits, count)};
            return true;
        }
    }
    is.setstate(std::basic_istream<Char, Traits>::failbit);
    return false;
}

/// The number of steps as given: a wide integer, or a power of two that may be too large for one.
class step_count {
public:
    /// `name` and `parameter` are those of the function that refuses a negative integer.
    template <step_distance Distance>
    constexpr step_count(const char* name, const char* parameter, const Distance& distance) {
        using plain = std::remove_cvref_t<Distance>;
        if constexpr (step_integer<plain>) {
            if constexpr (std::signed_integral<plain>) {
                if (distance < 0) {
                    refuse(name, parameter, static_cast<long long>(distance),
                           "must not be negative");
                }
            }
            value_ = wide_integer{distance};
        } else if constexpr (std::same_as<plain, wide_integer>) {
            value_ = distance;
        } else if constexpr (std::same_as<plain, power_of_two_distance>) {
            if (distance.exponent < wide_integer::bits) {
                value_ = wide_integer::power_of_two(static_cast<unsigned>(distance.exponent));
            } else {
                large_exponent_ = distance.exponent;
            }
        } else {
            value_ = wide_integer{std::string_view{distance}};
        }
    }

    /// Whether it is below 2^1024, so that value() is all of it.
    [[nodiscard]] constexpr bool fits() const noexcept { return large_exponent_ == 0; }
    [[nodiscard]] constexpr const wide_integer& value() const noexcept { return value_; }

    /// What is left of it modulo an engine's period.
    template <class Engine>
    [[nodiscard]] constexpr wide_integer modulo_period() const {
        if (large_exponent_ != 0) {
            return power_of_two_modulo_period<Engine>(large_exponent_);
        }
        return value_ < period_of<Engine> ? value_ : value_ % period_of<Engine>;
    }

    friend message& print(message& m, const step_count& n) {
        return n.fits() ? print(m, n.value_) : m.text("2^").value(n.large_exponent_);
    }

private:
    wide_integer value_;
    std::uint64_t large_exponent_ = 0; // k of 2^k, where k >= 1024
};

/// Refuses a number of steps, of any size: "leat::NAME: PARAMETER = VALUE, ALLOWED".
[[noreturn, gnu::cold, gnu::noinline]] inline void refuse_steps(const char* name,
                                                                const char* parameter,
                                                                const step_count& value,
                                                                const char* allowed) {
    message m;
    m.text("leat::").text(name).text(": ").text(parameter).text(" = ");
    raise<invalid_parameter>(print(m, value).text(", ").text(allowed));
}

} // namespace detail
} // namespace leat

#endif
