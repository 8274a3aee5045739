// Check values from outside the project: tests/reference/*.json, read at run time.
//
//     for (const auto& entry : leat_test::reference_group("jumps", "lehmer")) {
//         LEAT_TEST_REFERENCE(entry); // source and status, printed when a check fails
//         ... leat_test::word(entry["parameters"]["state"]) ...
//     }

#ifndef LEAT_TESTS_SUPPORT_REFERENCE_HPP
#define LEAT_TESTS_SUPPORT_REFERENCE_HPP

#include "leat/core/wide_integer.hpp"

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <cstdint>
#include <fstream>
#include <map>
#include <stdexcept>
#include <string>
#include <vector>

namespace leat_test {

using json = nlohmann::json;

/// All entries of tests/reference/TOPIC.json.
inline const json& reference_entries(const std::string& topic) {
    static std::map<std::string, json> topics;
    json& entries = topics[topic];
    if (entries.is_null()) {
        const std::string path = std::string{LEAT_TEST_DIR} + "/reference/" + topic + ".json";
        std::ifstream file{path};
        if (!file) {
            throw std::runtime_error{"cannot read " + path};
        }
        entries = json::parse(file).at("entries");
    }
    return entries;
}

/// The entry with this id; its first part is the topic, as in "engines.splitmix64.0".
inline const json& reference_entry(const std::string& id) {
    for (const json& entry : reference_entries(id.substr(0, id.find('.')))) {
        if (entry.at("id") == id) {
            return entry;
        }
    }
    throw std::runtime_error{"no reference entry " + id};
}

/// The entries whose id begins with `prefix`, as in "jumps.lehmer16807."; never an empty list.
inline std::vector<json> reference_family(const std::string& prefix) {
    std::vector<json> family;
    for (const json& entry : reference_entries(prefix.substr(0, prefix.find('.')))) {
        if (entry.at("id").get<std::string>().rfind(prefix, 0) == 0) {
            family.push_back(entry);
        }
    }
    if (family.empty()) {
        throw std::runtime_error{"no reference entry begins with " + prefix};
    }
    return family;
}

/// The entries of a group; never an empty list.
inline std::vector<json> reference_group(const std::string& topic, const std::string& group) {
    std::vector<json> members;
    for (const json& entry : reference_entries(topic)) {
        if (entry.at("group") == group) {
            members.push_back(entry);
        }
    }
    if (members.empty()) {
        throw std::runtime_error{"no reference group " + topic + "/" + group};
    }
    return members;
}

/// Where an entry comes from, for the message of a failed check.
inline std::string origin(const json& entry) {
    return entry.at("id").get<std::string>() + " [" + entry.at("source").get<std::string>() + "; " +
           entry.at("status").get<std::string>() + "]";
}

#define LEAT_TEST_REFERENCE(entry) SCOPED_TRACE(leat_test::origin(entry))

/// A 64-bit word, from a JSON number or decimal text.
inline std::uint64_t word(const json& x) {
    return x.is_string() ? std::stoull(x.get<std::string>()) : x.get<std::uint64_t>();
}

inline std::vector<std::uint64_t> words(const json& list) {
    std::vector<std::uint64_t> result;
    for (const json& x : list) {
        result.push_back(word(x));
    }
    return result;
}

/// A wide integer, from a JSON number, decimal text, or "2^k".
inline leat::wide_integer wide(const json& x) {
    if (!x.is_string()) {
        return x.get<std::uint64_t>();
    }
    const std::string text = x.get<std::string>();
    if (text.rfind("2^", 0) == 0) {
        return leat::wide_integer::power_of_two(static_cast<unsigned>(std::stoul(text.substr(2))));
    }
    return leat::wide_integer{std::string_view{text}};
}

/// The next draws of an engine, as many as `expected` has.
template <class Engine>
std::vector<std::uint64_t> draws(Engine& engine, std::size_t count) {
    std::vector<std::uint64_t> result;
    for (std::size_t i = 0; i < count; ++i) {
        result.push_back(engine());
    }
    return result;
}

/// The n-th draw of a copy, counting from 1, drawn one by one.
template <class Engine>
std::uint64_t nth_draw(Engine engine, std::uint64_t n) {
    for (std::uint64_t i = 1; i < n; ++i) {
        engine();
    }
    return engine();
}

} // namespace leat_test

#endif
