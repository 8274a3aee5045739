// Every engine.

#ifndef LEAT_ENGINES_HPP
#define LEAT_ENGINES_HPP

#include "leat/engines/braid.hpp"
#include "leat/engines/combined_recursive.hpp"
#include "leat/engines/counter.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/engines/xoroshiro.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/engines/xoshiro.hpp"

#endif
