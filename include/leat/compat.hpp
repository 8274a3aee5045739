// In place of rand() and its kin, and engines that replay what they gave.

#ifndef LEAT_COMPAT_HPP
#define LEAT_COMPAT_HPP

#include "leat/compat/historical.hpp"
#include "leat/compat/rand.hpp"

#endif
