/* Quantities as people write them, read with UDUNITS.
 *
 * A number is an optional sign, decimal digits with at most one point among
 * them, and an optional exponent (2.0e-4, .5, 60, -1E3), however the YAML
 * scalar was quoted.  Nothing else counts as one: no hexadecimal or octal, no
 * underscores, no decimal or thousands comma, no 1:30, no infinity, no NaN.
 * A unit follows the number, with or without a space, in UDUNITS' spelling;
 * a digit in it is an exponent (mm2/s2, s-2) or the 1 of 1/K, never a factor,
 * and no origin or logarithm is taken (the degrees of a temperature apart).
 *
 * Every factor between units lives in this file's .c. */
#ifndef VICINAL_BASE_UNITS_H
#define VICINAL_BASE_UNITS_H

#include <stdbool.h>
#include <stddef.h>

/* What a quantity can be; beside it what its number is in, once read. */
enum units_dimension {
    UNITS_PLAIN,           /* a number without a unit */
    UNITS_FRACTION,        /* 1; written in % or as a plain number */
    UNITS_TEMPERATURE,     /* K */
    UNITS_SPREAD,          /* K: a difference of temperatures */
    UNITS_DRIFT,           /* K/s */
    UNITS_PER_KELVIN,      /* 1/K */
    UNITS_TIME,            /* s */
    UNITS_HOURS,           /* h: a time that is counted in hours */
    UNITS_LENGTH,          /* m */
    UNITS_VOLUME,          /* m3 */
    UNITS_MASS,            /* kg */
    UNITS_MOLAR_MASS,      /* kg/mol */
    UNITS_SPECIFIC_VOLUME, /* m3/kg */
    UNITS_TUBE_CONSTANT,   /* m2/s2 */
    UNITS_FLARED,          /* m2 s: E */
    UNITS_SQUARE,          /* m2: B */
    UNITS_ANGLE,           /* rad */
    UNITS_PRICE_PER_GRAM,  /* 1/kg; written as a plain number for one gram */
    UNITS_DIMENSIONS
};

struct units;

/* Reads UDUNITS' own database (some 10 ms). NULL: out of memory, or the
 * database is not where UDUNITS looks for it. */
struct units *units_new(void);
void units_free(struct units *u);

/* What is wanted of a text: the dimension, the unit to offer when it is
 * missing or wrong, and an example to show (NULL: none). */
struct units_want {
    enum units_dimension dimension;
    const char *unit, *example;
};

/* Why a text was refused: one line, without the key's name. */
enum { UNITS_WHY = 256 };
struct units_why {
    char text[UNITS_WHY];
};

/* Reads `text` into `value`, in the dimension's unit above. False: `why` says
 * what is wrong with it. */
bool units_read(const struct units *u, struct units_want want, const char *text, double *value, struct units_why *why);

/* `number` of `unit` in the dimension's unit; NaN when that is no such unit. */
double units_si(const struct units *u, enum units_dimension dimension, const char *unit, double number);

/* The number that a text begins with. Gives back what follows it, NULL when
 * the text does not begin with a number (see above). */
const char *units_number(const char *text, double *number);

#endif
