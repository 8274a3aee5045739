// A stream in 48 bytes, for millions of entities: the words and members of `stream`, without its
// buffer.
//
// It computes one philox block for every two words: some 15 to 20 ns each, where a stream takes 1
// to
// 2. Several words at once (fills, draw_into) are made at the speed of a stream.
//
// Errors and text: as a stream's. Not for long runs of single draws.

#ifndef LEAT_STREAMS_THIN_STREAM_HPP
#define LEAT_STREAMS_THIN_STREAM_HPP

#include "leat/core/sizes.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/path.hpp"
#include "leat/streams/recorder.hpp"
#include "leat/streams/refill.hpp"
#include "leat/streams/stream.hpp" // makes words in bulk

#include <cstddef>
#include <cstdint>
#include <span>
#include <utility> // exchange

namespace leat {

/// A stream in 48 bytes: the same words, one block computed for every two.
class thin_stream {
public:
    using result_type = std::uint64_t;

    /// The stream at an address, standing at its position.
    constexpr explicit thin_stream(const stream_address& a) noexcept
        : key_(a.key), upper_(a.upper), position_(a.position) {}

    thin_stream(const thin_stream&) = delete; // a copy would repeat draws
    thin_stream& operator=(const thin_stream&) = delete;

    /// Takes over: the other may not be drawn from any more.
    constexpr thin_stream(thin_stream&& other) noexcept { take(other); }
    /// Takes over: the other may not be drawn from any more.
    constexpr thin_stream& operator=(thin_stream&& other) noexcept {
        if (this != &other) {
            take(other);
        }
        return *this;
    }
    ~thin_stream() = default;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }

    /// The next word; see stream.
    constexpr result_type operator()() {
        if (mode_ != mode::plain) [[unlikely]] {
            return draw_unless_plain();
        }
        if (position_ >= limit_) [[unlikely]] {
            detail::exhausted("thin_stream", address(), limit_);
        }
        const bool odd = position_ % 2 != 0;
        if (odd && has_second_) {
            ++position_;
            has_second_ = false;
            return second_;
        }
        const auto pair = detail::stream_block({key_, upper_}, position_ / 2);
        ++position_;
        has_second_ = !odd;
        second_ = pair[1];
        return pair[odd ? 1 : 0];
    }

    /// Writes the words that drawing one by one would give; see stream, at whose speed it does so.
    constexpr void draw_into(std::span<std::uint64_t> out) {
        const bool none = mode_ == mode::moved_from || position_ >= limit_;
        const std::size_t allowed = detail::smaller(out.size(), none ? 0 : limit_ - position_);
        stream buffered(address());
        buffered.draw_into(out.first(allowed));
        go_to(buffered.position());
        if (mode_ == mode::recorded) [[unlikely]] {
            record_->drawn(allowed, position_);
        }
        if (allowed < out.size()) {
            (*this)(); // says what is wrong
        }
    }

    [[nodiscard]] constexpr std::uint64_t position() const noexcept { return position_; }
    /// Goes to word n, in O(1).
    constexpr void seek(std::uint64_t n) noexcept {
        go_to(n);
        tell();
    }
    constexpr void discard(std::uint64_t n) {
        if (n > detail::stream_capacity - position_) {
            detail::exhausted("thin_stream", address(), detail::stream_capacity);
        }
        seek(position_ + n);
    }
    /// Takes the last n words drawn back; see stream.
    constexpr void give_back(std::uint64_t n) noexcept {
        go_to(position_ - n);
        if (mode_ == mode::recorded) [[unlikely]] {
            record_->drawn(0 - n, position_);
        }
    }
    /// Lets the stream yield words up to position n and no further.
    constexpr void limit(std::uint64_t n) noexcept {
        limit_ = n;
        tell();
    }
    [[nodiscard]] constexpr std::uint64_t limit() const noexcept { return limit_; }
    /// A second stream that yields the same words from here on, with the same limit.
    [[nodiscard]] constexpr thin_stream replica() const {
        thin_stream copy(address());
        copy.limit_ = limit_;
        copy.mode_ = mode_;
        if (mode_ == mode::recorded) [[unlikely]] {
            copy.record_ = record_->replica(address(), limit_);
        }
        return copy;
    }
    /// Which draw comes next.
    /// Whether it was moved from and yields nothing any more, until another is moved to it.
    [[nodiscard]] constexpr bool was_moved_from() const noexcept {
        return mode_ == mode::moved_from;
    }
    /// Which draw comes next.
    [[nodiscard]] constexpr stream_address address() const noexcept {
        return {key_, upper_, position_};
    }
    /// The stream of what is born during a run; see stream.
    template <class Part>
    [[nodiscard]] constexpr thin_stream offspring(const Part& i) const {
        const detail::path_part part = detail::as_path_part(i);
        const auto place = detail::offspring_place(address(), part);
        const stream_address start{place.key, place.upper, 0};
        if (mode_ == mode::recorded) [[unlikely]] {
            return thin_stream(start, *record_->offspring(part, start));
        }
        return thin_stream(start);
    }

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const thin_stream& s) {
        return detail::write_stream(os, s);
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        thin_stream& s) {
        return detail::read_stream(is, s);
    }

private:
    using mode = detail::stream_mode;
    friend class source;

    thin_stream(const stream_address& a, detail::stream_record& record) noexcept : thin_stream(a) {
        mode_ = mode::recorded;
        record_ = &record;
    }

    constexpr void go_to(std::uint64_t n) noexcept {
        position_ = n;
        has_second_ = false;
    }

    constexpr void tell() const noexcept {
        if (mode_ == mode::recorded) [[unlikely]] {
            record_->stands(position_, limit_);
        }
    }

    // A recorded stream, whose words are counted, or a moved-from one.
    [[gnu::noinline]] result_type draw_unless_plain() {
        if (mode_ == mode::moved_from) {
            detail::moved_from("thin_stream");
        }
        if (position_ >= limit_) {
            detail::exhausted("thin_stream", address(), limit_);
        }
        const auto pair = detail::stream_block({key_, upper_}, position_ / 2);
        const result_type word = pair[position_ % 2];
        ++position_;
        record_->drawn(1, position_);
        return word;
    }
    constexpr void take(thin_stream& other) noexcept {
        key_ = other.key_;
        upper_ = other.upper_;
        position_ = other.position_;
        limit_ = other.limit_;
        has_second_ = other.has_second_;
        mode_ = std::exchange(other.mode_, mode::moved_from);
        if (mode_ == mode::recorded) [[unlikely]] {
            record_ = other.record_;
            other.second_ = 0;
        } else {
            second_ = other.second_;
        }
    }

    std::uint64_t key_ = 0;
    std::uint64_t upper_ = 0;
    std::uint64_t position_ = 0;
    std::uint64_t limit_ = detail::stream_capacity;
    union {
        std::uint64_t second_ = 0;      // the second word of the last block, where has_second_
        detail::stream_record* record_; // of a recorded stream, which never has_second_
    };
    bool has_second_ = false;
    mode mode_ = mode::plain;
};

static_assert(sizeof(thin_stream) <= 48);

} // namespace leat

#endif
