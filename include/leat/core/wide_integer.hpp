// Wide integers: periods and distances, which pass 2^64 for every modern engine.
//
// `wide_integer` holds 0 to 2^1024 - 1 in place, without a heap, usable in constant evaluation.
// It is for counting steps, not for number theory at speed: the jump algebra of each engine keeps
// its own modular arithmetic. A result that would not fit, or be negative, is refused.
//
// Division: Knuth, TAOCP vol. 2, 4.3.1, Algorithm D, on 32-bit digits.

#ifndef LEAT_CORE_WIDE_INTEGER_HPP
#define LEAT_CORE_WIDE_INTEGER_HPP

#include "leat/core/errors.hpp"

#include <array>
#include <bit>
#include <compare>
#include <concepts>
#include <cstdint>
#include <string_view> // decimal text

namespace leat {

/// An unsigned integer below 2^1024. Its arithmetic is not inlined: it is long, and calls cost
/// little beside it.
class wide_integer {
public:
    static constexpr int digit_count = 32;        ///< digits of 32 bits
    static constexpr int bits = 32 * digit_count; ///< 1024

    constexpr wide_integer() noexcept = default;

    /// From any integer type of up to 64 bits; a negative value is refused. Implicit, since a
    /// distance is usually a plain integer.
    template <std::integral Int>
    requires(sizeof(Int) <= 8) constexpr wide_integer(Int x) {
        if constexpr (std::signed_integral<Int>) {
            if (x < 0) {
                detail::refuse("wide_integer", "value", static_cast<long long>(x),
                               "must not be negative");
            }
        }
        const auto word = static_cast<std::uint64_t>(x);
        digits_[0] = static_cast<std::uint32_t>(word);
        digits_[1] = static_cast<std::uint32_t>(word >> 32);
    }

    /// From 64-bit words, the least significant first.
    template <std::size_t N>
    requires(N <= digit_count / 2) constexpr explicit wide_integer(
        const std::array<std::uint64_t, N>& words) noexcept {
        for (std::size_t i = 0; i < N; ++i) {
            digits_[2 * i] = static_cast<std::uint32_t>(words[i]);
            digits_[2 * i + 1] = static_cast<std::uint32_t>(words[i] >> 32);
        }
    }

    /// From decimal text: digits only. Anything else, or 2^1024 and above, is refused.
    [[gnu::noinline]] constexpr explicit wide_integer(std::string_view decimal) {
        if (decimal.empty()) {
            refuse_text(decimal);
        }
        for (const char c : decimal) {
            if (c < '0' || c > '9') {
                refuse_text(decimal);
            }
            std::uint64_t carry = static_cast<std::uint64_t>(c - '0');
            for (auto& digit : digits_) {
                carry += std::uint64_t{digit} * 10;
                digit = static_cast<std::uint32_t>(carry);
                carry >>= 32;
            }
            if (carry != 0) {
                refuse_text(decimal);
            }
        }
    }

    /// 2^k, for k below 1024.
    static constexpr wide_integer power_of_two(unsigned k) { return wide_integer{1} << k; }

    /// The 64-bit word at 64 * i.
    [[nodiscard]] constexpr std::uint64_t word(int i) const noexcept {
        return i < digit_count / 2
                   ? digits_[static_cast<std::size_t>(2 * i)] |
                         std::uint64_t{digits_[static_cast<std::size_t>(2 * i + 1)]} << 32
                   : 0;
    }
    /// Bit i, the lowest being bit 0.
    [[nodiscard]] constexpr bool bit(int i) const noexcept {
        return i < bits && ((digits_[static_cast<std::size_t>(i / 32)] >> (i % 32)) & 1u) != 0;
    }
    /// The number of bits up to the highest one; 0 for zero.
    [[nodiscard]] constexpr int bit_width() const noexcept {
        const int n = size();
        return n == 0
                   ? 0
                   : 32 * (n - 1) +
                         static_cast<int>(std::bit_width(digits_[static_cast<std::size_t>(n - 1)]));
    }
    /// Whether it is below 2^64.
    [[nodiscard]] constexpr bool fits_word() const noexcept { return size() <= 2; }
    /// The value as a 64-bit word; refused where it does not fit.
    constexpr explicit operator std::uint64_t() const {
        if (!fits_word()) {
            detail::refuse("wide_integer", "the value does not fit in 64 bits");
        }
        return word(0);
    }

