// std::vector in constant expressions, where the standard library has it.
//
// Libraries before libstdc++ 12 and libc++ 15 do not: a function marked LEAT_VECTOR_CONSTEXPR,
// which takes, makes or returns a vector that is no template's parameter, is then an ordinary
// function. Everything else in leat is constexpr everywhere.

#ifndef LEAT_CORE_VECTOR_CONSTEXPR_HPP
#define LEAT_CORE_VECTOR_CONSTEXPR_HPP

#include <version> // __cpp_lib_constexpr_vector

// A macro: no language rule makes `constexpr` depend on a condition.
#if defined(__cpp_lib_constexpr_vector)
/// `constexpr`, where the standard library's vector is.
#define LEAT_VECTOR_CONSTEXPR constexpr
#else
#define LEAT_VECTOR_CONSTEXPR inline
#endif

#endif
