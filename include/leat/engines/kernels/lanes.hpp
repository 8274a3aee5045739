// The vectors that kernels compute on, in a namespace for each instruction set.

#ifndef LEAT_ENGINES_KERNELS_LANES_HPP
#define LEAT_ENGINES_KERNELS_LANES_HPP

#include "leat/engines/kernels/instruction_set.hpp"

#include <cstddef>
#include <cstdint>

#if LEAT_VECTOR_KERNELS

#define LEAT_KERNEL_FILE "leat/engines/kernels/lanes.ipp"
#include "leat/engines/kernels/per_instruction_set.ipp"
#undef LEAT_KERNEL_FILE

#endif

#endif
