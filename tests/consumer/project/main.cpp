// Uses leat as a stranger would; prints the version it was built with.

#include "leat/leat.hpp"

#include <cstdio>

int main() {
    leat::source study{1};
    leat::stream s = study.stream("consumer", 1);
    const double u = leat::unit(s);
    if (!(u > 0 && u < 1)) {
        return 1;
    }
    std::puts(leat::version);
}
