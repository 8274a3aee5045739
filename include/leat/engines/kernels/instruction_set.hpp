// Which vector kernels this build has, and which of them this processor runs.
//
// LEAT_VECTOR_KERNELS is 1 where kernels are compiled: x86-64 and little-endian AArch64, with g++
// or clang, unless LEAT_PORTABLE_ONLY is defined. All kernels give the words of the portable code,
// so the choice is one of speed alone. It is read from the processor's feature words, which the
// compiler's run-time library fills in before main; leat keeps no state of its own.
//
// LEAT_TEST_KERNEL_CEILING (0 baseline, 1 AVX2, 2 AVX-512) caps the choice: a hook for tests and
// benchmarks, not for users.

#ifndef LEAT_ENGINES_KERNELS_INSTRUCTION_SET_HPP
#define LEAT_ENGINES_KERNELS_INSTRUCTION_SET_HPP

#if !defined(LEAT_PORTABLE_ONLY) && (defined(__GNUC__) || defined(__clang__)) &&                   \
    (defined(__x86_64__) || (defined(__aarch64__) && !defined(__AARCH64EB__)))
#define LEAT_VECTOR_KERNELS 1
#else
#define LEAT_VECTOR_KERNELS 0
#endif

#ifndef LEAT_TEST_KERNEL_CEILING
#define LEAT_TEST_KERNEL_CEILING 2
#endif

namespace leat::detail {

/// The instruction sets that kernels are compiled for; baseline is what the target always has
/// (SSE2 on x86-64, NEON on AArch64).
enum class instruction_set { baseline, avx2, avx512 };

/// The best one that this processor, and the system it runs, can do.
inline instruction_set best_instruction_set() noexcept {
#if LEAT_VECTOR_KERNELS && defined(__x86_64__)
    if (LEAT_TEST_KERNEL_CEILING >= 2 && __builtin_cpu_supports("avx512f") &&
        __builtin_cpu_supports("avx512dq") && __builtin_cpu_supports("avx512vl")) {
        return instruction_set::avx512;
    }
    if (LEAT_TEST_KERNEL_CEILING >= 1 && __builtin_cpu_supports("avx2")) {
        return instruction_set::avx2;
    }
#endif
    return instruction_set::baseline;
}

} // namespace leat::detail

#endif
