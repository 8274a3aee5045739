// All of leat but what asks for more: state/json.hpp (nlohmann_json) and testing.hpp.
//
// Not for keys, tokens, lotteries or gambling.

#ifndef LEAT_LEAT_HPP
#define LEAT_LEAT_HPP

#include "leat/bulk.hpp"
#include "leat/core.hpp"
#include "leat/distributions.hpp"
#include "leat/engines.hpp"
#include "leat/estimate.hpp"
#include "leat/regions.hpp"
#include "leat/streams.hpp"
#include "leat/uniform.hpp"
#include "leat/version.hpp"

#endif
