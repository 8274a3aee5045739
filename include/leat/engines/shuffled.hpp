// shuffled and shuffled_by: an engine's draws, dealt through a table in another order.
//
// shuffled<Engine, K> keeps K draws of the base engine and the last value given. That value picks
// the place whose draw comes next, and the base engine fills the place anew (Bays and Durham).
// shuffled_by<Engine, Selector, K> lets a second engine pick the place (MacLaren and Marsaglia;
// Knuth's Algorithm M).
//
// State     the base engine(s), the table of K words, and for `shuffled` the last value.
// Output    the base engine's words, each once; so its range, and its values' lattice, stay.
// Period    shuffled: that of the base engine as a rule, no more is proved. shuffled_by: the least
//           common multiple of both engines' as a rule.
// Jumps     none: discard takes real steps. Jump the base engine and wrap it then:
//           shuffled<E, K>{base}.
// Seeding   shuffled seeds its base engine and fills the table from it, as ISO has it. shuffled_by
//           seeds both engines from one number by seed sequences drawn from splitmix64, first the
//           base, then the selector; from a seed sequence it seeds the base as it is and the
//           selector with the same words mixed, so that equal engines do not run in step.
//
// Good for breaking up short-range order of a weak engine (the hyperplanes of a Lehmer engine), and
// for reproducing published results. The bits themselves are no better than the base engine's, and
// a sound engine needs no shuffling.
//
// Sources: Bays and Durham, TOMS 2(1), 1976; ISO C++ [rand.adapt.shuf], whose index is used
// (Knuth's Algorithm B differs in 127 of 2^31 - 2 values of a Lehmer engine); Knuth, TAOCP vol.
// 2, 3.2.2, Algorithm M (MacLaren and Marsaglia, JACM 12(1), 1965).

#ifndef LEAT_ENGINES_SHUFFLED_HPP
#define LEAT_ENGINES_SHUFFLED_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/text.hpp"
#include "leat/engines/shuffle_table.hpp"
#include "leat/engines/splitmix64.hpp" // seeds of two engines from one number

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat {

/// Bays and Durham's shuffle, ISO C++'s shuffle_order_engine. See the head of this file.
template <class Engine, std::size_t K>
class shuffled {
    using table_type = detail::shuffle_table<Engine, K>;

public:
    using result_type = typename Engine::result_type;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "shuffled";
    static constexpr std::uint64_t default_seed = Engine::default_seed;
    static constexpr int state_bits = detail::state_bits_of<Engine>(); ///< those of the base engine

    /// The full state: the base engine after its last draw, the last value, the table.
    struct state_type {
        Engine base;                      ///< after its last draw
        result_type last;                 ///< the last value given
        std::array<result_type, K> table; ///< the draws kept

        friend constexpr bool operator==(const state_type& a, const state_type& b) {
            return a.base == b.base && a.last == b.last && a.table == b.table;
        }
    };

    static constexpr result_type min() noexcept { return Engine::min(); }
    static constexpr result_type max() noexcept { return Engine::max(); }

    constexpr shuffled() : shuffled(Engine{}) {}
    /// Seeds the base engine, which refuses what it refuses, and fills the table.
    constexpr explicit shuffled(std::uint64_t seed) {
        detail::seed_by_number(base_, seed);
        fill();
    }
    template <detail::seed_sequence_for<shuffled> Sequence>
    constexpr explicit shuffled(Sequence& q) {
        base_.seed(q);
        fill();
    }
    /// Wraps an engine; its next K + 1 draws fill the table.
    constexpr explicit shuffled(const Engine& base) : base_(base) { fill(); }
    /// From the full state; words outside the base engine's range are refused.
    constexpr explicit shuffled(const state_type& state)
        : base_(state.base), table_{state.table}, last_(state.last) {
        table_.check("shuffled");
        table_type::check_word("shuffled", "last", last_);
    }

    constexpr void seed() { *this = shuffled{}; }
    constexpr void seed(std::uint64_t seed) { *this = shuffled{seed}; }
    template <detail::seed_sequence_for<shuffled> Sequence>
    constexpr void seed(Sequence& q) {
        base_.seed(q);
        fill();
    }

    constexpr result_type operator()() {
        constexpr std::uint64_t size = std::uint64_t{max()} - min() + 1; // 0 stands for 2^64
        result_type& chosen = table_.words[detail::table_place(K, last_ - min(), size)];
        last_ = chosen;
        chosen = base_();
        return last_;
    }

    /// Takes n real steps.
    constexpr void discard(unsigned long long n) {
        for (; n > 0; --n) {
            (*this)();
        }
    }

    /// The base engine, K + 1 draws ahead.
    [[nodiscard]] constexpr const Engine& base() const noexcept { return base_; }
    [[nodiscard]] constexpr state_type state() const { return {base_, last_, table_.words}; }

    // Spelled out: a defaulted constexpr == does not compile over an engine of <random>.
    friend constexpr bool operator==(const shuffled& a, const shuffled& b) {
        return a.base_ == b.base_ && a.last_ == b.last_ && a.table_ == b.table_;
    }

    /// The base engine, the table, the last value.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const shuffled& e) {
        os << e.base_;
        e.table_.write(os);
        detail::write_char(os, ' ');
        detail::write_unsigned(os, e.last_);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        shuffled& e) {
        shuffled read = e;
        is >> read.base_;
        if (read.table_.read(is) && table_type::read_word(is, read.last_)) {
            e = read;
        }
        return is;
    }

private:
    constexpr void fill() {
        table_.fill(base_);
        last_ = base_();
    }

    Engine base_;
    table_type table_;
    result_type last_ = 0;
};

