// A study half done, in a file: the rows that are finished, and of which study they are.
//
// Nothing in it tells which driver made it or on how many threads or processes, because no row
// depends on that; any other may go on from it. The file is JSON with a version and a checksum. One
// that is damaged or cut short, of another version of the program or the library, or of a study
// that would have given other rows, is refused. The number of replications may differ: a study can
// be carried further.

#ifndef SKERRY_BANK_CHECKPOINT_HPP
#define SKERRY_BANK_CHECKPOINT_HPP

#include <string>

#include "collector.hpp"
#include "input_file.hpp"

namespace skerry {

/// Writes the file; at no moment, not even of a crash, is there half a file. Throws
/// std::runtime_error.
void save_checkpoint(const std::string& file, const loaded_input& in, const row_set& rows);

/// The rows of a checkpoint of this study. Throws refusal, which names the file.
row_set load_checkpoint(const std::string& file, const loaded_input& in);

} // namespace skerry

#endif
