/* Prints tests/reference/historical.json: what the C library of this machine gives.

   cc -std=gnu11 -O1 make_historical.c -o make_historical && ./make_historical > historical.json

   Each entry holds the first ten and the last five of 5000 values, and the sum of i times the i-th
   value (i from 1) modulo 2^64, which no single changed value leaves as it is. Values of drand48()
   stand as integers, times 2^48. */

#include <gnu/libc-version.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>

enum { draws = 5000 };

static int entries = 0;

static int64_t of_random(void) { return random(); }
static int64_t of_rand(void) { return rand(); }
static int64_t of_drand48(void) { return (int64_t)(drand48() * 281474976710656.0); }
static int64_t of_lrand48(void) { return lrand48(); }
static int64_t of_mrand48(void) { return mrand48(); }

static void print(const char *function, const char *seeded_by, const char *seed,
                  int64_t (*draw)(void)) {
    int64_t last[5];
    uint64_t sum = 0;
    printf("%s\n{\"id\": \"historical.%s.%s\", \"group\": \"%s\", \"name\": \"%s after %s\", "
           "\"parameters\": {\"seed\": \"%s\", \"draws\": \"%d\"}, \"expected\": {\"first\": [",
           entries++ == 0 ? "" : ",", function, seed, function, function, seeded_by, seed, draws);
    for (int i = 1; i <= draws; ++i) {
        const int64_t value = draw();
        sum += (uint64_t)i * (uint64_t)value;
        last[i % 5] = value;
        if (i <= 10) {
            printf("%s\"%lld\"", i == 1 ? "" : ", ", (long long)value);
        }
    }
    printf("], \"last\": [");
    for (int i = 1; i <= 5; ++i) {
        printf("%s\"%lld\"", i == 1 ? "" : ", ", (long long)last[i % 5]);
    }
    printf("], \"sum\": \"%llu\"}, \"source\": \"the C library, glibc %s; "
           "tests/reference/make_historical.c\", \"status\": \"reference library\"}",
           (unsigned long long)sum, gnu_get_libc_version());
}

int main(void) {
    static const unsigned seeds[] = {1, 2, 42, 123456789, 4294967295u, 0, 2147483647, 2147483648u};
    static const long seeds48[] = {0, 1, 12345, -7};
    static char state[256];
    char seed[32];

    printf("{\"topic\": \"historical\", \"about\": \"What the functions of a C library give: the "
           "first ten and the last five of 5000 values, and the sum of i times the i-th value, i "
           "from 1, modulo 2^64. All integers are decimal strings; drand48 stands as an integer, "
           "times 2^48. Printed by make_historical.c beside this file.\", \"entries\": [");
    print("drand48", "no seeding", "none", of_drand48); /* first, before anything seeds */
    for (unsigned i = 0; i < sizeof seeds48 / sizeof *seeds48; ++i) {
        snprintf(seed, sizeof seed, "%ld", seeds48[i]);
        srand48(seeds48[i]);
        print("drand48", "srand48()", seed, of_drand48);
        srand48(seeds48[i]);
        print("lrand48", "srand48()", seed, of_lrand48);
        srand48(seeds48[i]);
        print("mrand48", "srand48()", seed, of_mrand48);
    }
    for (unsigned i = 0; i < sizeof seeds / sizeof *seeds; ++i) {
        snprintf(seed, sizeof seed, "%u", seeds[i]);
        srand(seeds[i]);
        print("rand", "srand()", seed, of_rand);
        srandom(seeds[i]);
        print("random", "srandom()", seed, of_random);
    }
    for (unsigned i = 0; i < sizeof seeds / sizeof *seeds; ++i) {
        snprintf(seed, sizeof seed, "%u", seeds[i]);
        initstate(seeds[i], state, 256);
        print("random_256", "initstate() with 256 bytes", seed, of_random);
        initstate(seeds[i], state, 8);
        print("random_8", "initstate() with 8 bytes", seed, of_random);
    }
    printf("\n]}\n");
    return 0;
}
