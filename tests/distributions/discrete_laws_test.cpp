// The laws of whole numbers one by one: what is written and what it means, masses and moments
// against references and MPFR, refusals, the ends of the domains.

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <functional>
#include <limits>
#include <string>
#include <type_traits>

namespace {

using leat_test::json;
constexpr std::int64_t two_to_53 = std::int64_t{1} << 53;
constexpr std::int64_t largest = std::numeric_limits<std::int64_t>::max();
constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double infinity = std::numeric_limits<double>::infinity();

// ---- What is written, and what it means ------------------------------------------------------

// The design: deduction ignores argument types, results are std::int64_t; named fields.
static_assert(std::same_as<decltype(leat::poisson{4}), leat::poisson<std::int64_t>>);
static_assert(std::same_as<decltype(leat::binomial{100, 0.3}), leat::binomial<std::int64_t>>);
static_assert(std::same_as<decltype(leat::binomial{100u, 1}), leat::binomial<std::int64_t>>);
static_assert(std::same_as<decltype(leat::geometric{0.5F}), leat::geometric<std::int64_t>>);
static_assert(std::same_as<leat::poisson<int>::result_type, int>);
static_assert(std::same_as<leat::bernoulli::result_type, bool>);
static_assert(leat::binomial{{.n = 100, .p = 0.3}} == leat::binomial{100, 0.3});
static_assert(leat::hypergeometric{{.population = 9, .successes = 4, .draws = 2}} ==
              leat::hypergeometric{9, 4, 2});
static_assert(leat::zipf{{.exponent = 1.5, .n = 9}} == leat::zipf{1.5, 9});
static_assert(leat::negative_binomial{{.r = 1.5, .p = 0.5}} == leat::negative_binomial{1.5, 0.5});
static_assert(!std::convertible_to<double, leat::poisson<std::int64_t>>); // explicit

// ---- Masses and moments ----------------------------------------------------------------------

/// |a / b - 1| at most `tolerance`, or both 0.
void expect_near_relative(double a, double b, double tolerance, const std::string& what) {
    EXPECT_LE(std::abs(a - b), tolerance * std::abs(b)) << what << ": " << a << " and " << b;
}

double parameter(const json& entry, const char* name) {
    return std::stod(entry.at("parameters").at(name).get<std::string>());
}

template <class Law>
void check_published(const json& entry, const Law& law) {
    LEAT_TEST_REFERENCE(entry);
    const json& expected = entry.at("expected");
    const std::string id = entry.at("id");
    expect_near_relative(law.mean(), expected.at("mean"), 1e-12, id + " mean");
    expect_near_relative(law.variance(), expected.at("variance"), 1e-12, id + " variance");
    for (const json& at : expected.at("at")) {
        const double k = std::stod(at.at("k").get<std::string>());
        expect_near_relative(law.density(k), at.at("pmf"), 1e-12, id + " mass");
        if constexpr (requires { law.cumulative(k); }) {
            expect_near_relative(law.cumulative(k), at.at("cdf"), 1e-12, id + " cumulative");
        }
    }
    if constexpr (requires { law.quantile(0.5); }) {
        for (const auto& [p, k] : expected.at("lower").items()) {
            EXPECT_EQ(law.quantile(std::stod(p)), std::stod(k.template get<std::string>()))
                << id << " quantile " << p;
        }
    }
}

TEST(DiscreteLaws, PublishedMassesAndMoments) {
    for (const json& e : leat_test::reference_family("discrete.poisson.")) {
        check_published(e, leat::poisson{parameter(e, "mean")});
    }
    for (const json& e : leat_test::reference_family("discrete.binomial.")) {
        check_published(
            e, leat::binomial{static_cast<std::int64_t>(parameter(e, "n")), parameter(e, "p")});
    }
    for (const json& e : leat_test::reference_family("discrete.geometric.")) {
        check_published(e, leat::geometric{parameter(e, "p")});
    }
    for (const json& e : leat_test::reference_family("discrete.negbinomial.")) {
        check_published(e, leat::negative_binomial{parameter(e, "r"), parameter(e, "p")});
    }
    for (const json& e : leat_test::reference_family("discrete.hypergeometric.")) {
        check_published(e, leat::hypergeometric{static_cast<int>(parameter(e, "N")),
                                                static_cast<int>(parameter(e, "K")),
                                                static_cast<int>(parameter(e, "n"))});
    }
    for (const json& e : leat_test::reference_family("discrete.zipf.")) {
        check_published(e, leat::zipf{parameter(e, "s"), static_cast<int>(parameter(e, "n"))});
    }
}

/// Sums of logarithms with 400 bits, by MPFR: enough that 10^17 loses no digit of a double.
class exact_log {
public:
    exact_log() {
        mpfr_init2(sum_, 400);
        mpfr_init2(x_, 400);
        mpfr_init2(y_, 400);
        mpfr_set_zero(sum_, 1);
    }
    exact_log(const exact_log&) = delete;
    exact_log& operator=(const exact_log&) = delete;
    ~exact_log() {
        mpfr_clear(sum_);
        mpfr_clear(x_);
        mpfr_clear(y_);
    }

