// A planted fault for the layers test: who includes this would pay for JSON without having asked.
#include "leat/state/json.hpp"
