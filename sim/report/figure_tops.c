#include "sim/report/figure_tops.h"

#include <math.h>

#include "sim/report/gnuplot.h"
#include "sim/report/say.h"

static const char *const line_name[SURVEY_EXTRAPOLATIONS] = {"Huggins", "Kraemer", "Martin", "common intercept",
                                                            "single point"};

bool figure_tops(struct figures_pen *pen, const struct plan *plan, const struct survey_tops *tops)
{
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    fputs("extrapolation,top relative viscosity [1],standard deviation [points],bias [points]\n", csv.stream);
    for (size_t e = 0; e < SURVEY_EXTRAPOLATIONS; e++)
        for (size_t i = 0; i < SURVEY_TOPS; i++) {
            if (isnan(tops->sd[i][e]))
                continue;
            fprintf(csv.stream, "%s,%s,", line_name[e], say_digits(tops->top[i], 4).text);
            fprintf(csv.stream, "%s,", say_digits(say_percent(tops->sd[i][e]), 4).text);
            fprintf(csv.stream, "%s\n", say_digits(say_percent(tops->bias[i][e]), 4).text);
        }
    gnuplot_number(text.stream, "height", 520.0);
    gnuplot_number(text.stream, "now", plan->top[CLEAVED]);
    return figures_draw(pen, "tops", "tops.gp", &csv, &text);
}
