#include "sim/base/units.h"

#include <ctype.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <udunits2.h>

#include "sim/base/text.h"

/* Plain dimensions have no unit, only a factor. */
static const struct units_row {
    const char *si;
    double factor;
    const char *name;
} units_rows[UNITS_DIMENSIONS] = {
    [UNITS_PLAIN] = {NULL, 1.0, "a plain number"},
    [UNITS_FRACTION] = {"1", 1.0, "a fraction"},
    [UNITS_TEMPERATURE] = {"K", 1.0, "a temperature"},
    [UNITS_SPREAD] = {"K", 1.0, "a spread of temperature"},
    [UNITS_DRIFT] = {"K/s", 1.0, "a drift of temperature"},
    [UNITS_PER_KELVIN] = {"K-1", 1.0, "a relative change per kelvin"},
    [UNITS_TIME] = {"s", 1.0, "a time"},
    [UNITS_HOURS] = {"h", 1.0, "a time"},
    [UNITS_LENGTH] = {"m", 1.0, "a length"},
    [UNITS_VOLUME] = {"m3", 1.0, "a volume"},
    [UNITS_MASS] = {"kg", 1.0, "a mass"},
    [UNITS_MOLAR_MASS] = {"kg/mol", 1.0, "a molar mass"},
    [UNITS_SPECIFIC_VOLUME] = {"m3/kg", 1.0, "a volume per mass"},
    [UNITS_TUBE_CONSTANT] = {"m2/s2", 1.0, "a tube constant"},
    [UNITS_FLARED] = {"m2 s", 1.0, "a kinetic-energy coefficient E"},
    [UNITS_SQUARE] = {"m2", 1.0, "a kinetic-energy coefficient B"},
    [UNITS_ANGLE] = {"radian", 1.0, "an angle"},
    [UNITS_PRICE_PER_GRAM] = {NULL, 1e3, "a plain number"},
};

/* What people type and UDUNITS does not know, or takes for something else. */
static const struct units_hint {
    const char *typed, *hint;
} units_hints[] = {
    {"kDa", "write kg/mol for kDa"},
    {"kd", "write kg/mol for kDa"},
    {"Da", "write g/mol for Da"},
    {"MDa", "write kg/mol: 1 MDa is 1000 kg/mol"},
    {"cP", "cP is a viscosity, and no key takes one: solutions are asked for by their viscosity relative to water"},
    {"mPas",
     "mPa.s is a viscosity, and no key takes one: solutions are asked for by their viscosity relative to water"},
    {"mPa.s",
     "mPa.s is a viscosity, and no key takes one: solutions are asked for by their viscosity relative to water"},
    {"g/100mL", "write g/dL for g/100mL"},
    {"g/100ml", "write g/dL for g/100mL"},
    {"g/100 mL", "write g/dL for g/100mL"},
    {"mL/100mg", "write dL/g"},
    {"100mL/g", "write dL/g for 100mL/g"},
    {"100 mL/g", "write dL/g for 100mL/g"},
    {"C", "C is the coulomb; write degC"},
    {"F", "F is the farad; write degF"},
    {"k", "write K for kelvin"},
    {"deg", "write degree for an angle, degC for a temperature"},
    {"degK", "write K for kelvin"},
    {"mn", "write min for minutes"},
    {"mins", "write min for minutes"},
    {"secs", "write s for seconds"},
    {"hrs", "write h for hours"},
    {"wt%", "write %"},
    {"mol%", "write %"},
    {"mol %", "write %"},
    {"wt %", "write %"},
    {"pct", "write %"},
    {"cSt", "cSt is a kinematic viscosity; a tube constant is in mm2/s2, which is cSt/s"},
};

struct units {
    ut_system *system;
    ut_unit *si[UNITS_DIMENSIONS];
};

struct units *units_new(void)
{
    ut_set_error_message_handler(ut_ignore);
    struct units *u = calloc(1, sizeof *u);
    if (!u)
        return NULL;
    u->system = ut_read_xml(NULL);
    bool whole = u->system != NULL;
    for (size_t i = 0; whole && i < UNITS_DIMENSIONS; i++) {
        if (!units_rows[i].si)
            continue;
        u->si[i] = ut_parse(u->system, units_rows[i].si, UT_ASCII);
        whole = u->si[i] != NULL;
    }
    if (whole)
        return u;
    units_free(u);
    return NULL;
}

