// One of two files that include every header: a definition that is not inline would clash.

#include "every_leat_header.hpp"

const char* version_in_the_other_file();

int main() { return version_in_the_other_file() == leat::version ? 0 : 1; }
