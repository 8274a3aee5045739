// Save and restore: text, run manifests, and the errors of refused documents. JSON is apart, in
// state/json.hpp, since it asks for nlohmann_json.

#ifndef LEAT_STATE_HPP
#define LEAT_STATE_HPP

#include "leat/state/manifest.hpp"
#include "leat/state/refused.hpp"

#endif
