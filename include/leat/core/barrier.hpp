// The value barrier: stops the compiler from contracting or reassociating floating point.
//
// An empty asm that claims to change the value makes each operation round by itself, so that
// a * b + c gives the same bits with and without a fused multiply-add, at every optimisation
// level. It emits no instruction. In constant evaluation it is the identity, which rounds the same.
// `strict<Real>` applies it to every operation, so that formulas still read as formulas.

#ifndef LEAT_CORE_BARRIER_HPP
#define LEAT_CORE_BARRIER_HPP

#include "leat/core/floating_point.hpp" // refuses fast-math and excess precision

#include <type_traits>

namespace leat::detail {

/// Returns x, through a point the optimiser cannot see past.
template <class Real>
[[gnu::always_inline]] constexpr Real held(Real x) noexcept {
    static_assert(std::is_same_v<Real, double> || std::is_same_v<Real, float>);
    if (!std::is_constant_evaluated()) {
#if defined(_MSC_VER) && !defined(__clang__)
        volatile Real copy = x;
        x = copy;
#elif defined(__SSE2__)
        asm("" : "+x"(x));
#elif defined(__aarch64__) || (defined(__arm__) && defined(__ARM_FP) && !defined(__SOFTFP__))
        asm("" : "+w"(x));
#elif (defined(__riscv_flen) && __riscv_flen >= 64) || defined(__s390__) || defined(__powerpc__)
        asm("" : "+f"(x));
#else
        asm("" : "+m"(x));
#endif
    }
    return x;
}

/// A real number whose every operation is rounded by itself.
template <class Real>
struct strict {
    Real value;

    constexpr strict(Real x) noexcept : value(x) {} // implicit: constants mix freely
    constexpr explicit operator Real() const noexcept { return value; }

    friend constexpr strict operator+(strict a, strict b) noexcept {
        return held(a.value + b.value);
    }
    friend constexpr strict operator-(strict a, strict b) noexcept {
        return held(a.value - b.value);
    }
    friend constexpr strict operator*(strict a, strict b) noexcept {
        return held(a.value * b.value);
    }
    friend constexpr strict operator/(strict a, strict b) noexcept {
        return held(a.value / b.value);
    }
    constexpr strict operator-() const noexcept { return -value; }

    friend constexpr bool operator<(strict a, strict b) noexcept { return a.value < b.value; }
    friend constexpr bool operator>(strict a, strict b) noexcept { return a.value > b.value; }
    friend constexpr bool operator<=(strict a, strict b) noexcept { return a.value <= b.value; }
    friend constexpr bool operator>=(strict a, strict b) noexcept { return a.value >= b.value; }
};

} // namespace leat::detail

#endif
