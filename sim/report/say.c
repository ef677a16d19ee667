#include "sim/report/say.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

double say_g_dL(double kg_m3)
{
    return kg_m3 / 10.0;
}
double say_dL_g(double m3_kg)
{
    return m3_kg * 10.0;
}
double say_hours(double s)
{
    return s / 3600.0;
}
double say_minutes(double s)
{
    return s / 60.0;
}
double say_g(double kg)
{
    return kg * 1e3;
}
double say_mm2_s2(double m2_s2)
{
    return m2_s2 * 1e6;
}
double say_percent(double fraction)
{
    return fraction * 100.0;
}
double say_celsius(double K)
{
    return K - 273.15;
}

/* Flasks are whole volumes: the rounding of the conversion is taken off. */
double say_mL(double m3)
{
    return round(m3 * 1e12) / 1e6;
}

struct say say_number(double x)
{
    struct say s = {""};
    if (!isfinite(x))
        return s;
    for (int digits = 15; digits <= 17; digits++) {
        snprintf(s.text, sizeof s.text, "%.*g", digits, x);
        if (!(strtod(s.text, NULL) < x) && !(strtod(s.text, NULL) > x))
            break;
    }
    return s;
}

struct say say_count(size_t n)
{
    struct say s = {""};
    char plain[24];
    const int length = snprintf(plain, sizeof plain, "%zu", n);
    char *to = s.text;
    for (int i = 0; i < length; i++) {
        if (i > 0 && (length - i) % 3 == 0)
            *to++ = ',';
        *to++ = plain[i];
    }
    *to = '\0';
    return s;
}

struct say say_digits(double x, int digits)
{
    struct say s = {"-"};
    if (!isfinite(x))
        return s;
    const double size = fabs(x);
    int decimals = size > 0.0 ? digits - 1 - (int)floor(log10(size)) : 0;
    if (decimals < 0)
        decimals = 0;
    if (decimals > 9)
        decimals = 9;
    snprintf(s.text, sizeof s.text, "%.*f", decimals, x);
    return s;
}

/* Drop zeros behind the last digit that counts, and a bare point. */
static void trim(char *text)
{
    if (!strchr(text, '.'))
        return;
    char *end = text + strlen(text);
    while (end[-1] == '0')
        *--end = '\0';
    if (end[-1] == '.')
        *--end = '\0';
}

struct say say_share(double fraction)
{
    struct say s = say_digits(say_percent(fraction), 4);
    trim(s.text);
    strcat(s.text, " %");
    return s;
}

struct say say_short(double x, int digits)
{
    struct say s = say_digits(x, digits);
    trim(s.text);
    return s;
}

struct say say_points(double fraction)
{
    struct say s = {"-"};
    if (isfinite(fraction))
        snprintf(s.text, sizeof s.text, "%.3f %%", say_percent(fraction));
    return s;
}

struct say say_points_of(double difference)
{
    struct say s = {"-"};
    if (isfinite(difference))
        snprintf(s.text, sizeof s.text, "%.3f", say_percent(difference));
    return s;
}

struct say say_by_error(double x, double se)
{
    struct say s = {"-"};
    if (!isfinite(x))
        return s;
    if (!isfinite(se) || !(se > 0.0))
        return say_digits(x, 4);
    int decimals = 1 - (int)floor(log10(se));
    if (decimals < 0)
        decimals = 0;
    if (decimals > 9)
        decimals = 9;
    snprintf(s.text, sizeof s.text, "%.*f", decimals, x);
    return s;
}

struct say say_clock(double s)
{
    struct say out;
    const unsigned long minutes = (unsigned long)floor(say_minutes(s) + 1e-9);
    snprintf(out.text, sizeof out.text, "%lu:%02lu", minutes / 60, minutes % 60);
    return out;
}

struct say say_while(double s)
{
    struct say out;
    if (s >= 3600.0)
        snprintf(out.text, sizeof out.text, "%.20s h", say_short(say_hours(s), 4).text);
    else if (s > 90.0)
        snprintf(out.text, sizeof out.text, "%.20s min", say_short(say_minutes(s), 3).text);
    else
        snprintf(out.text, sizeof out.text, "%.20s s", say_short(s, 3).text);
    return out;
}

struct say say_volume(double m3)
{
    struct say out;
    snprintf(out.text, sizeof out.text, "%.2f mL", say_mL(m3));
    return out;
}

struct say say_plural(size_t n, const char *one)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%.30s %s%s", say_count(n).text, one, n == 1 ? "" : "s");
    return s;
}
