// A planted fault for the layers test: core reaches to the right.
#include "leat/engines/lehmer.hpp"
