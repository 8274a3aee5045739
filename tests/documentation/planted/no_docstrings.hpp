// A header that says what it is, but not what its parts are.

#ifndef LEAT_PLANTED_NO_DOCSTRINGS_HPP
#define LEAT_PLANTED_NO_DOCSTRINGS_HPP

namespace leat {

class planted_class {
public:
    /// A field with a docstring.
    int field = 0;
};

/// A class with a docstring.
class planted_members {
public:
    int planted_function() const { return 0; }
    int planted_field = 0;
};

inline int planted_free_function() { return 0; }

using planted_alias = int;

enum class planted_enum { one };

inline constexpr int planted_constant = 1;

template <class T>
concept planted_concept = sizeof(T) == 1;

class planted_empty {};

#define LEAT_PLANTED_MACRO 1

} // namespace leat

#endif
