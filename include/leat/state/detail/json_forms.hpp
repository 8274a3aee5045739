// How objects become the content of a document, and back.
//
//   a law       its parameters by name                {"mean": 1, "sd": 2}
//   an engine   the words of its text, in order       {"state": ["1", "2", "3", "4"]}
//   a class     its constructor's arguments by name   {"centre": [3, 4], "radius": 2.5}
//               or, of a class made of others, a list {"parts": [{...}, {...}]}
//
// What a type must have for that stands in type_name.hpp. An argument is a number, true or false, a
// list, null for an optional one that is not there, an object of one of these kinds, or a class of
// the user's: one without members (a predicate) is null, any other is left to its own to_json and
// from_json.

#ifndef LEAT_STATE_DETAIL_JSON_FORMS_HPP
#define LEAT_STATE_DETAIL_JSON_FORMS_HPP

#include "leat/core/wide_integer.hpp"
#include "leat/state/detail/json_values.hpp"
#include "leat/state/detail/restoring.hpp"
#include "leat/state/detail/type_name.hpp"
#include "leat/streams/distance.hpp" // print a wide integer

#include <array>
#include <concepts>
#include <cstddef>
#include <istream> // ws
#include <optional>
#include <sstream>
#include <string>
#include <type_traits>
#include <utility> // forward, index_sequence
#include <vector>

namespace leat::detail {

/// How a T is saved: write<Json>(x) gives the content of a document, and read(fields) makes a T of
/// one. Where the type does not name itself (type_name.hpp), also `name`.
template <class T>
struct saved_form;

/// A type that has a form.
template <class T>
concept saved = requires {
    sizeof(saved_form<T>);
};

template <class T>
struct is_list : std::false_type {};
template <class T>
struct is_list<std::vector<T>> : std::true_type {};
template <class T, std::size_t N>
struct is_list<std::array<T, N>> : std::true_type {};

template <class T>
inline constexpr bool is_optional = false;
template <class T>
inline constexpr bool is_optional<std::optional<T>> = true;

/// An argument as a value in a document.
template <json_value Json, class T>
Json to_value(const T& x) {
    if constexpr (std::same_as<T, bool>) {
        return x;
    } else if constexpr (std::integral<T>) {
        return integer_to_json<Json>(x);
    } else if constexpr (std::floating_point<T>) {
        return real_to_json<Json>(x);
    } else if constexpr (std::same_as<T, wide_integer>) {
        message m;
        return print(m, x).c_str();
    } else if constexpr (is_optional<T>) {
        return x ? to_value<Json>(*x) : Json(nullptr);
    } else if constexpr (is_list<T>::value) {
        Json list = Json::array();
        for (const auto& entry : x) {
            list.push_back(to_value<Json>(entry));
        }
        return list;
    } else if constexpr (saved<T>) {
        return saved_form<T>::template write<Json>(x);
    } else if constexpr (std::is_empty_v<T> && std::default_initializable<T>) {
        return nullptr;
    } else {
        return x; // the user's to_json
    }
}

/// The argument that a value stands for.
template <class T, json_value Json>
T from_value(const json_field<Json>& field) {
    if constexpr (std::same_as<T, bool>) {
        return field.boolean();
    } else if constexpr (std::integral<T>) {
        return field.template integer<T>();
    } else if constexpr (std::floating_point<T>) {
        return field.template real<T>();
    } else if constexpr (std::same_as<T, wide_integer>) {
        return field.wide();
    } else if constexpr (is_optional<T>) {
        return field.is_null() ? T{} : T{from_value<typename T::value_type>(field)};
    } else if constexpr (saved<T>) {
        json_fields<Json> fields = field.object();
        T x = saved_form<T>::read(fields);
        fields.end();
        return x;
    } else if constexpr (std::is_empty_v<T> && std::default_initializable<T>) {
        if (!field.is_null()) {
            field.refuse("must be null");
        }
        return T{};
    } else {
        return field.template other<T>();
    }
}

template <class T, json_value Json>
requires is_list<T>::value T from_value(const json_field<Json>& field) {
    using entry = typename T::value_type;
    if constexpr (requires(T x, entry e) { x.push_back(e); }) {
        T list;
        for (const json_field<Json>& one : field.list()) {
            list.push_back(from_value<entry>(one));
        }
        return list;
    } else {
        T list{};
        const auto entries = field.list(list.size());
        for (std::size_t i = 0; i < list.size(); ++i) {
            list[i] = from_value<entry>(entries[i]);
        }
        return list;
    }
}

/// Gives an object a member. Out of line, as its opposite, so that a type with many fields adds
/// little code of its own.
template <json_value Json, class T>
[[gnu::noinline]] void put(Json& object, const char* name, const T& x) {
    object[name] = to_value<Json>(x);
}

/// Takes a member.
template <class T, json_value Json>
[[gnu::noinline]] T take(json_fields<Json>& fields, const char* name) {
    return from_value<T>(fields.take(name));
}

/// A law, by its parameters.
template <named_law T>
struct saved_form<T> {
    using parameters = typename T::param_type;

