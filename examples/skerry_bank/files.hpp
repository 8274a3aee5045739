// Whole files, read and written.

#ifndef SKERRY_BANK_FILES_HPP
#define SKERRY_BANK_FILES_HPP

#include <string>

namespace skerry {

/// What is in the file. Throws refusal where it cannot be read.
std::string read_file(const std::string& file);

/// Writes the file so that whoever looks, now or after the program was killed, finds the old one or
/// the new one whole: it is written under another name, FILE.part, and renamed. Throws
/// std::runtime_error.
void write_file(const std::string& file, const std::string& text);

/// The same, and not even a machine that fails can lose it afterwards. Waits for the disk.
void write_file_to_disk(const std::string& file, const std::string& text);

} // namespace skerry

#endif
