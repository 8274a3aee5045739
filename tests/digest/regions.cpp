// Digests of the regions: points, and what is computed from the parameters.

#include "leat/regions.hpp"
#include "digest/digest.hpp"

#include <array>

namespace digests {
namespace {

template <class Region>
void region(const char* name, const Region& where) {
    digest d;
    leat::xoshiro256_plus_plus g{20261201};
    for (int i = 0; i < 50000; ++i) {
        d.add(where(g));
    }
    d.add(where.measure());
    d.add(where.bounds().low);
    d.add(where.bounds().high);
    print(true, name, d);
}

} // namespace

void regions() {
    region("disk.unit", leat::disk{{0, 0}, 1});
    region("disk.far", leat::disk{{1e6, -3e5}, 0.7});
    region("ellipse.axes", leat::ellipse{{1, 2}, 5, 0.5});
    region("ellipse.turned", leat::ellipse{{-1, 0.3}, 5, 2, 0.6});
}

} // namespace digests
