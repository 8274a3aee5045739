// The ground floor: errors, concepts, wide integers, portable floating point.

#ifndef LEAT_CORE_HPP
#define LEAT_CORE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/floating_point.hpp"
#include "leat/core/siphash.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"

#endif
