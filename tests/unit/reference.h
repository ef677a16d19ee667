/* The published values in tests/reference: one row
 * a value, lines with # apart, tab-separated
 *   quantity  arguments  value  tolerance  reason  source
 * An empty tolerance means half a unit of the last printed digit. */
#ifndef VICINAL_TESTS_UNIT_REFERENCE_H
#define VICINAL_TESTS_UNIT_REFERENCE_H

#include "check.h"

struct reference_row {
    char arguments[96]; /* words, a space between two */
    char value[160];    /* as printed */
    double number;      /* of the value */
    double tolerance;
    char reason[8];
};

/* The rows of one quantity, in the order of the file (tests/reference/FILE);
 * how many. Fails the test when there is none or more than there is room. */
size_t reference_read(const char *file, const char *quantity, struct reference_row *rows, size_t room);

/* The only row of a quantity. */
struct reference_row reference_one(const char *file, const char *quantity);

/* Argument i of a row: as a word, as a number. Fails when there is none. */
const char *reference_word(const struct reference_row *row, size_t i, char word[32]);
double reference_argument(const struct reference_row *row, size_t i);

/* Hold a number against a row. */
#define check_row(actual, row) check_row_at((actual), (row), (struct check_place){__FILE__, __LINE__})
void check_row_at(double actual, const struct reference_row *row, struct check_place place);

#endif