    /// Adds sign ln n!.
    exact_log& factorial(int sign, double n) {
        mpfr_set_d(x_, n, MPFR_RNDN);
        mpfr_add_ui(x_, x_, 1, MPFR_RNDN);
        mpfr_lngamma(x_, x_, MPFR_RNDN);
        return add(sign);
    }
    /// Adds k ln x, or k ln(1 - x).
    exact_log& power(double x, double k, bool complement = false) {
        mpfr_set_d(x_, x, MPFR_RNDN);
        if (complement) {
            mpfr_ui_sub(x_, 1, x_, MPFR_RNDN);
        }
        mpfr_log(x_, x_, MPFR_RNDN);
        mpfr_set_d(y_, k, MPFR_RNDN);
        mpfr_mul(x_, x_, y_, MPFR_RNDN);
        return add(1);
    }
    /// Adds sign ln Gamma(a + b).
    exact_log& gamma(int sign, double a, double b = 0) {
        mpfr_set_d(x_, a, MPFR_RNDN);
        mpfr_add_d(x_, x_, b, MPFR_RNDN);
        mpfr_lngamma(x_, x_, MPFR_RNDN);
        return add(sign);
    }
    /// Adds sign ln(2 pi x) / 2.
    exact_log& half_log_two_pi(int sign, double x) {
        mpfr_const_pi(x_, MPFR_RNDN);
        mpfr_mul_d(x_, x_, 2 * x, MPFR_RNDN);
        mpfr_log(x_, x_, MPFR_RNDN);
        mpfr_div_ui(x_, x_, 2, MPFR_RNDN);
        return add(sign);
    }
    exact_log& plus(double x) {
        mpfr_set_d(x_, x, MPFR_RNDN);
        return add(1);
    }
    [[nodiscard]] double exp() {
        mpfr_exp(x_, sum_, MPFR_RNDN);
        return mpfr_get_d(x_, MPFR_RNDN);
    }
    [[nodiscard]] double value() { return mpfr_get_d(sum_, MPFR_RNDN); }

private:
    exact_log& add(int sign) {
        (sign > 0 ? mpfr_add : mpfr_sub)(sum_, sum_, x_, MPFR_RNDN);
        return *this;
    }
    mpfr_t sum_;
    mpfr_t x_;
    mpfr_t y_;
};

/// Calls visit(k) for whole k within 8 standard deviations of the mean.
template <class Law, class Visit>
void around_mean(const Law& law, Visit visit) {
    const double sd = std::sqrt(law.variance());
    for (const double z : {-8.0, -3.3, -1.0, -0.01, 0.0, 0.5, 2.0, 5.0, 8.0}) {
        const double k = std::floor(law.mean() + z * sd);
        if (k >= static_cast<double>(law.min()) && k <= static_cast<double>(law.max())) {
            visit(k);
        }
    }
}

// The deviance form at any size: by log-gammas in double, nothing would be right from 1e13 on.
TEST(DiscreteLaws, MassesAreRightAtEverySize) {
    for (const double mean : {1e-300, 1e-5, 0.7, 9.99, 12.3, 1e4, 1e9 + 0.3, 1e12, 1e15}) {
        const leat::poisson law{mean};
        around_mean(law, [&](double k) {
            exact_log log;
            const double exact = log.power(mean, k).plus(-mean).factorial(-1, k).exp();
            expect_near_relative(law.density(k), exact, 2e-14, "Poisson " + std::to_string(mean));
        });
    }
    for (const std::int64_t n : {std::int64_t{1}, std::int64_t{30}, std::int64_t{1000000},
                                 std::int64_t{1000000000000}, two_to_53}) {
        for (const double p : {1e-15, 1e-3, 0.3, 0.5, 0.99}) {
            const leat::binomial law{n, p};
            const auto all = static_cast<double>(n);
            around_mean(law, [&](double k) {
                exact_log log;
                const double exact = log.factorial(1, all)
                                         .factorial(-1, k)
                                         .factorial(-1, all - k)
                                         .power(p, k)
                                         .power(p, all - k, true)
                                         .exp();
                expect_near_relative(law.density(k), exact, 1e-13,
                                     "binomial " + std::to_string(n) + " " + std::to_string(p));
            });
        }
    }
    struct parameters {
        std::int64_t population;
        std::int64_t successes;
        std::int64_t draws;
    };
    for (const auto& [population, successes, draws] :
         {parameters{40, 20, 20}, parameters{1000, 990, 980},
          parameters{two_to_53, 5, two_to_53 / 2},
          parameters{two_to_53, two_to_53 / 3, two_to_53 / 5},
          parameters{two_to_53, two_to_53 / 3 * 2, two_to_53 / 1000},
          parameters{1000000000000, 1000000, 999000000000}}) {
        const leat::hypergeometric law{population, successes, draws};
        const auto all = static_cast<double>(population);
        const auto marked = static_cast<double>(successes);
        const auto drawn = static_cast<double>(draws);
        around_mean(law, [&](double k) {
            exact_log log;
            log.factorial(1, marked).factorial(1, all - marked).factorial(1, drawn);
            log.factorial(1, all - drawn).factorial(-1, all).factorial(-1, k);
            log.factorial(-1, marked - k).factorial(-1, drawn - k);
            log.factorial(-1, all - marked - drawn + k);
            expect_near_relative(law.density(k), log.exp(), 3e-13,
                                 "hypergeometric " + std::to_string(all));
        });
    }
    for (const double r : {1e-6, 0.3, 7.7, 1e5, 1e9}) {
        for (const double p : {1e-3, 0.5, 0.9}) {
            const leat::negative_binomial law{r, p};
            const auto check = [&](double k) {
                exact_log log;
                log.gamma(1, k, r).gamma(-1, r).factorial(-1, k).power(p, r).power(p, k, true);
                expect_near_relative(law.density(k), log.exp(), 3e-13,
                                     "negative binomial " + std::to_string(r));
            };
            around_mean(law, check);
            check(0);
            check(1);
        }
    }
}

TEST(DiscreteLaws, MassesOutsideTheSupportAre0) {
    const auto check = [](const auto& law) {
        EXPECT_EQ(law.density(-1), 0);
        EXPECT_EQ(law.density(0.5), 0);
        EXPECT_EQ(law.density(infinity), 0);
        EXPECT_EQ(law.density(-infinity), 0);
        EXPECT_THROW(static_cast<void>(law.density(nan)), leat::invalid_parameter);
    };
    check(leat::bernoulli{0.3});
    check(leat::binomial{10, 0.3});
    check(leat::geometric{0.3});
    check(leat::hypergeometric{10, 3, 4});
    check(leat::negative_binomial{2, 0.3});
    check(leat::poisson{3});
    check(leat::zipf{1, 10});
    EXPECT_EQ((leat::binomial{10, 0.3}.density(11)), 0);
    EXPECT_EQ((leat::hypergeometric{10, 8, 4}.density(1)), 0); // two of four are marked at least
    EXPECT_EQ((leat::zipf{1, 10}.density(0)), 0);
}

// ---- Refusals (P5) ---------------------------------------------------------------------------

void expect_refused(const char* start, const std::function<void()>& make) {
    try {
        make();
        ADD_FAILURE() << start << ": accepted";
    } catch (const leat::invalid_parameter& e) {
        EXPECT_EQ(std::string(e.what()).rfind(start, 0), 0u) << e.what();
        EXPECT_NE(std::string(e.what()).find(", must "), std::string::npos) << e.what();
    }
}
#define LEAT_TEST_REFUSED(start, ...)                                                              \
    expect_refused(start, [] { static_cast<void>(leat::__VA_ARGS__); })

TEST(DiscreteLaws, Refusals) {
    LEAT_TEST_REFUSED("leat::bernoulli: p = 1.5", bernoulli{1.5});
    LEAT_TEST_REFUSED("leat::bernoulli: p = -0.1", bernoulli{-0.1});
    LEAT_TEST_REFUSED("leat::bernoulli: p = ", bernoulli{nan});
    LEAT_TEST_REFUSED("leat::binomial: n = -1", binomial{-1, 0.5});
    LEAT_TEST_REFUSED("leat::binomial: n = ", binomial{two_to_53 + 1, 0.5});
    LEAT_TEST_REFUSED("leat::binomial: n = 300", binomial<std::uint8_t>{300, 0.5});
    LEAT_TEST_REFUSED("leat::binomial: n = -1", binomial<unsigned>{-1, 0.5});
    LEAT_TEST_REFUSED("leat::binomial: p = 1.1", binomial{1, 1.1});
    LEAT_TEST_REFUSED("leat::binomial: p = ", binomial{1, nan});
    LEAT_TEST_REFUSED("leat::poisson: mean = -1", poisson{-1});
    LEAT_TEST_REFUSED("leat::poisson: mean = ", poisson{nan});
    LEAT_TEST_REFUSED("leat::poisson: mean = inf", poisson{infinity});
    LEAT_TEST_REFUSED("leat::poisson: mean = 1e+19", poisson{1e19});
    LEAT_TEST_REFUSED("leat::geometric: p = 0,", geometric{0});
    LEAT_TEST_REFUSED("leat::geometric: p = 1.5", geometric{1.5});
    LEAT_TEST_REFUSED("leat::geometric: p = ", geometric{nan});
    LEAT_TEST_REFUSED("leat::geometric: p = 1e-18", geometric{1e-18});
    LEAT_TEST_REFUSED("leat::negative_binomial: r = 0", negative_binomial{0, 0.5});
    LEAT_TEST_REFUSED("leat::negative_binomial: r = inf", negative_binomial{infinity, 0.5});
    LEAT_TEST_REFUSED("leat::negative_binomial: r = ", negative_binomial{nan, 0.5});
    LEAT_TEST_REFUSED("leat::negative_binomial: p = 0", negative_binomial{1, 0});
    LEAT_TEST_REFUSED("leat::negative_binomial: p = ", negative_binomial{1, nan});
    LEAT_TEST_REFUSED("leat::negative_binomial: p = 1e-10", negative_binomial{1e9, 1e-10});
    LEAT_TEST_REFUSED("leat::hypergeometric: population = -1", hypergeometric{-1, 0, 0});
    LEAT_TEST_REFUSED("leat::hypergeometric: population = ", hypergeometric{two_to_53 + 1, 0, 0});
    LEAT_TEST_REFUSED("leat::hypergeometric: successes = 11", hypergeometric{10, 11, 1});
    LEAT_TEST_REFUSED("leat::hypergeometric: draws = 12", hypergeometric{10, 1, 12});
    LEAT_TEST_REFUSED("leat::zipf: exponent = -1", zipf{-1, 10});
    LEAT_TEST_REFUSED("leat::zipf: exponent = ", zipf{nan, 10});
    LEAT_TEST_REFUSED("leat::zipf: n = 0", zipf{1, 0});
    LEAT_TEST_REFUSED("leat::zipf: n = ", zipf<std::uint64_t>{1, std::uint64_t{1} << 63});
}

// The type is refused where a draw would pass it with a chance above 2^-64: found here from the
// exact masses beyond the type's end, on both sides of that chance.
TEST(DiscreteLaws, TheTypeIsRefusedWhereAChanceOf2ToMinus64WouldPassIt) {
    const auto bisect = [](double accepted, double refused, auto accepts) {
        for (int i = 0; i < 200 && std::nextafter(accepted, refused) != refused; ++i) {
            const double middle = accepted + (refused - accepted) / 2;
            (accepts(middle) ? accepted : refused) = middle;
        }
        return accepted;
    };
    const auto accepts = [](auto make) {
        return [make](double x) {
            try {
                make(x);
                return true;
            } catch (const leat::invalid_parameter&) {
                return false;
            }
        };
    };
    const auto poisson_end =
        bisect(1, 127, accepts([](double x) { return leat::poisson<std::int8_t>{x}; }));
    double chance = 0;
    for (int k = 400; k > 127; --k) {
        chance += leat::poisson{poisson_end}.density(k);
    }
    EXPECT_NEAR(std::log2(chance), -64, 0.1);

    const auto geometric_end =
        bisect(0.5, 1e-9, accepts([](double x) { return leat::geometric<std::int16_t>{x}; }));
    EXPECT_NEAR(32768 * std::log2(1 - geometric_end), -64, 1e-6);

    for (const double r : {0.01, 1.0, 40.0}) {
        const auto end = bisect(0.9999, 1e-9, accepts([r](double x) {
                                    return leat::negative_binomial<std::int16_t>{r, x};
                                }));
        chance = 0;
        for (int k = 200000; k > 32767; --k) {
            chance += leat::negative_binomial{r, end}.density(k);
        }
        EXPECT_NEAR(std::log2(chance), -64, 0.3) << r;
    }
    // Ends known by closed forms, of the type that most will use.
    EXPECT_NO_THROW(leat::geometric{4.9e-18});
    EXPECT_THROW(leat::geometric{4.7e-18}, leat::invalid_parameter);
    EXPECT_NO_THROW(leat::poisson{9.22e18});
    EXPECT_NO_THROW(leat::poisson<std::uint64_t>{1.8446e19});
}

// ---- Degenerate and extreme parameters -------------------------------------------------------

/// The words drawn through it.
class counting {
public:
    using result_type = std::uint64_t;
    static constexpr result_type min() { return 0; }
    static constexpr result_type max() { return ~result_type{0}; }
    result_type operator()() {
        ++words;
        return engine_();
    }
    int words = 0;

private:
    leat::xoshiro256_plus_plus engine_{4711};
};

template <class Law>
void expect_always(const Law& law, std::int64_t value) {
    counting g;
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(law(g), value);
    }
    EXPECT_EQ(law.mean(), static_cast<double>(value));
    EXPECT_EQ(law.variance(), 0);
    EXPECT_EQ(law.density(static_cast<double>(value)), 1);
}

