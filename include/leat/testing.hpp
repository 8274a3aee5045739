// Tools for testing code that draws: not part of leat.hpp.

#ifndef LEAT_TESTING_HPP
#define LEAT_TESTING_HPP

#include "leat/testing/agreement.hpp"
#include "leat/testing/agrees_with_counts.hpp"
#include "leat/testing/agrees_with_distribution.hpp"
#include "leat/testing/agrees_with_mean.hpp"
#include "leat/testing/engines.hpp"
#include "leat/testing/enumerating.hpp"
#include "leat/testing/trace_comparison.hpp"
#include "leat/testing/trace_file.hpp"
#include "leat/testing/traced.hpp"

#endif
