// The ground floor: errors, concepts, wide integers, portable floating point.

#ifndef LEAT_CORE_HPP
#define LEAT_CORE_HPP

#include "leat/core/arctangent.hpp"
#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/congruential.hpp"
#include "leat/core/element_order.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/error_function.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exact_ratio.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/floating_point.hpp"
#include "leat/core/gf2.hpp"
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/modular.hpp"
#include "leat/core/montgomery.hpp"
#include "leat/core/normal_quantile.hpp"
#include "leat/core/polynomial.hpp"
#include "leat/core/power.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/siphash.hpp"
#include "leat/core/sizes.hpp"
#include "leat/core/square_root.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"

#endif