TEST(DiscreteLaws, DegenerateLawsAreConstant) {
    expect_always(leat::bernoulli{0}, 0);
    expect_always(leat::bernoulli{1}, 1);
    expect_always(leat::binomial{0, 0.5}, 0);
    expect_always(leat::binomial{9, 0}, 0);
    expect_always(leat::binomial{9, 1}, 9);
    expect_always(leat::binomial{two_to_53, 1}, two_to_53);
    expect_always(leat::geometric{1}, 0);
    expect_always(leat::hypergeometric{0, 0, 0}, 0);
    expect_always(leat::hypergeometric{9, 0, 5}, 0);
    expect_always(leat::hypergeometric{9, 9, 5}, 5);
    expect_always(leat::hypergeometric{9, 4, 9}, 4);
    expect_always(leat::hypergeometric{two_to_53, two_to_53, two_to_53}, two_to_53);
    expect_always(leat::negative_binomial{3.5, 1}, 0);
    expect_always(leat::poisson{0}, 0);
    expect_always(leat::zipf{1, 1}, 1);
    expect_always(leat::zipf{0, 1}, 1);
}

/// Draws in the support; on average at most `words` words a draw.
template <class Law>
void sweep(const Law& law, double words) {
    constexpr int draws = 3000;
    counting g;
    for (int i = 0; i < draws; ++i) {
        const auto k = law(g);
        ASSERT_GE(k, law.min());
        ASSERT_LE(k, law.max());
    }
    EXPECT_LE(g.words, words * draws) << law.mean() << " " << law.variance();
}

