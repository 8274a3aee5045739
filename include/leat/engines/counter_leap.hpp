// counter_leap: every n-th draw of a counter engine, at the cost of one draw.
//
// What `leap(n)` of splitmix64 and the philox engines returns, and `leapfrog` bounds. It rests on
// the engine's discard being O(1), so it is for counters only.

#ifndef LEAT_ENGINES_COUNTER_LEAP_HPP
#define LEAT_ENGINES_COUNTER_LEAP_HPP

#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"

#include <cstdint>

namespace leat {

/// Draws 0, n, 2n, ... of a counter engine.
template <class Engine>
class counter_leap {
public:
    using result_type = typename Engine::result_type;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "counter_leap";

    static constexpr result_type min() noexcept { return Engine::min(); }
    static constexpr result_type max() noexcept { return Engine::max(); }

    /// n must be at least 1.
    constexpr counter_leap(const Engine& engine, std::uint64_t n) : engine_(engine), skip_(n - 1) {
        if (n == 0) {
            detail::refuse("counter_leap", "n", n, "must be at least 1");
        }
    }

    constexpr result_type operator()() noexcept {
        const result_type x = engine_();
        engine_.discard(skip_);
        return x;
    }

    /// One to be read into.
    static constexpr counter_leap for_reading() { return {Engine{}, 1}; }

    friend constexpr bool operator==(const counter_leap&, const counter_leap&) = default;

    /// Writes how many draws are skipped after each, and the engine.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const counter_leap& e) {
        detail::write_unsigned(os, e.skip_);
        detail::write_char(os, ' ');
        return os << e.engine_;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        counter_leap& e) {
        counter_leap read = e;
        if (detail::read_unsigned(is, ~std::uint64_t{0}, read.skip_) && is >> read.engine_) {
            e = read;
        }
        return is;
    }

private:
    Engine engine_; // its next draw is ours
    std::uint64_t skip_;
};

} // namespace leat

#endif
