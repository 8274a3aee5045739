// Promise P6 for the laws of whole numbers, whose fills decide by tables what single draws decide
// by computing: on every branch of every method, and for long fills of many parameters.

#include "bulk/fill_equals_loop.hpp"

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <cstdint>
#include <memory>

namespace {

TEST(FillEqualsLoop, EveryDiscreteLaw) {
    const leat_test::expect_every_fill_equals_loop check;
    check("binomial by inversion", leat::binomial{10, 0.3});
    check("binomial by inversion, flipped", leat::binomial<int>{10, 0.7});
    check("binomial by rejection", leat::binomial{100, 0.3});
    check("binomial by rejection, flipped", leat::binomial<std::uint8_t>{100, 0.8});
    check("geometric", leat::geometric{0.1});
    check("geometric in two parts", leat::geometric{1e-9});
    check("hypergeometric by inversion", leat::hypergeometric{100, 30, 10});
    check("hypergeometric by rejection", leat::hypergeometric{1000, 700, 600});
    check("negative_binomial", leat::negative_binomial{2.5, 0.2});
    check("poisson by inversion", leat::poisson{4});
    check("poisson by rejection", leat::poisson<std::uint64_t>{1000});
    check("zipf", leat::zipf{1.1, 1000});
    check("zipf of many digits", leat::zipf{0.1, std::int64_t{1} << 60});
    check("zipf, uniform", leat::zipf<int>{0, 10});
}

// std::vector<bool> is no array, so Bernoulli stands apart.
TEST(FillEqualsLoop, Bernoulli) {
    for (const double p : {0.0, 0x1p-64, 0.3, 1.0}) {
        const leat::bernoulli law{p};
        leat::stream filled = leat::source{5}.stream();
        leat::stream one_by_one = filled.replica();
        const auto got = std::make_unique<bool[]>(2000);
        leat::fill(std::span(got.get(), 2000), law, filled);
        for (std::size_t i = 0; i < 2000; ++i) {
            ASSERT_EQ(got[i], law(one_by_one)) << i;
        }
        EXPECT_EQ(filled.address(), one_by_one.address());
    }
}

template <class Law>
void expect_long_fill_equals_loop(const Law& law) {
    std::vector<std::int64_t> got(20000);
    leat::xoshiro256_braid filled{17};
    leat::xoshiro256_braid one_by_one{17};
    leat::fill(got, law, filled);
    for (std::size_t i = 0; i < got.size(); ++i) {
        ASSERT_EQ(got[i], law(one_by_one)) << law.mean() << ", draw " << i;
    }
    ASSERT_EQ(filled, one_by_one);
}

TEST(FillEqualsLoop, TablesAndSingleDrawsDecideAlike) {
    for (const double mean : {0.0, 1e-300, 1e-5, 0.3, 9.99, 10.0, 10.5, 50.0, 254.5, 255.0, 300.0,
                              5000.0, 65536.5, 1e7, 1e15, 9e18}) {
        expect_long_fill_equals_loop(leat::poisson{mean});
    }
    for (const std::int64_t n :
         {std::int64_t{0}, std::int64_t{1}, std::int64_t{25}, std::int64_t{40}, std::int64_t{300},
          std::int64_t{100000}, std::int64_t{1} << 53}) {
        for (const double p : {0.0, 1e-15, 0.1, 0.499, 0.5, 0.75, 1.0}) {
            expect_long_fill_equals_loop(leat::binomial{n, p});
        }
    }
    expect_long_fill_equals_loop(leat::hypergeometric{20, 15, 10});
    expect_long_fill_equals_loop(leat::hypergeometric{0, 0, 0});
    expect_long_fill_equals_loop(leat::hypergeometric{39, 20, 19});
    expect_long_fill_equals_loop(leat::hypergeometric{40, 20, 20});
    expect_long_fill_equals_loop(leat::hypergeometric{1000, 300, 100});
    expect_long_fill_equals_loop(leat::hypergeometric{100000, 60000, 70000});
    constexpr std::int64_t two_to_53 = std::int64_t{1} << 53;
    expect_long_fill_equals_loop(leat::hypergeometric{two_to_53, two_to_53 / 3, two_to_53 / 5});
}

} // namespace
