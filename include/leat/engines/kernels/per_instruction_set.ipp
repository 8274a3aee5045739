// Includes LEAT_KERNEL_FILE once for each instruction set, in a namespace of its own, with
// LEAT_KERNEL_LANES 64-bit lanes a vector. No include guard: this file is meant to be included once
// for each kernel file. Intrinsics headers stay out: <immintrin.h> costs more to include than all
// of leat. The width is fixed by a macro because template-dependent widths confuse g++ 12.

#define LEAT_KERNEL_SPACE kernels_baseline
#define LEAT_KERNEL_LANES 2
#include LEAT_KERNEL_FILE
#undef LEAT_KERNEL_SPACE
#undef LEAT_KERNEL_LANES

#if defined(__x86_64__)

#if defined(__clang__)
#pragma clang attribute push(__attribute__((target("avx2"))), apply_to = function)
#else
#pragma GCC push_options
#pragma GCC target("avx2")
#endif
#define LEAT_KERNEL_SPACE kernels_avx2
#define LEAT_KERNEL_LANES 4
#include LEAT_KERNEL_FILE
#undef LEAT_KERNEL_SPACE
#undef LEAT_KERNEL_LANES
#if defined(__clang__)
#pragma clang attribute pop
#pragma clang attribute push(__attribute__((target("avx512f,avx512dq,avx512vl"))),                 \
                             apply_to = function)
#else
#pragma GCC pop_options
#pragma GCC push_options
#pragma GCC target("avx512f,avx512dq,avx512vl")
#endif
#define LEAT_KERNEL_SPACE kernels_avx512
#define LEAT_KERNEL_LANES 8
#include LEAT_KERNEL_FILE
#undef LEAT_KERNEL_SPACE
#undef LEAT_KERNEL_LANES
#if defined(__clang__)
#pragma clang attribute pop
#else
#pragma GCC pop_options
#endif

#endif
