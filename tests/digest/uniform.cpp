// Digests of the mappings from words to integers and reals.

#include "leat/uniform.hpp"
#include "digest/digest.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/testing/engines.hpp"

#include <array>
#include <cstdint>
#include <limits>
#include <vector>

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

    draws("uniform.double.plain", leat::uniform{-1.0, 2.5});
    draws("uniform.double.few_ulp", leat::uniform{1.0, 1.0 + 0x1p-50});
    draws("uniform.double.wide", leat::uniform{-0x1.fffffffffffffp1023, 0x1.fffffffffffffp1023});
    draws("uniform.double.inexact_width", leat::uniform{0.1, 1e9});
    draws("uniform.double.small", leat::uniform{1e-280, 3e-280});
    draws("uniform.double.closed_open", leat::uniform<double, leat::ends::closed_open>{0.1, 0.7});
    draws("uniform.double.open_closed", leat::uniform<double, leat::ends::open_closed>{0.1, 0.7});
    draws("uniform.double.closed", leat::uniform<double, leat::ends::closed>{0.1, 0.7});
    draws("uniform.float.plain", leat::uniform<float>{-1.0f, 2.5f});
    draws("uniform.float.few_ulp", leat::uniform<float>{1.0f, 1.0f + 0x1p-20f});
    draws("uniform.float.wide", leat::uniform<float>{-0x1.fffffep127f, 0x1.fffffep127f});

    draws("uniform_integer.die", leat::uniform_integer{1, 6});
    draws("uniform_integer.int8", leat::uniform_integer<std::int8_t>{-128, 127});
    draws("uniform_integer.int64_full",
          leat::uniform_integer<std::int64_t>{std::numeric_limits<std::int64_t>::min(),
                                              std::numeric_limits<std::int64_t>::max()});
    draws("uniform_integer.uint64_most", // most words are rejected
          leat::uniform_integer<std::uint64_t>{0, std::uint64_t{1} << 63});
    draws("uniform_integer.from_lehmer", leat::uniform_integer{-5, 994}, 20000,
          leat::minimal_standard{1});
    draws("below.hundred", [](auto& g) { return leat::below(100, g); });
    draws("below.near_2_to_32", [](auto& g) { return leat::below(4294967297u, g); });

    std::vector<int> items(52);
    draws(
        "shuffle.52",
        [&items](auto& g) {
            for (int i = 0; i < 52; ++i) {
                items[static_cast<std::size_t>(i)] = i;
            }
            leat::shuffle(items, g);
            return items;
        },
        500);
    draws("pick.52", [&items](auto& g) { return leat::pick(items, g); });
    draws(
        "sample_without_replacement.few",
        [](auto& g) { return leat::sample_without_replacement(1000000007, 20, g); }, 500);
    draws(
        "sample_without_replacement.most",
        [](auto& g) { return leat::sample_without_replacement(60, 50, g); }, 500);
}

} // namespace digests