    friend constexpr bool operator==(const wide_integer&, const wide_integer&) = default;
    /// By value.
    friend constexpr std::strong_ordering operator<=>(const wide_integer& a,
                                                      const wide_integer& b) noexcept {
        for (std::size_t i = digit_count; i-- > 0;) {
            if (a.digits_[i] != b.digits_[i]) {
                return a.digits_[i] <=> b.digits_[i];
            }
        }
        return std::strong_ordering::equal;
    }

    /// The sum; refused from 2^1024 on.
    [[gnu::noinline]] friend constexpr wide_integer operator+(wide_integer a,
                                                              const wide_integer& b) {
        std::uint64_t carry = 0;
        for (std::size_t i = 0; i < digit_count; ++i) {
            carry += std::uint64_t{a.digits_[i]} + b.digits_[i];
            a.digits_[i] = static_cast<std::uint32_t>(carry);
            carry >>= 32;
        }
        if (carry != 0) {
            refuse_overflow();
        }
        return a;
    }
    /// The difference; refused below 0.
    [[gnu::noinline]] friend constexpr wide_integer operator-(wide_integer a,
                                                              const wide_integer& b) {
        if (a < b) {
            detail::refuse("wide_integer", "a difference would be negative");
        }
        std::uint64_t borrow = 0;
        for (std::size_t i = 0; i < digit_count; ++i) {
            const std::uint64_t d = std::uint64_t{a.digits_[i]} - b.digits_[i] - borrow;
            a.digits_[i] = static_cast<std::uint32_t>(d);
            borrow = d >> 63;
        }
        return a;
    }
    /// The product; refused from 2^1024 on.
    [[gnu::noinline]] friend constexpr wide_integer operator*(const wide_integer& a,
                                                              const wide_integer& b) {
        wide_integer product;
        const std::size_t n = static_cast<std::size_t>(a.size());
        const std::size_t m = static_cast<std::size_t>(b.size());
        for (std::size_t i = 0; i < n; ++i) {
            std::uint64_t carry = 0;
            for (std::size_t j = 0; j < m || carry != 0; ++j) {
                if (i + j >= digit_count) {
                    refuse_overflow();
                }
                carry += product.digits_[i + j];
                if (j < m) {
                    carry += std::uint64_t{a.digits_[i]} * b.digits_[j];
                }
                product.digits_[i + j] = static_cast<std::uint32_t>(carry);
                carry >>= 32;
            }
        }
        return product;
    }
    /// Times 2^k; refused from 2^1024 on.
    [[gnu::noinline]] friend constexpr wide_integer operator<<(const wide_integer& a, unsigned k) {
        if (a == wide_integer{}) {
            return a;
        }
        if (k >= bits || a.bit_width() + static_cast<int>(k) > bits) {
            refuse_overflow();
        }
        wide_integer r;
        const std::size_t whole = k / 32;
        const unsigned part = k % 32;
        for (std::size_t i = digit_count; i-- > whole;) {
            std::uint64_t pair = std::uint64_t{a.digits_[i - whole]} << 32;
            if (i > whole) {
                pair |= a.digits_[i - whole - 1];
            }
            r.digits_[i] = static_cast<std::uint32_t>((pair << part) >> 32);
        }
        return r;
    }
    /// Divided by 2^k, rounded down.
    [[gnu::noinline]] friend constexpr wide_integer operator>>(const wide_integer& a,
                                                               unsigned k) noexcept {
        wide_integer r;
        const std::size_t whole = k / 32;
        for (std::size_t i = 0; i + whole < digit_count; ++i) {
            std::uint64_t pair = a.digits_[i + whole];
            if (i + whole + 1 < digit_count) {
                pair |= std::uint64_t{a.digits_[i + whole + 1]} << 32;
            }
            r.digits_[i] = static_cast<std::uint32_t>(pair >> (k % 32));
        }
        return r;
    }
    /// The quotient, rounded down; division by 0 is refused.
    friend constexpr wide_integer operator/(const wide_integer& a, const wide_integer& b) {
        wide_integer remainder;
        return divide(a, b, remainder);
    }
    /// The remainder; division by 0 is refused.
    friend constexpr wide_integer operator%(const wide_integer& a, const wide_integer& b) {
        if (a < b) {
            return a;
        }
        wide_integer remainder;
        divide(a, b, remainder);
        return remainder;
    }

private:
    [[nodiscard]] constexpr int size() const noexcept {
        int n = digit_count;
        while (n > 0 && digits_[static_cast<std::size_t>(n - 1)] == 0) {
            --n;
        }
        return n;
    }

