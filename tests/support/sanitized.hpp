// Whether an address sanitizer watches: it is slow, and looks for other faults than wrong numbers,
// so that tests draw less under it and skip what only repeats the same code.

#ifndef LEAT_TESTS_SUPPORT_SANITIZED_HPP
#define LEAT_TESTS_SUPPORT_SANITIZED_HPP

namespace leat_test {

#if defined(__SANITIZE_ADDRESS__) // g++
inline constexpr bool sanitized = true;
#elif defined(__has_feature) // clang
inline constexpr bool sanitized = __has_feature(address_sanitizer);
#else
inline constexpr bool sanitized = false;
#endif

} // namespace leat_test

#endif
