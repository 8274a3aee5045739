// The name of a type in a saved document: that of the class, and the template arguments that tell
// its kinds apart. What is usual is left out: double, std::int64_t, open ends.
//
//   normal   normal<float>   poisson<int32>   uniform<float, closed_open>
//   disk     ball<3>         box<2, float>    either<disk, box<2>>
//   xorshift32               lehmer<uint32, 16807, 2147483647>
//   shuffled<lehmer<uint32, 16807, 2147483647>, 256>
//
// A law names itself by law_name in its parameters, an engine by engine_name (and
// engine_parameters), any other class by class_name. The names are frozen with the format.

#ifndef LEAT_STATE_DETAIL_TYPE_NAME_HPP
#define LEAT_STATE_DETAIL_TYPE_NAME_HPP

#include "leat/core/concepts.hpp" // portable_real

#include <concepts>
#include <cstddef>
#include <string>
#include <type_traits>

namespace leat::detail {

template <class T>
concept named_law = requires {
    T::param_type::law_name;
    requires std::same_as<typename T::param_type::distribution_type, T>;
};

template <class T>
concept named_class = requires {
    T::class_name;
};

template <class T>
concept named_engine = requires {
    T::engine_name;
};

template <class T>
concept named_type = named_law<T> || named_class<T> || named_engine<T>;

template <named_type T>
std::string type_name();

/// A list of template arguments, as it grows.
class name_arguments {
public:
    [[gnu::noinline]] void add(const char* argument) {
        text_ += text_.empty() ? "<" : ", ";
        text_ += argument;
    }
    /// A number type; one of the usual ones is nothing.
    template <class Number>
    void add_number() {
        if constexpr (std::same_as<Number, float>) {
            add("float");
        } else if constexpr (std::integral<Number> && !std::same_as<Number, bool> &&
                             !(std::is_signed_v<Number> && sizeof(Number) == 8)) {
            add_integer<Number>();
        }
    }
    /// An integer type by its sign and width: int and long differ from system to system.
    template <std::integral Int>
    void add_integer() {
        add((std::is_signed_v<Int> ? "int" : "uint") + std::to_string(8 * sizeof(Int)));
    }
    /// A type, if it has a name.
    template <class T>
    void add_type() {
        if constexpr (named_type<T>) {
            add(type_name<T>());
        }
    }
    void add(const std::string& argument) { add(argument.c_str()); }
    /// The class's name with the list, in angle brackets, if anything is in it.
    [[nodiscard, gnu::noinline]] std::string after(const char* name) const {
        return text_.empty() ? name : name + text_ + ">";
    }

private:
    std::string text_;
};

/// The template arguments of a class: of a sampler its number type, ...
template <class T>
struct class_arguments {
    static void list(name_arguments& all) {
        if constexpr (requires { typename T::real_type; }) {
            all.add_number<typename T::real_type>();
        } else if constexpr (requires { typename T::result_type; }) {
            all.add_number<typename T::result_type>();
        }
    }
};

/// ... of one in N dimensions these too, ...
template <template <std::size_t, portable_real> class Region, std::size_t N, class Real>
struct class_arguments<Region<N, Real>> {
    static void list(name_arguments& all) {
        all.add(std::to_string(N));
        all.add_number<Real>();
    }
};

/// ... and of one made of others theirs; a predicate has no name.
template <template <class...> class Combination, named_type Part, class... Parts>
struct class_arguments<Combination<Part, Parts...>> {
    static void list(name_arguments& all) {
        all.add_type<Part>();
        (all.add_type<Parts>(), ...);
    }
};

/// The template arguments of an engine: its parameters, or ...
template <class T>
struct engine_arguments {
    static void list(name_arguments& all) {
        if constexpr (requires { T::engine_parameters; }) {
            all.add_integer<std::remove_cvref_t<decltype(T::engine_parameters[0])>>();
            for (const auto parameter : T::engine_parameters) {
                all.add(std::to_string(parameter));
            }
        }
    }
};

/// ... the engine that it wraps, and perhaps a size.
template <template <class> class Adaptor, named_engine Engine>
struct engine_arguments<Adaptor<Engine>> {
    static void list(name_arguments& all) { all.add_type<Engine>(); }
};

template <template <class, std::size_t> class Adaptor, named_engine Engine, std::size_t K>
struct engine_arguments<Adaptor<Engine, K>> {
    static void list(name_arguments& all) {
        all.add_type<Engine>();
        all.add(std::to_string(K));
    }
};

template <template <class, class, std::size_t> class Adaptor, class Engine, class Selector,
          std::size_t K>
struct engine_arguments<Adaptor<Engine, Selector, K>> {
    static void list(name_arguments& all) {
        all.add_type<Engine>();
        all.add_type<Selector>();
        all.add(std::to_string(K));
    }
};

/// The name of a type.
template <named_type T>
std::string type_name() {
    name_arguments arguments;
    if constexpr (named_law<T>) {
        using parameters = typename T::param_type;
        using result = typename T::result_type;
        if constexpr (requires { typename result::value_type; }) { // of a law of several dimensions
            arguments.add_number<typename result::value_type>();
        } else {
            arguments.add_number<result>();
        }
        if constexpr (requires { parameters::variant_name; }) {
            if (parameters::variant_name != nullptr) {
                arguments.add(parameters::variant_name);
            }
        }
        return arguments.after(parameters::law_name);
    } else if constexpr (named_engine<T>) {
        engine_arguments<T>::list(arguments);
        return arguments.after(T::engine_name);
    } else {
        class_arguments<T>::list(arguments);
        return arguments.after(T::class_name);
    }
}

} // namespace leat::detail

#endif
