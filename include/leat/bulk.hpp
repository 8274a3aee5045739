// Many draws at once: fills of arrays.

#ifndef LEAT_BULK_HPP
#define LEAT_BULK_HPP

#include "leat/bulk/fill.hpp"
#include "leat/bulk/fill_chunks.hpp"
#include "leat/bulk/kernels/convert.hpp"
#include "leat/bulk/word_cursor.hpp"

#endif
