// The uniform law on an interval of reals, by default without its ends.
//
//   leat::uniform u{0.25, 4};      double x = u(g);         // 0.25 < x < 4, always
//   leat::uniform<double, leat::ends::closed_open>{a, b};   // a <= x < b
//   leat::uniform<float>{a, b};
//
// A value is the real number a + (b - a) u rounded once to nearest, u being what `unit` gives for
// the same word; if that is an end that does not belong to the interval, its neighbour inside. No
// rounding reaches an excluded end, and no b - a overflows: {-max, max} works.
//
// One draw consumes one `word64` (float: one `word32`); nothing is rejected.
// Refused: a or b not finite; b not above a; b - a below 2^-960 (float: 2^-100), where subnormal
// numbers would begin to matter; open ends with no number between them.
// Cost, measured over `unit`: under 1 ns for a = 0, 2 ns for most intervals, 30 to 40 ns where the
// exact sum passes 127 bits, as for {1e-6, 1e6}, and 17 ns with closed ends. A call (g, p) prepares
// the interval anew: some 12 ns.
// Not for integers: rounding or truncating a uniform real is biased, see uniform_integer.

#ifndef LEAT_UNIFORM_OPEN_INTERVAL_HPP
#define LEAT_UNIFORM_OPEN_INTERVAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/uniform/detail/interval_map.hpp"
#include "leat/uniform/unit.hpp"

#include <concepts>
#include <cstdint>
#include <iosfwd>
#include <limits>
#include <type_traits>

namespace leat {

template <detail::portable_real Real, ends Ends>
class uniform;

/// The interval between a and b.
template <detail::portable_real Real = double, ends Ends = ends::open>
struct uniform_parameters {
    using distribution_type = uniform<Real, Ends>;
    static constexpr const char* law_name = "uniform";
    /// What tells the kinds apart where they are saved.
    static constexpr const char* variant_name = Ends == ends::open          ? nullptr
                                                : Ends == ends::closed_open ? "closed_open"
                                                : Ends == ends::open_closed ? "open_closed"
                                                                            : "closed";

    Real a = 0; ///< one end
    Real b = 1; ///< the other, above a

    /// Calls visit(name, field) for each of them.
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("a", self.a);
        visit("b", self.b);
    }
    friend constexpr bool operator==(const uniform_parameters&,
                                     const uniform_parameters&) = default;
};

/// Uniform on the interval between a and b.
template <detail::portable_real Real = double, ends Ends = ends::open>
class uniform {
public:
    using result_type = Real;
    using param_type = uniform_parameters<Real, Ends>;

    /// The unit interval.
    constexpr uniform() noexcept : uniform(uniform_parameters<Real, Ends>{}) {}
    /// Takes arithmetic arguments of any type, converted to Real.
    template <class A, class B>
    requires std::is_arithmetic_v<A> && std::is_arithmetic_v<B>
    constexpr uniform(A a, B b) : uniform(uniform_parameters<Real, Ends>{to_real(a), to_real(b)}) {}
    constexpr explicit uniform(const uniform_parameters<Real, Ends>& p) : map_(checked(p).a, p.b) {}

    /// One value.
    template <random_words G>
    [[gnu::always_inline]] constexpr Real operator()(G& g) const {
        const std::uint64_t word = detail::unit_word<Real>(g);
        return map_(word);
    }
    /// The draw whose 64-bit word is `word`, for fills: it decides alone.
    constexpr bool from_word(std::uint64_t word, Real& x) const noexcept {
        x = map_(word);
        return true;
    }
    /// For fills, which have kernels for products.
    [[nodiscard]] constexpr detail::unit_product<Real, Ends> as_product() const noexcept {
        return map_.as_product();
    }
    /// One value of the interval `p`, leaving this one aside.
    template <random_words G>
    constexpr Real operator()(G& g, const param_type& p) const {
        const uniform other(p);
        return other(g);
    }

