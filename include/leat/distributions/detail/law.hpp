// What every one-dimensional law has in common: the members of ISO C++ [rand.req.dist] that need
// only its parameters.
//
// A law `L` derives from `law<L, P>`, where its parameters P are an aggregate with
//     using distribution_type = L;
//     static constexpr const char* law_name = "...";          as messages print it
//     constexpr detail::fault fault() const noexcept;         what is wrong with them, if anything
//     template <class Self, class Visit> static constexpr void each(Self&, Visit);   its fields:
//         visit("NAME", field) for each in turn
// and a defaulted ==. It adds result_type, operator()(g), accessors, min, max, mean and variance,
// and writes `using base::operator();`.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_LAW_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_LAW_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"

#include <concepts>
#include <cstdint>
#include <limits>
#include <type_traits>

namespace leat::detail {

/// A number of any kind, as an argument for a real parameter.
template <class T>
concept number = std::is_arithmetic_v<T> && !std::same_as<T, bool>;

/// What is wrong with a law's parameters: nothing, where `parameter` is null.
struct fault {
    static constexpr std::uint64_t no_entry = std::numeric_limits<std::uint64_t>::max();

    const char* parameter = nullptr;
    double value = 0;
    const char* allowed = nullptr;
    std::uint64_t entry = no_entry;  // which one, where the parameter is a list
    std::uint64_t column = no_entry; // and of which column, where it is a matrix
};

/// True for neither infinite nor NaN.
constexpr bool finite(double x) noexcept {
    return x >= std::numeric_limits<double>::lowest() && x <= std::numeric_limits<double>::max();
}

/// The fault of a parameter that must be finite.
constexpr fault unless_finite(const char* parameter, double x) noexcept {
    return finite(x) ? fault{} : fault{parameter, x, "must be finite"};
}

/// The fault of a parameter that must be finite and positive.
constexpr fault unless_positive(const char* parameter, double x) noexcept {
    return finite(x) && x > 0 ? fault{} : fault{parameter, x, "must be finite and > 0"};
}

/// The fault of a parameter that must be finite and not negative.
constexpr fault unless_non_negative(const char* parameter, double x) noexcept {
    return finite(x) && x >= 0 ? fault{} : fault{parameter, x, "must be finite and >= 0"};
}

/// The first of two faults.
constexpr fault first_of(fault a, fault b) noexcept { return a.parameter != nullptr ? a : b; }

/// A parameter that is a list of numbers.
template <class Field>
concept list_field = requires(Field& x) {
    x.push_back(x[0]);
};

/// Writes a field of a law's parameters: reals as the hex digits of their bits, a list as its
/// length and then its entries.
template <class Char, class Traits, class Field>
void write_field(std::basic_ostream<Char, Traits>& os, const Field& x) {
    if constexpr (list_field<Field>) {
        write_unsigned(os, x.size());
        for (const auto& entry : x) {
            write_char(os, ' ');
            write_field(os, entry);
        }
    } else if constexpr (std::floating_point<Field>) {
        write_real(os, static_cast<double>(x));
    } else {
        write_unsigned(os, static_cast<std::uint64_t>(x));
    }
}

/// Reads a field, or sets failbit: also where a float's text holds more than a float.
template <class Char, class Traits, class Field>
void read_field(std::basic_istream<Char, Traits>& is, Field& x) {
    if constexpr (list_field<Field>) {
        x.clear();
        std::uint64_t left = 0;
        // One by one: a false length must not ask for memory.
        for (read_unsigned(is, std::numeric_limits<std::uint64_t>::max(), left);
             left > 0 && !is.fail(); --left) {
            typename Field::value_type entry{};
            read_field(is, entry);
            x.push_back(entry);
        }
    } else if constexpr (std::floating_point<Field>) {
        double wide = 0;
        if (read_real(is, wide)) {
            // A value out of the type's range would be undefined to convert.
            const bool fits = !finite(wide) ||
                              (wide >= static_cast<double>(std::numeric_limits<Field>::lowest()) &&
                               wide <= static_cast<double>(std::numeric_limits<Field>::max()));
            if (fits && static_cast<double>(static_cast<Field>(wide)) == wide) {
                x = static_cast<Field>(wide);
            } else {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            }
        }
    } else {
        std::uint64_t wide = 0;
        if (read_unsigned(is, static_cast<std::uint64_t>(std::numeric_limits<Field>::max()),
                          wide)) {
            x = static_cast<Field>(wide);
        }
    }
}

/// The common base of laws (see above).
template <class Law, class Parameters>
class law {
public:
    using param_type = Parameters;

    /// The parameters.
    [[nodiscard]] constexpr const param_type& param() const noexcept { return parameters_; }
    /// Takes other parameters; refused ones leave the law as it was.
    constexpr void param(const param_type& p) { self() = Law(p); }
    /// ISO's promise that what follows does not depend on earlier draws: always so, laws hold none.
    constexpr void reset() const noexcept {}

    /// A draw with the given parameters instead of its own.
    template <random_words G>
    [[nodiscard]] constexpr auto operator()(G& g, const param_type& p) const {
        return Law(p)(g);
    }

    friend constexpr bool operator==(const Law& a, const Law& b) noexcept {
        return a.param() == b.param();
    }

    /// Writes the parameters, exactly and in any locale, one space between two.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const Law& x) {
        bool first = true;
        Parameters::each(x.param(), [&](const char*, const auto& field) {
            if (!first) {
                write_char(os, ' ');
            }
            first = false;
            write_field(os, field);
        });
        return os;
    }
    /// Reads what << wrote; garbage and refused parameters set failbit and leave the law as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        Law& x) {
        Parameters p{};
        Parameters::each(p, [&](const char*, auto& field) { read_field(is, field); });
        if (!is.fail()) {
            if (p.fault().parameter == nullptr) {
                x.param(p);
            } else {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            }
        }
        return is;
    }

protected:
    /// Refuses what `fault` finds.
    constexpr explicit law(const param_type& p) : parameters_(p) {
        const fault found = p.fault();
        if (found.parameter != nullptr) {
            if (found.column != fault::no_entry) {
                refuse_entry(Parameters::law_name, found.parameter, found.entry, found.column,
                             found.value, found.allowed);
            }
            if (found.entry != fault::no_entry) {
                refuse_entry(Parameters::law_name, found.parameter, found.entry, found.value,
                             found.allowed);
            }
            refuse(Parameters::law_name, found.parameter, found.value, found.allowed);
        }
    }

private:
    constexpr Law& self() noexcept { return static_cast<Law&>(*this); }

    param_type parameters_;
};

} // namespace leat::detail

#endif
