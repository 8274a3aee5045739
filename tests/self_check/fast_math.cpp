// Built and linked with -Ofast and -D LEAT_ACCEPT_FAST_MATH: the self-check must fail, and say why.
// Linking so sets flush-to-zero at start-up where the system has it (crtfastmath.o on x86).

#include "leat/self_check.hpp"

#include <cstdio>
#include <cstring>

namespace {

bool failed(const leat::self_check_report& report, const char* check) {
    for (const leat::self_check_finding& finding : report.findings()) {
        if (finding.failed && std::strcmp(finding.check, check) == 0) {
            return true;
        }
    }
    return false;
}

} // namespace

int main() {
    const leat::self_check_report report = leat::self_check();
    std::fputs(to_string(report).c_str(), stdout);
    if (report.ok() || !failed(report, "fast-math")) {
        std::puts("fast-math went unnoticed");
        return 1;
    }
#if defined(__x86_64__)
    if (!failed(report, "subnormal numbers")) {
        std::puts("flush-to-zero went unnoticed");
        return 1;
    }
#endif
    try {
        leat::self_check_or_throw();
    } catch (const leat::self_check_failed& e) {
        std::puts(e.what());
        return 0;
    }
    std::puts("self_check_or_throw did not throw");
    return 1;
}
