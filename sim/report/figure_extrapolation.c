#include "sim/report/figure_extrapolation.h"

#include <math.h>

#include "sim/report/say.h"

enum { CURVES = 2 };

static const char *const series_name[SERIES] = {"intact", "cleaved"};

static const char *axis(enum extrapolation e)
{
    switch (e) {
    case HUGGINS:
        return "ηsp/c / (dL/g)";
    case KRAEMER:
        return "ln(ηr)/c / (dL/g)";
    case MARTIN:
        return "ln(ηsp/c), with ηsp/c in dL/g";
    case COMMON_INTERCEPT:
        return "ηsp/c and ln(ηr)/c / (dL/g)";
    case SINGLE_POINT:
        return "√(2(ηsp − ln ηr))/c / (dL/g)";
    }
    return "";
}

/* The ordinate of one level in SI: curve 1 is common-intercept's second. */
static double ordinate(enum extrapolation e, int curve, const struct example_level *level)
{
    const double c = level->concentration_kg_m3, r = level->relative_viscosity, sp = r - 1.0;
    if (e == KRAEMER || (e == COMMON_INTERCEPT && curve == 1))
        return log(r) / c;
    if (e == MARTIN)
        return log(sp / c);
    if (e == SINGLE_POINT)
        return sqrt(2.0 * (sp - log(r))) / c;
    return sp / c;
}

/* SI to the axis: m3/kg to dL/g, of a logarithm by adding one. */
static double on_axis(enum extrapolation e, double y)
{
    return e == MARTIN ? y + log(say_dL_g(1.0)) : say_dL_g(y);
}

/* Line or level value at the concentration c (SI), on the axis. */
static double fitted(enum extrapolation e, const struct example *x, int series, int curve, double c)
{
    if (e == SINGLE_POINT)
        return say_dL_g(x->intrinsic_m3_kg[series]);
    return on_axis(e, x->intercept[series][curve] + x->slope[series][curve] * c);
}

static void row(FILE *to, const char *series, const char *kind, double c, double y)
{
    if (isfinite(c) && isfinite(y))
        fprintf(to, "%s,%s,%s,%s\n", series, kind, say_number(say_g_dL(c)).text, say_number(y).text);
}

static void rows(FILE *to, enum extrapolation e, const struct example *x)
{
    static const char *const point[CURVES] = {"level", "level 2"}, *const line[CURVES] = {"line", "line 2"};
    const int curves = e == COMMON_INTERCEPT ? 2 : 1;
    fputs("series,what,concentration [g/dL],ordinate [see axis]\n", to);
    for (int s = 0; s < SERIES; s++)
        for (int k = 0; k < curves; k++) {
            double top = 0.0;
            for (size_t j = 0; j < x->levels[s]; j++) {
                const struct example_level *level = &x->level[s][j];
                row(to, series_name[s], point[k], level->concentration_kg_m3, on_axis(e, ordinate(e, k, level)));
                if (level->concentration_kg_m3 > top)
                    top = level->concentration_kg_m3;
            }
            if (k == 0)
                row(to, series_name[s], "intercept", 0.0, fitted(e, x, s, k, 0.0));
            row(to, series_name[s], line[k], 0.0, fitted(e, x, s, k, 0.0));
            row(to, series_name[s], line[k], top, fitted(e, x, s, k, top));
        }
}

static void variables(FILE *to, enum extrapolation e, const struct example *x)
{
    char text[120];
    gnuplot_text(to, "y_label", axis(e));
    for (int s = 0; s < SERIES; s++) {
        snprintf(text, sizeof text, "%s: [η] = %s dL/g", series_name[s],
                 say_digits(say_dL_g(x->intrinsic_m3_kg[s]), 4).text);
        gnuplot_text(to, s == INTACT ? "intact_title" : "cleaved_title", text);
    }
    gnuplot_number(to, "curves", e == COMMON_INTERCEPT ? 2.0 : 1.0);
    gnuplot_text(to, "note", isfinite(x->estimate) ? say_points(x->estimate).text : "no answer");
}

bool figure_extrapolation(struct figures_pen *pen, const struct plan *plan, const struct example *example)
{
    const enum extrapolation e = plan->analysis.extrapolation;
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    rows(csv.stream, e, example);
    variables(text.stream, e, example);
    return figures_draw(pen, "extrapolation", "extrapolation.gp", &csv, &text);
}
