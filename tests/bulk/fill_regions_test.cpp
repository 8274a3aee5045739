// Promise P6 for every sampler of regions/; they join in support/sampler_list.hpp.

#include "bulk/fill_equals_loop.hpp"
#include "support/sampler_list.hpp"

#include <gtest/gtest.h>

namespace {

TEST(FillEqualsLoop, EveryRegion) {
    leat_test::each_region(leat_test::expect_every_fill_equals_loop{});
}

} // namespace
