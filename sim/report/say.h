/* How values are shown: the one place where SI becomes what people read, and
 * the digits that are printed. */
#ifndef VICINAL_REPORT_SAY_H
#define VICINAL_REPORT_SAY_H

#include <stddef.h>

/* SI to display units. */
double say_g_dL(double kg_m3);
double say_dL_g(double m3_kg);
double say_hours(double s);
double say_minutes(double s);
double say_mL(double m3);
double say_g(double kg);
double say_mm2_s2(double m2_s2);
double say_percent(double fraction);
double say_celsius(double K);

/* A short text by value: say_number(x).text lives to the end of the full
 * expression it stands in. */
struct say {
    char text[64];
};

/* The fewest digits (15, 16 or 17) that read back as the same double; "" for
 * what is not finite. */
struct say say_number(double x);

/* A count with its thousands set off: 20,000. */
struct say say_count(size_t n);

/* A fraction or share in %, four significant digits, no trailing zeros:
 * "1.5 %". */
struct say say_share(double fraction);

/* A fraction in % rounded to 0.001 points: "1.391 %". */
struct say say_points(double fraction);

/* A difference of fractions in points, rounded to 0.001: "0.062". */
struct say say_points_of(double difference);

/* A value with `digits` significant digits, plain notation. */
struct say say_digits(double x, int digits);

/* The same without trailing zeros behind the point: 25, not 25.0. */
struct say say_short(double x, int digits);

/* A value with the decimals that two digits of its standard error ask for, or
 * four significant digits where there is none. */
struct say say_by_error(double x, double se);

/* A clock or a while as hours:minutes, the begun minute not counted: "3:05". */
struct say say_clock(double s);

/* How long something takes: "1.5 h", "8 min", "60 s". */
struct say say_while(double s);

/* A volume to be measured out, in mL to 0.01: "4.00 mL". */
struct say say_volume(double m3);

/* "1 day", "2 days". */
struct say say_plural(size_t n, const char *one);

#endif
