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
//   thin_stream  the same words and members in at most 48 bytes, for millions of entities; it
//                computes one block for every two words
//
// Use one stream per entity, purpose and replication. Do not use it for keys, tokens or gambling:
// who knows a few words and the method can look for the rest.
//
// Errors: `stream_exhausted`, naming the address, at the end or at a limit; `error` when a
// moved-from stream is drawn from.

#ifndef LEAT_STREAMS_STREAM_HPP
#define LEAT_STREAMS_STREAM_HPP

#include "leat/core/errors.hpp"
#include "leat/core/sizes.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/path.hpp"
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

} // namespace detail

class thin_stream;

/// A stream with a buffer: the one to use.
class stream {
public:
    using result_type = std::uint64_t;

    /// The stream at an address, standing at its position.
    constexpr explicit stream(const stream_address& a) noexcept : key_(a.key), upper_(a.upper) {
        seek(a.position);
    }

    stream(const stream&) = delete; // a copy would repeat draws: pass by reference, or replica()
    stream& operator=(const stream&) = delete;

    constexpr stream(stream&& other) noexcept { take(other); }
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
            if (cursor_ == end_ && position() % buffer == 0 && !is_moved_from_) {
                // Whole buffers go straight to their place.
                const std::uint64_t left = limit_ > position() ? limit_ - position() : 0;
                const std::size_t whole = detail::smaller(out.size() - i, left) / buffer;
                detail::refill({key_, upper_}, position() / 2, out.data() + i, whole);
                seek(position() + whole * buffer);
                i += whole * buffer;
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
        const std::uint64_t base = n - n % detail::stream_buffer_words;
        filled_ = filled_ && base == base_;
        base_ = base;
        cursor_ = static_cast<std::uint32_t>(n - base);
        set_end();
    }

    /// Skips n words, in O(1). Past the end of the stream it throws and moves nothing.
    constexpr void discard(std::uint64_t n) {
        if (n > detail::stream_capacity - position()) {
            detail::exhausted("stream", address(), detail::stream_capacity);
        }
        seek(position() + n);
    }

    /// Lets the stream yield words up to position n and no further: word n (from 0) throws.
    constexpr void limit(std::uint64_t n) noexcept {
        limit_ = n;
        set_end();
    }
    [[nodiscard]] constexpr std::uint64_t limit() const noexcept { return limit_; }

    /// A second stream that yields the same words from here on, with the same limit.
    [[nodiscard]] constexpr stream replica() const noexcept {
        stream copy(address());
        copy.limit(limit_);
        copy.is_moved_from_ = is_moved_from_;
        copy.set_end();
        return copy;
    }

    /// Which draw comes next; `stream{address}` starts there.
    [[nodiscard]] constexpr stream_address address() const noexcept {
        return {key_, upper_, position()};
    }

    /// The stream of what is born during a run: a function of this stream's address without its
    /// position, and of i (an integer or a text), whenever it is asked for.
    template <class Part>
    [[nodiscard]] constexpr stream offspring(const Part& i) const {
        const auto place = detail::offspring_place(address(), detail::as_path_part(i));
        return stream(stream_address{place.key, place.upper, 0});
    }

private:
    constexpr void take(stream& other) noexcept {
        key_ = other.key_;
        upper_ = other.upper_;
        base_ = other.base_;
        limit_ = other.limit_;
        cursor_ = other.cursor_;
        filled_ = other.filled_;
        is_moved_from_ = std::exchange(other.is_moved_from_, true);
        if (filled_) {
            words_ = other.words_;
        }
        set_end();
        other.set_end();
    }

    // Words up to end_ may be drawn from the buffer; end_ == cursor_ sends the next draw to refill.
    constexpr void set_end() noexcept {
        end_ = cursor_;
        if (filled_ && !is_moved_from_ && limit_ > position()) {
            const std::uint64_t allowed = limit_ - base_;
            end_ = allowed < detail::stream_buffer_words
                       ? static_cast<std::uint32_t>(allowed)
                       : static_cast<std::uint32_t>(detail::stream_buffer_words);
        }
    }

