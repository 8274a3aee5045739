// A planted fault for the weight test.
#include <string>
