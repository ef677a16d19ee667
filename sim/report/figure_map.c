#include "sim/report/figure_map.h"

#include <math.h>

#include "sim/report/gnuplot.h"
#include "sim/report/say.h"

/* Half a step of the logarithmic scale, as a factor. */
static double half_step(const struct survey_map *m)
{
    return sqrt(m->fluctuation_K[1] / m->fluctuation_K[0]);
}

/* Where the figure falls through the bar along a row of fillings, linear in the
 * logarithm; the left edge when it is below all along, the right one when it
 * never falls. */
static double crossing(const struct survey_map *m, size_t row, double bar)
{
    if (!(m->figure[0][row] >= bar))
        return m->fluctuation_K[0] / half_step(m);
    for (size_t i = 1; i < SURVEY_BATHS; i++) {
        const double before = m->figure[i - 1][row], here = m->figure[i][row];
        if (here < bar)
            return m->fluctuation_K[i - 1] *
                   pow(m->fluctuation_K[i] / m->fluctuation_K[i - 1], (before - bar) / (before - here));
    }
    return m->fluctuation_K[SURVEY_BATHS - 1] * half_step(m);
}

static void rows(FILE *to, const struct survey_map *m, double bar)
{
    const double half = half_step(m);
    fputs("what,fluctuation [K],from [K],to [K],fillings,figure [%]\n", to);
    for (size_t i = 0; i < SURVEY_BATHS; i++)
        for (size_t j = 0; j < SURVEY_FILLINGS; j++) {
            if (isnan(m->figure[i][j]))
                continue;
            const double K = m->fluctuation_K[i];
            fprintf(to, "cell,%s,%s,%s,%zu,%s\n", say_digits(K, 6).text, say_digits(K / half, 6).text,
                    say_digits(K * half, 6).text, j + 1, say_digits(say_percent(m->figure[i][j]), 6).text);
        }
    for (size_t j = 0; j < SURVEY_FILLINGS; j++)
        if (!isnan(m->figure[0][j]))
            fprintf(to, "bar,%s,,,%zu,%s\n", say_digits(crossing(m, j, bar), 6).text, j + 1,
                    say_digits(say_percent(bar), 6).text);
}

bool figure_map(struct figures_pen *pen, const struct question *question, const struct survey_map *map)
{
    const double bar = question->has_against ? question->power : question->confidence;
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    rows(csv.stream, map, bar);
    gnuplot_text(text.stream, "figure_label", question->has_against ? "power / %" : "studies within / %");
    gnuplot_number(text.stream, "bar", say_percent(bar));
    gnuplot_number(text.stream, "now", map->fluctuation_now_K);
    gnuplot_number(text.stream, "fillings", (double)map->fillings_now);
    return figures_draw(pen, "map", "map.gp", &csv, &text);
}
