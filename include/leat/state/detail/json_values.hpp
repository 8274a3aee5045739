// The values in a saved document, each written in one form only and read back strictly.
//
//   real     a number; an end that is infinite is the text "infinity" or "-infinity"
//   word     64 bits of state: decimal text, since many readers round numbers above 2^53
//   integer  a number up to 2^53 in size, decimal text beyond
// Anything else is refused with `state_refused`, which names the field.
//
// Saving is not worth inlining: much is marked noinline, which keeps compiling cheap.

#ifndef LEAT_STATE_DETAIL_JSON_VALUES_HPP
#define LEAT_STATE_DETAIL_JSON_VALUES_HPP

#include "leat/core/errors.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/state/detail/json_checksum.hpp" // json_value
#include "leat/state/refused.hpp"

#include <bit>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <string>
#include <string_view>
#include <utility> // move
#include <vector>

namespace leat::detail {

inline constexpr std::int64_t largest_json_integer = std::int64_t{1} << 53;

template <json_value Json>
[[gnu::noinline]] Json word_to_json(std::uint64_t x) {
    std::string digits;
    do {
        digits.insert(digits.begin(), static_cast<char>('0' + static_cast<int>(x % 10)));
        x /= 10;
    } while (x != 0);
    return digits;
}

template <json_value Json, std::integral Int>
[[gnu::noinline]] Json integer_to_json(Int x) {
    if constexpr (std::signed_integral<Int>) {
        if (x < -largest_json_integer) {
            std::string digits = word_to_json<Json>(0 - static_cast<std::uint64_t>(x));
            return "-" + digits;
        }
        if (x <= largest_json_integer) {
            return static_cast<typename Json::number_integer_t>(x);
        }
    } else if (x <= std::uint64_t{largest_json_integer}) {
        return static_cast<typename Json::number_unsigned_t>(x);
    }
    return word_to_json<Json>(static_cast<std::uint64_t>(x));
}

template <json_value Json, std::floating_point Real>
[[gnu::noinline]] Json real_to_json(Real x) {
    if (x > std::numeric_limits<Real>::max()) {
        return "infinity";
    }
    if (x < std::numeric_limits<Real>::lowest()) {
        return "-infinity";
    }
    return static_cast<typename Json::number_float_t>(x);
}

template <json_value Json>
class json_fields;

/// A value that is being read, and where it stands.
template <json_value Json>
class json_field {
public:
    json_field(const Json& value, std::string where) : value_(&value), where_(std::move(where)) {}