    [[nodiscard]] constexpr Real a() const noexcept { return map_.a(); }
    [[nodiscard]] constexpr Real b() const noexcept { return map_.b(); }
    [[nodiscard]] constexpr param_type param() const noexcept { return {a(), b()}; }
    /// Changes the interval; a refused one changes nothing.
    constexpr void param(const param_type& p) { *this = uniform(p); }
    /// Nothing to forget: no draw changes a sampler.
    constexpr void reset() noexcept {}

    /// The smallest value a draw can give.
    [[nodiscard]] constexpr Real min() const noexcept { return map_(0); }
    /// The largest value a draw can give.
    [[nodiscard]] constexpr Real max() const noexcept { return map_(~std::uint64_t{0}); }
    [[nodiscard]] constexpr Real mean() const noexcept {
        const detail::strict<Real> half = Real{0.5};
        return (half * a() + half * b()).value;
    }
    /// Infinite where it passes the largest Real.
    [[nodiscard]] constexpr Real variance() const noexcept {
        const detail::strict<Real> half = Real{0.5};
        const detail::strict<Real> radius = half * b() - half * a();
        return (radius * radius / Real{3}).value;
    }

    friend constexpr bool operator==(const uniform& x, const uniform& y) noexcept {
        return x.param() == y.param();
    }

    /// Writes a and b.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const uniform& x) {
        detail::write_real(os, x.a());
        detail::write_char(os, ' ');
        detail::write_real(os, x.b());
        return os;
    }
    /// Reads what << wrote. Anything else, or an interval that would be refused, sets failbit and
    /// leaves `x` as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        uniform& x) {
        double a = 0;
        double b = 0;
        if (detail::read_real(is, a) && detail::read_real(is, b)) {
            const param_type p{to_real(a), to_real(b)};
            // A float's text holds no more digits than a float.
            if (double{p.a} == a && double{p.b} == b && fault_of(p) == fault::none) {
                x = uniform(p);
            } else {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            }
        }
        return is;
    }

private:
    enum class fault { none, a, b, order, width, room };

    template <class T>
    static constexpr Real to_real(T x) noexcept {
        if constexpr (std::same_as<T, Real>) {
            return x;
        } else {
            return static_cast<Real>(x);
        }
    }

    static constexpr bool finite(Real x) noexcept {
        return x >= std::numeric_limits<Real>::lowest() && x <= std::numeric_limits<Real>::max();
    }

    static constexpr fault fault_of(const param_type& p) noexcept {
        if (!finite(p.a)) {
            return fault::a;
        }
        if (!finite(p.b)) {
            return fault::b;
        }
        if (!(p.a < p.b)) {
            return fault::order;
        }
        // The width as rounded to Real decides; one that may overflow is not computed.
        constexpr Real least = std::same_as<Real, double> ? Real(0x1p-960) : Real(0x1p-100f);
        if (p.a > -1 && p.b < 1 && detail::held(p.b - p.a) < least) {
            return fault::width;
        }
        if (Ends == ends::open && detail::next_up(p.a) == p.b) {
            return fault::room;
        }
        return fault::none;
    }

    /// Returns p, or refuses it.
    static constexpr const param_type& checked(const param_type& p) {
        switch (fault_of(p)) {
        case fault::none:
            break;
        case fault::a:
            detail::refuse("uniform", "a", p.a, "must be finite");
        case fault::b:
            detail::refuse("uniform", "b", p.b, "must be finite");
        case fault::order:
            detail::refuse("uniform", "b", p.b, "must be above a");
        case fault::width:
            detail::refuse("uniform", "b - a", detail::held(p.b - p.a),
                           "must be at least 2^-960 (2^-100 for float)");
        case fault::room:
            detail::refuse("uniform", "b", p.b,
                           "must leave room for a number between a and b, as both ends are out");
        }
        return p;
    }

    detail::interval_map<Real, Ends> map_;
};

/// Two numbers of any type give the open interval of doubles: uniform{0, 1}.
template <class A, class B>
requires std::is_arithmetic_v<A> && std::is_arithmetic_v<B> uniform(A, B)
->uniform<double, ends::open>;

} // namespace leat

#endif
