// Streams: reproducible sequences of 64-bit words, each with an address.
//
// A stream is philox4x32-10 in counter mode (Salmon, Moraes, Dror and Shaw, SC11, 2011): the
// address gives the key and the upper half of the counter, the block number is the lower half. It
// is opened by a `source` from a path, or by an address, in nanoseconds and in any order. It is a
// uniform random bit generator over all 64-bit words, and holds 2^64 - 1 of them.
//
// Streams are move-only: a copied engine silently repeats draws. Pass a stream by reference;
// `replica()` makes a second one where the same draws are wanted (common random numbers).
//
//   stream       draws at full speed from a buffer of 32 words; at most 320 bytes
//   thin_stream  the same words and members in at most 48 bytes (thin_stream.hpp)
//
// Use one stream per entity, purpose and replication. Do not use it for keys, tokens or gambling:
// who knows a few words and the method can look for the rest.
//
// As text (<< and >>) a stream is its key, the upper half of its counter, its position and its
// limit. A moved-from stream has no text: << sets failbit. What >> reads takes the place of the
// stream that was there.
//
// Errors: `stream_exhausted`, naming the address, at the end or at a limit; `error` when a
// moved-from stream is drawn from.

#ifndef LEAT_STREAMS_STREAM_HPP
#define LEAT_STREAMS_STREAM_HPP

#include "leat/core/errors.hpp"
#include "leat/core/sizes.hpp"
#include "leat/core/text.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/path.hpp"
#include "leat/streams/recorder.hpp"
#include "leat/streams/refill.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <span>
#include <utility> // exchange

namespace leat {
namespace detail {

/// The number of words a stream holds; positions run from 0 to this.
constexpr std::uint64_t stream_capacity = ~std::uint64_t{0};

[[noreturn, gnu::cold, gnu::noinline]] inline void
exhausted(const char* name, const stream_address& a, std::uint64_t limit) {
    message m;
    m.text("leat::").text(name).text(": exhausted: word ").value(a.position);
    m.text(" was asked for, the limit is ").value(limit).text(" words; address: ");
    raise<stream_exhausted>(write_address(m, a));
}

[[noreturn, gnu::cold, gnu::noinline]] inline void moved_from(const char* name) {
    message m;
    raise<error>(m.text("leat::").text(name).text(
        ": drawn from after it was moved from; draw from the stream it was moved to"));
}

/// Where the i-th offspring of a stream lives: a function of the parent's place and of i alone.
constexpr stream_place offspring_place(const stream_address& parent, const path_part& i) noexcept {
    path_hash path(stream_place{parent.key, parent.upper});
    path.append(i);
    return path.place(path_kind::offspring);
}

/// Writes key, upper half, position and limit; a moved-from stream sets failbit.
template <class Char, class Traits, class Stream>
std::basic_ostream<Char, Traits>& write_stream(std::basic_ostream<Char, Traits>& os,
                                               const Stream& s) {
    if (s.was_moved_from()) {
        os.setstate(std::basic_ostream<Char, Traits>::failbit);
    } else {
        const stream_address a = s.address();
        write_words(os, std::array<std::uint64_t, 4>{a.key, a.upper, a.position, s.limit()});
    }
    return os;
}

/// Reads what write_stream wrote; garbage sets failbit and leaves the stream as it was.
template <class Char, class Traits, class Stream>
std::basic_istream<Char, Traits>& read_stream(std::basic_istream<Char, Traits>& is, Stream& s) {
    std::array<std::uint64_t, 4> words{};
    if (read_words(is, words)) {
        s = Stream(stream_address{words[0], words[1], words[2]});
        s.limit(words[3]);
    }
    return is;
}

} // namespace detail

/// A stream with a buffer: the one to use.
class stream {
public:
    using result_type = std::uint64_t;

    /// The stream at an address, standing at its position.
    constexpr explicit stream(const stream_address& a) noexcept
        : key_(a.key),
          upper_(a.upper),
          base_(a.position - a.position % detail::stream_buffer_words),
          cursor_(static_cast<std::uint32_t>(a.position % detail::stream_buffer_words)),
          end_(cursor_) {}

    stream(const stream&) = delete; // a copy would repeat draws: pass by reference, or replica()
    stream& operator=(const stream&) = delete;

    /// Takes over: the other may not be drawn from any more.
    constexpr stream(stream&& other) noexcept { take(other); }
    /// Takes over: the other may not be drawn from any more.
    constexpr stream& operator=(stream&& other) noexcept {
        if (this != &other) {
            take(other);
        }
        return *this;
    }
    ~stream() = default;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }

    /// The next word. Throws `stream_exhausted` at the limit and leaves the position there.
    constexpr result_type operator()() {
        if (cursor_ == end_) [[unlikely]] {
            refill();
        }
        return words_[cursor_++];
    }

    /// Writes the words that drawing one by one would give, and stands where that would. At the
    /// limit it throws `stream_exhausted`, having written the words up to there.
    constexpr void draw_into(std::span<std::uint64_t> out) {
        constexpr std::size_t buffer = detail::stream_buffer_words;
        std::size_t i = 0;
        while (i < out.size()) {
            if (cursor_ == end_ && position() % buffer == 0 && mode_ != mode::moved_from) {
                // Whole buffers go straight to their place.
                const std::uint64_t left = limit_ > position() ? limit_ - position() : 0;
                const std::size_t whole = detail::smaller(out.size() - i, left) / buffer;
                detail::refill({key_, upper_}, position() / 2, out.data() + i, whole);
                go_to(position() + whole * buffer);
                i += whole * buffer;
                if (mode_ == mode::recorded) [[unlikely]] {
                    record_->drawn(whole * buffer, position());
                }
                if (i == out.size()) {
                    break;
                }
            }
            out[i++] = (*this)();
            while (cursor_ != end_ && i < out.size()) {
                out[i++] = words_[cursor_++];
            }
        }
    }

