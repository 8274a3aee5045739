// The library against the second implementation: every row of tests/golden/law_vectors.json, which
// tests/specification/second_laws.py wrote by tests/golden/LAWS.md. Values to the bit, and the
// words they consume.

#include "leat/core/arctangent.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/power.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/distributions/beta.hpp"
#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/student_t.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/von_mises.hpp"
#include "leat/distributions/weibull.hpp"
#include "leat/streams/source.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/permute.hpp"

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <array>
#include <bit>
#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <fstream>
#include <limits>
#include <map>
#include <numeric>
#include <set>
#include <string>
#include <type_traits>
#include <vector>

namespace {

using nlohmann::json;

json vectors() {
    std::ifstream file(std::string(LEAT_TEST_DIR) + "/golden/law_vectors.json");
    return json::parse(file);
}

/// A number, an infinite end, or a list of numbers.
template <class Parameter>
Parameter parameter(const json& x) {
    if constexpr (std::is_floating_point_v<Parameter>) {
        if (x.is_string()) {
            constexpr Parameter infinity = std::numeric_limits<Parameter>::infinity();
            return x == "infinity" ? infinity : -infinity;
        }
    }
    return x.get<Parameter>();
}

std::string bits(double x) {
    std::array<char, 17> text{};
    std::snprintf(text.data(), text.size(), "%016llx",
                  static_cast<unsigned long long>(std::bit_cast<std::uint64_t>(x)));
    return text.data();
}
std::string bits(float x) {
    std::array<char, 9> text{};
    std::snprintf(text.data(), text.size(), "%08lx",
                  static_cast<unsigned long>(std::bit_cast<std::uint32_t>(x)));
    return text.data();
}

/// A value drawn from the stream with a row's parameters, as the file holds it.
using draw = json (*)(const json& parameters, leat::stream& s);

/// The law with the row's parameters, one for each field of its aggregate.
template <class Law>
Law law_of(const json& parameters) {
    typename Law::param_type p;
    std::size_t i = 0;
    Law::param_type::each(p, [&](const char*, auto& field) {
        field = parameter<std::remove_reference_t<decltype(field)>>(parameters.at(i));
        ++i;
    });
    EXPECT_EQ(i, parameters.size());
    return Law(p);
}

template <class Law>
json draw_of(const json& parameters, leat::stream& s) {
    return bits(law_of<Law>(parameters)(s));
}
template <class Law>
json draw_log_of(const json& parameters, leat::stream& s) {
    return bits(law_of<Law>(parameters).draw_log(s));
}

std::vector<std::uint64_t> first_integers(const json& count) {
    std::vector<std::uint64_t> items(count.get<std::size_t>());
    std::iota(items.begin(), items.end(), std::uint64_t{0});
    return items;
}

struct section {
    const char* name;
    draw as_double; // or of whole numbers
    draw as_float;
};

template <leat::ends Ends>
constexpr section uniform(const char* name) {
    return {name, draw_of<leat::uniform<double, Ends>>, draw_of<leat::uniform<float, Ends>>};
}

template <template <class> class Law>
constexpr section law(const char* name) {
    return {name, draw_of<Law<double>>, draw_of<Law<float>>};
}

const section sections[] = {
    law<leat::beta>("beta"),
    law<leat::cauchy>("cauchy"),
    law<leat::chi_squared>("chi_squared"),
    law<leat::empirical>("empirical"),
    law<leat::erlang>("erlang"),
    law<leat::exponential>("exponential"),
    law<leat::fisher_f>("fisher_f"),
    law<leat::gamma>("gamma"),
    {"gamma.draw_log", draw_log_of<leat::gamma<double>>, draw_log_of<leat::gamma<float>>},
    law<leat::gumbel>("gumbel"),
    law<leat::inverse_gaussian>("inverse_gaussian"),
    law<leat::laplace>("laplace"),
    law<leat::logistic>("logistic"),
    law<leat::lognormal>("lognormal"),
    law<leat::maxwell>("maxwell"),
    law<leat::normal>("normal"),
    law<leat::pareto>("pareto"),
    {"pick",
     [](const json& p, leat::stream& s) {
         std::vector<std::uint64_t> items = first_integers(p.at(0));
         return json(leat::pick(items, s));
     },
     nullptr},
    law<leat::piecewise_linear>("piecewise_linear"),
    law<leat::rayleigh>("rayleigh"),
    {"sample_without_replacement",
     [](const json& p, leat::stream& s) {
         return json(leat::sample_without_replacement(p.at(0).get<std::uint64_t>(),
                                                      p.at(1).get<std::uint64_t>(), s));
     },
     nullptr},
    {"shuffle",
     [](const json& p, leat::stream& s) {
         std::vector<std::uint64_t> items = first_integers(p.at(0));
         leat::shuffle(items, s);
         return json(items);
     },
     nullptr},
    law<leat::student_t>("student_t"),
    law<leat::triangular>("triangular"),
    law<leat::truncated_normal>("truncated_normal"),
    uniform<leat::ends::open>("uniform"),
    uniform<leat::ends::closed>("uniform.closed"),
    uniform<leat::ends::closed_open>("uniform.closed_open"),
    uniform<leat::ends::open_closed>("uniform.open_closed"),
    law<leat::von_mises>("von_mises"),
    law<leat::weibull>("weibull"),
};

void check(const section& law, const json& row) {
    SCOPED_TRACE(row.dump());
    const json& path = row.at("path");
    leat::stream s = leat::source(row.at("seed").get<std::uint64_t>())
                         .stream(path.at(0).get<std::string>(), path.at(1).get<std::uint64_t>());
    s.seek(row.at("word").get<std::uint64_t>());
    const draw one = row.at("real") == "float" ? law.as_float : law.as_double;
    ASSERT_NE(one, nullptr);
    ASSERT_FALSE(row.at("values").empty());
    for (const json& value : row.at("values")) {
        EXPECT_EQ(one(row.at("parameters"), s), value);
    }
    EXPECT_EQ(s.position(), row.at("position"));
}

TEST(LawVectors, EveryRowToTheBit) {
    const json file = vectors();
    std::set<std::string> names;
    for (const section& law : sections) {
        names.insert(law.name);
        SCOPED_TRACE(law.name);
        ASSERT_TRUE(file.contains(law.name));
        const json& rows = file.at(law.name);
        EXPECT_GE(rows.size(), 2u);
        bool in_float = law.as_float == nullptr;
        for (const json& row : rows) {
            check(law, row);
            in_float = in_float || row.at("real") == "float";
        }
        EXPECT_TRUE(in_float) << "no row of floats";
    }
    for (const auto& [name, rows] : file.items()) {
        EXPECT_TRUE(names.contains(name) || name.starts_with("function "))
            << name << " is not checked";
    }
}

/// A function of one or two reals, with one or two values.
using function = json (*)(double x, double y);

const std::map<std::string, function> functions = {
    {"arctangent", [](double y, double x) { return json{bits(leat::detail::arctangent(y, x))}; }},
    {"exp", [](double x, double) { return json{bits(leat::detail::natural_exp(x))}; }},
    {"expm1", [](double x, double) { return json{bits(leat::detail::exp_minus_one(x))}; }},
    {"log1p", [](double x, double) { return json{bits(leat::detail::log_one_plus(x))}; }},
    {"log_gamma", [](double x, double) { return json{bits(leat::detail::log_gamma(x))}; }},
    {"log_parts",
     [](double x, double) {
         const leat::detail::two_part log = leat::detail::log_parts(x);
         return json{bits(log.high), bits(log.low)};
     }},
    {"power", [](double x, double y) { return json{bits(leat::detail::power(x, y))}; }},
    {"sine_cosine",
     [](double x, double) {
         const leat::detail::sine_and_cosine both = leat::detail::sine_cosine(x);
         return json{bits(both.sine), bits(both.cosine)};
     }},
};

TEST(LawVectors, CoreMathsToTheBit) {
    const json file = vectors();
    std::size_t found = 0;
    for (const auto& [name, rows] : file.items()) {
        if (!name.starts_with("function ")) {
            continue;
        }
        ++found;
        SCOPED_TRACE(name);
        const function f = functions.at(name.substr(9));
        const json& arguments = rows.at(0).at("arguments");
        const json& values = rows.at(0).at("values");
        ASSERT_GT(values.size(), 100u);
        ASSERT_EQ(arguments.size(), values.size());
        for (std::size_t i = 0; i < values.size(); ++i) {
            const auto x = parameter<double>(arguments[i].at(0));
            const double y = arguments[i].size() > 1 ? parameter<double>(arguments[i].at(1)) : 0.0;
            EXPECT_EQ(f(x, y), values[i]) << arguments[i];
        }
    }
    EXPECT_EQ(found, functions.size());
}

} // namespace
