// block and leapfrog: pieces of one engine's sequence that cannot meet, each with an end.
//
//     auto mine = leat::block(engine, i, leat::pow2(40));   // the i-th 2^40 draws
//     auto mine = leat::leapfrog(engine, i, n);             // draws i, i + n, i + 2n, ...
//
// Both leave `engine` as it is and count from its next draw. They return a limited<...>, which is
// drawn from like an engine and throws stream_exhausted where its piece ends.
//
// block(engine, i, length): draws i * length to (i + 1) * length - 1. Any engine that can jump. The
// length and i are integers, wide integers, pow2(k) or decimal text. A block that does not lie
// within the period is refused, so that all blocks of one length are disjoint.
//
// leapfrog(engine, i, n): draws i, i + n, i + 2n, ... at O(1) each, for engines with a member
// leap(n) (Lehmer engines, counters); others do not compile. It ends with the last such draw below
// the period: there leaping would come round, to its own draws where n divides the period, else to
// those of another i. So n leaps together deal out the whole period, each draw once.
//
// Refused: an i not below n, n = 0, a length of 0, negative numbers, blocks past the period.
//
// When not to use: leapfrog and short blocks of congruential engines bring lattice trouble: the
// leap is a Lehmer engine with the multiplier a^n, which nobody tested, and blocks at a
// power-of-two distance are correlated. New programs take addressed streams (source.hpp).

#ifndef LEAT_STREAMS_SPLIT_HPP
#define LEAT_STREAMS_SPLIT_HPP

#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/streams/distance.hpp"
#include "leat/streams/jump.hpp"

#include <cstdint>

namespace leat {

namespace detail {

/// An engine that gives every n-th of its draws at the cost of one.
template <class Engine>
concept leaping = requires(const Engine& e, std::uint64_t n) {
    e.leap(n);
};

} // namespace detail

/// An engine's next `length` draws; the draw after them throws stream_exhausted. What `block` and
/// `leapfrog` return. Copies are made as of any engine, and give the same draws again.
template <class Engine>
class limited {
public:
    using result_type = typename Engine::result_type;

    static constexpr result_type min() noexcept { return Engine::min(); }
    static constexpr result_type max() noexcept { return Engine::max(); }

    /// The next `length` draws of an engine.
    constexpr limited(const Engine& engine, const wide_integer& length)
        : engine_(engine), length_(length) {
        load();
    }

    /// The next draw. At the end throws stream_exhausted, and changes nothing.
    constexpr result_type operator()() {
        if (left_ == 0) [[unlikely]] {
            if (remaining() == wide_integer{}) {
                exhausted();
            }
            load();
        }
        --left_;
        return engine_();
    }

    /// Skips n draws. Where fewer are left throws stream_exhausted, and changes nothing.
    constexpr void discard(unsigned long long n) requires requires(Engine& e) { e.discard(n); }
    {
        if (n <= left_) {
            left_ -= n;
        } else if (remaining() < wide_integer{n}) {
            exhausted();
        } else {
            before_ = position() + wide_integer{n};
            loaded_ = 0;
            load();
        }
        engine_.discard(n);
    }

    /// The draws made and skipped so far.
    [[nodiscard]] constexpr wide_integer position() const {
        return before_ + wide_integer{loaded_ - left_};
    }
    /// The draws that are left.
    [[nodiscard]] constexpr wide_integer remaining() const { return length_ - position(); }
    /// The engine, where it stands.
    [[nodiscard]] constexpr const Engine& engine() const noexcept { return engine_; }

    friend constexpr bool operator==(const limited& a, const limited& b) {
        return a.engine_ == b.engine_ && a.remaining() == b.remaining();
    }

    /// The length, in draws, that it was made with.
    [[nodiscard]] constexpr const wide_integer& length() const noexcept { return length_; }
    /// An engine that stands `position` draws into a piece of `length`, so that length - position
    /// are left. A position past the length is refused.
    [[nodiscard]] static constexpr limited at(const Engine& engine, const wide_integer& length,
                                              const wide_integer& position) {
        if (position > length) {
            detail::refuse("limited", "position must be at most the length");
        }
        limited made(engine, length);
        made.loaded_ = made.left_ = 0;
        made.before_ = position;
        made.load();
        return made;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "limited";
    /// What `at` takes, by name.
    static constexpr const char* argument_names[] = {"engine", "length", "position"};
    /// Calls use with those arguments.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(engine_, length_, position());
    }
    /// From those arguments.
    static constexpr limited from_arguments(const Engine& engine, const wide_integer& length,
                                            const wide_integer& position) {
        return at(engine, length, position);
    }

