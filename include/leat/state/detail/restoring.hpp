// From the refusal of a constructor to the refusal of the document that asked for it.

#ifndef LEAT_STATE_DETAIL_RESTORING_HPP
#define LEAT_STATE_DETAIL_RESTORING_HPP

#include "leat/core/errors.hpp"
#include "leat/state/refused.hpp"

#include <string>
#include <string_view>

namespace leat::detail {

/// What make() gives. An error of leat's that it throws becomes "leat::json: WHERE: ", followed by
/// the parameter, its value and what is allowed.
template <class Make>
auto restoring(const std::string& where, Make make) {
#if defined(__cpp_exceptions)
    try {
        return make();
    } catch (const state_refused&) {
        throw;
    } catch (const error& refusal) {
        std::string_view reason = refusal.what(); // "leat::NAME: REASON"
        if (const auto end = reason.find(": "); end != reason.npos) {
            reason.remove_prefix(end + 2);
        }
        message m;
        m.text("leat::json: ").text(where.data(), where.size() < 120 ? where.size() : 120);
        raise<state_refused>(m.text(": ").text(reason.data(), reason.size()));
    }
#else
    return make(); // which ends the program with its own message
#endif
}

} // namespace leat::detail

#endif
