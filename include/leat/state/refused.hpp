// What is thrown when a saved document cannot be restored: it was changed, cut, saved from another
// type or by a later version. The message names the field, what was found and what is allowed:
//   leat::json: normal: sd = -1, must be finite and >= 0
// Whatever was to be restored is left as it was.

#ifndef LEAT_STATE_REFUSED_HPP
#define LEAT_STATE_REFUSED_HPP

#include "leat/core/errors.hpp"

namespace leat {

/// A saved document that is refused.
class state_refused : public error {
public:
    using error::error;
};

} // namespace leat

#endif
