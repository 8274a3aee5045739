// The input file: JSON, read and checked key by key.
//
// An unknown key, a missing one, one that stands twice, a wrong type and a value out of range are
// each refused with one line that names the key by its full path and says what is allowed.

#ifndef SKERRY_BANK_INPUT_FILE_HPP
#define SKERRY_BANK_INPUT_FILE_HPP

#include <string>

#include "input.hpp"
#include "json_section.hpp"

namespace skerry {

/// The input, and the JSON that says the same: results.json holds it whole, so that it can be run
/// again.
struct loaded_input {
    input values;
    json document;
};

/// The input that a document holds. Throws refusal, which names the key.
loaded_input parse_input(const json& document);

/// Reads the file. Throws refusal, which names the file and the key.
loaded_input load_input(const std::string& file);

/// Puts an option's value in place of the file's.
void replace_seed(loaded_input& in, const seed_value& seed);
void replace_replications(loaded_input& in, int replications);

} // namespace skerry

#endif
