// The law whose density runs in straight lines between given points: densities[i] at points[i], up
// to a common factor, and 0 outside; measured or drawn densities.
//
//   leat::piecewise_linear arrivals({0, 6, 9, 24}, {0, 1, 5, 0.5});
//
// Domain: as many points as densities, at least 2; points finite, ascending, their whole width
// finite; densities finite and >= 0, with a positive area below them; anything else throws
// invalid_parameter, which names the entry. The densities need not be normalised. A draw takes two
// word64 and constant time: an interval by an alias table over the areas (chances right to about
// 2^-64), then a place in it by inversion. An interval without area is never drawn. Draws lie in
// [points[i], points[i + 1]) of their interval. Constructing, moments, `density`, `cumulative` and
// `quantile` are linear in the number of points. A float is computed as a double and rounded.
// Source: ISO C++ [rand.dist.samp.plinear] (the law); Walker, ACM TOMS 3(3), 1977 (the table).
// Not for steps (categorical, then uniform), nor for the values themselves (empirical).

#ifndef LEAT_DISTRIBUTIONS_PIECEWISE_LINEAR_HPP
#define LEAT_DISTRIBUTIONS_PIECEWISE_LINEAR_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/alias_table.hpp"
#include "leat/uniform/detail/interval_map.hpp" // next_up
#include "leat/uniform/unit.hpp"

#include <cstddef>
#include <cstdint>
#include <utility> // move
#include <vector>

namespace leat {

template <detail::portable_real Real>
class piecewise_linear;

namespace detail {

/// The straight line over one interval, with its ends' heights as shares: left + right = 1.
struct sloping_line {
    double left;
    double right;

    /// How far into the interval (0 to 1) the part u of its area reaches, 0 < u < 1.
    [[nodiscard]] constexpr double place(double u) const noexcept {
        using real = strict<double>;
        const real square = (real(1.0) - u) * (real(left) * left) + real(u) * (real(right) * right);
        return (real(u) / (real(left) + square_root(square.value))).value;
    }
    /// Which part of the area lies before t, 0 <= t <= 1.
    [[nodiscard]] constexpr double part(double t) const noexcept {
        using real = strict<double>;
        return (real(t) * ((real(2.0) - t) * left + real(t) * right)).value;
    }
};

/// Calls visit(area, line) for every interval, unless all densities are 0; the area is in units of
/// (the largest density) x (the whole width).
template <class Real, class Visit>
constexpr void each_line(const std::vector<Real>& points, const std::vector<Real>& densities,
                         Visit visit) {
    using real = strict<double>;
    Real highest = 0;
    for (const Real density : densities) {
        highest = density > highest ? density : highest;
    }
    if (highest == 0) {
        return;
    }
    const auto point = [&](std::size_t i) { return real(static_cast<double>(points[i])); };
    const auto height = [&](std::size_t i) {
        return quotient(static_cast<double>(densities[i]), static_cast<double>(highest));
    };
    const double whole_width = (point(points.size() - 1) - point(0)).value;
    for (std::size_t i = 0; i + 1 < points.size(); ++i) {
        const real sum = real(height(i)) + height(i + 1);
        const real width = point(i + 1) - point(i);
        if (sum.value > 0) {
            const double area = product((sum * 0.5).value, quotient(width.value, whole_width));
            visit(area,
                  sloping_line{quotient(height(i), sum.value), quotient(height(i + 1), sum.value)});
        } else {
            visit(0.0, sloping_line{0.5, 0.5});
        }
    }
}

} // namespace detail

/// The parameters of `piecewise_linear`.
template <detail::portable_real Real = double>
struct piecewise_linear_parameters {
    using distribution_type = piecewise_linear<Real>;
    static constexpr const char* law_name = "piecewise_linear";

