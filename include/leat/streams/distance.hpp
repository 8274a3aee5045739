// Distances: how jump, rewind, block and leapfrog take a number of steps.
//
// An integer of any type, a wide_integer, pow2(k) for any k, or decimal text. Whatever it is, it is
// reduced modulo the engine's period exactly. A negative integer is refused.

#ifndef LEAT_STREAMS_DISTANCE_HPP
#define LEAT_STREAMS_DISTANCE_HPP

#include "leat/core/errors.hpp"
#include "leat/core/modular.hpp"
#include "leat/core/wide_integer.hpp"

#include <concepts>
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

/// 2^k mod m, for m > 0.
constexpr wide_integer power_of_two_modulo(std::uint64_t k, const wide_integer& m) {
    const int width = m.bit_width();
    if (k < wide_integer::bits) {
        return wide_integer::power_of_two(static_cast<unsigned>(k)) % m;
    }
    if (m.fits_word()) {
        const std::uint64_t word = m.word(0);
        return power_mod<std::uint64_t>(2 % word, k, word);
    }
    if (m == wide_integer::power_of_two(static_cast<unsigned>(width - 1))) {
        return {};
    }
    // Squares must fit: periods of engines do not come near this.
    if (2 * width > wide_integer::bits) {
        refuse("pow2", "exponent", k, "must be below 1024 where the period is above 2^512");
    }
    int below = 0; // the bits of k after the leading ones, which make a power that fits
    while ((k >> below) >= wide_integer::bits) {
        ++below;
    }
    wide_integer power = wide_integer::power_of_two(static_cast<unsigned>(k >> below)) % m;
    while (below-- > 0) {
        power = power * power % m;
        if ((k >> below & 1u) != 0) {
            power = (power << 1) % m;
        }
    }
    return power;
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

    [[nodiscard]] constexpr wide_integer modulo(const wide_integer& m) const {
        if (!fits()) {
            return power_of_two_modulo(large_exponent_, m);
        }
        return value_ < m ? value_ : value_ % m;
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
