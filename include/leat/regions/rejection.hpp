// Any other shape: the points of a bounding region that a predicate accepts, by rejection.
//
//   leat::rejection heart{leat::box{{-2, -2}, {2, 2}}, is_in_heart};
//   auto [point, trials] = heart.draw_counted(g);
//   auto share = heart.estimate_acceptance(100000, g);     // and measure it by share.low,
//   share.high leat::rejection half{leat::disk{{0, 0}, 1}, is_left, 1.5707963267948966};  // its
//   measure known
//
// Uniform in a region and accepted is uniform in what is accepted, exactly (von Neumann 1951;
// Devroye, Non-Uniform Random Variate Generation, 1986, II.3). The bounding region may be a surface
// or another rejection. The predicate takes a point, const; it must not draw, nor change its mind.
//
// Words: those of the bounding region a trial; trials are 1 / share on average. Domain: the shape
// fills at least 1/10000 of the bounding region. Errors: engine_stuck after 700 000 trials, which
// such a shape needs with a probability below 2^-100: no hang where the shape is empty, or nearly.
// invalid_parameter for a measure that is not in (0, that of the bounding region], and where
// measure() is asked but was never given. Not for a thin shape in a wide region: find a tighter
// one, or a map.

#ifndef LEAT_REGIONS_REJECTION_HPP
#define LEAT_REGIONS_REJECTION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/dimension.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <concepts>
#include <cstdint>
#include <optional>
#include <type_traits>

namespace leat {

/// A point and the trials that it took, itself included.
template <class Point>
struct counted_point {
    Point point;          ///< the point
    std::uint32_t trials; ///< how many it took
};

/// The share of trials accepted, and the ends of its interval at 95 %: Wilson's, which is sound at
/// shares near 0 and 1 too (E. B. Wilson, J. Amer. Stat. Assoc. 22, 1927).
struct acceptance {
    double share;           ///< accepted / trials
    double low;             ///< the lower end
    double high;            ///< the upper end
    std::uint64_t accepted; ///< how many trials were accepted
    std::uint64_t trials;   ///< how many were made
};

namespace detail {

/// The interval for `accepted` out of `trials`.
constexpr acceptance acceptance_of(std::uint64_t accepted, std::uint64_t trials) noexcept {
    using real = strict<double>;
    constexpr double z2 = 3.8414588206941245; // 1.959963984540054^2, 97.5 % of a normal
    const real n = static_cast<double>(trials);
    const real k = static_cast<double>(accepted);
    const real share = k / n;
    const real middle = (k + z2 / 2) / (n + z2);
    const real spread = k * (real(1) - share) + z2 / 4;
    const real half = real(square_root((real(z2) * spread).value)) / (n + z2);
    const real low = middle - half;
    const real high = middle + half;
    return {share.value, accepted == 0 ? 0.0 : low.value, accepted == trials ? 1.0 : high.value,
            accepted, trials};
}

/// What rejection and without share. `Derived` has accepts(point) and a name_.
template <class Derived, class Region>
class rejecting_region : public region_base<Derived, typename Region::real_type, Region::dimension,
                                            measured_dimension_of<Region>> {
    using Real = typename Region::real_type;

public:
    using point_type = typename Region::point_type;

    /// A point uniform by measure.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        return draw_counted(g).point;
    }

    /// The same, with the trials that it took.
    template <random_words G>
    constexpr counted_point<point_type> draw_counted(G& g) const {
        for (std::uint32_t trial = 1; trial <= most_trials; ++trial) {
            const point_type p = region_(g);
            if (self().accepts(p)) {
                return {p, trial};
            }
        }
        message m;
        raise<engine_stuck>(
            m.text("leat::")
                .text(Derived::name_)
                .text(": rejected 700000 trials: the shape fills less than 1/10000 of the region "
                      "around it, if anything, or the engine is stuck"));
    }

    /// What share of the bounding region's points is accepted, from `trials` of them.
    template <random_words G>
    constexpr acceptance estimate_acceptance(std::uint64_t trials, G& g) const {
        if (trials == 0) {
            refuse(Derived::name_, "trials", trials, "must be at least 1");
        }
        std::uint64_t accepted = 0;
        for (std::uint64_t trial = 0; trial < trials; ++trial) {
            const point_type p = region_(g);
            accepted += self().accepts(p) ? 1u : 0u;
        }
        return acceptance_of(accepted, trials);
    }

    /// Whether p is in the bounding region, and accepted.
    [[nodiscard]] constexpr bool contains(const point_type& p) const {
        return region_.contains(p) && self().accepts(p);
    }

    /// The measure that was given; refused where none was: it is not known.
    [[nodiscard]] constexpr Real measure() const {
        if (measure_ == 0) {
            refuse(Derived::name_, "measure() is not known: give it to the constructor, or take "
                                   "estimate_acceptance times the measure of the region around it");
        }
        return measure_;
    }

    /// The bounding region.
    [[nodiscard]] constexpr const Region& region() const noexcept { return region_; }

protected:
    explicit constexpr rejecting_region(const Region& region) : region_(region) {
        this->bounds_ = region_.bounds();
    }
    constexpr rejecting_region(const Region& region, Real measure) : rejecting_region(region) {
        measure_ = measure;
        if (!(measure > 0 && measure <= region_.measure())) {
            refuse(Derived::name_, "measure", measure,
                   "must be above 0 and at most that of the region around it");
        }
    }

    /// The measure, if it was given.
    [[nodiscard]] constexpr std::optional<Real> known_measure() const noexcept {
        return measure_ == 0 ? std::nullopt : std::optional<Real>(measure_);
    }

private:
    static constexpr std::uint32_t most_trials = 700000; // (1 - 1e-4)^700000 < 2^-100

    [[nodiscard]] constexpr const Derived& self() const noexcept {
        return static_cast<const Derived&>(*this);
    }

    Region region_;
    Real measure_ = 0; // 0 for unknown
};

} // namespace detail

/// The points of `Region` that `Predicate` accepts.
template <class Region, class Predicate>
class rejection : public detail::rejecting_region<rejection<Region, Predicate>, Region> {
    static_assert(std::predicate<const Predicate&, const typename Region::point_type&>,
                  "leat::rejection needs a predicate that takes a point and is const");
    using base = detail::rejecting_region<rejection, Region>;

public:
    /// Its measure is not known.
    constexpr rejection(const Region& region, Predicate predicate)
        : base(region), predicate_(predicate) {}
    /// Of a known measure, so that it may be part of an `either`.
    constexpr rejection(const Region& region, Predicate predicate,
                        std::type_identity_t<typename Region::real_type> measure)
        : base(region, measure), predicate_(predicate) {}

    /// The name under which it is saved.
    static constexpr const char* class_name = "rejection";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"region", "predicate", "measure"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(this->region(), predicate_, this->known_measure());
    }
    /// From those arguments.
    static constexpr rejection from_arguments(const Region& region, Predicate predicate,
                                              std::optional<typename Region::real_type> measure) {
        return measure ? rejection(region, predicate, *measure) : rejection(region, predicate);
    }

    /// Whether region and predicate are equal, where predicates can be compared.
    friend constexpr bool
    operator==(const rejection& a,
               const rejection& b) noexcept requires std::equality_comparable<Predicate> {
        return a.region() == b.region() && a.predicate_ == b.predicate_;
    }

private:
    friend base;
    static constexpr const char* name_ = "rejection";

    [[nodiscard]] constexpr bool accepts(const typename base::point_type& p) const {
        return predicate_(p);
    }

    Predicate predicate_;
};

} // namespace leat

#endif
