#ifndef LEAT_PLANTED_NO_OPENING_HPP
#define LEAT_PLANTED_NO_OPENING_HPP

namespace leat {

/// A class with a docstring, in a file that does not say what it is.
class planted_no_opening {};

} // namespace leat

#endif
