#include "other.hpp"

event draw_elsewhere(const leat::source& study, int replication) {
    return draw_event(study, replication);
}
