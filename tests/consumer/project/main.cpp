// Uses leat as a stranger would, from two files; prints the version it was built with.

#include "other.hpp"

#include "leat/version.hpp"

#include <cstdio>

int main() {
    const leat::source study{20261201};
    const event here = draw_event(study, 1);
    if (!(here.wait > 0) || here != draw_elsewhere(study, 1) || here == draw_elsewhere(study, 2)) {
        return 1;
    }
    std::puts(leat::version);
}
