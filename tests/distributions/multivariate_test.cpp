// multivariate_normal, dirichlet, multinomial: fit of margins and of pairs, exact sums, singular
// laws, extremes, refusals, text.

#include "distributions/law_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include "leat/bulk/fill.hpp"
#include "leat/distributions/dirichlet.hpp"
#include "leat/distributions/multinomial.hpp"
#include "leat/distributions/multivariate_normal.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"

#include <boost/math/distributions/beta.hpp>
#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/normal.hpp>
#include <gtest/gtest.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <numeric>
#include <sstream>
#include <string>
#include <vector>

namespace {

using namespace leat_test;
using matrix = std::vector<std::vector<double>>;

constexpr int many = 100000;

template <class Law>
auto draw_vectors(const Law& law, int count, leat::stream& g) {
    std::vector<typename Law::result_type> draws(static_cast<std::size_t>(count));
    for (auto& x : draws) {
        x = law(g);
    }
    return draws;
}

/// The values of f over the draws.
template <class Draws, class Function>
std::vector<double> values(const Draws& draws, Function f) {
    std::vector<double> result;
    for (const auto& x : draws) {
        result.push_back(f(x));
    }
    return result;
}

/// Against the normal law of this mean and variance.
outcome normal_test(const std::string& name, std::vector<double> x, double mean, double variance) {
    const boost::math::normal law(mean, std::sqrt(variance));
    return kolmogorov_smirnov_test(name, x, [&](double at) { return cdf(law, at); });
}

/// Every margin, and the sum and difference of every pair, which pin the covariances: each is
/// normal, with mean and variance by the rules of linear maps (T. W. Anderson, An Introduction to
/// Multivariate Statistical Analysis, theorem 2.4.1).
std::vector<outcome> normal_report(const std::vector<double>& mean, const matrix& a,
                                   const std::vector<std::vector<double>>& draws) {
    std::vector<outcome> all;
    for (std::size_t i = 0; i < mean.size(); ++i) {
        const auto margin = [i](const auto& x) { return x[i]; };
        all.push_back(normal_test("margin", values(draws, margin), mean[i], a[i][i]));
        for (std::size_t j = 0; j < i; ++j) {
            // In units of their deviations, or the larger would hide the smaller.
            const double u = 1 / std::sqrt(a[i][i]);
            const double v = 1 / std::sqrt(a[j][j]);
            for (const double sign : {1.0, -1.0}) {
                const auto pair = [&](const auto& x) { return u * x[i] + sign * v * x[j]; };
                const double variance = 2 + sign * 2 * u * v * a[i][j];
                all.push_back(normal_test("pair", values(draws, pair),
                                          u * mean[i] + sign * v * mean[j], variance));
            }
        }
    }
    return all;
}

const std::vector<double> three_means{1, -2, 0.5};
const matrix three_by_three{{4, 1.2, -0.4}, {1.2, 9, 2}, {-0.4, 2, 1}};

TEST(MultivariateNormalGoodness, MarginsAndPairs) {
    auto g = source_of_this_test().stream();
    const leat::multivariate_normal law(three_means, three_by_three);
    check(normal_report(three_means, three_by_three, draw_vectors(law, many, g)));
    const std::vector<double> mean{0, 1e-9};
    const matrix far_apart{{1e12, -0.9e-3}, {-0.9e-3, 1e-18}}; // correlation -0.9
    const leat::multivariate_normal other(mean, far_apart);
    check(normal_report(mean, far_apart, draw_vectors(other, many, g)));
}

// The mistake of a factor that forgets the correlation, and of one that is not transposed.
TEST(PlantedFaults, MultivariateNormalsWithoutTheRightFactorAreRejected) {
    auto g = source_of_this_test().stream();
    const leat::multivariate_normal independent(three_means, {{4, 0, 0}, {0, 9, 0}, {0, 0, 1}});
    EXPECT_TRUE(is_rejected(
        normal_report(three_means, three_by_three, draw_vectors(independent, many, g))));
    const leat::multivariate_normal weak(three_means,
                                         {{4, 1.2, -0.4}, {1.2, 9, 1.8}, {-0.4, 1.8, 1}});
    EXPECT_TRUE(
        is_rejected(normal_report(three_means, three_by_three, draw_vectors(weak, many, g))));
}

// A = B B' with B of three columns in five dimensions: draws lie where v x = v mean for the v that
// B' sends to 0, here chosen first.
TEST(MultivariateNormal, SingularCovariancesKeepToTheirPlane) {
    const double third = 1.0 / 3;
    const matrix b{{1, 0, third}, {0.3, 2, -1}, {-0.7, 0.1, 0.9}, {0, 0, 0}, {0, 0, 0}};
    matrix factor = b;
    for (std::size_t k = 0; k < 3; ++k) {
        factor[3][k] = b[0][k] + b[1][k];           // x3 = x0 + x1
        factor[4][k] = 0.5 * b[2][k] - 2 * b[0][k]; // x4 = x2 / 2 - 2 x0
    }
    matrix a(5, std::vector<double>(5));
    for (std::size_t i = 0; i < 5; ++i) {
        for (std::size_t j = 0; j < 5; ++j) {
            for (std::size_t k = 0; k < 3; ++k) {
                a[i][j] += factor[i][k] * factor[j][k];
            }
        }
    }
    const leat::multivariate_normal law(std::vector<double>(5, 0.0), a);
    EXPECT_EQ(law.rank(), 3u);
    leat::xoshiro256_plus_plus g{1};
    for (int i = 0; i < 20000; ++i) {
        const auto x = law(g);
        ASSERT_NEAR(x[3], x[0] + x[1], 1e-12);
        ASSERT_NEAR(x[4], 0.5 * x[2] - 2 * x[0], 1e-12);
    }
    const leat::multivariate_normal alike({1, 1, 1}, matrix(3, std::vector<double>(3, 2.0)));
    EXPECT_EQ(alike.rank(), 1u);
    const leat::multivariate_normal one_fixed({5, 7}, {{0, 0}, {0, 1}});
    EXPECT_EQ(one_fixed.rank(), 1u);
    const leat::multivariate_normal fixed({5, -0.0}, {{0, 0}, {0, 0}});
    EXPECT_EQ(fixed.rank(), 0u);
    EXPECT_EQ(fixed(g), (std::vector<double>{5, 0}));
    for (int i = 0; i < 1000; ++i) {
        const auto x = alike(g);
        ASSERT_NEAR(x[1], x[0], 1e-12);
        ASSERT_NEAR(x[2], x[0], 1e-12);
        ASSERT_EQ(one_fixed(g)[0], 5);
    }
}

template <class Make>
std::string refusal(Make make) {
    try {
        make();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "nothing refused";
}

TEST(MultivariateNormal, RefusesWhatIsNoCovarianceAndNamesTheEntry) {
    const auto with = [](const matrix& a) {
        return refusal([&] { leat::multivariate_normal(std::vector<double>(a.size(), 0.0), a); });
    };
    const std::string start = "leat::multivariate_normal: ";
    EXPECT_EQ(with({{1, 0.5}, {0.4, 1}}),
              start + "covariance[1][0] = 0.4, must equal the entry across the diagonal");
    EXPECT_EQ(with({{1, 0}, {0, -1}}),
              start + "covariance[1][1] = -1, must be 0 or at least 2^-1000");
    EXPECT_EQ(with({{1, 2}, {2, 1}}), start + "covariance[1][0] = 2, must not exceed the geometric "
                                              "mean of the two variances in size");
    EXPECT_EQ(with({{0, 2}, {2, 1}}), start + "covariance[0][1] = 2, must be 0, as a variance is");
    // Each pair is possible, the three together are not: the determinant is -2.888.
    const std::string semidefinite = ", must leave the matrix positive semidefinite";
    EXPECT_NE(with({{1, 0.9, -0.9}, {0.9, 1, 0.9}, {-0.9, 0.9, 1}}).find(semidefinite),
              std::string::npos);
    // Eigenvalues of (1 - r) I + r J in three dimensions: 1 - r twice and 1 + 2 r.
    const auto equal = [&](double r) { return with({{1, r, r}, {r, 1, r}, {r, r, 1}}); };
    EXPECT_EQ(equal(-0.5), "nothing refused"); // singular
    EXPECT_EQ(equal(-0.49), "nothing refused");
    EXPECT_NE(equal(-0.5 - 1e-10).find(semidefinite), std::string::npos);
    EXPECT_EQ(equal(1), "nothing refused");
    EXPECT_EQ(with({{1, std::numeric_limits<double>::infinity()}, {0, 1}}),
              start + "covariance[0][1] = inf, must be finite");
    EXPECT_EQ(with({{1, 0}, {0}}),
              start + "size of a row of covariance = 1, must be the number of rows");
    EXPECT_EQ(refusal([] {
                  leat::multivariate_normal({0, 0}, {{1}});
              }),
              start + "size of covariance = 1, must be the size of mean");
    EXPECT_EQ(refusal([] { leat::multivariate_normal({}, {}); }),
              start + "size of mean = 0, must be at least 1");
    EXPECT_EQ(refusal([] {
                  leat::multivariate_normal({0, std::numeric_limits<double>::infinity()},
                                            {{1, 0}, {0, 1}});
              }),
              start + "mean[1] = inf, must be finite");
    // Rounding across the diagonal is no asymmetry.
    EXPECT_EQ(with({{1, 0.3}, {0.1 + 0.2, 1}}), "nothing refused");
}

/// Each share by Boost.Math's beta law of alpha[i] and the others' sum (Devroye 1986, XI.4), and
/// sums of two, which are beta too.
std::vector<outcome> dirichlet_report(const std::vector<double>& alpha, leat::stream& g) {
    const leat::dirichlet law(alpha);
    const auto draws = draw_vectors(law, many, g);
    const double total = std::accumulate(alpha.begin(), alpha.end(), 0.0);
    std::vector<outcome> all;
    for (std::size_t i = 0; i < alpha.size(); ++i) {
        for (std::size_t j = 0; j <= i; ++j) {
            const double a = i == j ? alpha[i] : alpha[i] + alpha[j];
            const boost::math::beta_distribution<> beta(a, total - a);
            auto x = values(draws, [&](const auto& share) {
                return std::min(1.0, i == j ? share[i] : share[i] + share[j]);
            });
            all.push_back(
                kolmogorov_smirnov_test("dirichlet", x, [&](double at) { return cdf(beta, at); }));
        }
    }
    return all;
}

TEST(DirichletGoodness, SharesAndSumsOfTwo) {
    auto g = source_of_this_test().stream();
    check(dirichlet_report({1, 1, 1}, g));
    check(dirichlet_report({0.5, 2, 1, 7}, g));
    check(dirichlet_report({300, 200.5, 1000}, g));
}

// alpha 1e-3 and 1e-8: nearly all falls to one share, to each with a chance of alpha / total.
TEST(DirichletGoodness, SmallParameters) {
    for (const double scale : {1e-3, 1e-8, 1e-300}) {
        auto g = source_of_this_test().stream(std::to_string(scale));
        const leat::dirichlet law({scale, 2 * scale, scale});
        std::uint64_t middle = 0;
        for (int i = 0; i < many; ++i) {
            const auto x = law(g);
            double sum = 0;
            for (const double share : x) {
                ASSERT_GE(share, std::numeric_limits<double>::min());
                ASSERT_LT(share, 1);
                sum += share;
            }
            ASSERT_NEAR(sum, 1, 1e-15);
            middle += x[1] > 0.5 ? 1U : 0U;
        }
        // By symmetry of x[1] ~ beta(2 s, 2 s) about 1/2.
        check(count_test("middle", middle, many, 0.5));
    }
}

// Johnson, Kotz and Balakrishnan, Continuous Multivariate Distributions 1, ch. 49; by hand.
TEST(Dirichlet, Moments) {
    const leat::dirichlet law({1, 2, 5});
    EXPECT_EQ(law.mean(), (std::vector<double>{0.125, 0.25, 0.625}));
    EXPECT_DOUBLE_EQ(law.variance()[1], 0.25 * 0.75 / 9);
    EXPECT_DOUBLE_EQ(law.covariance()[0][2], -0.125 * 0.625 / 9);
    EXPECT_EQ(law.covariance()[2][2], law.variance()[2]);
}

TEST(Dirichlet, RefusesAndNamesTheEntry) {
    EXPECT_EQ(refusal([] { leat::dirichlet(std::vector<double>{}); }),
              "leat::dirichlet: size of alpha = 0, must be at least 1");
    for (const double bad : {0.0, -1.0, 1e301, 1e-301, std::numeric_limits<double>::infinity(),
                             std::numeric_limits<double>::quiet_NaN()}) {
        EXPECT_EQ(refusal([&] {
                      leat::dirichlet({1, bad});
                  }).find("leat::dirichlet: alpha[1] = "),
                  0u);
    }
    leat::xoshiro256_plus_plus g{1};
    EXPECT_EQ(leat::dirichlet{}(g), std::vector<double>{1});
}

/// Chi-square of counts 0 .. n against Boost.Math's binomial, cells of at least 100.
outcome binomial_test(const std::string& name, const std::vector<double>& x, double n, double p) {
    const boost::math::binomial law(n, p);
    std::vector<std::uint64_t> counts;
    std::vector<double> probabilities;
    double below = 0;
    double k = 0;
    while (k <= n) {
        double cell = 0;
        double last = k;
        for (; last <= n && cell * many < 200; ++last) {
            cell += pdf(law, last);
        }
        if ((1 - below - cell) * many < 200) { // the rest is too little for a cell of its own
            last = n + 1;
            cell = 1 - below;
        }
        std::uint64_t count = 0;
        for (const double at : x) {
            count += at >= k && at < last ? 1U : 0U;
        }
        counts.push_back(count);
        probabilities.push_back(cell);
        below += cell;
        k = last;
    }
    return chi_square_test(name, counts, probabilities);
}

/// Margins, and sums of two, are binomial (Johnson, Kotz and Balakrishnan, Discrete Multivariate
/// Distributions, ch. 35).
void check_multinomial(std::int64_t n, const std::vector<double>& weights, leat::stream& g) {
    const leat::multinomial law(n, weights);
    const auto draws = draw_vectors(law, many, g);
    const double total = std::accumulate(weights.begin(), weights.end(), 0.0);
    for (const auto& counts : draws) {
        ASSERT_EQ(std::accumulate(counts.begin(), counts.end(), std::int64_t{0}), n);
        for (std::size_t i = 0; i < counts.size(); ++i) {
            ASSERT_GE(counts[i], 0);
            ASSERT_TRUE(weights[i] > 0 || counts[i] == 0);
        }
    }
    for (std::size_t i = 0; i < weights.size(); ++i) {
        for (std::size_t j = 0; j <= i; ++j) {
            const double w = i == j ? weights[i] : weights[i] + weights[j];
            if (w == 0 || w == total || weights[j] == 0 || weights[i] == 0) {
                continue;
            }
            const auto x = values(draws, [&](const auto& counts) {
                return static_cast<double>(i == j ? counts[i] : counts[i] + counts[j]);
            });
            check(binomial_test("counts", x, static_cast<double>(n), w / total));
        }
    }
}

TEST(MultinomialGoodness, MarginsAndSumsOfTwo) {
    auto g = source_of_this_test().stream();
    check_multinomial(12, {1, 2, 3}, g);
    check_multinomial(200, {0.5, 0, 0.2, 0.25, 0.05}, g);
    check_multinomial(1, {1, 1, 1, 1}, g);
    check_multinomial(1000, {0.02, 0.97, 0.01}, g);
}

TEST(Multinomial, SumsAreExactAtTheExtremes) {
    leat::xoshiro256_plus_plus g{1};
    constexpr std::int64_t most = std::int64_t{1} << 53;
    for (const auto& weights : {std::vector<double>{1e300, 1e300, 1.7e308, 1.7e308},
                                {4.9e-324, 0, 9.9e-324, 1e-323},
                                {1e-300, 1, 1e-20, 0},
                                {0, 0, 3, 0}}) {
        for (const std::int64_t n : {std::int64_t{0}, std::int64_t{1}, most}) {
            const leat::multinomial law(n, weights);
            for (int i = 0; i < 200; ++i) {
                const auto counts = law(g);
                ASSERT_EQ(std::accumulate(counts.begin(), counts.end(), std::int64_t{0}), n);
                for (std::size_t k = 0; k < weights.size(); ++k) {
                    ASSERT_TRUE(weights[k] > 0 || counts[k] == 0);
                }
            }
        }
    }
    // Rare beside nearly all: Poisson of mean 2^53 * 1e-13 = 900.7 within eight deviations.
    const leat::multinomial rare(most, {1, 1e-13});
    for (int i = 0; i < 100; ++i) {
        ASSERT_NEAR(static_cast<double>(rare(g)[1]), 900.7, 240);
    }
}

TEST(Multinomial, MomentsAndRefusals) {
    const leat::multinomial law(16, {1, 0, 3});
    EXPECT_EQ(law.mean(), (std::vector<double>{4, 0, 12}));
    EXPECT_EQ(law.variance(), (std::vector<double>{3, 0, 3}));
    EXPECT_EQ(law.covariance()[0][2], -3);
    EXPECT_EQ(refusal([] {
                  leat::multinomial(3, {1, -1});
              }),
              "leat::multinomial: weights[1] = -1, must be finite and >= 0");
    EXPECT_EQ(refusal([] {
                  leat::multinomial(3, {0, 0});
              }),
              "leat::multinomial: sum of weights = 0, must be > 0");
    EXPECT_EQ(refusal([] { leat::multinomial(-1, {1}); }),
              "leat::multinomial: n = -1, must be >= 0 and <= 2^53");
}

/// What all three share: draws by operator(), draw_into and fill are the same, text returns.
template <class Law>
void check_members(const Law& law, const typename Law::result_type& other_size) {
    static_assert(std::regular<Law> && std::is_aggregate_v<typename Law::param_type>);
    leat::source source{7};
    auto one = source.stream("draws");
    auto two = source.stream("draws");
    auto three = source.stream("draws");
    std::vector<typename Law::result_type> filled(50);
    leat::fill(filled, law, three);
    auto x = law(one);
    auto g = source.stream("draws");
    EXPECT_EQ(Law{}(g, law.param()), x);
    for (std::size_t i = 0; i < filled.size(); ++i) {
        auto y = x;
        law.draw_into(std::span(y), two);
        ASSERT_EQ(y, x);
        ASSERT_EQ(filled[i], x);
        x = law(one);
    }
    EXPECT_EQ(two.position(), three.position());
    auto wrong = other_size;
    EXPECT_THROW(law.draw_into(std::span(wrong), two), leat::invalid_parameter);
    EXPECT_EQ(two.position(), three.position());

    std::stringstream text;
    text << law << ' ' << Law{};
    Law first;
    Law second = law;
    text >> first >> second;
    EXPECT_TRUE(text);
    EXPECT_EQ(first, law);
    EXPECT_EQ(second, Law{});
    for (const char* garbage :
         {"", "x", "3", "1 x7ff8000000000000 1 1 x3ff0000000000000", "1 1 x"}) {
        std::istringstream is{garbage};
        first = law;
        is >> first;
        EXPECT_TRUE(is.fail()) << garbage;
        EXPECT_EQ(first, law) << garbage;
    }
}

TEST(MultivariateLaws, MembersAgree) {
    check_members(leat::multivariate_normal(three_means, three_by_three), {1, 2});
    check_members(leat::dirichlet({0.2, 1, 30}), {1, 2});
    check_members(leat::multinomial(10, {1, 5, 3}), {1, 2});
}

template <class Law>
void draw_from_broken(const Law& law) {
    const auto try_with = [&](auto g) {
        try {
            for (int i = 0; i < 3; ++i) {
                for (const auto x : law(g)) {
                    ASSERT_TRUE(std::isfinite(static_cast<double>(x)));
                }
            }
        } catch (const leat::engine_stuck&) {
        }
    };
    try_with(leat::constant{0});
    try_with(leat::constant{~std::uint64_t{0}});
}

// P3, P5: no hang, nothing infinite.
TEST(MultivariateLaws, BrokenEngines) {
    draw_from_broken(leat::multivariate_normal(three_means, three_by_three));
    draw_from_broken(leat::multivariate_normal({1.7e308}, {{1e308}}));
    draw_from_broken(leat::dirichlet({0.2, 1, 30}));
    draw_from_broken(leat::dirichlet({1e-300, 1e300}));
    draw_from_broken(leat::multinomial(100, {1, 5, 3}));
}

} // namespace
