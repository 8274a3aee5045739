// A start-up check: does this build, in this thread, give the numbers that leat promises?
//
//   #include "leat/self_check.hpp"          // not part of leat.hpp: it instantiates every law
//   int main() {
//       leat::self_check_or_throw();         // first of all
//
// or, to see for oneself:
//
//       const leat::self_check_report report = leat::self_check();
//       if (!report) { std::cerr << report; return 1; }
//
// It looks at what headers cannot refuse at compile time: the rounding mode, flush-to-zero (which
// linking with -Ofast turns on for the whole program), contraction, excess precision, the parts of
// fast-math, and golden digests of every engine, stream, mapping, law and region, and of estimates.
// It takes less than a millisecond, draws from no engine of yours and changes nothing.
//
// What it says holds for the flags of the file that calls it, and for the calling thread: control
// registers belong to threads (a new one inherits those of its maker). Call it from one file,
// compiled as the rest is, before threads are started; and again in a thread that foreign code
// (a plug-in host, a graphics library) has made.
// A failed check means that reals may differ from other builds; only a digest named engine,
// stream or uniform_integer says that integers do.
// Not a statistical test: it shows that numbers are the right ones, not that they are random.

#ifndef LEAT_SELF_CHECK_HPP
#define LEAT_SELF_CHECK_HPP

#include "leat/self_check/arithmetic.hpp"
#include "leat/self_check/golden.hpp"
#include "leat/self_check/report.hpp"

namespace leat {

/// Checks and reports. Throws nothing.
// Not inlined: else a change of the rounding mode might slip past its arithmetic.
[[nodiscard, gnu::noinline]] inline self_check_report self_check() noexcept {
    self_check_report report;
    detail::check_arithmetic(report);
    detail::check_golden(report);
    return report;
}

/// Checks, and throws `self_check_failed` if anything failed. Returns the report, for its notes.
inline self_check_report self_check_or_throw() {
    const self_check_report report = self_check();
    detail::throw_failure(report);
    return report;
}

} // namespace leat

#endif
