/* Quantities. Every tolerance here is ROUND: a few roundings of a double. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <math.h>
#include <string.h>

#include "sim/base/units.h"

static int open_units(void **state)
{
    *state = units_new();
    return *state ? 0 : -1;
}

static int close_units(void **state)
{
    units_free(*state);
    return 0;
}

static void assert_near(double x, double expected)
{
    if (fabs(x - expected) > 4e-16 * 4.0 * fabs(expected))
        print_message("%.17g is not %.17g\n", x, expected);
    assert_true(fabs(x - expected) <= 4e-16 * 4.0 * fabs(expected));
}

static void assert_reads(void **state, enum units_dimension dimension, const char *text, double expected)
{
    double value = NAN;
    struct units_why why = {""};
    const bool good = units_read(*state, (struct units_want){dimension, "", NULL}, text, &value, &why);
    if (!good)
        print_message("%s: %s\n", text, why.text);
    assert_true(good);
    assert_near(value, expected);
}

static void assert_refuses(void **state, struct units_want want, const char *text, const char *why_not)
{
    double value = NAN;
    struct units_why why = {""};
    assert_false(units_read(*state, want, text, &value, &why));
    if (!strstr(why.text, why_not))
        print_message("%s: %s\n", text, why.text);
    assert_non_null(strstr(why.text, why_not));
}

/* Conversions by definition of the units. */
static void reads_every_dimension(void **state)
{
    assert_reads(state, UNITS_PLAIN, "0.76", 0.76);
    assert_reads(state, UNITS_FRACTION, "1.5 %", 0.015);
    assert_reads(state, UNITS_FRACTION, "0.015", 0.015);
    assert_reads(state, UNITS_FRACTION, "300 ppm", 3e-4);
    assert_reads(state, UNITS_TEMPERATURE, "25 degC", 298.15);
    assert_reads(state, UNITS_TEMPERATURE, "25 °C", 298.15);
    assert_reads(state, UNITS_TEMPERATURE, "298.15 K", 298.15);
    assert_reads(state, UNITS_SPREAD, "20 mK", 0.02);
    assert_reads(state, UNITS_DRIFT, "0.36 K/h", 1e-4);
    assert_reads(state, UNITS_PER_KELVIN, "0.001 1/K", 0.001);
    assert_reads(state, UNITS_TIME, "10 min", 600);
    assert_reads(state, UNITS_TIME, "1.5h", 5400);
    assert_reads(state, UNITS_HOURS, "90 min", 1.5);
    assert_reads(state, UNITS_LENGTH, "0.47 mm", 0.47e-3);
    assert_reads(state, UNITS_VOLUME, "5.6 mL", 5.6e-6);
    assert_reads(state, UNITS_MASS, "0.3 mg", 0.3e-6);
    assert_reads(state, UNITS_MOLAR_MASS, "85 kg/mol", 85);
    assert_reads(state, UNITS_MOLAR_MASS, "44.05 g/mol", 0.04405);
    assert_reads(state, UNITS_SPECIFIC_VOLUME, "2.0e-4 dL/g", 2.0e-5);
    assert_reads(state, UNITS_TUBE_CONSTANT, "0.003 mm2/s2", 3e-9);
    assert_reads(state, UNITS_TUBE_CONSTANT, "0.003 cSt/s", 3e-9);
    assert_reads(state, UNITS_FLARED, "95 mm2 s", 95e-6);
    assert_reads(state, UNITS_SQUARE, "1 mm2", 1e-6);
    assert_reads(state, UNITS_ANGLE, "180 degree", 3.14159265358979323846);
    assert_reads(state, UNITS_PRICE_PER_GRAM, "0.5", 500);
}

static void takes_numbers_and_nothing_else(void **state)
{
    (void)state;
    static const char *const numbers[] = {"0", "-1", "+2", ".5", "5.", "2.0e-4", "1E3", "007"};
    static const double values[] = {0, -1, 2, .5, 5, 2.0e-4, 1e3, 7};
    static const char *const none[] = {"", ".", "-", "e5", "nan", ".nan", "inf", "+inf", "1e999", "x", " 1", "--1"};
    double x;
    for (size_t i = 0; i < sizeof numbers / sizeof *numbers; i++) {
        const char *rest = units_number(numbers[i], &x);
        assert_non_null(rest);
        assert_string_equal(rest, "");
        assert_true(x >= values[i] && x <= values[i]);
    }
    for (size_t i = 0; i < sizeof none / sizeof *none; i++)
        assert_null(units_number(none[i], &x));
    assert_string_equal(units_number("0x10", &x), "x10");
    assert_string_equal(units_number("1e K", &x), "e K");
    assert_string_equal(units_number("1_000", &x), "_000");
}

