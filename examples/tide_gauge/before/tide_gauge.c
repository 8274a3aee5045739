/* How well does the tide gauge in Skerry Bank harbour tell the level of an hour?
   (Harbour, gauge and figures are invented.)

   The gauge sends a reading every six minutes; the office takes the mean of an hour. Waves shake a
   reading, the wake of a boat lifts it now and then, and some are lost on the way.

   tide_gauge [MONTHS [SEED [readings]]]      prints a line a month, or every reading to the bit */

#include <math.h>
#include <stdio.h>
#include <stdlib.h>

#define HOURS (30 * 24)
#define READINGS 10

static double uniform(void) { return rand() / (RAND_MAX + 1.0); }

static double gauss(void) {
    double sum = -6;
    int i;
    for (i = 0; i < 12; ++i)
        sum += uniform();
    return sum;
}

/* Metres above chart datum, so many hours after the start. */
static double tide(double hours) {
    return 2.1 + 1.4 * sin(hours * 6.283185307179586 / 12.4206) +
           0.5 * sin(hours * 6.283185307179586 / 12.0);
}

static void month(int number, int print_readings) {
    double square = 0, highest = -100, highest_read = -100;
    int off = 0, lost = 0, wakes = 0, hour, i;

    for (hour = number * HOURS; hour < (number + 1) * HOURS; ++hour) {
        double level = 0, read = 0;
        int sent = 0;
        for (i = 0; i < READINGS; ++i) {
            double x = tide(hour + i / (double)READINGS);
            level += x / READINGS;
            if (rand() % 100 == 0) {
                ++lost;
                continue;
            }
            x += 0.02 * gauss();
            if (rand() % 250 == 0) {
                ++wakes;
                x += 0.6 * uniform();
            }
            if (print_readings)
                printf("%a\n", x);
            read += x;
            ++sent;
        }
        if (sent == 0)
            continue;
        read /= sent;
        square += (read - level) * (read - level);
        if (fabs(read - level) > 0.03)
            ++off;
        if (level > highest)
            highest = level;
        if (read > highest_read)
            highest_read = read;
    }
    if (!print_readings)
        printf("%5d %8.2f %8d %8d %8d %8.1f\n", number + 1, 1000 * sqrt(square / HOURS), off, lost,
               wakes, 1000 * (highest_read - highest));
}

int main(int argc, char** argv) {
    int months = argc > 1 ? atoi(argv[1]) : 12, i;

    srand(argc > 2 ? strtoul(argv[2], NULL, 10) : 1);
    if (argc <= 3)
        printf("month rms/mm  >30mm     lost    wakes   top/mm\n");
    for (i = 0; i < months; ++i)
        month(i, argc > 3);
    return 0;
}