    std::vector<Real> points{0, 1};    ///< at least two, ascending
    std::vector<Real> densities{1, 1}; ///< one at each point, >= 0, not all 0; any area

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (points.size() < 2) {
            return {"size of points", static_cast<double>(points.size()), "must be at least 2"};
        }
        if (densities.size() != points.size()) {
            return {"size of densities", static_cast<double>(densities.size()),
                    "must be the number of points"};
        }
        for (std::size_t i = 0; i < points.size(); ++i) {
            const auto point = static_cast<double>(points[i]);
            if (!detail::finite(point) || (i > 0 && !(points[i - 1] < points[i]))) {
                return {"points", point, "must be finite and above the point before", i};
            }
            const auto density = static_cast<double>(densities[i]);
            if (!detail::finite(density) || density < 0) {
                return {"densities", density, "must be finite and >= 0", i};
            }
        }
        const double width =
            detail::held(static_cast<double>(points.back()) - static_cast<double>(points.front()));
        if (!detail::finite(width)) {
            return {"last of points", static_cast<double>(points.back()),
                    "must lie above the first by no more than the largest finite number"};
        }
        double area = 0;
        detail::each_line(points, densities, [&area](double one, const detail::sloping_line&) {
            area = detail::held(area + one);
        });
        return area > 0x1p-900 ? detail::fault{}
                               : detail::fault{"area below densities", area,
                                               "must be above 2^-900 of the largest density over "
                                               "the whole width"};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("points", self.points);
        visit("densities", self.densities);
    }
    friend bool operator==(const piecewise_linear_parameters&,
                           const piecewise_linear_parameters&) = default;
};

/// The law of a piecewise linear density.
template <detail::portable_real Real = double>
class piecewise_linear
    : public detail::law<piecewise_linear<Real>, piecewise_linear_parameters<Real>> {
    using base = detail::law<piecewise_linear, piecewise_linear_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Uniform on [0, 1).
    constexpr piecewise_linear() : piecewise_linear(param_type{}) {}
    constexpr piecewise_linear(std::vector<Real> points, std::vector<Real> densities)
        : piecewise_linear(param_type{std::move(points), std::move(densities)}) {}
    constexpr explicit piecewise_linear(const param_type& p)
        : base(p),
          areas_(areas_of(p)),
          lines_(lines_of(p)),
          table_(areas_),
          total_(sum_of(areas_)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const std::size_t i = table_(g);
        const std::uint64_t word = word64(g);
        return inside<Real>(i, lines_[i].place(detail::open_unit(word)));
    }

    [[nodiscard]] constexpr const std::vector<Real>& points() const noexcept {
        return this->param().points;
    }
    /// As they were given, not normalised.
    [[nodiscard]] constexpr const std::vector<Real>& densities() const noexcept {
        return this->param().densities;
    }
    /// The expectation.
    [[nodiscard]] constexpr double mean() const noexcept {
        const real width = whole_width();
        return (real(point(0)) + width * mean_share()).value;
    }
    /// The variance. Saturates at the ends of double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        const real centre = mean_share();
        real sum = 0.0;
        for (std::size_t i = 0; i < lines_.size(); ++i) {
            const real right = lines_[i].right;
            const real width = share_of_width(point(i), point(i + 1));
            const real distance =
                (real(share_of_width(point(0), point(i))) - centre) + width * centroid(i);
            // (left^2 + 4 left right + right^2) / 18, about the centroid of the trapezium
            const real own = (real(1.0) + real(2.0) * right * lines_[i].left) / 18.0;
            sum = sum + real(areas_[i]) * (distance * distance + width * width * own);
        }
        const detail::scaled width = detail::split(whole_width());
        return (detail::split((sum / total_).value) * width * width).value();
    }
    [[nodiscard]] constexpr Real min() const noexcept { return points().front(); }
    [[nodiscard]] constexpr Real max() const noexcept { return points().back(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const std::size_t i = interval_of(x);
        const double t = share_of_interval(i, x);
        const detail::sloping_line& line = lines_[i];
        // twice the mean height of the interval, times the line
        const real height =
            real(areas_[i]) / total_ * 2.0 * ((real(1.0) - t) * line.left + real(t) * line.right);
        const double width = (real(point(i + 1)) - point(i)).value;
        return height.value > 0 ? detail::or_zero(detail::split(height.value) *
                                                  detail::inverse(detail::split(width)))
                                : 0;
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x < point(0) ? 0 : 1;
        }
        const std::size_t i = interval_of(x);
        real sum = 0.0;
        for (std::size_t before = 0; before < i; ++before) {
            sum = sum + areas_[before];
        }
        sum = sum + real(areas_[i]) * lines_[i].part(share_of_interval(i, x));
        return sum.value < total_ ? (sum / total_).value : 1;
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double target =
            detail::product(detail::chance_or_refuse(param_type::law_name, p), total_);
        real before = 0.0;
        std::size_t i = 0;
        std::size_t last = 0; // with an area
        for (; i < areas_.size(); ++i) {
            if (areas_[i] > 0) {
                last = i;
                if (!((before + areas_[i]).value < target)) {
                    break;
                }
            }
            before = before + areas_[i];
        }
        if (i == areas_.size()) { // by rounding alone
            return inside<double>(last, 1);
        }
        const real part = (real(target) - before) / areas_[i];
        return inside<double>(i, part.value > 0 ? lines_[i].place(part.value) : 0);
    }

