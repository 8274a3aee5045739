// Engines that cannot do what is asked of them, and parameters that make no engine.
//
// refused 1: leat::jump: this engine has no algebra to jump by; for leat::shuffled
// refused 2: leat::rewind: this engine has no algebra to jump by; for leat::shuffled
// refused 3: leat::lehmer: multiplier and modulus must have no common factor
// refused 4: leat::lehmer: the multiplier must be above 0 and below the modulus
// refused 5: leat::multiply_with_carry: the sum of the multipliers must be at most 2^w

#include "leat/engines/lehmer.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/streams/jump.hpp"

#if !defined(REFUSED)
#define REFUSED 0
#endif

int main() {
    leat::minimal_standard base;
    leat::shuffled<leat::minimal_standard, 32> table;

#if REFUSED == 1
    leat::jump(table, 1000);
#else
    leat::jump(base, 1000);
    table = leat::shuffled<leat::minimal_standard, 32>{base};
#endif

#if REFUSED == 2
    leat::rewind(table, 1000);
#else
    leat::rewind(base, 1000);
    table = leat::shuffled<leat::minimal_standard, 32>{base};
#endif

#if REFUSED == 3
    leat::lehmer<std::uint32_t, 6, 9> small;
#elif REFUSED == 4
    leat::lehmer<std::uint32_t, 11, 7> small;
#else
    leat::lehmer<std::uint32_t, 3, 7> small;
#endif

#if REFUSED == 5
    leat::multiply_with_carry<std::uint8_t, 200, 200> carrying;
#else
    leat::multiply_with_carry<std::uint8_t, 100, 100> carrying;
#endif

    return static_cast<int>((table() ^ small() ^ carrying()) & 1u);
}
