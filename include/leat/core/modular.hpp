// Arithmetic modulo one word: products, powers, factors, orders. The algebra of Lehmer engines.
//
// Integers only, the same on every target: no 128-bit type is needed. All of it works in constant
// evaluation, where the order of a multiplier is found once and for all.
//
// Sources: Knuth, TAOCP vol. 2, 4.3.1, Algorithm D (division), 4.5.4 (factors, Algorithm P for
// primality, Pollard's rho); Sorenson and Webster, Math. Comp. 86 (2017): the first 12 prime bases
// settle primality below 3.3 * 10^24.

#ifndef LEAT_CORE_MODULAR_HPP
#define LEAT_CORE_MODULAR_HPP

#include "leat/core/wide_multiply.hpp"

#include <array>
#include <bit>
#include <cstdint>

namespace leat::detail {

struct quotient_remainder {
    std::uint64_t quotient;
    std::uint64_t remainder;
};

/// n / d and n % d, for n.high < d (so that the quotient fits one word).
constexpr quotient_remainder divide_wide(word_pair n, std::uint64_t d) noexcept {
    const int shift = std::countl_zero(d);
    d <<= shift;
    if (shift > 0) {
        n.high = n.high << shift | n.low >> (64 - shift);
        n.low <<= shift;
    }
    const std::uint64_t d1 = d >> 32;
    const std::uint64_t d0 = d & 0xFFFFFFFFu;
    // One 32-bit digit of the quotient: an estimate from the top digits, at most two too large.
    const auto digit = [d, d1, d0](std::uint64_t& rest, std::uint64_t next) {
        std::uint64_t q = rest / d1;
        std::uint64_t r = rest % d1;
        while ((q >> 32) != 0 || q * d0 > (r << 32 | next)) {
            --q;
            r += d1;
            if ((r >> 32) != 0) {
                break;
            }
        }
        rest = (rest << 32 | next) - q * d; // modulo 2^64; the true value is below d
        return q;
    };
    const std::uint64_t upper = digit(n.high, n.low >> 32);
    const std::uint64_t lower = digit(n.high, n.low & 0xFFFFFFFFu);
    return {upper << 32 | lower, n.high >> shift};
}

/// a * b mod m, for a, b < m.
template <class UInt>
constexpr UInt multiply_mod(UInt a, UInt b, UInt m) noexcept {
    if constexpr (sizeof(UInt) <= 4) {
        return static_cast<UInt>(std::uint64_t{a} * b % m);
    } else {
        return divide_wide(multiply_wide(a, b), m).remainder;
    }
}

/// base^exponent mod m, for base < m, by binary powers.
template <class UInt>
constexpr UInt power_mod(UInt base, std::uint64_t exponent, UInt m) noexcept {
    UInt result = static_cast<UInt>(1 % m);
    for (; exponent != 0; exponent >>= 1) {
        if ((exponent & 1u) != 0) {
            result = multiply_mod(result, base, m);
        }
        base = multiply_mod(base, base, m);
    }
    return result;
}

constexpr std::uint64_t greatest_common_divisor(std::uint64_t a, std::uint64_t b) noexcept {
    while (b != 0) {
        const std::uint64_t r = a % b;
        a = b;
        b = r;
    }
    return a;
}

/// The inverse of a modulo m, for a prime to m, m > 1; by Euclid's algorithm.
constexpr std::uint64_t inverse_mod(std::uint64_t a, std::uint64_t m) noexcept {
    std::uint64_t r0 = m;
    std::uint64_t r1 = a % m;
    std::uint64_t t0 = 0;
    std::uint64_t t1 = 1;
    while (r1 != 0) {
        const std::uint64_t q = r0 / r1;
        const std::uint64_t r2 = r0 % r1;
        const std::uint64_t step = multiply_mod(q % m, t1, m);
        const std::uint64_t t2 = t0 >= step ? t0 - step : t0 + (m - step);
        r0 = r1;
        r1 = r2;
        t0 = t1;
        t1 = t2;
    }
    return t0;
}

/// Whether n is prime, exactly: Miller's test to twelve bases, which no 64-bit composite passes.
constexpr bool is_prime(std::uint64_t n) noexcept {
    constexpr std::array<std::uint64_t, 12> bases{2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37};
    for (const std::uint64_t p : bases) {
        if (n % p == 0) {
            return n == p;
        }
    }
    if (n < 2) {
        return false;
    }
    const int twos = std::countr_zero(n - 1);
    for (const std::uint64_t base : bases) {
        std::uint64_t x = power_mod(base, (n - 1) >> twos, n);
        bool passes = x == 1 || x == n - 1;
        for (int i = 1; i < twos && !passes; ++i) {
            x = multiply_mod(x, x, n);
            passes = x == n - 1;
        }
        if (!passes) {
            return false;
        }
    }
    return true;
}

/// The distinct primes that divide a number; at most 15 divide a 64-bit one.
struct prime_set {
    std::array<std::uint64_t, 15> primes{};
    int count = 0;

