// What the tests of xorshift, xoroshiro, xoshiro and the braid share: published outputs and jumps,
// and polynomials over GF(2) the slow and plain way, to hold against core/gf2.hpp.

#ifndef LEAT_TESTS_SUPPORT_LINEAR_ENGINES_HPP
#define LEAT_TESTS_SUPPORT_LINEAR_ENGINES_HPP

#include "leat/core/wide_integer.hpp"
#include "leat/engines/linear_engine.hpp"
#include "leat/streams/jump.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstddef>
#include <cstdint>
#include <string>
#include <vector>

namespace leat_test {

/// The words of a state, as the reference files have them.
template <class State>
State state_from(const std::vector<std::uint64_t>& list) {
    State state{};
    EXPECT_EQ(list.size(), state.size());
    for (std::size_t i = 0; i < state.size() && i < list.size(); ++i) {
        state[i] = static_cast<typename State::value_type>(list[i]);
    }
    return state;
}

/// The state an entry starts from: "state", or in the older entries "seeds" or "seed".
template <class Engine>
typename Engine::state_type start_of(const json& parameters) {
    for (const char* key : {"state", "seeds"}) {
        if (parameters.contains(key)) {
            return state_from<typename Engine::state_type>(words(parameters.at(key)));
        }
    }
    return state_from<typename Engine::state_type>({word(parameters.at("seed"))});
}

/// First outputs, the 10000th, and the period of an entry of engines.json.
template <class Engine>
void expect_published_outputs(const std::string& id) {
    const json& entry = reference_entry(id);
    LEAT_TEST_REFERENCE(entry);
    const json& expected = entry.at("expected");
    Engine engine{start_of<Engine>(entry.at("parameters"))};
    EXPECT_EQ(nth_draw(engine, 10000), word(expected.at("x10000")));
    const auto first = words(expected.at("first"));
    EXPECT_EQ(draws(engine, first.size()), first);
    std::string period = expected.at("period").get<std::string>();
    const std::string minus_one = " - 1";
    if (period.size() > minus_one.size() && period.rfind("2^", 0) == 0) {
        period.resize(period.size() - minus_one.size());
        EXPECT_EQ(Engine::period() + 1, wide(period));
    } else {
        EXPECT_EQ(Engine::period(), wide(period));
    }
}

/// Every jump of jumps.json whose id begins with `prefix`: state and next outputs; by leat::jump,
/// which reduces the distance, and by the engine's own advance, which does not.
template <class Engine>
void expect_published_jumps(const std::string& prefix, std::size_t at_least) {
    std::size_t checked = 0;
    for (const json& entry : reference_family(prefix)) {
        if (!entry.at("parameters").contains("state")) {
            continue; // bare polynomials and discrete logarithms have tests of their own
        }
        LEAT_TEST_REFERENCE(entry);
        const json& expected = entry.at("expected");
        const auto end = state_from<typename Engine::state_type>(words(expected.at("state")));
        const auto next = words(expected.at("next_outputs"));
        Engine jumped{start_of<Engine>(entry.at("parameters"))};
        Engine advanced = jumped;
        leat::jump(jumped, wide(entry.at("parameters").at("n")));
        EXPECT_EQ(jumped.state(), end);
        EXPECT_EQ(draws(jumped, next.size()), next);
        advanced.advance(wide(entry.at("parameters").at("n")));
        EXPECT_EQ(advanced.state(), end);
        ++checked;
    }
    EXPECT_GE(checked, at_least) << prefix;
}

/// A polynomial over GF(2), one coefficient an element, x^0 first.
using plain_polynomial = std::vector<int>;

template <class Word, std::size_t Size>
plain_polynomial plain(const std::array<Word, Size>& residue) {
    plain_polynomial p;
    for (const Word word : residue) {
        for (std::size_t i = 0; i < 8 * sizeof(Word); ++i) {
            p.push_back(static_cast<int>(word >> i & 1u));
        }
    }
    return p;
}

/// The minimal polynomial of a bit sequence, as Massey's paper has the algorithm: connection
/// polynomials as vectors, nothing packed, nothing shared with the library.
inline plain_polynomial berlekamp_massey(const std::vector<int>& s) {
    const std::size_t size = s.size() + 1;
    std::vector<int> c(size, 0);
    std::vector<int> b(size, 0);
    c[0] = b[0] = 1;
    std::size_t order = 0;
    std::size_t since = 1;
    for (std::size_t n = 0; n < s.size(); ++n) {
        int discrepancy = s[n];
        for (std::size_t j = 1; j <= order; ++j) {
            discrepancy ^= c[j] & s[n - j];
        }
        if (discrepancy == 0) {
            ++since;
            continue;
        }
        const std::vector<int> before = c;
        for (std::size_t j = 0; j + since < size; ++j) {
            c[j + since] ^= b[j];
        }
        if (2 * order <= n) {
            order = n + 1 - order;
            b = before;
            since = 1;
        } else {
            ++since;
        }
    }
    plain_polynomial minimal(order + 1);
    for (std::size_t k = 0; k <= order; ++k) {
        minimal[k] = c[order - k];
    }
    return minimal;
}

/// The characteristic polynomial of a step as the library derives it, leading term included.
template <class Step>
plain_polynomial characteristic_polynomial() {
    plain_polynomial p = plain(leat::detail::characteristic<Step>.low());
    p.push_back(1);
    return p;
}

} // namespace leat_test

#endif
