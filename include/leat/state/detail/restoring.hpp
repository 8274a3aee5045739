// From the refusal of a constructor to the refusal of the document that asked for it.

#ifndef LEAT_STATE_DETAIL_RESTORING_HPP
#define LEAT_STATE_DETAIL_RESTORING_HPP

#include "leat/core/errors.hpp"
#include "leat/state/refused.hpp"

#include <string>
#include <string_view>

namespace leat::detail {

/// "leat::json: WHERE: ", followed by what an error of leat's says after its class's name.
[[noreturn, gnu::cold, gnu::noinline]] inline void refuse_as(const std::string& where,
                                                             const error& refusal) {
    std::string_view reason = refusal.what(); // "leat::NAME: REASON"
    if (const auto end = reason.find(": "); end != reason.npos) {
        reason.remove_prefix(end + 2);
    }
    message m;
    m.text("leat::json: ").text(where.data(), where.size() < 120 ? where.size() : 120);
    raise<state_refused>(m.text(": ").text(reason.data(), reason.size()));
}

/// What make() gives. What it refuses is refused as a part of the document.
template <class Make>
auto restoring([[maybe_unused]] const std::string& where, Make make) {
#if defined(__cpp_exceptions)
    try {
        return make();
    } catch (const state_refused&) {
        throw;
    } catch (const error& refusal) {
        refuse_as(where, refusal);
    }
#else
    return make(); // which ends the program with its own message
#endif
}

} // namespace leat::detail

#endif