    constexpr void insert(std::uint64_t p) noexcept {
        for (int i = 0; i < count; ++i) {
            if (primes[static_cast<std::size_t>(i)] == p) {
                return;
            }
        }
        primes[static_cast<std::size_t>(count++)] = p;
    }
};

/// A proper divisor of an odd composite n, by Pollard's rho with products of 64 differences.
constexpr std::uint64_t pollard_divisor(std::uint64_t n) noexcept {
    for (std::uint64_t c = 1;; ++c) { // another polynomial x^2 + c, until one splits n
        const auto next = [n, c](std::uint64_t x) {
            x = multiply_mod(x, x, n);
            return x < n - c ? x + c : x - (n - c);
        };
        std::uint64_t slow = 2;
        std::uint64_t fast = 2;
        std::uint64_t divisor = 1;
        while (divisor == 1) {
            const std::uint64_t slow_start = slow;
            const std::uint64_t fast_start = fast;
            const auto step = [&slow, &fast, next] {
                slow = next(slow);
                fast = next(next(fast));
                return slow < fast ? fast - slow : slow - fast;
            };
            std::uint64_t product = 1;
            for (int i = 0; i < 64; ++i) {
                product = multiply_mod(product, step(), n);
            }
            divisor = greatest_common_divisor(product, n);
            if (divisor == n) { // several factors fell into one product: go back, one by one
                slow = slow_start;
                fast = fast_start;
                do {
                    divisor = greatest_common_divisor(step(), n);
                } while (divisor == 1);
            }
        }
        if (divisor != n) {
            return divisor;
        }
    }
}

/// The distinct primes dividing n, for n > 0: trial division, then Pollard's rho for what is left.
constexpr prime_set prime_factors(std::uint64_t n) noexcept {
    prime_set result;
    const auto divide_out = [&result, &n](std::uint64_t p) {
        if (n % p == 0) {
            result.insert(p);
            while (n % p == 0) {
                n /= p;
            }
        }
    };
    divide_out(2);
    for (std::uint64_t p = 3; p < 2048; p += 2) {
        divide_out(p);
    }
    // What is left has at most five prime factors, all of them above 2^11.
    std::array<std::uint64_t, 8> open{n};
    int size = n > 1 ? 1 : 0;
    while (size > 0) {
        const std::uint64_t part = open[static_cast<std::size_t>(--size)];
        if (is_prime(part)) {
            result.insert(part);
        } else {
            const std::uint64_t divisor = pollard_divisor(part);
            open[static_cast<std::size_t>(size++)] = divisor;
            open[static_cast<std::size_t>(size++)] = part / divisor;
        }
    }
    return result;
}

/// The least d > 0 with a^d = 1 mod m, for a prime to m, m > 1.
constexpr std::uint64_t multiplicative_order(std::uint64_t a, std::uint64_t m) noexcept {
    std::uint64_t order = m; // Euler's phi of m, which the order divides
    const prime_set of_m = prime_factors(m);
    for (int i = 0; i < of_m.count; ++i) {
        const std::uint64_t p = of_m.primes[static_cast<std::size_t>(i)];
        order = order / p * (p - 1);
    }
    const prime_set of_phi = prime_factors(order);
    for (int i = 0; i < of_phi.count; ++i) {
        const std::uint64_t q = of_phi.primes[static_cast<std::size_t>(i)];
        while (order % q == 0 && power_mod(a % m, order / q, m) == 1) {
            order /= q;
        }
    }
    return order;
}

} // namespace leat::detail

#endif
