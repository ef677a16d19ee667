#include "sim/report/figure_budget.h"

#include <math.h>

#include "sim/report/say.h"

static const double least_shown = 0.001;
enum { ALWAYS_SHOWN = 3, FRAME_UNITS = 96, ROW_UNITS = 30 };

/* Exchanging it changes nothing: the source is not there. (Its first-order share
 * is then noise.) */
static bool absent(const struct budget_group *g)
{
    return !isfinite(g->total) || !(fabs(g->total) > 1e-12);
}

size_t figure_budget_sorted(const struct budget *budget, enum draws_group order[SOURCES])
{
    size_t count = 0;
    for (int g = 0; g < SOURCES; g++) {
        if (absent(&budget->group[g]))
            continue;
        size_t place = count++;
        for (; place > 0 && budget->group[order[place - 1]].total < budget->group[g].total; place--)
            order[place] = order[place - 1];
        order[place] = (enum draws_group)g;
    }
    return count;
}

static void number(FILE *to, double x)
{
    fprintf(to, ",%s", say_digits(say_percent(x), 5).text);
}

static void rows(FILE *to, const struct budget *b, const enum draws_group *order, size_t count)
{
    fputs("source,first order [%],its standard error [%],total [%],its standard error [%],standard deviation alone "
          "[points],its standard error [points]\n",
          to);
    for (size_t i = 0; i < count; i++) {
        const struct budget_group *g = &b->group[order[i]];
        fputs(sources_name(order[i]), to);
        number(to, g->first);
        number(to, g->first_se);
        number(to, g->total);
        number(to, g->total_se);
        number(to, g->alone_sd);
        number(to, g->alone_sd_se);
        fputc('\n', to);
    }
}

/* Where the axis begins: at zero, or below what noise puts below it. */
static double axis_left(const struct budget *b, const enum draws_group *order, size_t shown)
{
    double left = 0.0;
    for (size_t i = 0; i < shown; i++) {
        const struct budget_group *g = &b->group[order[i]];
        left = fmin(left, fmin(g->first - g->first_se, g->total - g->total_se));
    }
    return floor(say_percent(left));
}

bool figure_budget(struct figures_pen *pen, const struct budget *budget)
{
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(budget, order);
    size_t shown = 0;
    struct files_text csv, text;
    while (shown < count && (shown < ALWAYS_SHOWN || budget->group[order[shown]].total >= least_shown))
        shown++;
    if (count == 0)
        return true;
    if (!figures_open(&csv, &text))
        return false;
    rows(csv.stream, budget, order, count);
    gnuplot_number(text.stream, "rows", (double)shown);
    gnuplot_number(text.stream, "left", axis_left(budget, order, shown));
    gnuplot_number(text.stream, "height", (double)(FRAME_UNITS + ROW_UNITS * shown));
    return figures_draw(pen, "budget", "budget.gp", &csv, &text);
}
