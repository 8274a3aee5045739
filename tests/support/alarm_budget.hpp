// One budget of false alarms for the whole suite, and the check that spends it.
//
// Statistical tests run on fixed seeds, so they pass or fail for good; the false-alarm rate is the
// probability that a right library fails when its sequences change. The arithmetic:
//
//   every check fails at p < 1e-10; the checks of all tests, declared in the table below, are
//   added up at compile time; by the union bound (no independence needed) the suite's rate is at
//   most their number times 1e-10, which must stay at or below 1e-6. That leaves room for 10000
//   checks; with the few hundred here, p-values that are approximate by a factor of ten still keep
//   the bound.
//
// A new statistical test adds a line: its name and the number of p-values it checks. A check that
// is not declared, or one too many, fails.
// Planted faults are the opposite: `is_rejected` asks that a wrong sampler falls below the same
// level. They cannot cause a false alarm in the right one and are not counted.

#ifndef LEAT_TESTS_SUPPORT_ALARM_BUDGET_HPP
#define LEAT_TESTS_SUPPORT_ALARM_BUDGET_HPP

#include "support/statistics.hpp"

#include <gtest/gtest.h>

#include <map>
#include <string>
#include <string_view>
#include <vector>

namespace leat_test {

inline constexpr double check_level = 1e-10;
inline constexpr double suite_alarm_rate = 1e-6;

struct declared_checks {
    std::string_view test;
    int checks;
};

inline constexpr declared_checks alarm_budget[] = {
    {"Statistics.KolmogorovSmirnovFindsNothingInUniforms", 1},
    {"Disk.IsUniformOnACoarseGrid", 1},
    {"DiskGoodness.UnitDisk", 20},
    {"DiskGoodness.DiskElsewhere", 21},
    {"DiskGoodness.FloatDisk", 20},
    {"EllipseGoodness.Turned", 20},
    {"EllipseGoodness.ThinAndTurned", 20},
    {"EllipseGoodness.Float", 20},
    {"EllipseGoodness.TurnedByRejection", 20},
    {"EllipseGoodness.PublishedValues", 6},
    {"EllipseGoodness.PublishedValuesByRejection", 6},
    {"PlantedFaults.SquareRootRadiusPasses", 20},
    {"SmoothGoodness.Ball3", 11},
    {"SmoothGoodness.Ball5", 13},
    {"SmoothGoodness.Ball7", 15},
    {"SmoothGoodness.BallElsewhere", 8},
    {"SmoothGoodness.Sphere2", 7},
    {"SmoothGoodness.Sphere3", 8},
    {"SmoothGoodness.Sphere4", 9},
    {"SmoothGoodness.Sphere6", 11},
    {"SmoothGoodness.Annulus", 6},
    {"SmoothGoodness.AnnulusOfASmallHollow", 6},
    {"SmoothGoodness.Shell", 7},
    {"SmoothGoodness.ShellThin", 24},
    {"SmoothGoodness.Sector", 6},
    {"SmoothGoodness.Ellipsoid", 4},
    {"SmoothGoodness.Cap", 16},
    {"SmoothGoodness.Cylinder", 8},
    {"SmoothGoodness.Cone", 4},
    {"SmoothGoodness.Torus", 8},
    {"SmoothGoodness.Rotation", 12},
    {"SmoothGoodness.BoxAndSegments", 11},
    {"SmoothGoodness.AffineImage", 3},
    {"SmoothGoodness.Directions", 9},
    {"SmoothGoodness.VonMisesFisher", 21},
    {"PlantedFaults.RightOnesPassAtTheSameSize", 15},
    {"LawGoodness.Normal", 45},
    {"LawGoodness.Exponential", 30},
    {"LawGoodness.Weibull", 48},
    {"LawGoodness.Lognormal", 63},
    {"LawGoodness.Gamma", 105},
    {"LawGoodness.GammaLogarithm", 4},
    {"LawGoodness.ChiSquared", 31},
    {"LawGoodness.Erlang", 18},
    {"LawGoodness.StudentT", 19},
    {"LawGoodness.FisherF", 16},
    {"LawGoodness.Beta", 47},
    {"LawGoodness.InverseGaussian", 17},
    {"LawGoodness.TruncatedNormal", 20},
    {"LawGoodness.VonMises", 12},
    {"ClosedFormGoodness.Gumbel", 27},
    {"ClosedFormGoodness.Logistic", 42},
    {"ClosedFormGoodness.Laplace", 42},
    {"ClosedFormGoodness.Cauchy", 19},
    {"ClosedFormGoodness.Pareto", 38},
    {"ClosedFormGoodness.Rayleigh", 27},
    {"ClosedFormGoodness.Maxwell", 12},
    {"ClosedFormGoodness.Triangular", 63},
    {"ClosedFormGoodness.PiecewiseLinear", 5},
    {"ClosedFormGoodness.Empirical", 4},
    {"ClosedFormGoodness.GumbelTail", 1},
    {"ClosedFormGoodness.LogisticTails", 2},
    {"ClosedFormGoodness.CauchyTail", 1},
    {"PlantedFaults.TextbookZigguratPasses", 18},
    {"PlantedFaults.GammaWithTheRightBoostPasses", 3},
    {"PlantedFaults.InverseGaussianAsPublishedPasses", 3},
    {"DiscreteGoodness.Bernoulli", 7},
    {"DiscreteGoodness.Poisson", 35},
    {"DiscreteGoodness.Binomial", 42},
    {"DiscreteGoodness.Geometric", 16},
    {"DiscreteGoodness.NegativeBinomial", 18},
    {"DiscreteGoodness.Hypergeometric", 23},
    {"DiscreteGoodness.Zipf", 15},
    {"DiscreteGoodness.LargeMeans", 18},
    {"DiscreteFaults.PoissonByRoundedNormal", 3},
    {"DiscreteFaults.BinomialByRoundedNormal", 3},
    {"DiscreteFaults.HypergeometricWithReplacement", 1},
    {"DiscreteFaults.GeometricInFloatMissesValues", 1},
    {"CategoricalGoodness.Weights", 7},
    {"CategoricalGoodness.OneHeavyOutcomeAmongAMillion", 1},
    {"PlantedFaults.TextbookAliasInDoublePasses", 1},
    {"WeightedIndexGoodness.BeforeAndAfterUpdates", 5},
    {"MultivariateNormalGoodness.MarginsAndPairs", 13},
    {"DirichletGoodness.SharesAndSumsOfTwo", 22},
    {"DirichletGoodness.SmallParameters", 3},
    {"MultinomialGoodness.MarginsAndSumsOfTwo", 32},
    {"CorneredGoodness.Triangle", 3},
    {"CorneredGoodness.Tetrahedron", 4},
    {"CorneredGoodness.SimplexOfFive", 6},
    {"CorneredGoodness.PolygonWithAHole", 1},
    {"CorneredGoodness.CentroidOfAPolygon", 2},
    {"CorneredGoodness.MeshOfAnOctahedron", 4},
    {"CorneredGoodness.MeshByArea", 1},
    {"CombinationGoodness.EitherByMeasure", 1},
    {"PlantedFaults.TrianglesChosenByAreaPass", 3},
    {"CombinationGoodness.WithoutAndRejection", 4},
    {"StreamStatistics.FirstWordsOfSeedsAreDistinct", 2}, // a chance of 1.2e-10
    {"StreamStatistics.FirstWordsOfSeedsAreBalanced", 65},
    {"StreamStatistics.FirstWordsOfNeighbouringSeedsAreUncorrelated", 80},
    {"StreamStatistics.NeighbouringStreamsAreUncorrelated", 4},
    {"StreamStatistics.SiblingsShareNoWord", 271}, // a chance of 2.71e-8
    {"LawsAtLength.Normal", 9},
    {"LawsAtLength.Exponential", 6},
    {"LawsAtLength.Gamma", 6},
    {"LawsAtLength.Poisson", 18},
    {"LawsAtLength.Binomial", 13},
    {"NormalBeyondEight.IsComplete", 2},
    {"AlarmRate.OfMeansAndDistributionsIsWhatWasAskedFor", 3},
    {"AlarmRate.OfSkewMeansIsWithinTheStatedFactor", 1},
    {"AlarmRate.OfBoundedMeansIsNeverHigher", 2},
    {"AlarmRate.OfRepeatedLooksIsSpentOnce", 2},
    {"PlantedFaultsOfUsers.AreFound", 4},
    {"CompatRand.IsUnbiasedWhereTheRemainderIsNot", 2},
    {"Coverage.StudentIsExactForNormalValues", 6},
    {"Coverage.PairsOfNormalValues", 1},
    {"Coverage.WelchForUnequalVariances", 1},
    {"Coverage.StudentForExponentialValues", 2},
    {"Coverage.ProportionsOfRareEvents", 2},
    {"Coverage.QuantileWhateverTheLaw", 1},
    {"Coverage.BatchMeansOfOneLongRun", 2},
    {"Coverage.BatchMeansWarnOfARunTooShort", 1},
    {"Coverage.StoppingFallsShortAtFirst", 1},
    {"TideGauge.TheAnswersAgree", 5},
    {"AlarmBudget.APValueBelowTheLevelFails", 1},
};

constexpr int all_declared_checks() {
    int sum = 0;
    for (const auto& entry : alarm_budget) {
        sum += entry.checks;
    }
    return sum;
}

static_assert(all_declared_checks() * check_level <= suite_alarm_rate,
              "the statistical checks together pass the suite's false-alarm rate");

/// "Suite.Test" of the running test: the seed of its streams, and its line in the budget.
inline std::string name_of_this_test() {
    const auto* test = testing::UnitTest::GetInstance()->current_test_info();
    return std::string(test->test_suite_name()) + "." + test->name();
}

/// Passes when p is at or above the level, and spends one check of the running test's budget.
inline void check(const outcome& found) {
    const std::string name = name_of_this_test();
    static std::map<std::string, int> spent; // by test; the whole program is one thread
    int allowed = 0;
    for (const auto& entry : alarm_budget) {
        if (entry.test == name) {
            allowed = entry.checks;
        }
    }
    EXPECT_LE(++spent[name], allowed)
        << name << " makes more checks than support/alarm_budget.hpp declares";
    EXPECT_GE(found.p, check_level) << found.what << ": statistic " << found.statistic << ", p "
                                    << found.p << ", seed text \"" << name << "\"";
}

inline void check(const std::vector<outcome>& all) {
    for (const auto& one : all) {
        check(one);
    }
}

/// For planted faults: at least one outcome falls below the level.
inline testing::AssertionResult is_rejected(const std::vector<outcome>& all) {
    if (smallest_p(all) < check_level) {
        return testing::AssertionSuccess();
    }
    auto result = testing::AssertionFailure() << "the faulty sampler passed:";
    for (const auto& one : all) {
        result << "\n  " << one.what << ": statistic " << one.statistic << ", p " << one.p;
    }
    return result;
}

} // namespace leat_test

#endif
