// Built with -fno-exceptions -fno-rtti: a refused value is a message on stderr and an abort.

#include "every_plain_header.hpp"

int main(int count, char**) {
    // From the command line's length, so that nothing is known at compile time: this is refused.
    const leat::wide_integer nonsense{count == 1 ? "12x" : "12"};
    return nonsense.fits_word() ? 0 : 1;
}
