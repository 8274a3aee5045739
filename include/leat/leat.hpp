// All of leat but what asks for more, to be included by itself:
//   state/json.hpp                        needs nlohmann_json
//   distributions/with_boost_math.hpp     needs Boost.Math
//   streams/ledger.hpp, state.hpp, compat/rand.hpp
//                                         locks and containers, which cost as much again to compile
//   self_check.hpp                        compiles every law
//   testing.hpp                           for tests
//
// Not for keys, tokens, lotteries or gambling.

#ifndef LEAT_LEAT_HPP
#define LEAT_LEAT_HPP

#include "leat/bulk.hpp"
#include "leat/compat/historical.hpp"
#include "leat/core.hpp"
#include "leat/distributions.hpp"
#include "leat/engines.hpp"
#include "leat/estimate.hpp"
#include "leat/regions.hpp"
#include "leat/streams.hpp"
#include "leat/uniform.hpp"
#include "leat/version.hpp"

#endif
