// Every distribution.

#ifndef LEAT_DISTRIBUTIONS_HPP
#define LEAT_DISTRIBUTIONS_HPP

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/beta.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/student_t.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/von_mises.hpp"
#include "leat/distributions/weibull.hpp"
#include "leat/distributions/zipf.hpp"

#endif