    template <json_value Json>
    static Json write(const T& x) {
        Json content = Json::object();
        const parameters p = x.param();
        parameters::each(p,
                         [&](const char* name, const auto& field) { put(content, name, field); });
        return content;
    }
    template <json_value Json>
    static T read(json_fields<Json>& fields) {
        parameters p{};
        parameters::each(p, [&](const char* name, auto& field) {
            field = take<std::remove_reference_t<decltype(field)>>(fields, name);
        });
        return restoring(fields.where(), [&] { return T(p); });
    }
};

/// The words of an engine's text, as the content of a document.
template <json_value Json>
[[gnu::noinline]] Json state_content(const std::string& text) {
    std::istringstream in(text);
    Json words = Json::array();
    for (std::string word; in >> word;) {
        words.push_back(word);
    }
    Json content = Json::object();
    content["state"] = std::move(words);
    return content;
}

/// Such words as text.
template <json_value Json>
[[gnu::noinline]] std::string state_text(const json_field<Json>& state) {
    std::string text;
    for (const json_field<Json>& word : state.list()) {
        text += std::to_string(word.word()) + " ";
    }
    return text;
}

/// An engine, by the words of its text.
template <named_engine T>
struct saved_form<T> {
    template <json_value Json>
    static Json write(const T& x) {
        std::ostringstream out;
        out << x;
        return state_content<Json>(out.str());
    }
    template <json_value Json>
    static T read(json_fields<Json>& fields) {
        const json_field<Json> state = fields.take("state");
        std::istringstream in(state_text(state));
        T engine = [] {
            if constexpr (requires { T::for_reading(); }) {
                return T::for_reading();
            } else {
                return T{};
            }
        }();
        in >> engine;
        if (in.fail() || !(in >> std::ws).eof()) {
            state.refuse("must be the words of a state that the engine can be in");
        }
        return engine;
    }
};

/// Any other class, by its constructor's arguments.
template <named_class T>
struct saved_form<T> {
    template <json_value Json>
    static Json write(const T& x) {
        Json content = Json::object();
        x.arguments([&](const auto&... arguments) {
            if constexpr (requires { T::list_name; }) {
                Json list = Json::array();
                (list.push_back(to_value<Json>(arguments)), ...);
                content[T::list_name] = std::move(list);
            } else if constexpr (requires { T::argument_names; }) {
                std::size_t i = 0;
                (put(content, T::argument_names[i++], arguments), ...);
            }
        });
        return content;
    }
    template <json_value Json>
    static T read(json_fields<Json>& fields) {
        return read_arguments(fields, static_cast<argument_types*>(nullptr),
                              typename argument_types::numbers{});
    }

private:
    template <class... Types>
    struct types {
        using numbers = std::index_sequence_for<Types...>;
    };
    struct listed {
        template <class... Arguments>
        types<std::remove_cvref_t<Arguments>...> operator()(const Arguments&...) const {
            return {};
        }
    };
    using argument_types = decltype(std::declval<const T&>().arguments(listed{}));

    template <json_value Json, class... Types, std::size_t... I>
    static T read_arguments(json_fields<Json>& fields, types<Types...>*,
                            std::index_sequence<I...>) {
        if constexpr (requires { T::list_name; }) {
            const std::vector<json_field<Json>> parts =
                fields.take(T::list_name).list(sizeof...(Types));
            return restoring(fields.where(), [&] { return T(from_value<Types>(parts[I])...); });
        } else {
            return restoring(fields.where(), [&] {
                if constexpr (requires { &T::from_arguments; }) {
                    return T::from_arguments(take<Types>(fields, T::argument_names[I])...);
                } else {
                    return T(take<Types>(fields, T::argument_names[I])...);
                }
            });
        }
    }
};

} // namespace leat::detail

#endif
