// Probes of the floating point a program runs with: what a compiler's flags, its linker and the
// processor's control register make of + - * /.
//
// All work by arithmetic on values that the optimiser cannot know, and look at bits, so that no
// flag can fold or bend the answer; <cfenv> is not asked, for it knows neither flush-to-zero nor
// contraction. Control registers belong to a thread: what is found holds for the calling one.
// The probes that can be answered differently by leat's arithmetic (detail::strict) and by plain
// expressions are templates on the number type.

#ifndef LEAT_SELF_CHECK_ARITHMETIC_HPP
#define LEAT_SELF_CHECK_ARITHMETIC_HPP

#include "leat/core/barrier.hpp"
#include "leat/self_check/report.hpp"

#include <bit>
#include <cstdint>

namespace leat::detail {

/// x, which the optimiser cannot know.
template <class Real>
Real unknown(Real x) noexcept {
    volatile Real copy = x;
    return copy;
}

/// Whether two doubles have the same bits: comparing reals is what fast-math bends.
inline bool same_bits(double x, double y) noexcept {
    return std::bit_cast<std::uint64_t>(x) == std::bit_cast<std::uint64_t>(y);
}
inline bool same_bits(float x, float y) noexcept {
    return std::bit_cast<std::uint32_t>(x) == std::bit_cast<std::uint32_t>(y);
}

/// How sums are rounded: null for "to nearest, ties to even", else the name of what it is.
/// `half` is half the distance from 1 to the next number.
template <class Real>
const char* odd_rounding(Real half) noexcept {
    const Real one = unknown(Real{1});
    const Real next = unknown(Real{1} + 2 * half);
    const Real after = unknown(Real{1} + 4 * half);
    const Real little = unknown(half);
    const bool tie_up = same_bits(unknown(one + little), next);
    const bool minus_tie_down = same_bits(unknown(-one - little), -next);
    const bool odd_tie_up = same_bits(unknown(next + little), after);
    if (tie_up) {
        return minus_tie_down ? "away from zero at ties" : "upward, not to nearest";
    }
    if (minus_tie_down) {
        return "downward, not to nearest";
    }
    return odd_tie_up ? nullptr : "towards zero, not to nearest";
}

/// Whether a result below the smallest normal number becomes 0.
template <class Real, class Bits>
bool flushes_results(Real smallest, Bits bits_of_half) noexcept {
    const Real half = unknown(smallest) * unknown(Real{0.5});
    return std::bit_cast<Bits>(unknown(half)) != bits_of_half;
}

/// Whether an operand below the smallest normal number counts as 0.
template <class Real, class Bits>
bool flushes_operands(Real smallest, Bits bits_of_half) noexcept {
    const Real whole = unknown(std::bit_cast<Real>(bits_of_half)) * unknown(Real{2});
    return !same_bits(unknown(whole), smallest);
}

/// Whether a * b + c is rounded once, not twice.
template <class Number>
bool fuses_doubles() noexcept {
    const Number a = unknown(1 + 0x1p-27); // a a = 1 + 2^-26 + 2^-54, the last cut off by rounding
    const Number c = unknown(-(1 + 0x1p-26));
    const Number rest = a * a + c;
    return !same_bits(static_cast<double>(rest), 0.0);
}
template <class Number>
bool fuses_floats() noexcept {
    const Number a = unknown(1 + 0x1p-13f); // likewise; also where floats are reckoned as doubles
    const Number c = unknown(-(1 + 0x1p-12f));
    const Number rest = a * a + c;
    return !same_bits(static_cast<float>(rest), 0.0f);
}

/// Whether a sum is rounded to a longer format first, and then to a double (x87).
template <class Number>
bool rounds_twice() noexcept {
    const Number a = unknown(1.0);
    const Number b = unknown(0x1p-53 + 0x1p-65); // just above half a step; 64 bits round it to half
    const Number sum = a + b;
    return !same_bits(static_cast<double>(sum), 1 + 0x1p-52);
}

/// What of fast-math the compiler does to plain expressions in this file; null if nothing is seen.
inline const char* fast_math(bool rounds_to_nearest) noexcept {
#if defined(__FAST_MATH__) || defined(_M_FP_FAST)
    static_cast<void>(rounds_to_nearest);
    return "on, as its macro says";
#else
    if (!rounds_to_nearest) {
        return nullptr; // the probes below would be deceived
    }
    const double x = unknown(1.0);
    const double big = unknown(0x1p53);
    if (!same_bits((x + big) - big, 0.0)) { // 2^53 + 1 rounds to 2^53
        return "sums are reassociated";
    }
    if (!same_bits(unknown(5.0) / 3.0, 0x1.aaaaaaaaaaaabp0)) { // 5 (1/3) rounds to its neighbour
        return "divisions are made products";
    }
    const double nan = unknown(std::bit_cast<double>(std::uint64_t{0x7ff8} << 48));
    if (!(nan != nan)) {
        return "NaN is taken not to exist";
    }
    return nullptr;
#endif
}

/// Adds what is wrong, or worth a note, with the floating point of this thread and this build.
inline void check_arithmetic(self_check_report& report) noexcept {
    const auto fail = [&report](const char* check, const char* found, const char* meaning,
                                const char* remedy) {
        report.add({check, found, meaning, remedy, true});
    };

    const char* rounding = odd_rounding<double>(0x1p-53);
    if (rounding == nullptr) {
        rounding = odd_rounding<float>(0x1p-24f);
    }
    const bool nearest = rounding == nullptr; // what the other probes of rounding rely on
    if (!nearest) {
        fail("rounding mode", rounding,
             "reals drawn in this thread are not those that their seed stands for",
             "call std::fesetround(FE_TONEAREST) before drawing, and find what changed it");
    }

    constexpr double smallest = 0x1p-1022;
    constexpr float smallest_float = 0x1p-126f;
    constexpr std::uint64_t half = std::uint64_t{1} << 51;
    constexpr std::uint32_t half_float = std::uint32_t{1} << 22;
    const bool results =
        flushes_results(smallest, half) || flushes_results(smallest_float, half_float);
    const bool operands =
        flushes_operands(smallest, half) || flushes_operands(smallest_float, half_float);
    if (results || operands) {
        fail("subnormal numbers",
             !operands  ? "flushed to zero"
             : !results ? "taken for zero"
                        : "flushed to zero and taken for zero",
             "small numbers vanish, and results differ from those of other builds",
             "do not link with -Ofast or -ffast-math (nor load a library that was), and leave "
             "flush-to-zero off");
    }

    if (nearest && (fuses_doubles<strict<double>>() || fuses_floats<strict<float>>())) {
        fail("contraction", "leat's own a * b + c is fused",
             "this compiler sees through leat's value barrier: reals differ from other builds",
             "compile with -ffp-contract=off, and report the compiler");
    }
    if (nearest && rounds_twice<strict<double>>()) {
        fail("excess precision", "sums are rounded twice",
             "reals differ from those of other builds",
             "compile for SSE2 (-msse2 -mfpmath=sse), or set the processor to 53 bits");
    }

    if (const char* fast = fast_math(nearest); fast != nullptr) {
        fail("fast-math", fast, "the promise of the same bits everywhere is void for reals",
             "compile and link without -Ofast and -ffast-math");
    }
#if defined(LEAT_ACCEPT_FAST_MATH)
    report.add({"fast-math", "accepted by LEAT_ACCEPT_FAST_MATH",
                "leat no longer refuses fast-math: the promise of the same bits is void for reals",
                "build without LEAT_ACCEPT_FAST_MATH where results must be repeated elsewhere",
                false});
#endif
    if (nearest && fuses_doubles<double>()) {
        report.add({"contraction", "the compiler fuses a * b + c in your formulas",
                    "leat's numbers are the same everywhere; what your formulas make of them may "
                    "differ between builds",
                    "compile with -ffp-contract=off if that matters", false});
    }
}

} // namespace leat::detail

#endif
