// jump and rewind: any number of steps forth or back, exactly, in a time that grows with the number
// of its digits.
//
//     leat::jump(engine, 1'000'000);             // as a million draws
//     leat::jump(engine, leat::pow2(128));
//     leat::rewind(engine, "31415926535897932384626433832795");
//
// The distance is an integer of any type, a wide_integer, pow2(k), or decimal text; it is reduced
// by the engine's period. The engine is changed in place and returned by reference. A step is one
// draw. The cost: below a microsecond for Lehmer engines and counters, 20 for mrg32k3a and
// multiply-with-carry, 60 for the xorshift family (bench/jumps.cpp).
//
// Refused: a negative distance; text that is no decimal number; rewinding an engine in a transient
// state (multiply-with-carry), which no step leads back to.
//
// Not for streams, which have seek(), and not for engines without algebra (shuffled tables, those
// of <random>): they do not compile here.

#ifndef LEAT_STREAMS_JUMP_HPP
#define LEAT_STREAMS_JUMP_HPP

#include "leat/core/errors.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/streams/distance.hpp"

#include <concepts>

namespace leat {

namespace detail {

/// An engine with states that lead into a cycle without being on it.
template <class Engine>
concept has_transient_states = requires(const Engine& e) {
    { e.is_recurrent() } -> std::same_as<bool>;
};

} // namespace detail

/// Moves an engine on by `distance` draws.
template <class Engine, detail::step_distance Distance>
constexpr Engine& jump(Engine& engine, const Distance& distance) {
    static_assert(detail::jumpable<Engine>,
                  "leat::jump: this engine has no algebra to jump by; for leat::shuffled and "
                  "leat::shuffled_by, jump the base engine and wrap it then");
    if constexpr (detail::jumpable<Engine>) {
        const wide_integer& period = detail::period_of<Engine>;
        const detail::step_count steps{"jump", "distance", distance};
        wide_integer rest = steps.modulo_period<Engine>();
        if constexpr (detail::has_transient_states<Engine>) {
            // The period holds on the cycle only: walk there first. It is a few steps away.
            wide_integer walked;
            while (!engine.is_recurrent() && !(steps.fits() && steps.value() == walked)) {
                engine();
                walked = walked + 1;
            }
            walked = walked % period;
            rest = rest < walked ? rest + period - walked : rest - walked;
        }
        engine.advance(rest);
    }
    return engine;
}

/// Moves an engine back by `distance` draws.
template <class Engine, detail::step_distance Distance>
constexpr Engine& rewind(Engine& engine, const Distance& distance) {
    static_assert(detail::jumpable<Engine>,
                  "leat::rewind: this engine has no algebra to jump by; for leat::shuffled and "
                  "leat::shuffled_by, rewind the base engine and wrap it then");
    if constexpr (detail::jumpable<Engine>) {
        const wide_integer& period = detail::period_of<Engine>;
        const detail::step_count steps{"rewind", "distance", distance};
        const wide_integer back = steps.modulo_period<Engine>();
        if constexpr (detail::has_transient_states<Engine>) {
            if (!engine.is_recurrent()) {
                detail::refuse("rewind", "the engine is in a transient state, which no step leads "
                                         "to; jump it on to a recurrent one first");
            }
        }
        if (back != wide_integer{}) {
            engine.advance(period - back);
        }
    }
    return engine;
}

} // namespace leat

#endif
