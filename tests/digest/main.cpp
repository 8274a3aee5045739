// Prints the digest of everything: compared with tests/golden/digests.txt.

#include "digest/digest.hpp"

int main() {
    digests::engines();
    digests::streams();
    digests::uniform();
    digests::laws();
    digests::regions();
}
