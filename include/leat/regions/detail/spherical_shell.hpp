// What annulus and shell share: points uniform between two spheres about one centre.
//
// Method: two exact ones, of which the constructor takes the better, so that at least 63 % of
// trials succeed for any thickness: rejection of the points of the ball that fall in the hollow, or
// where the shell is thinner than outer / N, a radius uniform between inner and outer, accepted
// with the probability (radius / outer)^(N-1), at a uniform direction (von Neumann 1951). The
// second keeps the resolution of a thin shell, which inverting the law of radius^N would lose.

#ifndef LEAT_REGIONS_DETAIL_SPHERICAL_SHELL_HPP
#define LEAT_REGIONS_DETAIL_SPHERICAL_SHELL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/ball_measure.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/unit_vectors.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

/// The base of `Derived`, the points from `inner` to `outer` away from a centre.
template <class Derived, std::size_t N, portable_real Real>
class spherical_shell : public region_base<Derived, Real, N> {
    using base = region_base<Derived, Real, N>;

public:
    using typename base::point_type;

    /// A point uniform by measure.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < rounding_trials; ++trial) { // 0.37^128 < 2^-183
            const point_type p = thin_ ? thin_trial(g) : thick_trial(g);
            if (contains(p)) {
                return p;
            }
        }
        stuck(Derived::name_);
    }

    /// Whether p is in the region, its edges included: it lies within bounds(), and the squares of
    /// its distances from the centre add up to inner * inner to outer * outer, every operation
    /// rounded, scaled by a power of two. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        real sum = 0.0;
        for (std::size_t i = 0; i < N; ++i) {
            const real x = (real(double{p[i]}) - double{centre_[i]}) * scale_;
            sum = sum + x * x;
        }
        return least_ <= sum && sum <= most_ && this->bounds_.contains(p);
    }

    /// The area or volume, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        const double ratio = held(double{inner_} / double{outer_});
        return saturated<Real>(unit_ball_volume(N) * power(split(double{outer_}), N - 1) *
                               split(held(double{outer_} - double{inner_})) *
                               split(sum_of_powers(ratio, N)));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real inner() const noexcept { return inner_; }
    [[nodiscard]] constexpr Real outer() const noexcept { return outer_; }

    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "inner", "outer"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, inner_, outer_);
    }

    friend constexpr bool operator==(const spherical_shell&, const spherical_shell&) = default;

protected:
    using typename base::real;

    constexpr spherical_shell(const point_type& centre, Real inner, Real outer)
        : centre_(centre), inner_(inner), outer_(outer) {
        this->bounds_ = cube_about(Derived::name_, "outer", outer_, centre_);
        if (!(inner_ >= 0) || (inner_ != 0 && !is_size(inner_))) {
            refuse(Derived::name_, "inner", inner_,
                   std::is_same_v<Real, double> ? "must be 0 or at least 2^-960"
                                                : "must be 0 or at least 2^-100");
        }
        if (!(inner_ < outer_)) {
            refuse(Derived::name_, "inner", inner_, "must be below outer");
        }
        const Real thickness = (strict<Real>(outer_) - inner_).value;
        for (std::size_t i = 0; i < N; ++i) {
            require_resolution(Derived::name_, "outer - inner", thickness, this->bounds_, i);
        }
        scale_ = scale_of(outer_);
        const real inside = real(double{inner_}) * scale_;
        const real outside = real(double{outer_}) * scale_;
        least_ = (inside * inside).value;
        most_ = (outside * outside).value;
        thin_ = (real(double{thickness}) * static_cast<double>(N)).value < double{outer_};
    }

private:
    template <class G>
    constexpr point_type thick_trial(G& g) const {
        return at(unit_ball_point<N>(g, Derived::name_), double{outer_});
    }

    template <class G>
    constexpr point_type thin_trial(G& g) const {
        for (int trial = 0; trial < rounding_trials; ++trial) {
            const double u = unit(g);
            const double v = unit(g);
            const real radius =
                real(double{inner_}) + real(u) * (real(double{outer_}) - double{inner_});
            const real share = radius / double{outer_};
            real chance = 1.0;
            for (std::size_t i = 1; i < N; ++i) {
                chance = chance * share;
            }
            if (v < chance.value) {
                return at(unit_sphere_point<N>(g, Derived::name_), radius.value);
            }
        }
        stuck(Derived::name_);
    }

    [[nodiscard]] constexpr point_type at(const std::array<double, N>& direction,
                                          double size) const noexcept {
        point_type p{};
        for (std::size_t i = 0; i < N; ++i) {
            p[i] = rounded<Real>(double{centre_[i]} + real(direction[i]) * size);
        }
        return p;
    }

    point_type centre_;
    Real inner_;
    Real outer_;
    bool thin_ = false;
    double scale_ = 0; // the power of two that brings `outer` into [2, 4)
    double least_ = 0; // the scaled radii, squared
    double most_ = 0;
};

} // namespace leat::detail

#endif
