// The content of a saved run manifest:
//
//   {"library": "0.1.0",
//    "algorithms": {"path": "SipHash-2-4-128 over seed and parts, version 1", ...},
//    "sources": ["source{20261201}"],
//    "openings": [{"path": "source{20261201}.stream(\"failures\", 7)",
//                  "address": "leat-stream 1 key ... upper ... word 12 sum ...",
//                  "limit": "18446744073709551615", "words": "12"}, ...]}
//
// The address holds the position. Words are as json_values.hpp writes them.

#ifndef LEAT_STATE_DETAIL_JSON_MANIFEST_HPP
#define LEAT_STATE_DETAIL_JSON_MANIFEST_HPP

#include "leat/state/detail/json_forms.hpp"
#include "leat/state/detail/json_streams.hpp" // read_address
#include "leat/state/manifest.hpp"

#include <string>
#include <utility> // move
#include <vector>

namespace leat::detail {

template <>
struct saved_form<manifest> {
    static constexpr const char* name = "manifest";

    template <json_value Json>
    static Json write(const manifest& x) {
        Json content = Json::object();
        content["library"] = x.library();
        Json algorithms = Json::object();
        for (const run_algorithm& a : x.algorithms()) {
            algorithms[a.name] = a.form;
        }
        content["algorithms"] = std::move(algorithms);
        Json sources = Json::array();
        for (const std::string& s : x.sources()) {
            sources.push_back(s);
        }
        content["sources"] = std::move(sources);
        Json openings = Json::array();
        for (const ledger_entry& e : x.openings()) {
            Json one = Json::object();
            one["path"] = e.path;
            one["address"] = to_string(e.address);
            one["limit"] = word_to_json<Json>(e.limit);
            one["words"] = word_to_json<Json>(e.words);
            openings.push_back(std::move(one));
        }
        content["openings"] = std::move(openings);
        return content;
    }

    template <json_value Json>
    static manifest read(json_fields<Json>& fields) {
        std::string library(fields.take("library").text());
        // In the order of this library; what it does not know is refused as left over.
        json_fields<Json> forms = fields.take("algorithms").object();
        std::vector<run_algorithm> algorithms;
        const manifest known;
        for (const run_algorithm& a : known.algorithms()) {
            algorithms.push_back({a.name, std::string(forms.take(a.name).text())});
        }
        forms.end();
        std::vector<std::string> sources;
        for (const json_field<Json>& s : fields.take("sources").list()) {
            sources.emplace_back(s.text());
        }
        std::vector<ledger_entry> openings;
        for (const json_field<Json>& one : fields.take("openings").list()) {
            json_fields<Json> entry = one.object();
            ledger_entry e;
            e.opening = openings.size() + 1;
            e.path = entry.take("path").text();
            e.address = read_address(entry);
            e.limit = entry.take("limit").word();
            e.words = entry.take("words").word();
            entry.end();
            openings.push_back(std::move(e));
        }
        return restoring(fields.where(), [&] {
            return manifest(std::move(library), std::move(algorithms), std::move(sources),
                            std::move(openings));
        });
    }
};

} // namespace leat::detail

#endif
