// One component of one turbine in one replication: where its lives and repair hours come from.
//
// Each part has two streams of its own, found by path. The k-th life is the k-th draw of the one
// and the k-th repair the k-th draw of the other, whatever else happens on the farm: two designs
// that are opened from the same source meet the same lives and repairs, and a turbine added at the
// end, or a component added to the list, changes nobody else's.

#ifndef SKERRY_BANK_PART_HPP
#define SKERRY_BANK_PART_HPP

#include <leat/streams/address.hpp>
#include <leat/streams/source.hpp>

#include "farm.hpp"
#include "units.hpp"

namespace skerry {

class part {
public:
    /// `laws` must outlive the part.
    part(const component_laws& laws, const leat::source& replication, int turbine)
        : laws_(&laws),
          lives_(replication.thin_stream("turbine", turbine, laws.name, "life")),
          repairs_(replication.thin_stream("turbine", turbine, laws.name, "repair")) {}

    /// Operating time until the next failure.
    [[nodiscard]] seconds next_life() {
        const double hours = laws_->life_hours(lives_);
        return from_hours(hours);
    }

    /// Workable time that the next repair takes.
    [[nodiscard]] seconds next_repair() {
        const double hours = laws_->repair_hours(repairs_);
        return from_hours(hours);
    }

    /// The streams' addresses, for a replay's record.
    [[nodiscard]] leat::stream_address life_address() const { return lives_.address(); }
    [[nodiscard]] leat::stream_address repair_address() const { return repairs_.address(); }

private:
    const component_laws* laws_;
    leat::thin_stream lives_; // thin: a part fails a few times, and a farm has hundreds of parts
    leat::thin_stream repairs_;
};

} // namespace skerry

#endif
