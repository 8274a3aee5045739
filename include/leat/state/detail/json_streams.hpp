// The content of saved streams, addresses and sources.
//
//   stream, thin_stream   {"address": "leat-stream 1 key ...", "limit": "18446744073709551615"}
//   stream_address        {"address": "leat-stream 1 key ..."}
//   source                {"state": [...]}: the hash of seed and path, from which neither can be
//                         told; a program that wants to show them keeps them beside it

#ifndef LEAT_STATE_DETAIL_JSON_STREAMS_HPP
#define LEAT_STATE_DETAIL_JSON_STREAMS_HPP

#include "leat/state/detail/json_forms.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/stream.hpp"

#include <concepts>
#include <cstddef>
#include <cstdint>
#include <utility> // move

namespace leat::detail {

template <json_value Json>
stream_address read_address(json_fields<Json>& fields) {
    const json_field<Json> line = fields.take("address");
    return restoring(line.where(), [&] { return parse_address(line.text()); });
}

template <class T>
requires std::same_as<T, stream> || std::same_as<T, thin_stream>
struct saved_form<T> {
    static constexpr const char* name = std::same_as<T, stream> ? "stream" : "thin_stream";

    /// Throws where the stream was moved from: that must not come to life again.
    template <json_value Json>
    static Json write(const T& x) {
        if (x.was_moved_from()) {
            message m;
            m.text("leat::json: ").text(name);
            raise<error>(m.text(": saved after it was moved from; save what it was moved to"));
        }
        Json content = Json::object();
        content["address"] = to_string(x.address());
        content["limit"] = word_to_json<Json>(x.limit());
        return content;
    }
    template <json_value Json>
    static T read(json_fields<Json>& fields) {
        const stream_address address = read_address(fields);
        const std::uint64_t limit = fields.take("limit").word();
        T made(address);
        made.limit(limit);
        return made;
    }
};

template <>
struct saved_form<stream_address> {
    static constexpr const char* name = "stream_address";

    template <json_value Json>
    static Json write(const stream_address& x) {
        Json content = Json::object();
        content["address"] = to_string(x);
        return content;
    }
    template <json_value Json>
    static stream_address read(json_fields<Json>& fields) {
        return read_address(fields);
    }
};

template <>
struct saved_form<source> {
    static constexpr const char* name = "source";

    template <json_value Json>
    static Json write(const source& x) {
        Json words = Json::array();
        for (const std::uint64_t word : x.state()) {
            words.push_back(word_to_json<Json>(word));
        }
        Json content = Json::object();
        content["state"] = std::move(words);
        return content;
    }
    template <json_value Json>
    static source read(json_fields<Json>& fields) {
        source::state_type state{};
        const json_field<Json> field = fields.take("state");
        const auto words = field.list(state.size());
        for (std::size_t i = 0; i < state.size(); ++i) {
            state[i] = words[i].word();
        }
        return restoring(field.where(), [&] { return source::from_state(state); });
    }
};

} // namespace leat::detail

#endif
