// Tools for testing code that draws: not part of leat.hpp.

#ifndef LEAT_TESTING_HPP
#define LEAT_TESTING_HPP

#include "leat/testing/engines.hpp"

#endif
