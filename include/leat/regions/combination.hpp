// Regions made of regions: a disjoint union, and what is left of one outside another.
//
//   leat::either fields{leat::disk{{0, 0}, 2}, leat::box{{5, 0}, {7, 3}}};
//   leat::without lease{leat::ellipse{{0, 0}, 7.5, 4}, leat::disk{{1, 1}, 0.5}};
//
// either: a part is chosen by its share of the measure, then a point of it. Parts must not overlap,
// or where they do points are denser; that is not checked. All have the same point type and measure
// the same thing. A part is chosen in integers: each gets its number of the 2^64 words, within two.
// without: the first region's points, drawn until one lies outside the second (rejection.hpp); the
// second need not lie inside the first. Its measure is known only where it is given.
//
// Words: either, one word64 for the choice, then those of the part; without, those of the first
// region a trial. Errors: invalid_parameter, as where a part's measure does not fit in its type;
// engine_stuck where less than 1/10000 is left.
// Not for thousands of parts of one kind (polygon, triangle_mesh, polyline).

#ifndef LEAT_REGIONS_COMBINATION_HPP
#define LEAT_REGIONS_COMBINATION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/detail/dimension.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/rejection.hpp"
#include "leat/uniform/alias_table.hpp" // whole_weights
#include "leat/uniform/words.hpp"

#include <array>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <optional>
#include <tuple>
#include <type_traits>

namespace leat {

/// The points of any of some regions that do not overlap.
template <class First, class... Others>
class either : public detail::region_base<either<First, Others...>, typename First::real_type,
                                          First::dimension, detail::measured_dimension_of<First>> {
    static_assert((std::same_as<typename First::point_type, typename Others::point_type> && ...),
                  "leat::either: all parts need the same type of points");
    static_assert(((detail::measured_dimension_of<First> ==
                    detail::measured_dimension_of<Others>)&&...),
                  "leat::either: a length, an area and a volume cannot be shared out together");
    using Real = typename First::real_type;
    static constexpr std::size_t parts = 1 + sizeof...(Others);

public:
    using point_type = typename First::point_type;

    /// Of parts that do not overlap: where they do, points would be twice as likely.
    explicit constexpr either(const First& first, const Others&... others)
        : regions_(first, others...) {
        this->bounds_ = first.bounds();
        const auto include = [this](const auto& box) {
            detail::extend(this->bounds_, box.low);
            detail::extend(this->bounds_, box.high);
        };
        (include(others.bounds()), ...);
        const std::array<double, parts> measures{double{first.measure()},
                                                 double{others.measure()}...};
        for (std::size_t i = 0; i < parts; ++i) {
            constexpr double most = double{std::numeric_limits<Real>::max()};
            constexpr double least = double{std::numeric_limits<Real>::min()};
            if (!(measures[i] > least && measures[i] < most)) { // it saturates there
                detail::refuse_entry("either", "measure", i, measures[i],
                                     "must fit in the type of its region");
            }
        }
        const detail::whole_weights weights(measures);
        detail::word_pair sum{0, 0};
        detail::strict<double> total = 0.0;
        for (std::size_t i = 0; i < parts; ++i) {
            sum = detail::add(sum, weights(measures[i]));
            ends_[i] = sum == weights.total() ? ~std::uint64_t{0} : weights.share(sum);
            total = total + measures[i];
        }
        if (!(total <= double{std::numeric_limits<Real>::max()})) {
            detail::refuse("either", "the measures of the parts must have a finite sum");
        }
        measure_ = detail::rounded<Real>(total);
    }

    /// A point uniform by measure.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        const std::uint64_t word = word64(g);
        return draw_from<0>(word, g);
    }

    /// Whether p is in a part.
    [[nodiscard]] constexpr bool contains(const point_type& p) const {
        return std::apply([&p](const auto&... part) { return (part.contains(p) || ...); },
                          regions_);
    }

    /// The sum of the parts' measures.
    [[nodiscard]] constexpr Real measure() const noexcept { return measure_; }

    /// The parts, as a std::tuple.
    [[nodiscard]] constexpr const std::tuple<First, Others...>& regions() const noexcept {
        return regions_;
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "either";
    /// What its constructor takes, as a list.
    static constexpr const char* list_name = "parts";
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return std::apply(use, regions_);
    }

    friend constexpr bool operator==(const either&, const either&) = default;

private:
    template <std::size_t I, random_words G>
    constexpr point_type draw_from(std::uint64_t word, G& g) const {
        if constexpr (I + 1 < parts) {
            if (word >= ends_[I]) {
                return draw_from<I + 1>(word, g);
            }
        }
        return std::get<I>(regions_)(g);
    }

    std::tuple<First, Others...> regions_;
    std::array<std::uint64_t, parts> ends_{}; // part i has the words below ends_[i] that are left
    Real measure_ = 0;
};

/// The points of A outside B.
template <class A, class B>
class without : public detail::rejecting_region<without<A, B>, A> {
    static_assert(std::same_as<typename A::point_type, typename B::point_type>,
                  "leat::without: both regions need the same type of points");
    using base = detail::rejecting_region<without, A>;

public:
    /// Its measure is not known.
    constexpr without(const A& a, const B& b) : base(a), removed_(b) {}
    /// Of a known measure, so that it may be part of an `either`.
    constexpr without(const A& a, const B& b, std::type_identity_t<typename A::real_type> measure)
        : base(a, measure), removed_(b) {}

    /// The region that is left out.
    [[nodiscard]] constexpr const B& removed() const noexcept { return removed_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "without";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"region", "removed", "measure"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(this->region(), removed_, this->known_measure());
    }
    /// From those arguments.
    static constexpr without from_arguments(const A& a, const B& b,
                                            std::optional<typename A::real_type> measure) {
        return measure ? without(a, b, *measure) : without(a, b);
    }

    friend constexpr bool operator==(const without& a, const without& b) noexcept {
        return a.region() == b.region() && a.removed_ == b.removed_;
    }

private:
    friend base;
    static constexpr const char* name_ = "without";

    [[nodiscard]] constexpr bool accepts(const typename base::point_type& p) const {
        return !removed_.contains(p);
    }

    B removed_;
};

} // namespace leat

#endif
