// The address of a stream, and its one-line text.
//
// An address says exactly which draw of which stream: key and upper half of the counter (see
// path.hpp) and the position, counted in 64-bit words. The line it turns into goes into logs and
// error reports; `stream{parse_address(line)}` starts there again.
//
// The line, in ASCII, single spaces, hexadecimal in lower case with 16 digits (the sum has 8):
//   leat-stream 1 key 0123456789abcdef upper 0123456789abcdef word 37 sum 89abcdef
// where 1 is the version and the sum is the low half of the first word of SipHash-2-4-128 under
// a zero key over version, key, upper and position.

#ifndef LEAT_STREAMS_ADDRESS_HPP
#define LEAT_STREAMS_ADDRESS_HPP

#include "leat/core/errors.hpp"
#include "leat/core/siphash.hpp"

#include <cstdint>
#include <string>
#include <string_view>

namespace leat {

/// Which draw of which stream.
struct stream_address {
    std::uint64_t key;      ///< the philox key
    std::uint64_t upper;    ///< the upper half of the philox counter
    std::uint64_t position; ///< words drawn so far

    friend constexpr bool operator==(const stream_address&, const stream_address&) = default;
};

namespace detail {

constexpr std::uint64_t address_version = 1;

constexpr std::uint32_t address_sum(const stream_address& a) noexcept {
    siphash hash(0, 0);
    hash.absorb(address_version);
    hash.absorb(a.key);
    hash.absorb(a.upper);
    hash.absorb(a.position);
    return static_cast<std::uint32_t>(hash.finish().low);
}

/// Appends the line to a message: an error report can hold it without a heap.
inline message& write_address(message& m, const stream_address& a) noexcept {
    const auto digits = [&m](std::uint64_t x, int count) {
        for (int shift = 4 * (count - 1); shift >= 0; shift -= 4) {
            m.text(&"0123456789abcdef"[(x >> shift) & 15u], 1);
        }
    };
    m.text("leat-stream ").value(address_version).text(" key ");
    digits(a.key, 16);
    m.text(" upper ");
    digits(a.upper, 16);
    m.text(" word ").value(a.position).text(" sum ");
    digits(address_sum(a), 8);
    return m;
}

[[noreturn, gnu::cold, gnu::noinline]] inline void refuse_address(std::string_view text,
                                                                  const char* reason) {
    message m;
    m.text("leat::parse_address: text = \"")
        .text(text.data(), text.size() < 160 ? text.size() : 160);
    raise<malformed_text>(m.text("\", ").text(reason));
}

/// Takes the parts of an address line in turn; each call refuses what does not fit.
class address_reader {
public:
    explicit address_reader(std::string_view text) noexcept : text_(text), rest_(text) {}

    void expect(std::string_view word) {
        if (!rest_.starts_with(word)) {
            refuse_address(text_, "must be an address line: leat-stream 1 key K upper U word N "
                                  "sum S, as to_string wrote it");
        }
        rest_.remove_prefix(word.size());
    }
    std::uint64_t hexadecimal(std::size_t count) {
        std::uint64_t x = 0;
        for (std::size_t i = 0; i < count; ++i) {
            const char c = i < rest_.size() ? rest_[i] : ' ';
            const int digit = c >= '0' && c <= '9'   ? c - '0'
                              : c >= 'a' && c <= 'f' ? c - 'a' + 10
                                                     : -1;
            if (digit < 0) {
                refuse_address(text_, "must have 16 hexadecimal digits (a-f in lower case) in key "
                                      "and upper and 8 in sum");
            }
            x = x << 4 | static_cast<std::uint64_t>(digit);
        }
        rest_.remove_prefix(count);
        return x;
    }
    std::uint64_t decimal() {
        std::uint64_t x = 0;
        std::size_t count = 0;
        for (; count < rest_.size() && rest_[count] >= '0' && rest_[count] <= '9'; ++count) {
            const auto digit = static_cast<std::uint64_t>(rest_[count] - '0');
            const bool leading_zero = count == 1 && x == 0;
            if (leading_zero || x > (~std::uint64_t{0} - digit) / 10) {
                refuse_address(text_, "must have decimal numbers below 2^64 without leading zeros");
            }
            x = x * 10 + digit;
        }
        if (count == 0) {
            refuse_address(text_, "must have a decimal number after leat-stream and after word");
        }
        rest_.remove_prefix(count);
        return x;
    }
    void end() const {
        if (!rest_.empty()) {
            refuse_address(text_, "must end after the sum");
        }
    }

private:
    std::string_view text_;
    std::string_view rest_;
};

} // namespace detail

/// The address as one line of text.
inline std::string to_string(const stream_address& a) {
    detail::message m;
    return detail::write_address(m, a).c_str();
}

/// The address that a line names. Anything but a line that to_string wrote is refused with
/// `malformed_text`: another form, a later version, a sum that does not fit.
inline stream_address parse_address(std::string_view text) {
    detail::address_reader reader(text);
    reader.expect("leat-stream ");
    if (reader.decimal() != detail::address_version) {
        detail::refuse_address(text, "is of another version; this leat reads version 1");
    }
    stream_address a{};
    reader.expect(" key ");
    a.key = reader.hexadecimal(16);
    reader.expect(" upper ");
    a.upper = reader.hexadecimal(16);
    reader.expect(" word ");
    a.position = reader.decimal();
    reader.expect(" sum ");
    const std::uint64_t sum = reader.hexadecimal(8);
    reader.end();
    if (sum != detail::address_sum(a)) {
        detail::refuse_address(text, "has a sum that does not fit: the line was changed");
    }
    return a;
}

} // namespace leat

#endif
