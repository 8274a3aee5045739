// Prints the digest of everything, to be compared with tests/golden/digests.txt; with --machine,
// what it runs on: the bits of a pointer and the byte order.

#include "digest/digest.hpp"

#include <cstring>

int main(int count, char** arguments) {
    if (count > 1 && std::strcmp(arguments[1], "--machine") == 0) {
        std::printf("%d %s\n", static_cast<int>(8 * sizeof(void*)),
                    std::endian::native == std::endian::big ? "big" : "little");
        return 0;
    }
    digests::engines();
    digests::streams();
    digests::uniform();
    digests::maths();
    digests::laws();
    digests::discrete();
    digests::regions();
    digests::bulk();
    digests::estimate();
}