    [[gnu::noinline]] static constexpr wide_integer
    divide(const wide_integer& a, const wide_integer& b, wide_integer& remainder) {
        const std::size_t m = static_cast<std::size_t>(a.size());
        const std::size_t n = static_cast<std::size_t>(b.size());
        if (n == 0) {
            detail::refuse("wide_integer", "division by zero");
        }
        wide_integer quotient;
        if (n == 1) {
            std::uint64_t rest = 0;
            for (std::size_t i = m; i-- > 0;) {
                rest = rest << 32 | a.digits_[i];
                quotient.digits_[i] = static_cast<std::uint32_t>(rest / b.digits_[0]);
                rest %= b.digits_[0];
            }
            remainder = wide_integer{rest};
            return quotient;
        }
        if (m < n) {
            remainder = a;
            return quotient;
        }
        // D1: normalise, so that the divisor's top digit has its top bit set.
        const int shift = std::countl_zero(b.digits_[n - 1]);
        const auto shifted = [shift](std::uint32_t high, std::uint32_t low) {
            return static_cast<std::uint32_t>(((std::uint64_t{high} << 32 | low) << shift) >> 32);
        };
        std::array<std::uint32_t, digit_count> v{};
        std::array<std::uint32_t, digit_count + 1> u{};
        for (std::size_t i = 0; i < n; ++i) {
            v[i] = shifted(b.digits_[i], i > 0 ? b.digits_[i - 1] : 0);
        }
        for (std::size_t i = 0; i <= m; ++i) {
            u[i] = shifted(i < m ? a.digits_[i] : 0, i > 0 ? a.digits_[i - 1] : 0);
        }
        for (std::size_t j = m - n + 1; j-- > 0;) {
            // D3: estimate a quotient digit; it is at most two too large.
            const std::uint64_t top = std::uint64_t{u[j + n]} << 32 | u[j + n - 1];
            std::uint64_t q = top / v[n - 1];
            std::uint64_t r = top % v[n - 1];
            while ((q >> 32) != 0 || q * v[n - 2] > (r << 32 | u[j + n - 2])) {
                --q;
                r += v[n - 1];
                if ((r >> 32) != 0) {
                    break;
                }
            }
            // D4 to D6: multiply, subtract, and add back where the estimate was one too large.
            std::uint64_t carry = 0;
            std::uint64_t borrow = 0;
            for (std::size_t i = 0; i < n; ++i) {
                carry += q * v[i];
                const std::uint64_t d = u[i + j] - (carry & 0xFFFFFFFFu) - borrow;
                u[i + j] = static_cast<std::uint32_t>(d);
                borrow = d >> 63;
                carry >>= 32;
            }
            const std::uint64_t d = u[j + n] - carry - borrow;
            u[j + n] = static_cast<std::uint32_t>(d);
            if ((d >> 63) != 0) {
                --q;
                carry = 0;
                for (std::size_t i = 0; i < n; ++i) {
                    carry += std::uint64_t{u[i + j]} + v[i];
                    u[i + j] = static_cast<std::uint32_t>(carry);
                    carry >>= 32;
                }
                u[j + n] += static_cast<std::uint32_t>(carry);
            }
            quotient.digits_[j] = static_cast<std::uint32_t>(q);
        }
        remainder = wide_integer{};
        for (std::size_t i = 0; i < n; ++i) {
            remainder.digits_[i] = static_cast<std::uint32_t>(
                (std::uint64_t{i + 1 < n ? u[i + 1] : 0} << 32 | u[i]) >> shift);
        }
        return quotient;
    }

    [[noreturn]] static void refuse_overflow() {
        detail::refuse("wide_integer", "a result would not fit in 1024 bits");
    }
    [[noreturn]] static void refuse_text(std::string_view text) {
        detail::message m;
        detail::raise<malformed_text>(m.text("leat::wide_integer: text = \"")
                                          .text(text.data(), text.size() < 80 ? text.size() : 80)
                                          .text("\", must be decimal digits of a number below "
                                                "2^1024"));
    }

    std::array<std::uint32_t, digit_count> digits_{}; // least significant first
};

/// A distance of 2^k: `jump(engine, pow2(128))`. k has no upper bound; it is reduced by the period.
struct power_of_two_distance {
    std::uint64_t exponent; ///< k
};

/// The distance 2^k.
constexpr power_of_two_distance pow2(std::uint64_t k) noexcept { return {k}; }

} // namespace leat

#endif
