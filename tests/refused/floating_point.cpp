// Builds whose floating point would not give the same bits.
//
// refused 1 (g++ -ffast-math): define LEAT_ACCEPT_FAST_MATH and lose the promise
// refused 1 (clang++ -ffast-math): define LEAT_ACCEPT_FAST_MATH and lose the promise
// refused 1 (g++ -Ofast): define LEAT_ACCEPT_FAST_MATH and lose the promise
// refused 1 (g++ -ffinite-math-only): define LEAT_ACCEPT_FAST_MATH
// refused 1 (g++ -fassociative-math -fno-signed-zeros -fno-trapping-math): LEAT_ACCEPT_FAST_MATH
// refused 1 (g++ -mfpmath=387): compile with -msse2 -mfpmath=sse

#include "leat/core/floating_point.hpp"

int main() {}
