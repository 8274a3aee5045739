// Prints what the self-check says of the arithmetic that this file's flags lead to.

#include "leat/self_check/arithmetic.hpp"

#include <cstdio>

int main() {
    leat::self_check_report report;
    leat::detail::check_arithmetic(report);
    std::fputs(to_string(report).c_str(), stdout);
#if defined(__x86_64__) && !defined(__FMA__)
    std::puts("this machine has no fused multiply-add");
#endif
}
