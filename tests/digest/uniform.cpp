// Digests of the mappings from words to integers and reals.

#include "digest/digest.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/testing/engines.hpp"
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

namespace digests {
namespace {

/// One unit mapping: the extreme words, then many.
template <class Real, leat::ends Ends>
void unit(const char* name) {
    draws(name, [](auto& g) {
        leat::all_zeros zeros;
        leat::all_ones ones;
        const Real low = leat::unit<Real, Ends>(zeros);
        const Real high = leat::unit<Real, Ends>(ones);
        return std::array<Real, 3>{low, high, leat::unit<Real, Ends>(g)};
    });
}

} // namespace

void uniform() {
    const auto word64 = [](auto& g) { return leat::word64(g); };
    const auto word32 = [](auto& g) { return leat::word32(g); };
    draws("word64.minimal_standard", word64, 20000, leat::minimal_standard{1});
    draws("word64.xorshift32", word64, 20000, leat::xorshift32{1});
    draws("word64.xorshift64", word64, 20000, leat::xorshift64{1});
    draws("word32.minimal_standard", word32, 20000, leat::minimal_standard{1});
    draws("word32.xorshift64", word32, 20000, leat::xorshift64{1});

    unit<double, leat::ends::open>("unit.double.open");
    unit<double, leat::ends::closed_open>("unit.double.closed_open");
    unit<double, leat::ends::open_closed>("unit.double.open_closed");
    unit<double, leat::ends::closed>("unit.double.closed");
    unit<float, leat::ends::open>("unit.float.open");
    unit<float, leat::ends::closed_open>("unit.float.closed_open");
    unit<float, leat::ends::open_closed>("unit.float.open_closed");
    unit<float, leat::ends::closed>("unit.float.closed");
}

} // namespace digests
