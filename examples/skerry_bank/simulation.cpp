#include "simulation.hpp"

#include <algorithm>
#include <compare>
#include <deque>
#include <functional> // greater
#include <queue>

#include "part.hpp"

namespace skerry {
namespace {

// In the order in which events of one second are handled.
enum class event_kind { vessel_home, spare_ready, restart, failure };

struct event {
    seconds time;
    event_kind kind;
    int number; ///< of the vessel that comes home, else of the turbine
    friend auto operator<=>(const event&, const event&) = default;
};

/// A turbine's parts and the operating time that each has left.
class turbine {
public:
    turbine(const farm& place, const leat::source& replication, int number) {
        for (const component_laws& laws : place.components) {
            parts_.emplace_back(laws, replication, number);
            left_.push_back(parts_.back().next_life());
        }
    }

    /// How long it will run from now on.
    [[nodiscard]] seconds time_to_failure() const {
        return *std::min_element(left_.begin(), left_.end());
    }

    /// Runs until the next failure and says which component failed; of two that fail at once, the
    /// second fails right after the first is repaired.
    int fail() {
        const auto first = std::min_element(left_.begin(), left_.end());
        const seconds ran = *first;
        for (seconds& time : left_) {
            time = std::max<seconds>(0, time - ran);
        }
        return static_cast<int>(first - left_.begin());
    }

    [[nodiscard]] seconds next_repair(int component) {
        return parts_[static_cast<std::size_t>(component)].next_repair();
    }

    /// Makes a component as good as new.
    void renew(int component) {
        const auto c = static_cast<std::size_t>(component);
        left_[c] = parts_[c].next_life();
    }

private:
    std::vector<part> parts_;
    std::vector<seconds> left_;
};

class run {
public:
    run(const farm& place, const weather& sky, int vessels, const leat::source& replication)
        : place_(place), sky_(sky), at_sea_(static_cast<std::size_t>(vessels), false) {
        const int count = static_cast<int>(place.sites.size());
        for (int t = 0; t < count; ++t) {
            turbines_.emplace_back(place, replication, t);
            expect({turbines_.back().time_to_failure(), event_kind::failure, t});
        }
        last_job_.resize(turbines_.size(), 0);
    }

    std::vector<job> to_horizon() {
        while (!events_.empty()) {
            const event now = events_.top();
            events_.pop();
            handle(now);
            send_vessels(now.time);
        }
        return std::move(jobs_);
    }

private:
    /// Puts an event on the list; what lies at the horizon or beyond never happens.
    void expect(const event& e) {
        if (e.time < place_.horizon) {
            events_.push(e);
        }
    }

    void handle(const event& now) {
        const auto i = static_cast<std::size_t>(now.number);
        switch (now.kind) {
        case event_kind::vessel_home:
            at_sea_[i] = false;
            break;
        case event_kind::spare_ready:
            waiting_.push_back(last_job_[i]);
            break;
        case event_kind::restart:
            turbines_[i].renew(jobs_[last_job_[i]].component);
            expect({now.time + turbines_[i].time_to_failure(), event_kind::failure, now.number});
            break;
        case event_kind::failure: {
            const int component = turbines_[i].fail();
            const seconds repair = turbines_[i].next_repair(component);
            last_job_[i] = jobs_.size();
            const seconds ready =
                now.time + place_.components[static_cast<std::size_t>(component)].spares;
            jobs_.push_back(
                {now.number, component, repair, now.time, ready, -1, never, never, never});
            expect({ready, event_kind::spare_ready, now.number});
            break;
        }
        }
    }

    /// Sends free vessels, lowest number first, to the turbines that have waited
    /// longest.
    void send_vessels(seconds now) {
        for (std::size_t v = 0; v < at_sea_.size() && !waiting_.empty(); ++v) {
            if (at_sea_[v]) {
                continue;
            }
            job& next = jobs_[waiting_.front()];
            waiting_.pop_front();
            at_sea_[v] = true;
            const seconds sail = place_.sites[static_cast<std::size_t>(next.turbine)].sail;
            next.vessel = static_cast<int>(v);
            next.sailed = now;
            next.restart = sky_.done(now, sail + next.repair);
            next.home = sky_.done(next.restart, sail);
            expect({next.restart, event_kind::restart, next.turbine});
            expect({next.home, event_kind::vessel_home, next.vessel});
        }
    }

    const farm& place_;
    const weather& sky_;
    std::vector<turbine> turbines_;
    std::vector<std::size_t> last_job_; // of each turbine
    std::vector<bool> at_sea_;          // each vessel
    std::deque<std::size_t> waiting_;   // jobs that no vessel has taken up
    std::vector<job> jobs_;
    std::priority_queue<event, std::vector<event>, std::greater<>> events_;
};

} // namespace

std::vector<job> simulate(const farm& place, const weather& sky, int vessels,
                          const leat::source& replication) {
    return run(place, sky, vessels, replication).to_horizon();
}

} // namespace skerry
