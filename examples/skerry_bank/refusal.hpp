// What the program says before it stops with status 2: one line that names the option or key.

#ifndef SKERRY_BANK_REFUSAL_HPP
#define SKERRY_BANK_REFUSAL_HPP

#include <stdexcept>
#include <string>

namespace skerry {

/// A bad option, a bad input file, or a farm that cannot be laid out. The text is one line.
class refusal : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
    refusal(const std::string& where, const std::string& what)
        : std::runtime_error(where + ": " + what) {}
};

} // namespace skerry

#endif
