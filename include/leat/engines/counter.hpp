// The counter-based engines: their n-th output is a function of n, so any draw is there at once.

#ifndef LEAT_ENGINES_COUNTER_HPP
#define LEAT_ENGINES_COUNTER_HPP

#include "leat/engines/philox.hpp"
#include "leat/engines/splitmix64.hpp"

#endif
