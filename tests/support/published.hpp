// Check values from outside the project: entries of tests/reference/TOPIC.json, found by id.
// Each entry carries its source and status; see the file.

#ifndef LEAT_TESTS_SUPPORT_PUBLISHED_HPP
#define LEAT_TESTS_SUPPORT_PUBLISHED_HPP

#include <nlohmann/json.hpp>

#include <fstream>
#include <map>
#include <stdexcept>
#include <string>
#include <string_view>

namespace leat_test {

inline const nlohmann::json& published(const std::string& topic, std::string_view id) {
    static std::map<std::string, nlohmann::json> topics; // read once a program
    auto& file = topics[topic];
    if (file.is_null()) {
        std::ifstream in(std::string(LEAT_TEST_DIR) + "/reference/" + topic + ".json");
        in >> file;
    }
    for (const auto& entry : file.at("entries")) {
        if (entry.at("id") == id) {
            return entry;
        }
    }
    throw std::invalid_argument("no published entry " + std::string(id));
}

} // namespace leat_test

#endif
