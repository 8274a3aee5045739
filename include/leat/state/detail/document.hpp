// A saved document: {"leat": TYPE, "version": 1, ...content..., "checksum": "0123456789abcdef"}.
//
// seal() makes one of a type's content; unseal() checks one, names what is wrong, and hands out the
// content's fields:
//
//   Json document = seal("thing", 1, Json{{"size", 3}});
//
//   auto fields = unseal(document, "thing", 1);
//   const int size = fields.take("size").template integer<int>();
//   fields.end();                                   // refuses fields that nobody took
//
// Read everything first and change the target last: what is refused must leave it as it was.
// Anything wrong throws `state_refused`. The checksum (json_checksum.hpp) finds every change of
// content; white space, the order of fields and the way a number is written (2 or 2.0) are free.

#ifndef LEAT_STATE_DETAIL_DOCUMENT_HPP
#define LEAT_STATE_DETAIL_DOCUMENT_HPP

#include "leat/core/errors.hpp"
#include "leat/state/detail/json_checksum.hpp"
#include "leat/state/detail/json_values.hpp"
#include "leat/state/refused.hpp"

#include <cstdint>
#include <string>
#include <string_view>

namespace leat::detail {

/// A document of a type's content, an object with neither of the fields leat, version, checksum.
template <json_value Json>
[[gnu::noinline]] Json seal(std::string_view type, std::uint64_t version, const Json& content) {
    Json document = Json::object();
    document["leat"] = std::string(type);
    document["version"] = version;
    for (auto at = content.begin(); at != content.end(); ++at) {
        document[at.key()] = *at;
    }
    json_checksum sum;
    sum.object_without(document, "checksum");
    document["checksum"] = sum.text();
    return document;
}

/// The fields of a document's content. Refuses what is no document of this type and version, and
/// what was changed since seal() made it. The document must outlive the fields.
template <json_value Json>
[[gnu::noinline]] json_fields<Json> unseal(const Json& document, std::string_view type,
                                           std::uint64_t version) {
    const std::string where(type);
    json_fields<Json> fields = json_field<Json>(document, where + ": the document").object();
    fields = {document, where};
    const json_field<Json> saved_type = fields.take("leat");
    if (saved_type.text() != type) {
        message m;
        m.text("must be \"").text(type.data(), type.size() < 120 ? type.size() : 120);
        saved_type.refuse(m.text("\": it was saved from another type").c_str());
    }
    const json_field<Json> saved_version = fields.take("version");
    const auto number = saved_version.template integer<std::uint64_t>();
    if (number > version) {
        message m;
        m.text("must be at most ").value(version);
        saved_version.refuse(
            m.text(": it was saved by a later version of leat; restore it with that").c_str());
    }
    if (number != version) {
        message m;
        m.text("must be ").value(version);
        saved_version.refuse(m.c_str());
    }
    const json_field<Json> saved_sum = fields.take("checksum");
    json_checksum sum;
    sum.object_without(document, "checksum");
    if (saved_sum.text() != sum.text()) {
        saved_sum.refuse("must fit the rest of the document: it was changed or damaged");
    }
    return fields;
}

} // namespace leat::detail

#endif