// Right, no hang, few words: fit is tested in discrete_goodness_test.cpp.
TEST(DiscreteLaws, ExtremesDrawWithinTheSupportAndFewWords) {
    for (const double p : {1e-300, 1e-100, 1e-18, 1e-15, 1e-9, 1e-3, 0.1, 0.5, 0.9, 1 - 0x1p-53}) {
        for (const std::int64_t n : {std::int64_t{1}, std::int64_t{19}, std::int64_t{1000},
                                     std::int64_t{1} << 31, two_to_53}) {
            sweep(leat::binomial{n, p}, 2.9);
        }
        sweep(leat::bernoulli{p}, 1.01);
        if (p >= 1e-15) {
            sweep(leat::geometric{p}, 3.8);
        }
    }
    for (const double mean :
         {1e-300, 1e-18, 1e-3, 1.0, 9.99, 10.0, 11.0, 20.0, 1e3, 1e6, 1e9, 1e12, 1e15, 9.2e18}) {
        sweep(leat::poisson{mean}, 2.8);
    }
    for (const double r : {1e-6, 1e-3, 0.5, 1.0, 3.0, 1e3, 1e6, 1e9}) {
        for (const double p : {1e-6, 1e-3, 0.5, 1 - 1e-9}) {
            sweep(leat::negative_binomial{r, p}, 6);
        }
    }
    for (const std::int64_t population : {std::int64_t{2}, std::int64_t{39}, std::int64_t{41},
                                          std::int64_t{1000}, std::int64_t{1} << 40, two_to_53}) {
        for (const std::int64_t part : {1, 2, 3, 7, 1000}) {
            for (const std::int64_t other : {1, 2, 3, 7, 1000}) {
                sweep(leat::hypergeometric{population, population / part, population / other}, 4.2);
                sweep(leat::hypergeometric{population, population - population / part,
                                           population / other},
                      4.2);
            }
        }
    }
    for (const double s :
         {0.0, 1e-300, 1e-9, 0.5, 1 - 1e-12, 1.0, 1 + 1e-12, 1.5, 2.0, 40.0, 1000.0, 1e15, 1e300}) {
        for (const std::int64_t n : {std::int64_t{1}, std::int64_t{2}, std::int64_t{100},
                                     std::int64_t{1} << 44, largest}) {
            sweep(leat::zipf{s, n}, 2.6);
        }
    }
}