void units_free(struct units *u)
{
    if (!u)
        return;
    for (size_t i = 0; i < UNITS_DIMENSIONS; i++)
        ut_free(u->si[i]);
    ut_free_system(u->system);
    free(u);
}

const char *units_number(const char *text, double *number)
{
    const char *p = text;
    size_t digits = 0;
    if (*p == '+' || *p == '-')
        p++;
    for (; isdigit((unsigned char)*p); p++)
        digits++;
    if (*p == '.')
        for (p++; isdigit((unsigned char)*p); p++)
            digits++;
    if (!digits)
        return NULL;
    if (*p == 'e' || *p == 'E') {
        const char *q = p + 1;
        if (*q == '+' || *q == '-')
            q++;
        if (isdigit((unsigned char)*q)) {
            while (isdigit((unsigned char)*q))
                q++;
            p = q;
        }
    }
    char copy[128];
    const size_t size = (size_t)(p - text);
    if (size >= sizeof copy)
        return NULL;
    memcpy(copy, text, size);
    copy[size] = 0;
    *number = strtod(copy, NULL);
    return isfinite(*number) ? p : NULL;
}

/* Digits only as exponents, or as the 1 of 1/K; no origin, no logarithm. */
static bool units_is_tidy(const char *unit)
{
    if (strpbrk(unit, "@#,:()"))
        return false;
    if (unit[0] == '1' && unit[1] == '/')
        unit++;
    for (const char *p = unit; *p; p++) {
        if (!isdigit((unsigned char)*p))
            continue;
        const char before = p == unit ? ' ' : p[-1];
        const bool follows_letter = isalnum((unsigned char)before) || before == '^';
        const bool negative =
            (before == '-' || before == '+') && p - unit > 1 && (isalpha((unsigned char)p[-2]) || p[-2] == '^');
        if (!follows_letter && !negative)
            return false;
    }
    return true;
}

/* Is it made of radians? UDUNITS turns an angle into a number freely. */
static bool units_is_angle(const ut_unit *unit)
{
    char definition[128];
    const int size = ut_format(unit, definition, sizeof definition, UT_ASCII | UT_DEFINITION);
    return size > 0 && (size_t)size < sizeof definition && strstr(definition, "rad");
}

static bool units_has_origin(const struct units *u, ut_unit *unit)
{
    if (!ut_are_convertible(unit, u->si[UNITS_TEMPERATURE]))
        return false;
    cv_converter *to_K = ut_get_converter(unit, u->si[UNITS_TEMPERATURE]);
    const bool has = to_K && fabs(cv_convert_double(to_K, 0.0)) > 0.0;
    cv_free(to_K);
    return has;
}

enum units_fault { UNITS_GOOD, UNITS_UNKNOWN, UNITS_OTHER, UNITS_ORIGIN, UNITS_MEMORY };

static enum units_fault units_convert(const struct units *u, enum units_dimension dimension, const char *text,
                                      double number, double *value)
{
    if (!units_is_tidy(text))
        return UNITS_UNKNOWN;
    ut_unit *unit = ut_parse(u->system, text, UT_UTF8);
    if (!unit)
        return ut_get_status() == UT_OS ? UNITS_MEMORY : UNITS_UNKNOWN;
    enum units_fault fault = UNITS_OTHER;
    if (dimension == UNITS_SPREAD && units_has_origin(u, unit))
        fault = UNITS_ORIGIN;
    else if (u->si[dimension] && units_is_angle(unit) == (dimension == UNITS_ANGLE)) {
        cv_converter *converter = ut_get_converter(unit, u->si[dimension]);
        if (converter) {
            *value = cv_convert_double(converter, number);
            fault = UNITS_GOOD;
            cv_free(converter);
        }
    }
    ut_free(unit);
    return fault;
}

double units_si(const struct units *u, enum units_dimension dimension, const char *unit, double number)
{
    double value = NAN;
    if (!unit[0])
        return number * units_rows[dimension].factor;
    return units_convert(u, dimension, unit, number, &value) == UNITS_GOOD ? value : (double)NAN;
}

static const char *units_hint(const char *unit)
{
    for (size_t i = 0; i < sizeof units_hints / sizeof *units_hints; i++)
        if (strcmp(units_hints[i].typed, unit) == 0)
            return units_hints[i].hint;
    return NULL;
}

static bool units_refuse(struct units_why *why, struct units_want want, const char *format, ...)
    __attribute__((format(printf, 3, 4)));

