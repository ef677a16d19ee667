#include "check.h"

#include <float.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static int has_reason(const char *reason)
{
    static const char *const known[] = {"TABLE", "ROUND", "SERIES", "STAT", "TEXT"};
    for (size_t i = 0; i < sizeof known / sizeof *known; i++)
        if (strncmp(reason, known[i], strlen(known[i])) == 0)
            return 1;
    return 0;
}

void check_close_at(double actual, double expected, double tolerance, const char *reason, struct check_place place)
{
    if (has_reason(reason) && tolerance >= 0.0 && fabs(actual - expected) <= tolerance)
        return;
    char words[400];
    snprintf(words, sizeof words, "%.17g is not %.17g +- %.3g: off by %.3g (%s)", actual, expected, tolerance,
             actual - expected, reason);
    print_error("%s\n", words);
    _fail(place.file, place.line);
}

double check_half_unit(const char *printed)
{
    const size_t mantissa = strcspn(printed, "eE");
    const char *const point = memchr(printed, '.', mantissa);
    const long decimals = point ? (long)(printed + mantissa - point) - 1 : 0;
    const long exponent = printed[mantissa] ? strtol(printed + mantissa + 1, NULL, 10) : 0;
    return 0.5 * pow(10.0, (double)(exponent - decimals));
}

void check_printed_at(double actual, const char *printed, struct check_place place)
{
    const double expected = strtod(printed, NULL);
    check_close_at(actual, expected, check_half_unit(printed) + 4.0 * DBL_EPSILON * fabs(expected), "TABLE", place);
}

void check_round_at(double actual, double expected, double eps_count, struct check_place place)
{
    check_close_at(actual, expected, eps_count * DBL_EPSILON * fabs(expected), "ROUND", place);
}
