// uniform against exact arithmetic, at length: see exact_point.hpp for the reference.

#include "uniform/exact_point.hpp"

#include <gtest/gtest.h>

namespace {

using exact_point::sweep;
using leat::ends;

template <class Real>
void sweep_all(unsigned seed) {
    sweep<Real, ends::open>(8000000, seed);
    sweep<Real, ends::closed_open>(4000000, seed + 1);
    sweep<Real, ends::open_closed>(4000000, seed + 2);
    sweep<Real, ends::closed>(8000000, seed + 3);
}

TEST(UniformAtLength, Double) { sweep_all<double>(100); }
TEST(UniformAtLength, Float) { sweep_all<float>(200); }

} // namespace
