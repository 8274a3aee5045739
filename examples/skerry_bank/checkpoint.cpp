#include "checkpoint.hpp"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <iterator>
#include <utility>

#include <leat/streams/source.hpp>
#include <leat/version.hpp>

#include "files.hpp"
#include "flat_row.hpp"
#include "json_section.hpp"
#include "refusal.hpp"
#include "text.hpp"

namespace skerry {
namespace {

constexpr const char* kind = "leat_skerry_bank checkpoint";
constexpr int version = 1; // of the model and of this file: what either changes, changes it

/// A stream's first word depends on every byte of its path, and is the same on every machine: here
/// the path is the document's text.
std::string checksum(const json& document) {
    leat::stream words = leat::source{kind}.stream(document.dump());
    return hexadecimal(words());
}

/// Refuses what was not written by save_checkpoint, or was changed since.
void check_seal(json document) {
    const auto holds = [&](const char* key, const json& value) {
        return document.is_object() && document.contains(key) && document.at(key) == value;
    };
    if (!holds("kind", kind)) {
        throw refusal("is no checkpoint of this study's program");
    }
    if (!holds("version", version)) {
        throw refusal("version",
                      "must be " + std::to_string(version) + ", all that this program reads");
    }
    const json found = document.value("checksum", json());
    document.erase("checksum");
    if (found != checksum(document)) {
        throw refusal("checksum", "does not fit the rest: the file is damaged");
    }
}

/// The first part of the input in which two studies differ that would give different rows, or
/// nothing.
std::string difference(const input& a, const input& b) {
    const std::pair<const char*, bool> parts[] = {
        {"seed", a.seed == b.seed},
        {"horizon_days", a.horizon_days == b.horizon_days},
        {"lease", a.lease == b.lease},
        {"port", a.port == b.port},
        {"turbines", a.turbines == b.turbines},
        {"components", a.components == b.components},
        {"weather", a.weather == b.weather},
        {"vessels", a.vessel_speed_knots == b.vessel_speed_knots},
        {"designs", a.designs == b.designs}};
    const auto* const differing =
        std::find_if(std::begin(parts), std::end(parts), [](const auto& p) { return !p.second; });
    return differing == std::end(parts) ? "" : differing->first;
}

/// Whether an entry of a flat row is a count: the replication's number, or failures.
bool is_count(std::size_t i) { return i % 4 == 0; }

json to_json(const replication_row& row) {
    const flat_row numbers = flatten(row);
    json entry = json::array();
    for (std::size_t i = 0; i < numbers.size(); ++i) {
        entry.push_back(is_count(i) ? json(std::llround(numbers[i])) : json(numbers[i]));
    }
    return entry;
}

replication_row read_row(const json& entry) {
    flat_row numbers{};
    if (!entry.is_array() || entry.size() != numbers.size()) {
        throw refusal("rows",
                      "must each be a list of " + std::to_string(numbers.size()) + " numbers");
    }
    for (std::size_t i = 0; i < numbers.size(); ++i) {
        const bool right = is_count(i) ? entry[i].is_number_unsigned() &&
                                             entry[i].get<std::uint64_t>() < (1u << 30)
                                       : entry[i].is_number();
        if (!right) {
            throw refusal("rows", "holds " + entry[i].dump() + " in place of a " +
                                      (is_count(i) ? "count" : "number"));
        }
        numbers[i] = entry[i].get<double>();
    }
    return unflatten(numbers);
}

} // namespace

void save_checkpoint(const std::string& file, const loaded_input& in, const row_set& rows) {
    json document = {{"kind", kind},
                     {"version", version},
                     {"leat_version", leat::version},
                     {"input", in.document},
                     {"rows", json::array()}};
    for (const auto& row : rows) {
        if (row) {
            document["rows"].push_back(to_json(*row));
        }
    }
    document["checksum"] = checksum(document);
    write_file_to_disk(file, spread_out(document, {"rows"}));
}

row_set load_checkpoint(const std::string& file, const loaded_input& in) {
    const std::string text = read_file(file);
    try {
        const json document = parse_json(text);
        check_seal(document);
        const json_section whole(document, "",
                                 {"kind", "version", "leat_version", "input", "rows", "checksum"});
        if (whole.value("leat_version") != leat::version) {
            throw refusal("leat_version", "is " + whole.value("leat_version").dump() +
                                              ", must be \"" + leat::version +
                                              "\", this program's");
        }
        const std::string other = difference(parse_input(whole.value("input")).values, in.values);
        if (!other.empty()) {
            throw refusal("input." + other, "differs: the checkpoint is of another study");
        }
        row_set rows(static_cast<std::size_t>(in.values.replications));
        for (const json& entry : whole.value("rows")) {
            const replication_row row = read_row(entry);
            const auto r = static_cast<std::size_t>(row.replication);
            if (r >= rows.size() || rows[r]) {
                throw refusal("rows", "replication " + std::to_string(row.replication) +
                                          " must be below the number of replications, " +
                                          std::to_string(rows.size()) + ", and stand once");
            }
            rows[r] = row;
        }
        return rows;
    } catch (const refusal& e) {
        throw refusal(file, e.what());
    }
}

} // namespace skerry
