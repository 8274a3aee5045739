// What a traced run leaves behind: a small file that tells two runs apart without their draws.
//
// For each stream it holds how many words were drawn, a rolling hash of them, a rolling hash of the
// labels they were drawn under, and marks: the state of both hashes after every `stride` draws,
// with the label of the last. Written by leat::trace (testing/traced.hpp), compared by
// compare_traces (testing/trace_comparison.hpp).
//
// The file, version 1. Numbers are unsigned, of 4 or 8 bytes, the least significant byte first on
// every machine; a text is its length (4) and its bytes.
//   8 bytes "leat-trc", version (4)
//   stride (8), from (8), to (8)             marks after from, from + stride, ... <= to draws
//   number of streams (4), and for each, in the order of opening:
//     name (text), address (text)            the address line of a leat::stream, or nothing
//     draws (8), word hash (8), label hash (8)
//     number of labels (4), each a text      in the order of their first use; the first is empty
//     label of the last draw (4)             an index of that list
//     number of marks (8), each: word hash (8), label hash (8), label (4)
//   sum (16): SipHash-2-4-128 under a zero key of all the bytes before, eight to a word, the last
//             filled up with zeros, and then their number; low half first
// The rolling hash takes a word w from h to g ^ (g >> 32), g = (h ^ w) * 0x9e3779b97f4a7c15: one
// changed word surely changes it there. A label's word is the rolling hash of its bytes and length.
//
// Errors: read_trace throws `error` where a file cannot be read and `malformed_text` where it is no
// trace, was changed or cut, or is of another version.
// Not a proof against intent: whoever wants to can make two different runs hash alike.

#ifndef LEAT_TESTING_TRACE_FILE_HPP
#define LEAT_TESTING_TRACE_FILE_HPP

#include "leat/core/errors.hpp"
#include "leat/core/siphash.hpp"

#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <limits>
#include <span>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace leat {
namespace testing {

/// The hashes after so many draws of a stream.
struct trace_mark {
    std::uint64_t words;  ///< the hash of the words so far
    std::uint64_t labels; ///< the hash of their labels
    std::uint32_t label;  ///< of the last draw, as an index of the stream's labels

    friend bool operator==(const trace_mark&, const trace_mark&) = default;
};

/// What was recorded of one stream.
struct traced_stream {
    std::string name;                         ///< as the program gave it
    std::string address;                      ///< where it began, for streams that have an address
    std::uint64_t draws = 0;                  ///< how many words were drawn
    std::uint64_t words = 0;                  ///< the hash of them
    std::uint64_t labels = 0;                 ///< the hash of their labels
    std::vector<std::string> label_texts{""}; ///< in the order of their first use
    std::uint32_t label = 0;                  ///< of the last draw, as an index of these
    std::vector<trace_mark> marks;            ///< one for each stride in the range

    friend bool operator==(const traced_stream&, const traced_stream&) = default;
};

/// What was recorded of a run.
struct recorded_trace {
    std::uint64_t stride = 1024;                                  ///< draws from mark to mark
    std::uint64_t from = 0;                                       ///< no mark before so many draws
    std::uint64_t to = std::numeric_limits<std::uint64_t>::max(); ///< nor after so many
    std::vector<traced_stream> streams;                           ///< in the order of opening

