// JSON, and the layout of the files that are written in it.

#ifndef SKERRY_BANK_JSON_TEXT_HPP
#define SKERRY_BANK_JSON_TEXT_HPP

#include <initializer_list>
#include <string>
#include <string_view>

#include <nlohmann/json.hpp>

namespace skerry {

/// JSON whose keys keep the order they were written in.
using json = nlohmann::ordered_json;

/// An object, a line for each key; a list under one of the keys in `spread` has a line for each
/// entry, so that files can be compared line by line.
std::string spread_out(const json& object, std::initializer_list<std::string_view> spread);

} // namespace skerry

#endif