    /// A text.
    [[nodiscard, gnu::noinline]] std::string_view text() const {
        const auto* const text = value_->template get_ptr<const typename Json::string_t*>();
        if (text == nullptr) {
            refuse("must be a text");
        }
        return *text;
    }
    [[nodiscard, gnu::noinline]] bool boolean() const {
        if (!value_->is_boolean()) {
            refuse("must be true or false");
        }
        return value_->template get<bool>();
    }
    /// A word of at most `max`.
    [[nodiscard, gnu::noinline]] std::uint64_t word(std::uint64_t max = ~std::uint64_t{0}) const {
        std::uint64_t x = 0;
        if (!value_->is_string() || !parse(text(), x) || x > max) {
            message m;
            refuse(m.text("must be the decimal digits, as a text, of a whole number from 0 to ")
                       .value(max)
                       .c_str());
        }
        return x;
    }
    /// An integer of type Int.
    template <std::integral Int>
    [[nodiscard, gnu::noinline]] Int integer() const {
        std::uint64_t size = 0;
        bool negative = false;
        bool sound = false;
        if (value_->is_string()) {
            std::string_view digits = text();
            negative = digits.starts_with('-');
            digits.remove_prefix(negative ? 1 : 0);
            sound = parse(digits, size) && size > std::uint64_t{largest_json_integer};
        } else if (value_->is_number()) {
            const double x = value_->template get<double>();
            constexpr auto largest = static_cast<double>(largest_json_integer);
            constexpr std::uint64_t minus_zero = std::uint64_t{1} << 63;
            // Another program may have written 2 as 2.0; none writes a whole number as -0.0.
            if (x >= -largest && x <= largest && std::bit_cast<std::uint64_t>(x) != minus_zero &&
                static_cast<double>(static_cast<std::int64_t>(x)) == x) {
                negative = x < 0;
                size = static_cast<std::uint64_t>(negative ? -x : x);
                sound = value_->is_number_float() || size == exact_size();
            }
        }
        constexpr auto most = static_cast<std::uint64_t>(std::numeric_limits<Int>::max());
        if (!sound || size > most + (negative ? 1 : 0) ||
            (negative && !std::signed_integral<Int>)) {
            message m;
            m.text("must be a whole number from ");
            m.value(std::int64_t{std::numeric_limits<Int>::min()}).text(" to ");
            refuse(m.value(most).c_str());
        }
        return static_cast<Int>(negative ? 0 - size : size);
    }
    /// A real number that is a Real, which may be infinite.
    template <std::floating_point Real>
    [[nodiscard, gnu::noinline]] Real real() const {
        if (value_->is_string()) {
            if (text() == "infinity") {
                return std::numeric_limits<Real>::infinity();
            }
            if (text() == "-infinity") {
                return -std::numeric_limits<Real>::infinity();
            }
        } else if (value_->is_number()) {
            const double x = value_->template get<double>();
            // A value out of the type's range would be undefined to convert.
            if (x >= double{std::numeric_limits<Real>::lowest()} &&
                x <= double{std::numeric_limits<Real>::max()} &&
                double{static_cast<Real>(x)} == x) {
                return static_cast<Real>(x);
            }
        }
        refuse(std::same_as<Real, double>
                   ? "must be a finite number, or the text \"infinity\" or \"-infinity\""
                   : "must be a number that a float holds, or the text \"infinity\" or "
                     "\"-infinity\"");
    }
    /// A whole number of any size up to 2^1024.
    [[nodiscard, gnu::noinline]] wide_integer wide() const {
        const std::string_view digits = value_->is_string() ? text() : std::string_view{};
        bool sound = !digits.empty() && digits.size() <= 308 &&
                     (digits.size() == 1 || digits.front() != '0');
        for (const char c : digits) {
            sound = sound && c >= '0' && c <= '9';
        }
        if (!sound) {
            refuse("must be the decimal digits, as a text, of a whole number below 10^308");
        }
        return wide_integer{digits};
    }
    /// Whether it stands for nothing.
    [[nodiscard]] bool is_null() const { return value_->is_null(); }
    /// A T by its own from_json.
    template <class T>
    [[nodiscard]] T other() const {
#if defined(__cpp_exceptions)
        try {
            return value_->template get<T>();
        } catch (const typename Json::exception&) {
            refuse("must be what its own from_json reads");
        }
#else
        return value_->template get<T>();
#endif
    }
    /// The entries of a list.
    [[nodiscard, gnu::noinline]] std::vector<json_field> list() const {
        if (!value_->is_array()) {
            refuse("must be a list");
        }
        std::vector<json_field> entries;
        entries.reserve(value_->size());
        for (const Json& entry : *value_) {
            entries.emplace_back(entry, where_ + "[" + std::to_string(entries.size()) + "]");
        }
        return entries;
    }
    /// The entries of a list that has exactly so many.
    [[nodiscard, gnu::noinline]] std::vector<json_field> list(std::size_t size) const {
        if (!value_->is_array() || value_->size() != size) {
            message m;
            refuse(
                m.text("must be a list of ").value(std::uint64_t{size}).text(" entries").c_str());
        }
        return list();
    }
    /// The members of an object.
    [[nodiscard, gnu::noinline]] json_fields<Json> object() const {
        if (!value_->is_object()) {
            refuse("must be an object");
        }
        return {*value_, where_};
    }