    friend bool operator==(const recorded_trace&, const recorded_trace&) = default;
};

namespace detail {

using leat::detail::message;

inline constexpr std::string_view trace_magic = "leat-trc";
inline constexpr std::uint32_t trace_version = 1;

/// The rolling hash h, one word further.
constexpr std::uint64_t rolled(std::uint64_t h, std::uint64_t word) noexcept {
    const std::uint64_t g = (h ^ word) * 0x9e3779b97f4a7c15u;
    return g ^ (g >> 32);
}

/// A label as a word.
constexpr std::uint64_t label_word(std::string_view text) noexcept {
    std::uint64_t h = 0;
    for (const char c : text) {
        h = rolled(h, static_cast<unsigned char>(c));
    }
    return rolled(h, text.size());
}

using bytes = std::vector<unsigned char>;

inline leat::detail::word_pair sum_of(std::span<const unsigned char> data) {
    leat::detail::siphash hash(0, 0);
    for (std::size_t i = 0; i < data.size(); i += 8) {
        std::uint64_t word = 0;
        for (std::size_t k = 0; k < 8 && i + k < data.size(); ++k) {
            word |= std::uint64_t{data[i + k]} << (8 * k);
        }
        hash.absorb(word);
    }
    hash.absorb(data.size());
    return hash.finish();
}

/// Appends numbers and texts in the format above.
class trace_writer {
public:
    void number(std::uint64_t x, int size = 8) {
        for (int i = 0; i < size; ++i) {
            data_.push_back(static_cast<unsigned char>((x >> (8 * i)) & 255u));
        }
    }
    void text(std::string_view s) {
        number(s.size(), 4);
        raw(s);
    }
    void raw(std::string_view s) {
        for (const char c : s) {
            data_.push_back(static_cast<unsigned char>(c));
        }
    }
    /// All of it, with the sum.
    bytes sealed() {
        const leat::detail::word_pair sum = sum_of(data_);
        number(sum.low);
        number(sum.high);
        return std::move(data_);
    }

private:
    bytes data_;
};

/// Takes them apart again; refuses what does not fit.
class trace_reader {
public:
    trace_reader(std::string_view name, std::span<const unsigned char> data)
        : name_(name), rest_(data) {
        constexpr std::size_t shortest = 8 + 4 + 16;
        if (data.size() < shortest || raw(8) != trace_magic) {
            refuse("is no trace, or was cut");
        }
        if (number(4) != trace_version) {
            refuse("is of another version; this leat reads version 1");
        }
        trace_reader sum(name_, data.last(16), 0);
        const std::uint64_t low = sum.number();
        const std::uint64_t high = sum.number();
        const leat::detail::word_pair found = sum_of(data.first(data.size() - 16));
        if (low != found.low || high != found.high) {
            refuse("has a sum that does not fit: it was changed or cut");
        }
        rest_ = rest_.first(rest_.size() - 16);
    }

    std::uint64_t number(std::size_t size = 8) {
        need(size);
        std::uint64_t x = 0;
        for (std::size_t i = 0; i < size; ++i) {
            x |= std::uint64_t{rest_[i]} << (8 * i);
        }
        rest_ = rest_.subspan(size);
        return x;
    }
    /// How many things of at least `size` bytes follow.
    std::size_t count(std::size_t bytes_of_count, std::size_t size) {
        const std::uint64_t n = number(bytes_of_count);
        if (n > rest_.size() / size) {
            refuse("has a length that does not fit");
        }
        return static_cast<std::size_t>(n);
    }
    std::string text() { return raw(count(4, 1)); }
    std::uint32_t index(std::size_t size) {
        const std::uint64_t i = number(4);
        if (i >= size) {
            refuse("has a label that is not in its list");
        }
        return static_cast<std::uint32_t>(i);
    }
    void end() const {
        if (!rest_.empty()) {
            refuse("goes on after its end");
        }
    }
    [[noreturn]] void refuse(const char* reason) const {
        message m;
        m.text("leat::read_trace: ").text(name_.data(), name_.size() < 200 ? name_.size() : 200);
        leat::detail::raise<malformed_text>(m.text(" ").text(reason));
    }

private:
    trace_reader(std::string_view name, std::span<const unsigned char> data, int) noexcept
        : name_(name), rest_(data) {}

    void need(std::size_t size) const {
        if (rest_.size() < size) {
            refuse("ends too soon");
        }
    }
    std::string raw(std::size_t size) {
        need(size);
        std::string s;
        for (const unsigned char c : rest_.first(size)) {
            s.push_back(static_cast<char>(c));
        }
        rest_ = rest_.subspan(size);
        return s;
    }

    std::string_view name_;
    std::span<const unsigned char> rest_;
};

/// A file that is closed when it goes.
class file {
public:
    file(const std::string& path, const char* mode) : handle_(std::fopen(path.c_str(), mode)) {}
    file(const file&) = delete;
    file& operator=(const file&) = delete;
    ~file() { close(); }

