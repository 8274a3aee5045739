// The other file: see linked_twice.cpp.

#include "every_leat_header.hpp"

const char* version_in_the_other_file();

const char* version_in_the_other_file() { return leat::version; }