    /// "leat::json: WHERE = FOUND, ALLOWED".
    [[noreturn, gnu::cold, gnu::noinline]] void refuse(const char* allowed) const {
        message m;
        m.text("leat::json: ").text(where_.data(), where_.size() < 120 ? where_.size() : 120);
        m.text(" = ");
        found(m);
        raise<state_refused>(m.text(", ").text(allowed));
    }
    /// Where the value stands, as messages print it.
    [[nodiscard]] const std::string& where() const noexcept { return where_; }

private:
    /// Decimal digits without leading zeros, below 2^64.
    static bool parse(std::string_view digits, std::uint64_t& x) {
        if (digits.empty() || (digits.size() > 1 && digits.front() == '0')) {
            return false;
        }
        x = 0;
        for (const char c : digits) {
            const auto digit = static_cast<std::uint64_t>(c - '0');
            if (c < '0' || c > '9' || x > (~std::uint64_t{0} - digit) / 10) {
                return false;
            }
            x = x * 10 + digit;
        }
        return true;
    }
    /// The size of a number that is held as an integer.
    [[nodiscard]] std::uint64_t exact_size() const {
        if (value_->is_number_unsigned()) {
            return value_->template get<std::uint64_t>();
        }
        const auto x = value_->template get<std::int64_t>();
        return x < 0 ? 0 - static_cast<std::uint64_t>(x) : static_cast<std::uint64_t>(x);
    }
    void found(message& m) const {
        if (value_->is_string()) {
            const std::string_view all = text();
            m.text("\"").text(all.data(), all.size() < 40 ? all.size() : 40);
            m.text(all.size() < 40 ? "\"" : "...\"");
        } else if (value_->is_boolean()) {
            m.value(boolean());
        } else if (value_->is_number_float()) {
            m.value(value_->template get<double>());
        } else if (value_->is_number_unsigned()) {
            m.value(value_->template get<std::uint64_t>());
        } else if (value_->is_number()) {
            m.value(value_->template get<std::int64_t>());
        } else if (value_->is_array()) {
            m.text("a list of ").value(std::uint64_t{value_->size()});
        } else {
            m.text(value_->is_object() ? "an object" : value_->is_null() ? "null" : "binary data");
        }
    }

    const Json* value_;
    std::string where_;
};

/// The members of an object that is being read: each is taken by its name, and at the end none may
/// be left.
template <json_value Json>
class json_fields {
public:
    /// An object's members.
    json_fields(const Json& object, std::string where)
        : object_(&object), where_(std::move(where)) {}
    json_fields(const json_fields&) = default;
    json_fields& operator=(const json_fields&) = default;
    [[gnu::noinline]] ~json_fields() {} // see the head of this file

    /// The member of this name, which must be there.
    [[nodiscard, gnu::noinline]] json_field<Json> take(std::string_view name) {
        const auto at = object_->find(std::string(name));
        if (at == object_->end()) {
            refuse_member("has no field \"", name, "\"");
        }
        taken_.push_back(name);
        return {*at, where_ + ": " + std::string(name)};
    }
    [[nodiscard]] bool has(std::string_view name) const {
        return object_->find(std::string(name)) != object_->end();
    }
    /// Refuses members that were not taken.
    [[gnu::noinline]] void end() const {
        if (object_->size() == taken_.size()) {
            return;
        }
        for (auto at = object_->begin(); at != object_->end(); ++at) {
            bool known = false;
            for (const std::string_view name : taken_) {
                known = known || name == at.key();
            }
            if (!known) {
                refuse_member("has a field \"", at.key(), "\" that is not known here");
            }
        }
    }
    [[nodiscard]] const std::string& where() const noexcept { return where_; }

private:
    [[noreturn, gnu::cold, gnu::noinline]] void
    refuse_member(const char* before, std::string_view name, const char* after) const {
        message m;
        m.text("leat::json: ").text(where_.data(), where_.size() < 120 ? where_.size() : 120);
        m.text(" ").text(before).text(name.data(), name.size() < 40 ? name.size() : 40);
        raise<state_refused>(m.text(after));
    }

    const Json* object_;
    std::string where_;
    std::vector<std::string_view> taken_; // names that outlive this object
};

} // namespace leat::detail

#endif
