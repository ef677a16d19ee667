/* What a unit test includes first: cmocka, and numbers held against each other
 * with a tolerance that has a reason. */
#ifndef VICINAL_TESTS_UNIT_CHECK_H
#define VICINAL_TESTS_UNIT_CHECK_H

#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

/* |actual - expected| <= tolerance, or the test fails here. The reason begins
 * with one of
 *   TABLE    half a unit of the last printed digit
 *   ROUND    a few eps times the condition
 *   SERIES   a truncation bound
 *   STAT     z times the standard error; fixed seed, no retries, the
 *            false-alarm chance stated
 *   TEXT     exact bytes
 * and says the rest behind it. */
#define check_close(actual, expected, tolerance, reason)                                                               \
    check_close_at((actual), (expected), (tolerance), (reason), (struct check_place){__FILE__, __LINE__})

/* The same for a value as it is printed, such as "-0.1712": TABLE. */
#define check_printed(actual, printed) check_printed_at((actual), (printed), (struct check_place){__FILE__, __LINE__})

/* |actual/expected - 1| <= eps_count times 2.2e-16: ROUND. */
#define check_round(actual, expected, eps_count)                                                                       \
    check_round_at((actual), (expected), (eps_count), (struct check_place){__FILE__, __LINE__})

struct check_place {
    const char *file;
    int line;
};
void check_close_at(double actual, double expected, double tolerance, const char *reason, struct check_place place);
void check_printed_at(double actual, const char *printed, struct check_place place);
void check_round_at(double actual, double expected, double eps_count, struct check_place place);

/* Half a unit of the last digit of a printed number ("4.253e6" gives 500). */
double check_half_unit(const char *printed);

#endif
