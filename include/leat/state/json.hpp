// Save and restore as JSON: engines, streams, addresses, sources, laws, regions and manifests, with
// nlohmann_json. This is the only header of leat that includes it, and no other header includes
// this one.
//
//   nlohmann::json saved = pump;                     // a stream, an engine, a law, a region
//   auto again = saved.get<leat::stream>();          // saved.get_to(x) and from_json(saved, x) too
//
//   std::string text = leat::json_text(pump);        // and without a json in between
//   auto again = leat::from_json_text<leat::stream>(text);
//
// A document looks like this (detail/json_forms.hpp and json_streams.hpp say what is in it):
//   {"leat": "normal", "version": 1, "mean": 3.0, "sd": 0.5, "checksum": "6c4dd2a9d60bbe37"}
// It names its type, has a version and a checksum, and is readable. Numbers return to the bit; so
// what was restored draws what the original would have drawn. Other programs may reformat it, but
// any change of its content is found.
//
// Errors: `state_refused` names what is wrong: not such a document, another type, a later version,
// a field that is missing, unknown or of the wrong kind, a value that the type refuses, a checksum
// that does not fit. What was to be restored is then as it was before.
//
// The format is frozen as sequences are: what one version wrote, every later one of the same major
// number reads (tests/golden/documents.json). Saving a rejection saves no code: restore it with the
// predicate that it had.
//
// Not for documents from people you do not trust: the checksum keeps no secret, so that a forged
// document is taken if its values are sound, and a long list asks for memory.

#ifndef LEAT_STATE_JSON_HPP
#define LEAT_STATE_JSON_HPP

#include "leat/state/detail/document.hpp"
#include "leat/state/detail/json_forms.hpp"
#include "leat/state/detail/json_manifest.hpp"
#include "leat/state/detail/json_streams.hpp"
#include "leat/state/refused.hpp"

#include <nlohmann/json.hpp>

#include <concepts>
#include <cstdint>
#include <string>
#include <string_view>
#include <utility> // move

namespace leat {

namespace detail {

/// The version of a document of any of these types.
inline constexpr std::uint64_t saved_version = 1;

/// The name of a T in documents.
template <saved T>
std::string saved_name() {
    if constexpr (named_type<T>) {
        return type_name<T>();
    } else {
        return saved_form<T>::name;
    }
}

/// Makes a document of content; the type's name by a function, to keep callers small.
template <json_value Json>
[[gnu::noinline]] void write_document(Json& document, std::string (*name)(), const Json& content) {
    document = seal(name(), saved_version, content);
}

/// The fields of a document that is sound.
template <json_value Json>
[[gnu::noinline]] json_fields<Json> read_document(const Json& document, std::string (*name)()) {
    return unseal(document, name(), saved_version);
}

/// What a document holds.
template <saved T, json_value Json>
[[gnu::noinline]] T restore(const Json& document) {
    json_fields<Json> fields = read_document(document, &saved_name<T>);
    T x = saved_form<T>::read(fields);
    fields.end();
    return x;
}

} // namespace detail

/// Makes `j` the document of x. Throws where x is a stream that was moved from.
template <detail::json_value Json, detail::saved T>
[[gnu::noinline]] void to_json(Json& j, const T& x) {
    detail::write_document(j, &detail::saved_name<T>,
                           detail::saved_form<T>::template write<Json>(x));
}

/// Makes x what the document says. Throws `state_refused`, and leaves x as it was, where it is no
/// sound document of a T.
template <detail::json_value Json, detail::saved T>
void from_json(const Json& j, T& x) {
    x = detail::restore<T>(j);
}

/// The document of x as one line of text.
template <detail::saved T>
[[nodiscard]] std::string json_text(const T& x) {
    nlohmann::json document;
    to_json(document, x);
    return document.dump();
}

/// What such a text says. Text that is no JSON is refused too, with `state_refused`.
template <detail::saved T>
[[nodiscard]] T from_json_text(std::string_view text) {
    const auto document = nlohmann::json::parse(text, nullptr, false);
    if (document.is_discarded()) {
        detail::message m;
        m.text("leat::json: ").text(detail::saved_name<T>().c_str());
        detail::raise<state_refused>(m.text(": the text is no JSON: it was cut or damaged"));
    }
    return detail::restore<T>(document);
}

} // namespace leat

/// For json::get, of types without a default constructor and of streams, which cannot be copied.
template <leat::detail::saved T>
struct nlohmann::adl_serializer<T, void> {
    template <leat::detail::json_value Json>
    static void to_json(Json& j, const T& x) {
        leat::to_json(j, x);
    }
    template <leat::detail::json_value Json>
    static void from_json(const Json& j, T& x) {
        leat::from_json(j, x);
    }
    template <leat::detail::json_value Json>
    static T from_json(const Json& j) {
        return leat::detail::restore<T>(j);
    }
};

#endif