/* The reason, and behind it how it is written. */
static bool units_refuse(struct units_why *why, struct units_want want, const char *format, ...)
{
    struct text t = {0};
    va_list arguments;
    va_start(arguments, format);
    text_add_list(&t, format, arguments);
    va_end(arguments);
    if (want.unit && want.unit[0])
        text_add(&t, "; give it in %s", want.unit);
    if (want.example)
        text_add(&t, "%s for example %s", want.unit && want.unit[0] ? "," : ";", want.example);
    snprintf(why->text, sizeof why->text, "%s", t.bytes ? t.bytes : "");
    free(t.bytes);
    return false;
}

/* Not a number at all, or one with something odd behind it. */
static bool units_refuse_number(struct units_why *why, struct units_want want, const char *text)
{
    char shown[TEXT_SHOWN];
    static const char *const never[] = {"nan", "inf", "infinity"};
    const char *p = text + (*text == '+' || *text == '-' || *text == '.');
    for (size_t i = 0; i < sizeof never / sizeof *never; i++)
        if (text_distance(p, never[i]) == 0)
            return units_refuse(why, want, "`%s` is not a finite number", text_shown(shown, text));
    if (isdigit((unsigned char)*p))
        return units_refuse(why, want, "`%s` is too long or too large a number", text_shown(shown, text));
    return units_refuse(why, want, "`%s` does not begin with a number", text_shown(shown, text));
}

/* What stands behind the number when it is no unit: NULL, or why not. */
static const char *units_odd_rest(const char *rest)
{
    while (*rest == ' ')
        rest++;
    if (*rest == ',')
        return "a decimal point, no decimal or thousands comma";
    if (strncmp(rest, "+-", 2) == 0 || strncmp(rest, "+/-", 3) == 0 || strncmp(rest, "\xc2\xb1", 2) == 0)
        return "one number only; a standard uncertainty has a key of its own, which ends in _u";
    if (*rest == ':')
        return "one number and one unit, such as 90 min";
    if (strncmp(rest, "x10", 3) == 0 || strncmp(rest, "x 10", 4) == 0 || strncmp(rest, "*10", 3) == 0 || *rest == '^')
        return "powers of ten are written 2.0e-4";
    if ((*rest == 'x' || *rest == 'X' || *rest == '_' || *rest == 'b' || *rest == 'o') &&
        isalnum((unsigned char)rest[1]) && isdigit((unsigned char)rest[-1]))
        return "numbers are decimal, such as 2.0e-4";
    return NULL;
}

static bool units_refuse_unit(struct units_why *why, struct units_want want, const char *unit, enum units_fault fault)
{
    char shown[TEXT_SHOWN];
    const char *hint = units_hint(unit);
    if (fault == UNITS_MEMORY)
        return units_refuse(why, (struct units_want){0}, "out of memory");
    text_shown(shown, unit);
    if (hint) {
        want.unit = NULL; /* the hint names it */
        return units_refuse(why, want, "%s", hint);
    }
    if (fault == UNITS_ORIGIN)
        return units_refuse(why, want, "%s has an origin; a spread of temperature is written in K", shown);
    if (fault == UNITS_UNKNOWN)
        return units_refuse(why, want, "`%s` is not a known unit", shown);
    return units_refuse(why, want, "`%s` is not the unit of %s", shown, units_rows[want.dimension].name);
}

bool units_read(const struct units *u, struct units_want want, const char *text, double *value, struct units_why *why)
{
    double number;
    const char *rest = units_number(text, &number);
    if (!rest)
        return units_refuse_number(why, want, text);
    const char *odd = units_odd_rest(rest);
    if (odd)
        return units_refuse(why, want, "%s", odd);
    while (*rest == ' ')
        rest++;
    const bool plain = !units_rows[want.dimension].si;
    if (!*rest && (plain || want.dimension == UNITS_FRACTION)) {
        *value = number * units_rows[want.dimension].factor;
        return true;
    }
    if (!*rest)
        return units_refuse(why, want, "a number without a unit");
    if (plain)
        return units_hint(rest) ? units_refuse(why, want, "a plain number is wanted; %s", units_hint(rest))
                                : units_refuse(why, want, "a plain number is wanted, without a unit");
    const enum units_fault fault = units_convert(u, want.dimension, rest, number, value);
    return fault == UNITS_GOOD || units_refuse_unit(why, want, rest, fault);
}