    /// Writes length, position and the engine.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const limited& x) {
        detail::write_wide(os, x.length_);
        detail::write_char(os, ' ');
        detail::write_wide(os, x.position());
        detail::write_char(os, ' ');
        return os << x.engine_;
    }
    /// Reads what << wrote; garbage sets failbit and leaves `x` as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        limited& x) {
        wide_integer length;
        wide_integer position;
        Engine engine = x.engine_;
        if (detail::read_wide(is, length) && detail::read_wide(is, position) && is >> engine) {
            if (position <= length) {
                x = at(engine, length, position);
            } else {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            }
        }
        return is;
    }

private:
    /// Counts on with the next 2^64 - 1 draws, so that a draw looks at one word only.
    constexpr void load() {
        before_ = before_ + wide_integer{loaded_};
        const wide_integer rest = length_ - before_;
        loaded_ = rest.fits_word() ? rest.word(0) : ~std::uint64_t{0};
        left_ = loaded_;
    }
    [[noreturn]] void exhausted() const {
        detail::message m;
        m.text("leat::limited: length = ");
        detail::raise<stream_exhausted>(
            detail::print(m, length_).text(", a draw past the end was asked for"));
    }

    Engine engine_;
    wide_integer length_;
    wide_integer before_;      // draws before this load
    std::uint64_t loaded_ = 0; // draws in this load
    std::uint64_t left_ = 0;   // of which so many are left
};

/// The draws i * length to (i + 1) * length - 1 of an engine, counted from its next one.
template <class Engine, detail::step_distance Index, detail::step_distance Length>
[[nodiscard]] constexpr limited<Engine> block(const Engine& engine, const Index& i,
                                              const Length& length) {
    static_assert(detail::jumpable<Engine>,
                  "leat::block: this engine cannot jump; for leat::shuffled and leat::shuffled_by, "
                  "cut the base engine into blocks and wrap each");
    const wide_integer& period = detail::period_of<Engine>;
    const detail::step_count size{"block", "length", length};
    if (!size.fits() || size.value() == wide_integer{} || size.value() > period) {
        detail::refuse_steps("block", "length", size, "must be 1 to the engine's period");
    }
    const detail::step_count index{"block", "i", i};
    if (!index.fits() || index.value() >= period / size.value()) {
        detail::refuse_steps("block", "i", index,
                             "must be so small that the block ends within the engine's period");
    }
    Engine start = engine;
    jump(start, index.value() * size.value());
    return {start, size.value()};
}

/// The draws i, i + n, i + 2n, ... of an engine, counted from its next one, up to the period.
template <class Engine, detail::step_integer Index, detail::step_integer Count>
[[nodiscard]] constexpr auto leapfrog(const Engine& engine, Index i, Count n) {
    static_assert(detail::leaping<Engine>,
                  "leat::leapfrog: this engine cannot leap at O(1) a draw (Lehmer engines and "
                  "counters can); cut it into blocks with leat::block, or use addressed streams");
    if constexpr (detail::leaping<Engine>) {
        const wide_integer& period = detail::period_of<Engine>;
        const detail::step_count leap{"leapfrog", "n", n};
        if (leap.value() == wide_integer{}) {
            detail::refuse("leapfrog", "n", n, "must be at least 1");
        }
        const detail::step_count first{"leapfrog", "i", i};
        if (first.value() >= leap.value()) {
            detail::refuse("leapfrog", "i", i, "must be below n");
        }
        if (first.value() >= period) {
            detail::refuse("leapfrog", "i", i, "must be below the engine's period");
        }
        Engine start = engine;
        jump(start, first.value());
        // The draws below the period: i, i + n, ..., of which the last is at most period - 1.
        const wide_integer length =
            (period - first.value() + leap.value() - wide_integer{1}) / leap.value();
        return limited{start.leap(leap.value().word(0)), length};
    }
}

} // namespace leat

#endif
