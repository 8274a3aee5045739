#include "json_section.hpp"

#include <algorithm>
#include <set>
#include <utility>

#include "refusal.hpp"
#include "text.hpp"

namespace skerry {
namespace {

/// A key as it may stand in a one-line message.
std::string spelled(std::string_view key) {
    const bool plain = !key.empty() && std::all_of(key.begin(), key.end(), [](char c) {
        return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') ||
               c == '_';
    });
    return plain ? std::string(key) : quoted(key);
}

std::string kind(const json& value) {
    switch (value.type()) {
    case json::value_t::null:
        return "null";
    case json::value_t::boolean:
        return "true or false";
    case json::value_t::string:
        return "a text";
    case json::value_t::array:
        return "a list";
    case json::value_t::object:
        return "an object";
    default:
        return "a number";
    }
}

/// Watches the keys go by while a document is parsed: the parser itself keeps the last of two.
class key_watch {
public:
    void see(json::parse_event_t event, const json& parsed) {
        if (event == json::parse_event_t::object_start) {
            open_.emplace_back();
        } else if (event == json::parse_event_t::object_end) {
            open_.pop_back();
        } else if (event == json::parse_event_t::key) {
            level& now = open_.back();
            now.key = parsed.get<std::string>();
            if (!now.seen.insert(now.key).second) {
                std::string path;
                for (const level& each : open_) {
                    path += (path.empty() ? "" : ".") + spelled(each.key);
                }
                throw refusal(path, "stands twice in one object");
            }
        }
    }

private:
    struct level {
        std::set<std::string> seen;
        std::string key;
    };
    std::vector<level> open_;
};

} // namespace

json parse_json(const std::string& text) {
    key_watch watch;
    try {
        return json::parse(text, [&](int, json::parse_event_t event, json& parsed) {
            watch.see(event, parsed);
            return true;
        });
    } catch (const json::exception& e) {
        // "[json.exception.parse_error.101] parse error at line 1, column 2: ...": the place and
        // the cause are for the reader, the number in brackets is not.
        const std::string what = e.what();
        const std::size_t bracket = what.find("] ");
        throw refusal("not JSON", bracket == std::string::npos ? what : what.substr(bracket + 2));
    }
}

json_section::json_section(const json& value, std::string path,
                           std::initializer_list<std::string_view> keys)
    : value_(&value), path_(std::move(path)) {
    if (!value.is_object()) {
        throw refusal(path_.empty() ? "the document" : path_,
                      "is " + kind(value) + ", must be an object");
    }
    for (const auto& item : value.items()) {
        if (std::find(keys.begin(), keys.end(), item.key()) == keys.end()) {
            throw refusal(this->path(item.key()), "unknown key");
        }
    }
    for (const std::string_view key : keys) {
        if (!value.contains(std::string(key))) {
            throw refusal(this->path(key), "missing");
        }
    }
}

double json_section::number(std::string_view key, double lo, double hi) const {
    const json& found = value(key);
    const std::string allowed = "must be a number from " + shortest(lo) + " to " + shortest(hi);
    if (!found.is_number()) {
        throw refusal(path(key), "is " + kind(found) + ", " + allowed);
    }
    const auto x = found.get<double>();
    if (!(lo <= x && x <= hi)) {
        throw refusal(path(key), "is " + found.dump() + ", " + allowed);
    }
    return x;
}

int json_section::whole(std::string_view key, int lo, int hi) const {
    const json& found = value(key);
    const std::string allowed =
        "must be a whole number from " + std::to_string(lo) + " to " + std::to_string(hi);
    if (!found.is_number()) {
        throw refusal(path(key), "is " + kind(found) + ", " + allowed);
    }
    // Through the text: a number too large for the parser's integers has become a real one.
    const auto x = whole_number(found.dump(), lo, hi);
    if (!x) {
        throw refusal(path(key), "is " + found.dump() + ", " + allowed);
    }
    return static_cast<int>(*x);
}

std::string json_section::text(std::string_view key) const {
    const json& found = value(key);
    const std::string allowed = "must be a text of 1 to 60 characters";
    if (!found.is_string()) {
        throw refusal(path(key), "is " + kind(found) + ", " + allowed);
    }
    auto x = found.get<std::string>();
    if (!is_plain_text(x)) {
        throw refusal(path(key), allowed + ", none of them a control character");
    }
    return x;
}

json_section json_section::object(std::string_view key,
                                  std::initializer_list<std::string_view> keys) const {
    return json_section(value(key), path(key), keys);
}

std::vector<json_section>
json_section::objects(std::string_view key, std::size_t least, std::size_t most,
                      std::initializer_list<std::string_view> keys) const {
    const json& found = value(key);
    if (!found.is_array()) {
        throw refusal(path(key), "is " + kind(found) + ", must be a list");
    }
    if (found.size() < least || found.size() > most) {
        const std::string allowed = least == most
                                        ? std::to_string(least)
                                        : std::to_string(least) + " to " + std::to_string(most);
        throw refusal(path(key),
                      "has " + std::to_string(found.size()) + " entries, must have " + allowed);
    }
    std::vector<json_section> sections;
    for (std::size_t i = 0; i < found.size(); ++i) {
        sections.emplace_back(found[i], path(key) + "[" + std::to_string(i) + "]", keys);
    }
    return sections;
}

const json& json_section::value(std::string_view key) const { return value_->at(std::string(key)); }

std::string json_section::path(std::string_view key) const {
    return (path_.empty() ? "" : path_ + ".") + spelled(key);
}

bool is_plain_text(std::string_view text) {
    std::size_t characters = 0;
    for (const char c : text) {
        const auto byte = static_cast<unsigned char>(c);
        if (byte < 0x20u || byte == 0x7Fu) {
            return false;
        }
        characters += (byte & 0xC0u) != 0x80u ? 1u : 0u;
    }
    return characters >= 1 && characters <= 60;
}

} // namespace skerry
