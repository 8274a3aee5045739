#include "json_text.hpp"

#include <algorithm>

namespace skerry {

std::string spread_out(const json& object, std::initializer_list<std::string_view> spread) {
    std::string text = "{";
    const char* comma = "\n";
    for (const auto& item : object.items()) {
        text += comma + json(item.key()).dump() + ": ";
        if (std::find(spread.begin(), spread.end(), item.key()) == spread.end()) {
            text += item.value().dump();
        } else {
            text += "[";
            const char* entry_comma = "\n";
            for (const json& entry : item.value()) {
                text += entry_comma + entry.dump();
                entry_comma = ",\n";
            }
            text += "\n]";
        }
        comma = ",\n";
    }
    return text + "\n}\n";
}

} // namespace skerry
