// Engines that replay the sequences old results were made with, so that a migration can be shown to
// change nothing before the engine is changed. They are full engines of leat, but not for new work.
//
//   a program that called        on                                   replays with
//   rand(), random()             glibc, and where random() is its kin additive_feedback31
//   random() after initstate()   glibc, with 256 bytes                additive_feedback63
//   drand48(), lrand48(), ...    POSIX systems                        posix48
//   rand()                       systems that took the C standard's   iso_c_sample
//                                example as it stands
//
// examples/tide_gauge/README.md goes through a migration step by step.

#ifndef LEAT_COMPAT_HISTORICAL_HPP
#define LEAT_COMPAT_HISTORICAL_HPP

#include "leat/compat/additive_feedback.hpp"
#include "leat/compat/iso_c_sample.hpp"
#include "leat/compat/posix48.hpp"

#endif