    /// How many words have been drawn, counted from the start of the stream.
    [[nodiscard]] constexpr std::uint64_t position() const noexcept { return base_ + cursor_; }

    /// Goes to word n, in O(1). Going past a limit is allowed; drawing there throws.
    constexpr void seek(std::uint64_t n) noexcept {
        go_to(n);
        tell();
    }

    /// Skips n words, in O(1). Past the end of the stream it throws and moves nothing.
    constexpr void discard(std::uint64_t n) {
        if (n > detail::stream_capacity - position()) {
            detail::exhausted("stream", address(), detail::stream_capacity);
        }
        seek(position() + n);
    }

    /// Takes the last n words drawn back, as if they had not been: for what reads ahead.
    constexpr void give_back(std::uint64_t n) noexcept {
        go_to(position() - n);
        if (mode_ == mode::recorded) [[unlikely]] {
            record_->drawn(0 - n, position());
        }
    }

    /// Lets the stream yield words up to position n and no further: word n (from 0) throws.
    constexpr void limit(std::uint64_t n) noexcept {
        limit_ = n;
        set_end();
        tell();
    }
    [[nodiscard]] constexpr std::uint64_t limit() const noexcept { return limit_; }

    /// A second stream that yields the same words from here on, with the same limit.
    [[nodiscard]] constexpr stream replica() const {
        stream copy(address());
        copy.limit_ = limit_;
        copy.mode_ = mode_;
        if (mode_ == mode::recorded) [[unlikely]] {
            copy.record_ = record_->replica(address(), limit_);
        }
        return copy;
    }

    /// Whether it was moved from and yields nothing any more, until another is moved to it.
    [[nodiscard]] constexpr bool was_moved_from() const noexcept {
        return mode_ == mode::moved_from;
    }

    /// Which draw comes next; `stream{address}` starts there.
    [[nodiscard]] constexpr stream_address address() const noexcept {
        return {key_, upper_, position()};
    }

    /// The stream of what is born during a run: a function of this stream's address without its
    /// position, and of i (an integer or a text), whenever it is asked for.
    template <class Part>
    [[nodiscard]] constexpr stream offspring(const Part& i) const {
        const detail::path_part part = detail::as_path_part(i);
        const auto place = detail::offspring_place(address(), part);
        const stream_address start{place.key, place.upper, 0};
        if (mode_ == mode::recorded) [[unlikely]] {
            return stream(start, *record_->offspring(part, start));
        }
        return stream(start);
    }

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const stream& s) {
        return detail::write_stream(os, s);
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        stream& s) {
        return detail::read_stream(is, s);
    }

private:
    using mode = detail::stream_mode;
    friend class source;

    /// The stream at an address, which tells a ledger what it does.
    stream(const stream_address& a, detail::stream_record& record) noexcept : stream(a) {
        mode_ = mode::recorded;
        record_ = &record;
    }

    constexpr void go_to(std::uint64_t n) noexcept {
        const std::uint64_t base = n - n % detail::stream_buffer_words;
        filled_ = filled_ && base == base_;
        base_ = base;
        cursor_ = static_cast<std::uint32_t>(n - base);
        set_end();
    }

    constexpr void tell() const noexcept {
        if (mode_ == mode::recorded) [[unlikely]] {
            record_->stands(position(), limit_);
        }
    }

    constexpr void take(stream& other) noexcept {
        key_ = other.key_;
        upper_ = other.upper_;
        base_ = other.base_;
        limit_ = other.limit_;
        cursor_ = other.cursor_;
        filled_ = other.filled_;
        mode_ = std::exchange(other.mode_, mode::moved_from);
        record_ = other.record_;
        if (filled_) {
            words_ = other.words_;
        }
        set_end();
        other.set_end();
    }

    // Words up to end_ may be drawn from the buffer; end_ == cursor_ sends the next draw to refill.
    // A recorded stream goes there for every word, so that a draw need not ask whether it is one.
    constexpr void set_end() noexcept {
        end_ = cursor_;
        if (filled_ && mode_ == mode::plain && limit_ > position()) {
            const std::uint64_t allowed = limit_ - base_;
            end_ = allowed < detail::stream_buffer_words
                       ? static_cast<std::uint32_t>(allowed)
                       : static_cast<std::uint32_t>(detail::stream_buffer_words);
        }
    }

    // Makes the buffer hold the word at position(), or throws.
    [[gnu::noinline]] constexpr void refill() {
        if (mode_ == mode::moved_from) {
            detail::moved_from("stream");
        }
        if (position() >= limit_) {
            detail::exhausted("stream", address(), limit_);
        }
        go_to(position()); // from the end of one buffer to the start of the next
        if (!filled_) {
            detail::refill({key_, upper_}, base_ / 2, words_.data());
            filled_ = true;
        }
        set_end();
        if (mode_ == mode::recorded) [[unlikely]] {
            end_ = cursor_ + 1;
            record_->drawn(1, position() + 1);
        }
    }

    std::uint64_t key_ = 0;
    std::uint64_t upper_ = 0;
    std::uint64_t base_ = 0; // position of words_[0], a multiple of its size
    std::uint64_t limit_ = detail::stream_capacity;
    std::uint32_t cursor_ = 0;
    std::uint32_t end_ = 0;
    bool filled_ = false; // words_ holds the words at base_
    mode mode_ = mode::plain;
    detail::stream_record* record_ = nullptr;                      // where recorded
    std::array<std::uint64_t, detail::stream_buffer_words> words_; // unset until filled_
};

static_assert(sizeof(stream) <= 320);

} // namespace leat

#endif