private:
    static LEAT_VECTOR_CONSTEXPR std::vector<double> areas_of(const param_type& p) {
        std::vector<double> areas;
        detail::each_line(p.points, p.densities,
                          [&](double area, const detail::sloping_line&) { areas.push_back(area); });
        return areas;
    }
    static LEAT_VECTOR_CONSTEXPR std::vector<detail::sloping_line> lines_of(const param_type& p) {
        std::vector<detail::sloping_line> lines;
        detail::each_line(p.points, p.densities,
                          [&](double, const detail::sloping_line& line) { lines.push_back(line); });
        return lines;
    }
    static constexpr double sum_of(const std::vector<double>& areas) noexcept {
        real sum = 0.0;
        for (const double area : areas) {
            sum = sum + area;
        }
        return sum.value;
    }

    constexpr double point(std::size_t i) const noexcept {
        return static_cast<double>(points()[i]);
    }
    constexpr double whole_width() const noexcept {
        return detail::held(point(points().size() - 1) - point(0));
    }
    constexpr double share_of_width(double from, double to) const noexcept {
        const double width = detail::held(to - from);
        return width > 0 ? detail::quotient(width, whole_width()) : 0;
    }
    /// Of the area of interval i, as a share of its width: (left + 2 right) / 3.
    constexpr double centroid(std::size_t i) const noexcept {
        return ((real(1.0) + lines_[i].right) / 3.0).value;
    }
    constexpr double mean_share() const noexcept {
        real sum = 0.0;
        for (std::size_t i = 0; i < lines_.size(); ++i) {
            sum = sum +
                  real(areas_[i]) * (real(share_of_width(point(0), point(i))) +
                                     real(share_of_width(point(i), point(i + 1))) * centroid(i));
        }
        return (sum / total_).value;
    }
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) >= point(0) &&
               x < point(points().size() - 1);
    }
    constexpr std::size_t interval_of(double x) const noexcept {
        std::size_t i = 0;
        while (!(x < point(i + 1))) {
            ++i;
        }
        return i;
    }
    constexpr double share_of_interval(std::size_t i, double x) const noexcept {
        const double part = detail::held(x - point(i));
        return part > 0 ? detail::quotient(part, detail::held(point(i + 1) - point(i))) : 0;
    }
    /// The point t of the way through interval i, kept before its end.
    template <class Result>
    constexpr Result inside(std::size_t i, double t) const noexcept {
        const real start = point(i);
        const auto x =
            detail::into_signed<Result>((start + (real(point(i + 1)) - start) * t).value);
        const auto first = static_cast<Result>(start.value);
        const auto last = static_cast<Result>(point(i + 1));
        return x < first ? first : x < last ? x : -detail::next_up(static_cast<Result>(-last));
    }

    std::vector<double> areas_; // in units of (the largest density) x (the whole width)
    std::vector<detail::sloping_line> lines_;
    detail::alias_table<> table_;
    double total_;
};

piecewise_linear(std::vector<double>, std::vector<double>)->piecewise_linear<>;

} // namespace leat

#endif