static void says_what_is_wrong(void **state)
{
    const struct units_want spread = {UNITS_SPREAD, "K", "0.02 K"};
    assert_refuses(state, spread, "0.02", "a number without a unit; give it in K, for example 0.02 K");
    assert_refuses(state, spread, "0.02 degC", "a spread of temperature is written in K");
    assert_refuses(state, spread, "0.02 s", "`s` is not the unit of a spread of temperature; give it in K");
    assert_refuses(state, spread, "0.02 k", "write K for kelvin");
    assert_refuses(state, spread, "0,02 K", "no decimal or thousands comma");
    assert_refuses(state, spread, "0.02 +- 0.01 K", "one number only");
    assert_refuses(state, spread, "0.02+/-0.01 K", "one number only");
    assert_refuses(state, spread, "0.02 \xc2\xb1 0.01 K", "one number only");
    assert_refuses(state, spread, "K", "does not begin with a number");
    assert_refuses(state, spread, "", "does not begin with a number");
    assert_refuses(state, spread, ".inf", "not a finite number");
    assert_refuses(state, spread, "-NaN", "not a finite number");
    assert_refuses(state, spread, "1e999 K", "too large a number");
    assert_refuses(state, spread, "2 x 10-2 K", "powers of ten are written 2.0e-4");
    assert_refuses(state, spread, "0xff K", "numbers are decimal");
    assert_refuses(state, (struct units_want){UNITS_MOLAR_MASS, "kg/mol", NULL}, "85 kDa", "write kg/mol for kDa");
    assert_refuses(state, (struct units_want){UNITS_SPECIFIC_VOLUME, "dL/g", NULL}, "1 g/100mL",
                   "write g/dL for g/100mL");
    assert_refuses(state, (struct units_want){UNITS_PLAIN, "", "1.8"}, "1.8 cP",
                   "a plain number is wanted; cP is a viscosity");
    assert_refuses(state, (struct units_want){UNITS_PLAIN, "", "0.76"}, "76 %",
                   "a plain number is wanted, without a unit; for example 0.76");
}

/* UDUNITS takes these; they would be read as something that nobody meant. */
static void takes_no_factor_no_origin_no_angle_for_a_number(void **state)
{
    const struct units_want time = {UNITS_TIME, "s", NULL};
    assert_refuses(state, time, "6 10 s", "not a known unit");
    assert_refuses(state, time, "6 1e3 s", "not a known unit");
    assert_refuses(state, time, "6 s @ 3", "not a known unit");
    assert_refuses(state, time, "6 s since 2000-01-01", "not a known unit");
    assert_refuses(state, time, "6 lg(re 1 s)", "not a known unit");
    assert_refuses(state, (struct units_want){UNITS_FRACTION, "%", NULL}, "1 degree", "not the unit of a fraction");
    assert_refuses(state, (struct units_want){UNITS_FRACTION, "%", NULL}, "1 2", "not a known unit");
    assert_refuses(state, (struct units_want){UNITS_ANGLE, "degree", NULL}, "1 %", "not the unit of an angle");
    assert_refuses(state, (struct units_want){UNITS_SPECIFIC_VOLUME, "dL/g", NULL}, "1 mL/50g", "not a known unit");
}

static void turns_a_limit_into_si(void **state)
{
    assert_near(units_si(*state, UNITS_TEMPERATURE, "degC", 38), 311.15);
    assert_near(units_si(*state, UNITS_FRACTION, "%", 20), 0.2);
    assert_near(units_si(*state, UNITS_PRICE_PER_GRAM, "", 2), 2000);
    assert_true(isnan(units_si(*state, UNITS_MASS, "mL", 1)));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(reads_every_dimension), cmocka_unit_test(takes_numbers_and_nothing_else),
        cmocka_unit_test(says_what_is_wrong),    cmocka_unit_test(takes_no_factor_no_origin_no_angle_for_a_number),
        cmocka_unit_test(turns_a_limit_into_si),
    };
    return cmocka_run_group_tests(tests, open_units, close_units);
}
