// The library against the second implementation: every row of tests/golden/discrete_vectors.json,
// which tests/specification/second_discrete.py wrote by tests/golden/LAWS_DISCRETE.md.

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/categorical.hpp"
#include "leat/distributions/dirichlet.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/multinomial.hpp"
#include "leat/distributions/multivariate_normal.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/weighted_index.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/streams/source.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <bit>
#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <fstream>
#include <functional>
#include <limits>
#include <map>
#include <memory>
#include <set>
#include <string>
#include <vector>

namespace {

using nlohmann::json;
using reals = std::vector<double>;

/// A row's stream or its given words: one type, so that each law is compiled once.
struct row_words {
    using result_type = std::uint64_t;
    static constexpr result_type min() { return 0; }
    static constexpr result_type max() { return std::numeric_limits<result_type>::max(); }
    result_type operator()() {
        ++drawn;
        return next();
    }

    std::function<std::uint64_t()> next;
    std::uint64_t drawn = 0;
};

row_words words_of(const json& row) {
    if (row.contains("words")) {
        std::vector<std::uint64_t> words;
        for (const json& word : row.at("words")) {
            words.push_back(std::stoull(word.get<std::string>(), nullptr, 16));
        }
        return {leat::scripted(words)};
    }
    const json& path = row.at("path");
    const auto of_seed = leat::source(row.at("seed").get<std::uint64_t>());
    // Streams cannot be copied, which std::function asks for.
    const auto address =
        of_seed.stream(path.at(0).get<std::string>(), path.at(1).get<std::uint64_t>()).address();
    const auto s = std::make_shared<leat::stream>(address);
    s->seek(row.at("word").get<std::uint64_t>());
    return {[s] { return (*s)(); }, s->position()};
}

json kept(double x) {
    char text[17];
    std::snprintf(text, sizeof text, "%016llx",
                  static_cast<unsigned long long>(std::bit_cast<std::uint64_t>(x)));
    return text;
}
json kept(const reals& x) {
    json result = json::array();
    for (const double y : x) {
        result.push_back(kept(y));
    }
    return result;
}

using draw = std::function<json(row_words&)>;

/// Draws of a law of integers.
template <class Law>
draw integers(const Law& law) {
    return [law](row_words& g) { return json(law(g)); };
}
/// Draws of a law of several reals.
template <class Law>
draw vectors(const Law& law) {
    return [law](row_words& g) { return kept(law(g)); };
}

draw weighted_index_of(const json& p) {
    leat::weighted_index<> law(p[0].get<reals>());
    for (const json& update : p[1]) {
        law.update(update[0].get<std::int64_t>(), update[1].get<double>());
    }
    return integers(law);
}

struct law_row {
    std::function<draw(const json& parameters)> law;
    std::set<std::string> branches; // what the rows must reach between them
};

const std::map<std::string, law_row>& laws() {
    using std::int64_t;
    static const std::map<std::string, law_row> table{
        {"bernoulli",
         {[](const json& p) { return integers(leat::bernoulli(p[0].get<double>())); },
          {"equal to p", "further digits"}}},
        {"geometric",
         {[](const json& p) { return integers(leat::geometric<>(p[0].get<double>())); },
          {"beyond the type", "block, rejected", "blocks"}}},
        {"poisson",
         {[](const json& p) { return integers(leat::poisson<>(p[0].get<double>())); },
          {"inversion, sum of the rest", "rejection, mass", "rejection, out of range",
           "rejection, rejected", "rejection, squeeze"}}},
        {"binomial",
         {[](const json& p) {
              return integers(leat::binomial<>(p[0].get<int64_t>(), p[1].get<double>()));
          },
          {"inversion, sum of the rest", "rejection, mass", "rejection, out of range",
           "rejection, rejected", "rejection, squeeze"}}},
        {"negative_binomial",
         {[](const json& p) {
              return integers(leat::negative_binomial<>(p[0].get<double>(), p[1].get<double>()));
          },
          {"beyond the type", "gamma, boost", "gamma, logarithm", "gamma, rejected"}}},
        {"hypergeometric",
         {[](const json& p) {
              return integers(leat::hypergeometric<>(p[0].get<int64_t>(), p[1].get<int64_t>(),
                                                     p[2].get<int64_t>()));
          },
          {"inversion, neither is 0", "inversion, sum of the rest", "ratio, logarithm",
           "ratio, out of range", "ratio, quick", "ratio, quickly rejected", "ratio, rejected"}}},
        {"zipf",
         {[](const json& p) {
              return integers(leat::zipf<>(p[0].get<double>(), p[1].get<int64_t>()));
          },
          {"by area", "further digits", "further digits, beyond n", "near", "rejected"}}},
        {"categorical",
         {[](const json& p) { return integers(leat::categorical<>(p[0].get<reals>())); },
          {"alias", "one takes all", "own"}}},
        {"weighted_index", {weighted_index_of, {"at the very end"}}},
        {"multivariate_normal",
         {[](const json& p) {
              return vectors(
                  leat::multivariate_normal(p[0].get<reals>(), p[1].get<std::vector<reals>>()));
          },
          {"exactly 0", "singular"}}},
        {"dirichlet",
         {[](const json& p) { return vectors(leat::dirichlet(p[0].get<reals>())); },
          {"gamma, boost", "gamma, logarithm", "gamma, rejected"}}},
        {"multinomial",
         {[](const json& p) {
              return integers(leat::multinomial<>(p[0].get<int64_t>(), p[1].get<reals>()));
          },
          {"all", "others", "these"}}},
    };
    return table;
}

json read_vectors() {
    std::ifstream file(std::string(LEAT_TEST_DIR) + "/golden/discrete_vectors.json");
    return json::parse(file);
}

/// As many draws as the row has values.
json values(const json& row, const draw& next, row_words& g) {
    json result = json::array();
    for (std::size_t i = 0; i < row.at("values").size(); ++i) {
        result.push_back(next(g));
    }
    return result;
}

TEST(DiscreteVectors, TheLibraryGivesWhatThePageSays) {
    const json vectors = read_vectors();
    ASSERT_EQ(vectors.size(), laws().size());
    for (const auto& [name, law] : laws()) {
        std::set<std::string> missing = law.branches;
        for (const json& row : vectors.at(name)) {
            SCOPED_TRACE(name + row.at("parameters").dump().substr(0, 200));
            ASSERT_FALSE(row.at("values").empty());
            row_words g = words_of(row);
            EXPECT_EQ(values(row, law.law(row.at("parameters")), g), row.at("values"));
            EXPECT_EQ(g.drawn, row.at("position"));
            for (const json& branch : row.at("branches")) {
                missing.erase(branch.get<std::string>());
            }
        }
        EXPECT_TRUE(missing.empty()) << name << " never reaches: " << *missing.begin();
    }
}

// A word lost before the first draw shows in the values of every law.
TEST(DiscreteVectors, ALostWordShows) {
    const json vectors = read_vectors();
    for (const auto& [name, law] : laws()) {
        bool shows = false;
        for (const json& row : vectors.at(name)) {
            if (row.contains("path")) {
                row_words g = words_of(row);
                g();
                shows = shows || values(row, law.law(row.at("parameters")), g) != row.at("values");
            }
        }
        EXPECT_TRUE(shows) << name;
    }
}

} // namespace
