// Every distribution.

#ifndef LEAT_DISTRIBUTIONS_HPP
#define LEAT_DISTRIBUTIONS_HPP

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/weibull.hpp"

#endif
