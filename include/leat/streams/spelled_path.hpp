// Paths as text: the calls that open a stream, as a program spells them.
//
//   source{20261201}.branch("wind", 3).stream(7, 12)
//   source{"north sea"}.thin_stream("ship", -4).offspring(2)
//
// A ledger writes them, a manifest reads them back. In ASCII: in a text, quotes and backslashes
// have a backslash before them, and a byte that is no printable ASCII character is \x and two
// hexadecimal digits. What follows the branches is .stream, .thin_stream, .engine, or .chunk for a
// chunk of fill_chunks; after that any number of .offspring(i) and .replica().

#ifndef LEAT_STREAMS_SPELLED_PATH_HPP
#define LEAT_STREAMS_SPELLED_PATH_HPP

#include "leat/streams/path.hpp"
#include "leat/streams/recorder.hpp" // opening
#include "leat/streams/stream.hpp"   // offspring_place

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <string_view>

namespace leat::detail {

/// The members of a source that open something, as they are spelled: by number of `opening`.
inline constexpr std::array<std::string_view, 4> opening_names{"stream", "thin_stream", "engine",
                                                               "chunk"};

/// Appends a part as a program writes it.
inline void spell(std::string& to, const path_part& part) {
    if (!part.is_text) {
        to += part.is_negative ? "-" : "";
        to += std::to_string(part.magnitude);
        return;
    }
    to += '"';
    for (const char c : part.text) {
        if (c == '"' || c == '\\') {
            to += '\\';
            to += c;
        } else if (c >= ' ' && c <= '~') {
            to += c;
        } else {
            const auto byte = static_cast<unsigned char>(c);
            to += "\\x";
            to += "0123456789abcdef"[byte >> 4];
            to += "0123456789abcdef"[byte & 15u];
        }
    }
    to += '"';
}

/// Appends a call: .branch("wind", 3)
inline void spell_call(std::string& to, std::string_view member, std::span<const path_part> parts) {
    to += '.';
    to += member;
    to += '(';
    bool first = true;
    for (const path_part& part : parts) {
        to += first ? "" : ", ";
        first = false;
        spell(to, part);
    }
    to += ')';
}

/// Reads a spelled path piece by piece.
class spelling_reader {
public:
    explicit spelling_reader(std::string_view text) noexcept : rest_(text) {}

    /// Takes these characters, if they come next.
    bool take(std::string_view word) noexcept {
        const bool comes = rest_.starts_with(word);
        rest_.remove_prefix(comes ? word.size() : 0);
        return comes;
    }
    /// Takes a part. A text is valid until the next one is read.
    std::optional<path_part> part() {
        path_part p;
        if (take("\"")) {
            p.is_text = true;
            const bool sound = text();
            p.text = text_;
            return sound ? std::optional(p) : std::nullopt;
        }
        p.is_negative = take("-");
        const std::size_t digits = rest_.find_first_not_of("0123456789");
        const std::string_view number = rest_.substr(0, digits);
        if (number.empty() || (number[0] == '0' && (number.size() > 1 || p.is_negative))) {
            return std::nullopt;
        }
        for (const char c : number) {
            const auto digit = static_cast<std::uint64_t>(c - '0');
            if (p.magnitude > (~std::uint64_t{0} - digit) / 10) {
                return std::nullopt;
            }
            p.magnitude = p.magnitude * 10 + digit;
        }
        rest_.remove_prefix(number.size());
        const bool sound = !p.is_negative || p.magnitude <= std::uint64_t{1} << 63;
        return sound ? std::optional(p) : std::nullopt;
    }
    /// Takes a source with its seed: source{20261201}
    std::optional<path_part> seed() {
        if (!take("source{")) {
            return std::nullopt;
        }
        const std::optional<path_part> p = part();
        return take("}") ? p : std::nullopt;
    }
    /// Takes parts and the closing parenthesis.
    bool parts(path_hash& path) {
        if (take(")")) {
            return true;
        }
        do {
            const std::optional<path_part> p = part();
            if (!p) {
                return false;
            }
            path.append(*p);
        } while (take(", "));
        return take(")");
    }
    /// Takes a member function and its opening parenthesis.
    bool call(std::string_view member) noexcept {
        const std::string_view before = rest_;
        if (take(".") && take(member) && take("(")) {
            return true;
        }
        rest_ = before;
        return false;
    }
    [[nodiscard]] bool at_end() const noexcept { return rest_.empty(); }

private:
    bool text() {
        text_.clear();
        while (!rest_.empty()) {
            const char c = rest_.front();
            rest_.remove_prefix(1);
            if (c == '"') {
                return true;
            }
            if (c < ' ' || c > '~') {
                return false;
            }
            if (c != '\\') {
                text_ += c;
            } else if (rest_.starts_with('"') || rest_.starts_with('\\')) {
                text_ += rest_.front();
                rest_.remove_prefix(1);
            } else if (take("x") && rest_.size() >= 2) {
                constexpr std::string_view digits = "0123456789abcdef";
                const std::size_t high = digits.find(rest_[0]);
                const std::size_t low = digits.find(rest_[1]);
                if (high == digits.npos || low == digits.npos) {
                    return false;
                }
                text_ += static_cast<char>(static_cast<unsigned char>(16 * high + low));
                rest_.remove_prefix(2);
            } else {
                return false;
            }
        }
        return false;
    }

    std::string_view rest_;
    std::string text_;
};

/// Where a spelled path leads, and what was opened there.
struct spelled_place {
    stream_place place;
    opening as;
    bool is_replica; // or an offspring of one
};

/// Follows a spelled path; nothing where the text is none.
inline std::optional<spelled_place> place_of(std::string_view spelled) {
    spelling_reader reader(spelled);
    const std::optional<path_part> seed = reader.seed();
    if (!seed) {
        return std::nullopt;
    }
    path_hash path(*seed);
    while (reader.call("branch")) {
        if (!reader.parts(path)) {
            return std::nullopt;
        }
    }
    for (std::size_t i = 0; i < opening_names.size(); ++i) {
        if (!reader.call(opening_names[i])) {
            continue;
        }
        const auto as = static_cast<opening>(i);
        if (!reader.parts(path)) {
            return std::nullopt;
        }
        stream_place place = path.place(as == opening::engine  ? path_kind::engine
                                        : as == opening::chunk ? path_kind::chunk
                                                               : path_kind::stream);
        bool is_replica = false;
        while (as != opening::engine && !reader.at_end()) {
            if (reader.take(".replica()")) {
                is_replica = true;
                continue;
            }
            const bool called = reader.call("offspring");
            const std::optional<path_part> i_th = called ? reader.part() : std::nullopt;
            if (!i_th || !reader.take(")")) {
                return std::nullopt;
            }
            place = offspring_place({place.key, place.upper, 0}, *i_th);
        }
        return reader.at_end() ? std::optional(spelled_place{place, as, is_replica}) : std::nullopt;
    }
    return std::nullopt;
}

} // namespace leat::detail

#endif
