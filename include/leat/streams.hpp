// Reproducible streams: sources, streams, splitting and jumping.

#ifndef LEAT_STREAMS_HPP
#define LEAT_STREAMS_HPP

#include "leat/streams/address.hpp"
#include "leat/streams/distance.hpp"
#include "leat/streams/jump.hpp"
#include "leat/streams/overlap.hpp"
#include "leat/streams/path.hpp"
#include "leat/streams/recorder.hpp"
#include "leat/streams/refill.hpp"
#include "leat/streams/seeding.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"
#include "leat/streams/steps.hpp"
#include "leat/streams/steps_xorshift.hpp"
#include "leat/streams/stream.hpp"
#include "leat/streams/thin_stream.hpp"

#endif
