#include "sim/report/figure_power.h"

#include "sim/report/gnuplot.h"
#include "sim/report/say.h"

bool figure_power(struct figures_pen *pen, const struct question *question, const struct survey_curve *curve)
{
    char text[120];
    struct files_text csv, variables;
    if (!figures_open(&csv, &variables))
        return false;
    fputs("true fraction [%],called different [%],standard error [%]\n", csv.stream);
    for (size_t i = 0; i < SURVEY_FRACTIONS; i++)
        fprintf(csv.stream, "%s,%s,%s\n", say_digits(say_percent(curve->fraction[i]), 8).text,
                say_digits(say_percent(curve->power[i]), 6).text, say_digits(say_percent(curve->se[i]), 3).text);
    snprintf(text, sizeof text, "studies that call it different from %s / %%", say_share(question->against).text);
    gnuplot_text(variables.stream, "reach_label", text);
    gnuplot_number(variables.stream, "against", say_percent(question->against));
    gnuplot_number(variables.stream, "expect", say_percent(question->expect));
    gnuplot_number(variables.stream, "bar", say_percent(question->power));
    return figures_draw(pen, "power", "power.gp", &csv, &variables);
}
