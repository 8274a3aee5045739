// Planted faults: samplers with mistakes that were made in earnest, which the tests of fit must
// reject, each beside the right one, which must pass the same tests at the same size.

#include "distributions/law_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/reference.hpp"
#include "support/seeds.hpp"

#include "leat/distributions/gamma.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/words.hpp"

#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/normal.hpp>
#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <string>

namespace {

using namespace leat_test;

constexpr int many = 1000000;

std::vector<outcome> report_as_standard_normal(std::vector<double> x) {
    const boost::math::normal_distribution<double, in_double> reference(0, 1);
    const auto& entry = reference_entry("distributions.normal.0.1");
    auto report = law_report("normal", x, reference);
    return report + quantile_report("normal", x, entry);
}

/// Marsaglia and Tsang's ziggurat for the normal law (J. Stat. Software 5(8), 2000), written anew
/// for this test with the standard library's functions. r and v: distributions.ziggurat.normal.256.
class textbook_ziggurat {
public:
    enum class fault { none, index_from_magnitude, no_tail };

    explicit textbook_ziggurat(fault planted) : planted_(planted) {
        const auto& entry = reference_entry("distributions.ziggurat.normal.256");
        r_ = std::stod(entry["expected"]["r"].get<std::string>());
        const double v = std::stod(entry["expected"]["v"].get<std::string>());
        edge_[0] = v / density(r_);
        edge_[1] = r_;
        for (std::size_t i = 2; i < layers; ++i) {
            edge_[i] = std::sqrt(-2 * std::log(v / edge_[i - 1] + density(edge_[i - 1])));
        }
        edge_[layers] = 0;
    }

    template <class G>
    double operator()(G& g) const {
        for (;;) {
            const std::uint64_t word = g();
            const double u = leat::detail::open_unit(word); // the upper 52 bits
            // right: bits that u does not use. Wrong: bits it does use (Doornik, An improved
            // ziggurat method, 2005, on the published code).
            const std::size_t layer =
                planted_ == fault::index_from_magnitude ? word >> 56 : word & 255;
            const double sign = (word & 256) != 0 ? 1 : -1;
            const double x = u * edge_[layer];
            if (x < edge_[layer + 1]) {
                return sign * x;
            }
            if (layer == 0) {
                if (planted_ == fault::no_tail) {
                    continue;
                }
                return sign * tail(g);
            }
            const double low = density(edge_[layer]);
            const double high = density(edge_[layer + 1]);
            if (low + leat::unit(g) * (high - low) < density(x)) {
                return sign * x;
            }
        }
    }

private:
    static constexpr std::size_t layers = 256;
    static double density(double x) { return std::exp(-x * x / 2); }

    template <class G>
    double tail(G& g) const { // Marsaglia 1964
        for (;;) {
            const double x = -std::log(leat::unit(g)) / r_;
            const double y = -std::log(leat::unit(g));
            if (2 * y > x * x) {
                return r_ + x;
            }
        }
    }

    fault planted_;
    double r_ = 0;
    std::array<double, layers + 1> edge_{};
};

std::vector<double> draw_textbook_ziggurat(textbook_ziggurat::fault planted) {
    auto g = source_of_this_test().stream();
    return draw_values(textbook_ziggurat(planted), many, g);
}

TEST(PlantedFaults, TextbookZigguratPasses) {
    check(report_as_standard_normal(draw_textbook_ziggurat(textbook_ziggurat::fault::none)));
}

TEST(PlantedFaults, ZigguratIndexFromMagnitudeBitsIsRejected) {
    EXPECT_TRUE(is_rejected(report_as_standard_normal(
        draw_textbook_ziggurat(textbook_ziggurat::fault::index_from_magnitude))));
}

TEST(PlantedFaults, ZigguratWithoutTailIsRejected) {
    EXPECT_TRUE(is_rejected(
        report_as_standard_normal(draw_textbook_ziggurat(textbook_ziggurat::fault::no_tail))));
}

TEST(PlantedFaults, NormalFromTwelveUniformsIsRejected) {
    auto g = source_of_this_test().stream();
    const auto twelve = [](leat::stream& words) {
        double sum = -6;
        for (int i = 0; i < 12; ++i) {
            sum += leat::unit(words);
        }
        return sum;
    };
    EXPECT_TRUE(is_rejected(report_as_standard_normal(draw_values(twelve, many, g))));
}

/// A shape below 1 by a draw for shape + 1 times U^power; right is 1 / shape.
std::vector<outcome> report_boosted_gamma(double shape, double power) {
    auto g = source_of_this_test().stream(std::to_string(power));
    const leat::gamma above{shape + 1, 1};
    const auto boosted = [&](leat::stream& words) {
        const double x = above(words);
        return x * std::pow(leat::unit(words), power);
    };
    auto x = draw_values(boosted, many / 10, g);
    const boost::math::gamma_distribution<double, in_double> reference(shape, 1);
    return law_report("gamma", x, reference);
}

TEST(PlantedFaults, GammaWithTheRightBoostPasses) { check(report_boosted_gamma(0.5, 1 / 0.5)); }

TEST(PlantedFaults, GammaWithAWrongBoostIsRejected) {
    EXPECT_TRUE(is_rejected(report_boosted_gamma(0.5, 1.0)));     // U
    EXPECT_TRUE(is_rejected(report_boosted_gamma(0.5, 1 / 1.5))); // U^(1 / (shape + 1))
    EXPECT_TRUE(is_rejected(report_boosted_gamma(0.5, 0.5)));     // U^shape
    EXPECT_TRUE(is_rejected(report_boosted_gamma(0.9, 1.0)));     // near enough to look right
}

} // namespace
