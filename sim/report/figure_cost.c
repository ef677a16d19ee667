#include "sim/report/figure_cost.h"

#include <math.h>

#include "sim/report/say.h"

/* What stands on the figure's axes. */
struct cost_axes {
    bool hours, share; /* hours, else money; the share within, else power */
};

static double cost_of(struct cost_axes axes, const struct outcome *o)
{
    return axes.hours ? say_hours(o->at.hours_s) : o->at.money;
}

static double reached(struct cost_axes axes, const struct outcome *o)
{
    return say_percent(axes.share ? o->at.within : o->at.power);
}

static void line(FILE *to, struct cost_axes axes, size_t index, const char *status, const struct outcome *o)
{
    const double cost = cost_of(axes, o), reach = reached(axes, o);
    if (!isfinite(cost) || !isfinite(reach))
        return;
    fprintf(to, "%zu,%s,%s,%s,%zu\n", index, status, say_number(cost).text, say_number(reach).text, o->studies);
}

static void rows(FILE *to, struct cost_axes axes, const struct scenario *s, const struct search_result *r)
{
    fprintf(to, "index,status,%s [%s],%s [%%],studies [1]\n", axes.hours ? "hours" : "money",
            axes.hours ? "h" : scenario_cost(s)->currency, axes.share ? "share within" : "power");
    for (size_t i = 0; i < r->count; i++) {
        const struct outcome *o = &r->candidates[i].outcome;
        if (o->studies > 0)
            line(to, axes, i, outcome_status_text(o->status), o);
    }
    if (r->recommended != SEARCH_NONE)
        line(to, axes, (size_t)r->recommended, "recommended", &r->fresh);
    else if (r->nearest_miss != SEARCH_NONE)
        line(to, axes, (size_t)r->nearest_miss, "nearest miss", &r->nearest);
}

/* How many plans of a status were played, and so have a point. */
static size_t played(const struct search_result *r, enum status status)
{
    size_t n = 0;
    for (size_t i = 0; i < r->count; i++)
        if (r->candidates[i].outcome.status == status && r->candidates[i].outcome.studies > 0)
            n++;
    return n;
}

static void variables(FILE *to, struct cost_axes axes, const struct scenario *s, const struct search_result *r)
{
    const struct question *q = scenario_question(s);
    char text[160];
    if (axes.hours)
        gnuplot_text(to, "cost_label", "hours with preparation / h");
    else {
        snprintf(text, sizeof text, "money / %.40s", scenario_cost(s)->currency);
        gnuplot_text(to, "cost_label", text);
    }
    if (axes.share)
        snprintf(text, sizeof text, "studies within %s points / %%", say_short(say_percent(q->within), 4).text);
    else
        snprintf(text, sizeof text, "power, %s against %s / %%", say_share(q->expect).text, say_share(q->against).text);
    gnuplot_text(to, "reach_label", text);
    gnuplot_number(to, "bar", say_percent(axes.share ? q->confidence : q->power));
    for (int i = 0; i < STATUSES; i++) {
        static const char *const name[STATUSES] = {"resolving", "failing", "undecided", "impossible", "dear"};
        gnuplot_number(to, name[i], (double)played(r, (enum status)i));
    }
    gnuplot_text(to, "mark", r->recommended != SEARCH_NONE ? "recommended" : "nearest miss");
}

static bool draw(struct figures_pen *pen, struct cost_axes axes, const struct scenario *s,
                 const struct search_result *r)
{
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    rows(csv.stream, axes, s, r);
    variables(text.stream, axes, s, r);
    return figures_draw(pen, axes.share && scenario_question(s)->has_against ? "share" : "cost", "cost.gp", &csv,
                        &text);
}

bool figure_cost(struct figures_pen *pen, const struct scenario *scenario, const struct search_result *search)
{
    const struct question *q = scenario_question(scenario);
    struct cost_axes axes = {.hours = scenario_cost(scenario)->least == LEAST_HOURS};
    bool good = true;
    size_t points = 0;
    for (int i = 0; i < STATUSES; i++)
        points += played(search, (enum status)i);
    if (points == 0)
        return true; /* nothing was possible, so nothing to draw */
    if (q->has_against)
        good = draw(pen, axes, scenario, search);
    axes.share = true;
    if (q->has_within)
        good = draw(pen, axes, scenario, search) && good;
    return good;
}
