// One object of the input file, checked as it is opened and read key by key.
//
// Every refusal names the key by its full path, as in "turbines.count" or
// "components[2].life.shape", and says what is allowed there.

#ifndef SKERRY_BANK_JSON_SECTION_HPP
#define SKERRY_BANK_JSON_SECTION_HPP

#include <initializer_list>
#include <string>
#include <string_view>
#include <vector>

#include "json_text.hpp"

namespace skerry {

/// The text of one JSON document. Throws refusal for what is not JSON (with line and column), and
/// for a key that stands twice in one object.
json parse_json(const std::string& text);

/// An object that must have exactly the keys listed.
class json_section {
public:
    /// Refuses a value that is no object, an unknown key, and a missing key. `value` must outlive
    /// the section; `path` is empty for the whole document.
    json_section(const json& value, std::string path, std::initializer_list<std::string_view> keys);

    /// The number at `key`, from lo to hi, both allowed.
    [[nodiscard]] double number(std::string_view key, double lo, double hi) const;

    /// The whole number at `key`, from lo to hi, both allowed.
    [[nodiscard]] int whole(std::string_view key, int lo, int hi) const;

    /// The text at `key`: one to sixty characters, none of them a control character.
    [[nodiscard]] std::string text(std::string_view key) const;

    /// The object at `key`.
    [[nodiscard]] json_section object(std::string_view key,
                                      std::initializer_list<std::string_view> keys) const;

    /// The list of objects at `key`, from `least` to `most` of them.
    [[nodiscard]] std::vector<json_section>
    objects(std::string_view key, std::size_t least, std::size_t most,
            std::initializer_list<std::string_view> keys) const;

    /// The value at `key`, unchecked.
    [[nodiscard]] const json& value(std::string_view key) const;

    /// The full path of a key of this object.
    [[nodiscard]] std::string path(std::string_view key) const;

private:
    const json* value_;
    std::string path_;
};

/// Whether a text may be a name or a seed: one to sixty characters, none a control character.
bool is_plain_text(std::string_view text);

} // namespace skerry

#endif