/// Knuth's Algorithm M: `Selector` picks the place. See the head of this file.
template <class Engine, class Selector, std::size_t K>
class shuffled_by {
public:
    using result_type = typename Engine::result_type;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "shuffled_by";
    static constexpr std::uint64_t default_seed = 1;
    static constexpr int state_bits = detail::state_bits_of<Engine>(); ///< those of the base engine

    /// The full state: both engines after their last draws, and the table.
    struct state_type {
        Engine base;                      ///< after its last draw
        Selector selector;                ///< after its last draw
        std::array<result_type, K> table; ///< the draws kept

        friend constexpr bool operator==(const state_type& a, const state_type& b) {
            return a.base == b.base && a.selector == b.selector && a.table == b.table;
        }
    };

    static constexpr result_type min() noexcept { return Engine::min(); }
    static constexpr result_type max() noexcept { return Engine::max(); }

    constexpr shuffled_by() : shuffled_by(default_seed) {}
    /// Any number; see the head of this file.
    constexpr explicit shuffled_by(std::uint64_t seed) {
        detail::splitmix_sequence q{splitmix64{seed}};
        base_.seed(q);
        selector_.seed(q);
        table_.fill(base_);
    }
    template <detail::seed_sequence_for<shuffled_by> Sequence>
    constexpr explicit shuffled_by(Sequence& q) {
        seed(q);
    }
    /// Wraps two engines; the next K draws of the first fill the table.
    constexpr shuffled_by(const Engine& base, const Selector& selector)
        : base_(base), selector_(selector) {
        table_.fill(base_);
    }
    /// From the full state; words outside the base engine's range are refused.
    constexpr explicit shuffled_by(const state_type& state)
        : base_(state.base), selector_(state.selector), table_{state.table} {
        table_.check("shuffled_by");
    }

    constexpr void seed() { *this = shuffled_by{}; }
    constexpr void seed(std::uint64_t seed) { *this = shuffled_by{seed}; }
    template <detail::seed_sequence_for<shuffled_by> Sequence>
    constexpr void seed(Sequence& q) {
        base_.seed(q);
        detail::mixed_sequence<Sequence> mixed{q};
        selector_.seed(mixed);
        table_.fill(base_);
    }

    constexpr result_type operator()() {
        // Algorithm M: X first, then Y, j = floor(K Y / m) with m the least number above all Y.
        const result_type x = base_();
        const std::uint64_t y = selector_();
        constexpr std::uint64_t m = std::uint64_t{Selector::max()} + 1; // 0 stands for 2^64
        result_type& chosen = table_.words[detail::table_place(K, y, m)];
        const result_type result = chosen;
        chosen = x;
        return result;
    }

    /// Takes n real steps.
    constexpr void discard(unsigned long long n) {
        for (; n > 0; --n) {
            (*this)();
        }
    }

    /// The base engine, K draws ahead.
    [[nodiscard]] constexpr const Engine& base() const noexcept { return base_; }
    [[nodiscard]] constexpr const Selector& selector() const noexcept { return selector_; }
    [[nodiscard]] constexpr state_type state() const { return {base_, selector_, table_.words}; }

    friend constexpr bool operator==(const shuffled_by& a, const shuffled_by& b) {
        return a.base_ == b.base_ && a.selector_ == b.selector_ && a.table_ == b.table_;
    }

    /// The base engine, the selector, the table.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const shuffled_by& e) {
        os << e.base_;
        detail::write_char(os, ' ');
        os << e.selector_;
        e.table_.write(os);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        shuffled_by& e) {
        shuffled_by read = e;
        is >> read.base_ >> read.selector_;
        if (read.table_.read(is)) {
            e = read;
        }
        return is;
    }

private:
    Engine base_;
    Selector selector_;
    detail::shuffle_table<Engine, K> table_;
};

} // namespace leat

#endif
