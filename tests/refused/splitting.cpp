// Engines that cannot be cut or measured as asked.
//
// refused 1: leat::leapfrog: this engine cannot leap at O(1) a draw
// refused 2: leat::block: this engine cannot jump; for leat::shuffled and leat::shuffled_by
// refused 3: no matching function for call to 'steps_between
// refused 4: no matching function for call to 'jump

#include "leat/engines/lehmer.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/split.hpp"
#include "leat/streams/steps.hpp"

#if !defined(REFUSED)
#define REFUSED 0
#endif

int main() {
    leat::minimal_standard small;
    leat::xoshiro256_plus_plus large;
    leat::shuffled<leat::minimal_standard, 32> table;

#if REFUSED == 1
    auto leap = leat::leapfrog(large, 0, 2);
#else
    auto leap = leat::leapfrog(small, 0, 2);
#endif

#if REFUSED == 2
    auto piece = leat::block(table, 0, 100);
#else
    auto piece = leat::block(small, 0, 100);
#endif

#if REFUSED == 3
    const auto steps = leat::steps_between(large, large);
#else
    const auto steps = leat::steps_between(small, small);
#endif

#if REFUSED == 4
    leat::jump(large, 1e6); // a distance is no real
#else
    leat::jump(large, 1000000);
#endif

    return static_cast<int>((leap() ^ piece() ^ table() ^ steps->word(0) ^ large()) & 1u);
}
