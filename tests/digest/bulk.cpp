// Digests of fills: what the vector kernels make, and where the chunks of an array come from.

#include "leat/bulk.hpp"
#include "digest/digest.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/engines/braid.hpp"
#include "leat/streams/source.hpp"
#include "leat/uniform.hpp"

#include <cstddef>
#include <cstdint>
#include <initializer_list>
#include <vector>

namespace digests {
namespace {

/// Arrays of some lengths, filled in turn from one engine.
template <class Sampler, class Engine>
void fills(const char* name, const Sampler& sampler, Engine g) {
    using value = typename Sampler::result_type;
    digest d;
    for (const std::size_t length : std::initializer_list<std::size_t>{1, 15, 100, 513, 5000}) {
        std::vector<value> values(length);
        leat::fill(values, sampler, g);
        d.add(values);
    }
    d.add(g());
    print(holds_reals<value>(), name, d);
}

} // namespace

void bulk() {
    using leat::ends;
    const leat::source study{20261201};
    const leat::xoshiro256_braid braid{20261201};
    fills("fill.braid.open", leat::uniform{0, 1}, braid);
    fills("fill.braid.closed_open", leat::uniform<double, ends::closed_open>{0, 1}, braid);
    fills("fill.braid.open_closed", leat::uniform<double, ends::open_closed>{0, 0.3}, braid);
    fills("fill.braid.closed", leat::uniform<double, ends::closed>{0, 1}, braid);
    fills("fill.braid.float.open", leat::uniform<float>{0, 0.3}, braid);
    fills("fill.braid.float.closed", leat::uniform<float, ends::closed>{0, 1}, braid);
    fills("fill.braid.int", leat::uniform_integer{1, 6}, braid);
    fills("fill.braid.int64", leat::uniform_integer<std::int64_t>{-3, 999999999}, braid);
    fills("fill.stream.open", leat::uniform{0, 1}, study.stream("fill"));
    fills("fill.stream.normal", leat::normal{0, 1}, study.stream("fill"));

    digest d;
    std::vector<std::uint64_t> words(3 * leat::chunk_length + 100);
    leat::fill_chunks(words, leat::uniform_integer<std::uint64_t>{0, ~std::uint64_t{0}},
                      study.branch("array", 7));
    d.add(words);
    print(false, "fill_chunks", d);
}

} // namespace digests