// A hat that masses pass makes those too rare, by too little for a sample to show. So it is looked
// at directly: a trial at the very top of the hat, wherever it falls, must be rejected.
TEST(DiscreteLaws, NoMassPassesTheHat) {
    const auto check = [](const auto& law) {
        int accepted = 0;
        for (std::uint64_t place = 0; place < 2000; ++place) {
            const std::uint64_t first = (2 * place + 1) * (~std::uint64_t{0} / 4000);
            constexpr std::uint64_t centre = std::uint64_t{1} << 63;
            leat::scripted g({first, ~std::uint64_t{0}, centre, 1});
            static_cast<void>(law(g));
            try {
                g();
                ++accepted; // with words left over
            } catch (const leat::error&) {
            }
        }
        EXPECT_EQ(accepted, 0) << law.mean();
    };
    for (double mean = 10; mean < 1e6; mean *= 1.07) {
        check(leat::poisson{mean});
    }
    for (std::int64_t n = 20; n < 10000000; n += n / 3) {
        for (double p = 10.001 / static_cast<double>(n); p < 0.5; p *= 1.3) {
            check(leat::binomial{n, p});
        }
    }
}

// A scripted word decides: small chances are not lost (threshold 0 of the mean is right relative
// to itself), and all of a double's digits of p count.
TEST(DiscreteLaws, SmallChancesAreRightRelativeToThemselves) {
    const auto first_not_above_0 = [](const auto& law) { // by bisection over constant words
        std::uint64_t above = 0;
        std::uint64_t not_above = ~std::uint64_t{0};
        while (not_above - above > 1) {
            const std::uint64_t middle = above + (not_above - above) / 2;
            leat::constant g{middle};
            (law(g) > 0 ? above : not_above) = middle;
        }
        return std::ldexp(static_cast<double>(not_above), -64);
    };
    expect_near_relative(first_not_above_0(leat::poisson{1e-9}), -std::expm1(-1e-9), 1e-9, "");
    expect_near_relative(first_not_above_0(leat::binomial{1000, 1e-12}), 1e-9, 1e-8, "");
    expect_near_relative(first_not_above_0(leat::binomial{3, 0.25}), 1 - 0.421875, 1e-15, "");
    expect_near_relative(first_not_above_0(leat::hypergeometric{two_to_53, 1000, 9007199}),
                         -std::expm1(1000 * std::log1p(-9007199 * 0x1p-53)), 1e-8, "");

    leat::scripted at_the_third_word({0, 0, 17});
    EXPECT_TRUE(leat::bernoulli{18 * 0x1p-192}(at_the_third_word));
    leat::scripted not_below({0, 0, 18, 0});
    EXPECT_FALSE(leat::bernoulli{18 * 0x1p-192}(not_below));
}

// Stirling's remainders that are stored, and those that are computed, against MPFR.
TEST(DiscreteLaws, StirlingRemainders) {
    for (const double c : {1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 9.0, 10.0, 11.0, 57.0, 1e6}) {
        exact_log log;
        log.factorial(1, c).power(c, -c).plus(c).half_log_two_pi(-1, c);
        expect_near_relative(leat::detail::stirling_remainder(c), log.value(), 4e-16,
                             std::to_string(c));
    }
}

} // namespace
