// The checksum of a saved document: SipHash-2-4-128 over what the document says, not over how it is
// spaced. It finds changes; it is no signature, since anybody can compute it.
//
// Frozen: the message, in 64-bit words under a zero key, is the word "leatjson" (first letter
// lowest) and then the document, its member `checksum` left out. The checksum is the low word of
// the result. A value is
//   null     0
//   boolean  1 + 256 * (0 or 1)
//   number   2, then the bits of the nearest double: 2 and 2.0 are the same, 0.0 and -0.0 are not
//   string   3 + 256 * bytes, then the bytes, eight to a word, the last padded with zeros
//   list     4 + 256 * entries, then the entries
//   object   5 + 256 * members, then each member in the order of its name's bytes: name, value

#ifndef LEAT_STATE_DETAIL_JSON_CHECKSUM_HPP
#define LEAT_STATE_DETAIL_JSON_CHECKSUM_HPP

#include "leat/core/siphash.hpp"
#include "leat/state/refused.hpp"

#include <algorithm> // sort
#include <bit>
#include <cstdint>
#include <string>
#include <string_view>
#include <utility> // pair
#include <vector>

namespace leat::detail {

/// A JSON value of nlohmann's kind, whichever of its containers it is built on.
template <class Json>
concept json_value = requires {
    typename Json::object_t;
    typename Json::array_t;
    typename Json::number_unsigned_t;
    typename Json::parse_error;
};

/// The checksum of a document, as it goes.
class json_checksum {
public:
    json_checksum() noexcept { hash_.absorb(0x6e6f736a7461656cu); }

    /// Takes in an object without its member of this name.
    template <json_value Json>
    void object_without(const Json& object, std::string_view left_out) {
        take_object(object, left_out, 0);
    }

    /// 16 hexadecimal digits.
    [[nodiscard]] std::string text() const {
        const std::uint64_t word = hash_.finish().low;
        std::string digits;
        for (int shift = 60; shift >= 0; shift -= 4) {
            digits += "0123456789abcdef"[(word >> shift) & 15u];
        }
        return digits;
    }

private:
    // No document of leat's comes near; a hostile one must not use up the stack.
    static constexpr int deepest = 64;

    template <json_value Json>
    void take(const Json& value, int depth) {
        if (depth > deepest) {
            message m;
            raise<state_refused>(m.text("leat::json: lists and objects lie in one another more "
                                        "than 64 deep: this is no document of leat's"));
        }
        if (value.is_object()) {
            take_object(value, {}, depth);
        } else if (value.is_array()) {
            hash_.absorb(4 + 256 * std::uint64_t{value.size()});
            for (const Json& entry : value) {
                take(entry, depth + 1);
            }
        } else if (value.is_string()) {
            hash_.absorb_text(*value.template get_ptr<const typename Json::string_t*>());
        } else if (value.is_number()) {
            hash_.absorb(2);
            hash_.absorb(std::bit_cast<std::uint64_t>(value.template get<double>()));
        } else if (value.is_boolean()) {
            hash_.absorb(1 + (value.template get<bool>() ? 256u : 0u));
        } else {
            hash_.absorb(0);
        }
    }

    template <json_value Json>
    void take_object(const Json& object, std::string_view left_out, int depth) {
        std::vector<std::pair<std::string_view, const Json*>> members;
        for (auto at = object.begin(); at != object.end(); ++at) {
            if (at.key() != left_out || depth > 0) {
                members.emplace_back(at.key(), &*at);
            }
        }
        std::sort(members.begin(), members.end(),
                  [](const auto& a, const auto& b) { return a.first < b.first; });
        hash_.absorb(5 + 256 * std::uint64_t{members.size()});
        for (const auto& [name, value] : members) {
            hash_.absorb_text(name);
            take(*value, depth + 1);
        }
    }

    siphash hash_{0, 0};
};

} // namespace leat::detail

#endif
