// The laws drawn in closed form, one by one: what is refused and in which words, moments against
// the references, draws against the formula that defines them, the ends of the range.

#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"
#include "leat/uniform/unit.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <sstream>
#include <string>
#include <vector>

namespace {

using engine = leat::xoshiro256_plus_plus;
using leat_test::json;

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double smallest = std::numeric_limits<double>::min();
constexpr double largest = std::numeric_limits<double>::max();

// The design: deduction ignores argument types; vectors come as std::vector<double>.
static_assert(std::same_as<decltype(leat::gumbel{0, 1}), leat::gumbel<double>>);
static_assert(std::same_as<decltype(leat::triangular{0, 1, 2.0F}), leat::triangular<double>>);
static_assert(std::same_as<decltype(leat::empirical({1.0F, 2.0F})), leat::empirical<double>>);
static_assert(
    std::same_as<decltype(leat::piecewise_linear({0, 1}, {1, 1})), leat::piecewise_linear<double>>);
static_assert(leat::pareto{{.scale = 2, .shape = 3}} == leat::pareto{2, 3});
static_assert(leat::cauchy{{.location = 2, .scale = 3}} == leat::cauchy{2, 3});

template <class Make>
void expect_refused(const std::string& message, Make make) {
    try {
        static_cast<void>(make());
        ADD_FAILURE() << "accepted: " << message;
    } catch (const leat::invalid_parameter& e) {
        EXPECT_EQ(e.what(), message);
    }
}

TEST(ClosedForm, RefusedParameters) {
    expect_refused("leat::gumbel: scale = 0, must be finite and > 0", [] {
        return leat::gumbel{0, 0};
    });
    expect_refused("leat::logistic: location = inf, must be finite", [] {
        return leat::logistic{infinity, 1};
    });
    expect_refused("leat::laplace: scale = -1, must be finite and > 0", [] {
        return leat::laplace{0, -1};
    });
    expect_refused("leat::cauchy: scale = inf, must be finite and > 0", [] {
        return leat::cauchy{0, infinity};
    });
    expect_refused("leat::pareto: shape = 0, must be finite and > 0", [] {
        return leat::pareto{1, 0};
    });
    expect_refused("leat::rayleigh: scale = -2, must be finite and > 0",
                   [] { return leat::rayleigh{-2}; });
    expect_refused("leat::maxwell: scale = 0, must be finite and > 0",
                   [] { return leat::maxwell{0}; });
    expect_refused("leat::triangular: mode = 3, must be between lo and hi", [] {
        return leat::triangular{0, 3, 2};
    });
    const std::string room =
        ", must be finite and above lo, by at least 2^-960 (float 2^-100), with "
        "a number between, and by no more than the largest finite number";
    expect_refused("leat::triangular: hi = 0" + room, [] { return leat::triangular{0, 0, 0}; });
    expect_refused("leat::triangular: hi = 1.0000000000000002" + room, [] {
        return leat::triangular{1, 1, 1 + 0x1p-52};
    });
    expect_refused("leat::triangular: hi = 1e+308" + room, [] {
        return leat::triangular{-1e308, 0, 1e308};
    });
    expect_refused("leat::empirical: size of values = 0, must be at least 1",
                   [] { return leat::empirical(std::vector<double>{}); });
    expect_refused("leat::empirical: values[2] = inf, must be finite", [] {
        return leat::empirical({3.0, 1.0, infinity});
    });
    expect_refused("leat::piecewise_linear: size of points = 1, must be at least 2",
                   [] { return leat::piecewise_linear({1.0}, {1.0}); });
    expect_refused("leat::piecewise_linear: size of densities = 3, must be the number of points",
                   [] {
                       return leat::piecewise_linear({0, 1}, {1, 1, 1});
                   });
    expect_refused(
        "leat::piecewise_linear: points[2] = 1, must be finite and above the point before", [] {
            return leat::piecewise_linear({0, 1, 1}, {1, 1, 1});
        });
    expect_refused("leat::piecewise_linear: densities[0] = -1, must be finite and >= 0", [] {
        return leat::piecewise_linear({0, 1}, {-1, 1});
    });
    expect_refused("leat::piecewise_linear: area below densities = 0, must be above 2^-900 of the "
                   "largest density over the whole width",
                   [] {
                       return leat::piecewise_linear({0, 1}, {0, 0});
                   });
}

double number(const json& value) {
    if (!value.is_string()) {
        return value.get<double>();
    }
    const std::string text = value.get<std::string>();
    return text == "infinite"    ? infinity
           : text == "undefined" ? std::numeric_limits<double>::quiet_NaN()
                                 : std::stod(text);
}

template <class Make>
void expect_moments(const std::string& family, Make make) {
    for (const json& entry : leat_test::reference_family("distributions." + family + ".")) {
        LEAT_TEST_REFERENCE(entry);
        const auto law = make(entry["parameters"]);
        const double mean = number(entry["expected"]["mean"]);
        const double variance = number(entry["expected"]["variance"]);
        if (std::isfinite(mean)) {
            EXPECT_NEAR(law.mean(), mean, 1e-14 * std::fabs(mean));
        } else {
            EXPECT_EQ(std::isnan(law.mean()), std::isnan(mean));
        }
        if (std::isfinite(variance)) {
            EXPECT_NEAR(law.variance(), variance, 1e-14 * variance);
        } else {
            EXPECT_EQ(std::isnan(law.variance()), std::isnan(variance));
            EXPECT_EQ(law.variance() == infinity, variance == infinity);
        }
    }
}

TEST(ClosedForm, MomentsAreTheReferences) {
    const auto located = [](const std::string& family, auto standard) {
        expect_moments(family, [](const json& p) {
            return decltype(standard){number(p["location"]), number(p["scale"])};
        });
    };
    located("gumbel", leat::gumbel{});
    located("logistic", leat::logistic{});
    located("laplace", leat::laplace{});
    located("cauchy", leat::cauchy{});
    expect_moments("pareto", [](const json& p) {
        return leat::pareto{number(p["minimum"]), number(p["index"])};
    });
    expect_moments("rayleigh", [](const json& p) { return leat::rayleigh{number(p["scale"])}; });
    expect_moments("triangular", [](const json& p) {
        return leat::triangular{number(p["minimum"]), number(p["mode"]), number(p["maximum"])};
    });
    // Johnson, Kotz and Balakrishnan, ch. 18: from memory
    EXPECT_DOUBLE_EQ(leat::maxwell{2}.mean(), 2 * std::sqrt(8 / M_PI));
    EXPECT_NEAR(leat::maxwell{2}.variance(), 4 * (3 - 8 / M_PI), 1e-14);
    EXPECT_EQ((leat::pareto{1, 1}.mean()), infinity);
    EXPECT_EQ((leat::gumbel{0, 1e200}.variance()), largest);
}

// Each draw from the standard laws' draws of the same words.
TEST(ClosedForm, DrawsAreTheDefiningFunctions) {
    engine g{2026};
    for (int i = 0; i < 20000; ++i) {
        engine words = g;
        const double e = leat::exponential{}(words);
        words = g;
        const double u = leat::unit(words);
        words = g;
        const double z = leat::normal{}(words);
        const double second = leat::normal{}(words);
        words = g;
        static_cast<void>(leat::exponential{}(words));
        const double z_after_e = leat::normal{}(words);

        const auto draw = [&](const auto& law) {
            words = g;
            return law(words);
        };
        if (e >= 0x1p-8) {
            EXPECT_NEAR(draw(leat::gumbel{5, 2}), 5 - 2 * std::log(e),
                        4e-15 * (5 + std::fabs(std::log(e))));
        } else {
            EXPECT_GT(draw(leat::gumbel{5, 2}), 5 + 2 * 8 * std::log(2.0));
        }
        if (std::fabs(u - 0.5) <= 0.5 - 0x1p-8) {
            EXPECT_NEAR(draw(leat::logistic{0, 1}), std::log(u / (1 - u)), 2e-15);
        } else {
            EXPECT_GT(std::fabs(draw(leat::logistic{0, 1})), std::log(255.0));
        }
        EXPECT_DOUBLE_EQ(std::fabs(draw(leat::laplace{0, 1})), e);
        if (std::fabs(second) >= 0x1p-8) {
            EXPECT_EQ(draw(leat::cauchy{0, 1}), z / second);
        } else {
            EXPECT_EQ(std::signbit(draw(leat::cauchy{0, 1})),
                      std::signbit(z) != std::signbit(second));
        }
        EXPECT_NEAR(draw(leat::pareto{2, 3}), 2 * std::exp(e / 3), 1e-14 * std::exp(e / 3));
        EXPECT_DOUBLE_EQ(draw(leat::rayleigh{3}), 3 * std::sqrt(2 * e));
        EXPECT_DOUBLE_EQ(draw(leat::maxwell{3}), 3 * std::sqrt(2 * e + z_after_e * z_after_e));
        EXPECT_NEAR(draw(leat::triangular{-1, 0.5, 3}), leat::triangular(-1, 0.5, 3).quantile(u),
                    0);
        g();
    }
}

// P3, P5: whatever the parameters, a draw is a finite number of the support.
TEST(ClosedForm, ExtremeParametersStayInTheSupport) {
    engine g{8};
    const auto sound = [&g](const auto& law) {
        for (int i = 0; i < 300; ++i) {
            const auto x = law(g);
            ASSERT_TRUE(std::isfinite(x));
            ASSERT_GE(x, law.min());
            ASSERT_LE(x, law.max());
        }
    };
    for (const double a : {1e-300, 1e-8, 1.0, 1e12, 1e300, largest}) {
        for (const double b : {1e-300, 1e-8, 1.0, 1e12, 1e300, largest}) {
            sound(leat::gumbel{a, b});
            sound(leat::logistic{-a, b});
            sound(leat::laplace{a, b});
            sound(leat::cauchy{-a, b});
            sound(leat::pareto{a, b});
        }
        sound(leat::rayleigh{a});
        sound(leat::maxwell{a});
        sound(leat::triangular{-a / 3, 0, 0.1});
        sound(leat::empirical({-a, a}));
        sound(leat::piecewise_linear({-a / 3, a / 3}, {a, 0}));
    }
    sound(leat::pareto<float>{3e38F, 1e-30F});
    sound(leat::cauchy<float>{0, 3e38F});
    sound(leat::rayleigh<float>{1e-38F});
    EXPECT_EQ((leat::pareto{5e-324, 1}.min()), smallest);
}

// The ends belong to no triangular law, whatever the engine returns, at the narrowest too.
TEST(ClosedForm, TriangularDrawsAreInside) {
    const auto inside = [](const auto& law) {
        for (const std::uint64_t word :
             {std::uint64_t{0}, ~std::uint64_t{0}, std::uint64_t{1} << 63}) {
            leat::constant g{word};
            const auto x = law(g);
            EXPECT_GT(x, law.lo());
            EXPECT_LT(x, law.hi());
        }
    };
    inside(leat::triangular{0, 0, 1});
    inside(leat::triangular{0, 1, 1});
    inside(leat::triangular{1, 1, 1 + 0x1p-51});
    inside(leat::triangular{-1e308, 0, 0});
    inside(leat::triangular{1e300, 1e300, 1e301});
    inside(leat::triangular<float>{1, 1, 1.0000003F});
    inside(leat::triangular<float>{0, 0, 1e30F});
}

// An interval without area is never drawn; nor is the end of an interval.
TEST(ClosedForm, PiecewiseLinearKeepsToItsIntervals) {
    const leat::piecewise_linear law({0, 1, 2, 2.5, 4}, {3, 0, 0, 0, 1e-3});
    engine g{9};
    int last = 0;
    for (int i = 0; i < 100000; ++i) {
        const double x = law(g);
        ASSERT_TRUE((x >= 0 && x < 1) || (x >= 2.5 && x < 4)) << x;
        last += static_cast<int>(x >= 2.5);
    }
    EXPECT_NEAR(last, 100000 * 0.00075 / 1.50075, 50); // within 7 standard deviations
    for (const std::uint64_t word : {std::uint64_t{0}, ~std::uint64_t{0}}) {
        leat::constant stuck{word};
        const double x = leat::piecewise_linear{}(stuck);
        EXPECT_TRUE(x >= 0 && x < 1) << x;
    }
}

// The text of a law with lists: the length, then the entries; a false length is garbage.
TEST(ClosedForm, TextOfLists) {
    const leat::empirical law({2.0, 1.0});
    std::ostringstream os;
    os << law;
    EXPECT_EQ(os.str(), "2 x3ff0000000000000 x4000000000000000");
    for (const std::string text :
         {"3 x3ff0000000000000 x4000000000000000", "0", "18446744073709551615 x3ff0000000000000"}) {
        std::istringstream is{text};
        leat::empirical target = law;
        is >> target;
        EXPECT_TRUE(is.fail()) << text;
        EXPECT_EQ(target, law);
    }
}

} // namespace
