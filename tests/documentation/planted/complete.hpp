// A header as it should be: it opens with what it is.

#ifndef LEAT_PLANTED_COMPLETE_HPP
#define LEAT_PLANTED_COMPLETE_HPP

namespace leat {

/// A class with a docstring.
class planted_complete {
public:
    /// A function with one.
    int documented() const { return 0; }
};

} // namespace leat

#endif