    [[nodiscard]] std::FILE* handle() const noexcept { return handle_; }
    /// False where what was written did not arrive.
    bool close() noexcept {
        std::FILE* const open = std::exchange(handle_, nullptr);
        return open == nullptr || std::fclose(open) == 0;
    }

private:
    std::FILE* handle_;
};

/// False where the file cannot be written.
inline bool write_file(const std::string& path, std::span<const unsigned char> data) {
    file out(path, "wb");
    return out.handle() != nullptr &&
           std::fwrite(data.data(), 1, data.size(), out.handle()) == data.size() && out.close();
}

} // namespace detail

/// The trace as the bytes of a file.
[[nodiscard]] inline std::vector<unsigned char> encode_trace(const recorded_trace& t) {
    detail::trace_writer out;
    out.raw(detail::trace_magic);
    out.number(detail::trace_version, 4);
    out.number(t.stride);
    out.number(t.from);
    out.number(t.to);
    out.number(t.streams.size(), 4);
    for (const traced_stream& s : t.streams) {
        out.text(s.name);
        out.text(s.address);
        out.number(s.draws);
        out.number(s.words);
        out.number(s.labels);
        out.number(s.label_texts.size(), 4);
        for (const std::string& label : s.label_texts) {
            out.text(label);
        }
        out.number(s.label, 4);
        out.number(s.marks.size());
        for (const trace_mark& mark : s.marks) {
            out.number(mark.words);
            out.number(mark.labels);
            out.number(mark.label, 4);
        }
    }
    return out.sealed();
}

/// The trace in the bytes of a file; `name` is what messages call it.
[[nodiscard]] inline recorded_trace decode_trace(std::span<const unsigned char> data,
                                                 std::string_view name) {
    detail::trace_reader in(name, data);
    recorded_trace t;
    t.stride = in.number();
    t.from = in.number();
    t.to = in.number();
    if (t.stride == 0) {
        in.refuse("has a stride of 0");
    }
    constexpr std::size_t least_of_stream = 4 + 4 + 24 + 4 + 4 + 4 + 8;
    for (std::size_t left = in.count(4, least_of_stream); left > 0; --left) {
        traced_stream s;
        s.name = in.text();
        s.address = in.text();
        s.draws = in.number();
        s.words = in.number();
        s.labels = in.number();
        s.label_texts.clear();
        for (std::size_t labels = in.count(4, 4); labels > 0; --labels) {
            s.label_texts.push_back(in.text());
        }
        s.label = in.index(s.label_texts.size());
        const std::size_t marks = in.count(8, 20);
        const std::uint64_t last = s.draws < t.to ? s.draws : t.to;
        if (marks > 0 && (last < t.from || marks - 1 > (last - t.from) / t.stride)) {
            in.refuse("has more marks than draws");
        }
        for (std::size_t i = 0; i < marks; ++i) {
            trace_mark mark{};
            mark.words = in.number();
            mark.labels = in.number();
            mark.label = in.index(s.label_texts.size());
            s.marks.push_back(mark);
        }
        t.streams.push_back(std::move(s));
    }
    in.end();
    return t;
}

/// The trace in a file.
[[nodiscard]] inline recorded_trace read_trace(const std::string& path) {
    detail::file in(path, "rb");
    std::vector<unsigned char> data;
    bool sound = in.handle() != nullptr;
    unsigned char block[4096];
    for (std::size_t n = sizeof block; sound && n == sizeof block;) {
        n = std::fread(block, 1, sizeof block, in.handle());
        data.insert(data.end(), block, block + n);
        sound = std::ferror(in.handle()) == 0;
    }
    if (!sound) {
        detail::message m;
        leat::detail::raise<error>(m.text("leat::read_trace: cannot read ").text(path.c_str()));
    }
    return decode_trace(data, path);
}

} // namespace testing

using testing::read_trace;
using testing::recorded_trace;

} // namespace leat

#endif