    // Makes the buffer hold the word at position(), or throws.
    [[gnu::noinline]] constexpr void refill() {
        if (is_moved_from_) {
            detail::moved_from("stream");
        }
        if (position() >= limit_) {
            detail::exhausted("stream", address(), limit_);
        }
        seek(position()); // from the end of one buffer to the start of the next
        detail::refill({key_, upper_}, base_ / 2, words_.data());
        filled_ = true;
        set_end();
    }

    std::uint64_t key_ = 0;
    std::uint64_t upper_ = 0;
    std::uint64_t base_ = 0; // position of words_[0], a multiple of its size
    std::uint64_t limit_ = detail::stream_capacity;
    std::uint32_t cursor_ = 0;
    std::uint32_t end_ = 0;
    bool filled_ = false; // words_ holds the words at base_
    bool is_moved_from_ = false;
    std::array<std::uint64_t, detail::stream_buffer_words> words_; // unset until filled_
};

/// A stream in 48 bytes: the same words, one block computed for every two.
class thin_stream {
public:
    using result_type = std::uint64_t;

    constexpr explicit thin_stream(const stream_address& a) noexcept
        : key_(a.key), upper_(a.upper), position_(a.position) {}

    thin_stream(const thin_stream&) = delete; // a copy would repeat draws
    thin_stream& operator=(const thin_stream&) = delete;

    constexpr thin_stream(thin_stream&& other) noexcept { take(other); }
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
        if (is_moved_from_) [[unlikely]] {
            detail::moved_from("thin_stream");
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
        const std::uint64_t left = is_moved_from_ || position_ >= limit_ ? 0 : limit_ - position_;
        const std::size_t allowed = detail::smaller(out.size(), left);
        stream buffered(address());
        buffered.draw_into(out.first(allowed));
        seek(buffered.position());
        if (allowed < out.size()) {
            (*this)(); // says what is wrong
        }
    }

    [[nodiscard]] constexpr std::uint64_t position() const noexcept { return position_; }
    constexpr void seek(std::uint64_t n) noexcept {
        position_ = n;
        has_second_ = false;
    }
    constexpr void discard(std::uint64_t n) {
        if (n > detail::stream_capacity - position_) {
            detail::exhausted("thin_stream", address(), detail::stream_capacity);
        }
        seek(position_ + n);
    }
    constexpr void limit(std::uint64_t n) noexcept { limit_ = n; }
    [[nodiscard]] constexpr std::uint64_t limit() const noexcept { return limit_; }
    [[nodiscard]] constexpr thin_stream replica() const noexcept {
        thin_stream copy(address());
        copy.limit_ = limit_;
        copy.is_moved_from_ = is_moved_from_;
        return copy;
    }
    [[nodiscard]] constexpr stream_address address() const noexcept {
        return {key_, upper_, position_};
    }
    template <class Part>
    [[nodiscard]] constexpr thin_stream offspring(const Part& i) const {
        const auto place = detail::offspring_place(address(), detail::as_path_part(i));
        return thin_stream(stream_address{place.key, place.upper, 0});
    }

private:
    constexpr void take(thin_stream& other) noexcept {
        key_ = other.key_;
        upper_ = other.upper_;
        position_ = other.position_;
        limit_ = other.limit_;
        second_ = other.second_;
        has_second_ = other.has_second_;
        is_moved_from_ = std::exchange(other.is_moved_from_, true);
    }

    std::uint64_t key_ = 0;
    std::uint64_t upper_ = 0;
    std::uint64_t position_ = 0;
    std::uint64_t limit_ = detail::stream_capacity;
    std::uint64_t second_ = 0; // the second word of the last block, where has_second_
    bool has_second_ = false;
    bool is_moved_from_ = false;
};

static_assert(sizeof(stream) <= 320 && sizeof(thin_stream) <= 48);

} // namespace leat

#endif
