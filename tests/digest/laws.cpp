// Digests of the distributions.

#include "digest/digest.hpp"

namespace digests {

void laws() {}

} // namespace digests
