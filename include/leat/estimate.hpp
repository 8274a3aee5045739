// Estimates from simulation output: running moments, intervals, exact sums, merging in a fixed
// order, stopping.
//
// Where work can hurt someone, decisions follow local codes and licensed practice: an interval
// speaks of the model's randomness, not of how true the model is.

#ifndef LEAT_ESTIMATE_HPP
#define LEAT_ESTIMATE_HPP

#include "leat/estimate/batch_means.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/in_order.hpp"
#include "leat/estimate/interval.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/merge_tree.hpp"
#include "leat/estimate/paired_differences.hpp"
#include "leat/estimate/proportion_interval.hpp"
#include "leat/estimate/quantile_interval.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/estimate/stopping.hpp"

#endif
