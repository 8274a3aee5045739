// Uniform words, reals, integers and permutations, from any engine.

#ifndef LEAT_UNIFORM_HPP
#define LEAT_UNIFORM_HPP

#include "leat/uniform/alias_table.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/permute.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#endif
