// What a refusal says. The form is the library's promise (P5): "leat::NAME: PARAMETER = VALUE,
// ALLOWED"; the shortest form of a real is checked against the C library's strtod.

#include "leat/core/errors.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <cstdlib>
#include <cstring>
#include <exception>
#include <limits>
#include <random>
#include <string>
#include <type_traits>

namespace {

using leat::detail::message;

template <class Error, class Call>
std::string message_of(Call call) {
    try {
        call();
    } catch (const Error& error) {
        return error.what();
    }
    return "nothing thrown";
}

template <class Value>
std::string refusal_of(Value value) {
    return message_of<leat::invalid_parameter>(
        [value] { leat::detail::refuse("gadget", "size", value, "must be fitting"); });
}

TEST(errors, name_class_parameter_value_and_what_is_allowed) {
    EXPECT_EQ(refusal_of(-7), "leat::gadget: size = -7, must be fitting");
    EXPECT_EQ(refusal_of(std::numeric_limits<std::int64_t>::min()),
              "leat::gadget: size = -9223372036854775808, must be fitting");
    EXPECT_EQ(refusal_of(std::numeric_limits<std::uint64_t>::max()),
              "leat::gadget: size = 18446744073709551615, must be fitting");
    EXPECT_EQ(refusal_of(static_cast<std::uint8_t>(200)),
              "leat::gadget: size = 200, must be fitting");
    EXPECT_EQ(refusal_of(true), "leat::gadget: size = true, must be fitting");
    EXPECT_EQ(refusal_of("seven"), "leat::gadget: size = \"seven\", must be fitting");
    EXPECT_EQ(refusal_of(0.1), "leat::gadget: size = 0.1, must be fitting");
    EXPECT_EQ(refusal_of(-0.0), "leat::gadget: size = -0, must be fitting");
    EXPECT_EQ(refusal_of(0.5f), "leat::gadget: size = 0.5, must be fitting");
    EXPECT_EQ(refusal_of(std::numeric_limits<double>::infinity()),
              "leat::gadget: size = inf, must be fitting");
    EXPECT_EQ(message_of<leat::invalid_parameter>(
                  [] { leat::detail::refuse("gadget", "it is out of order"); }),
              "leat::gadget: it is out of order");
    const std::string stuck = message_of<leat::engine_stuck>([] { leat::detail::stuck("gadget"); });
    EXPECT_EQ(stuck.rfind("leat::gadget: the engine is stuck", 0), 0u) << stuck;
    EXPECT_NE(stuck.find("2^-100"), std::string::npos) << stuck;
}

TEST(errors, shows_nan_as_such) {
    const std::string text = refusal_of(std::numeric_limits<double>::quiet_NaN());
    EXPECT_NE(text.find("nan"), std::string::npos) << text;
}

TEST(errors, gives_reals_in_a_form_that_reads_back) {
    std::mt19937_64 draw{20261201};
    for (int i = 0; i < 2000; ++i) {
        const std::uint64_t bits = draw();
        double x = 0.0;
        std::memcpy(&x, &bits, sizeof x);
        if (!std::isfinite(x)) {
            continue;
        }
        message m;
        m.value(x);
        ASSERT_EQ(std::strtod(m.c_str(), nullptr), x) << m.c_str();
    }
}

TEST(errors, form_one_family) {
    static_assert(std::is_base_of_v<std::exception, leat::error>);
    static_assert(std::is_base_of_v<leat::error, leat::invalid_parameter>);
    static_assert(std::is_base_of_v<leat::error, leat::malformed_text>);
    static_assert(std::is_base_of_v<leat::error, leat::engine_stuck>);
    static_assert(std::is_base_of_v<leat::error, leat::stream_exhausted>);
    // A copy during a throw must not throw itself (ISO C++ [exception]).
    static_assert(std::is_nothrow_copy_constructible_v<leat::invalid_parameter>);
    EXPECT_EQ(message_of<std::exception>([] { leat::detail::refuse("gadget", "no"); }),
              "leat::gadget: no");
}

TEST(errors, cut_what_is_too_long_and_keep_the_beginning) {
    const std::string name(1000, 'x');
    const std::string text = message_of<leat::invalid_parameter>(
        [&] { leat::detail::refuse(name.c_str(), "size", 1, "."); });
    EXPECT_EQ(text.size(), 383u);
    EXPECT_EQ(text, ("leat::" + name).substr(0, 383));
    message m;
    EXPECT_STREQ(m.text("abcdef", 3).hex(0xAB).c_str(), "abc00000000000000ab");
}

} // namespace
