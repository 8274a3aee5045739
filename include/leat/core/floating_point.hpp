// What leat asks of floating point, refused at compile time where it is not met.
//
// Included by every header that computes with reals, and by no other: engines and integers compile
// under any flags. Switch: LEAT_ACCEPT_FAST_MATH accepts fast-math; same bits (promise P1) then no
// longer hold for reals.

#ifndef LEAT_CORE_FLOATING_POINT_HPP
#define LEAT_CORE_FLOATING_POINT_HPP

#include <cfloat>
#include <limits>

static_assert(std::numeric_limits<double>::is_iec559 && std::numeric_limits<double>::digits == 53 &&
                  std::numeric_limits<float>::is_iec559 && std::numeric_limits<float>::digits == 24,
              "leat needs IEEE 754 binary32 and binary64 as float and double");

#if !defined(FLT_EVAL_METHOD) || FLT_EVAL_METHOD != 0
// clang prints 1 or 2 here too when x87 is in use.
#error                                                                                             \
    "leat: floating point is evaluated with excess precision; on 32-bit x86 compile with -msse2 -mfpmath=sse"
#endif

#if !defined(LEAT_ACCEPT_FAST_MATH)
#if defined(__FAST_MATH__) || defined(_M_FP_FAST) ||                                               \
    (defined(__FINITE_MATH_ONLY__) && __FINITE_MATH_ONLY__ != 0) ||                                \
    (defined(__ASSOCIATIVE_MATH__) && __ASSOCIATIVE_MATH__ != 0) ||                                \
    (defined(__RECIPROCAL_MATH__) && __RECIPROCAL_MATH__ != 0)
#error                                                                                             \
    "leat: -ffast-math (or -Ofast, /fp:fast, a part of them) changes results; compile without it, or define LEAT_ACCEPT_FAST_MATH and lose the promise of same bits for reals"
#endif
#endif

#endif
