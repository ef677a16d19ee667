#include "sim/report/figure_margins.h"

#include <math.h>
#include <string.h>

#include "sim/report/candidates_csv.h"
#include "sim/report/say.h"

enum { COLUMNS = 3, FRAME_UNITS = 54, ROW_UNITS = 186 };
/* Wider than this the axis is logarithmic. */
static const double log_from = 4.0;

/* What one panel spans. */
struct panel {
    double low, high, lowest; /* values; the smallest figure */
};

double figure_margins_room(const struct margin *m)
{
    if (m->verdict == MARGIN_FAILS_ALREADY)
        return 0.0;
    if (m->verdict == MARGIN_WHOLE_RANGE || !(m->nominal > 0.0))
        return (double)INFINITY;
    const double room = m->up ? m->worst / m->nominal : m->worst > 0.0 ? m->nominal / m->worst : (double)INFINITY;
    return room > 1.0 ? room : 1.0;
}

void figure_margins_sorted(const struct margins *margins, size_t order[MARGIN_MOST])
{
    for (size_t i = 0; i < margins->count; i++) {
        const double room = figure_margins_room(&margins->margin[i]);
        size_t place = i;
        for (; place > 0 && figure_margins_room(&margins->margin[order[place - 1]]) > room; place--)
            order[place] = order[place - 1];
        order[place] = i;
    }
}

/* The points of one direction by value, rising. */
static size_t rising(const struct margin *m, size_t place[MARGIN_POINTS])
{
    size_t count = 0;
    for (size_t i = 0; i < m->points && i < MARGIN_POINTS; i++) {
        if (!isfinite(m->figure[i]) || !isfinite(m->at[i]))
            continue;
        size_t at = count++;
        for (; at > 0 && m->at[place[at - 1]] > m->at[i]; at--)
            place[at] = place[at - 1];
        place[at] = i;
    }
    return count;
}

static bool drawable(const struct margin *m)
{
    size_t place[MARGIN_POINTS];
    return m->verdict != MARGIN_WHOLE_RANGE && rising(m, place) > 1;
}

static void row(FILE *to, size_t panel, const struct margin *m, const char *what, const double values[2])
{
    fprintf(to, "%zu,", panel);
    candidates_csv_field(to, m->key);
    fprintf(to, ",%s,%s,%s\n", what, say_number(values[0]).text,
            isfinite(values[1]) ? say_digits(say_percent(values[1]), 6).text : "");
}

/* One direction of one condition; panel 0 is not drawn. */
static void direction(FILE *to, size_t panel, const struct margin *m, struct panel *span)
{
    size_t place[MARGIN_POINTS];
    const size_t count = rising(m, place);
    for (size_t i = 0; i < count; i++) {
        const double at[2] = {m->at[place[i]], m->figure[place[i]]};
        row(to, panel, m, m->up ? "up" : "down", at);
        span->low = fmin(span->low, at[0]);
        span->high = fmax(span->high, at[0]);
        span->lowest = fmin(span->lowest, at[1]);
    }
    if (m->verdict == MARGIN_FOUND)
        row(to, panel, m, "last", (const double[2]){m->worst, (double)NAN});
}

static void describe(FILE *to, size_t panel, const struct margin *m, struct panel span)
{
    char name[24], label[120];
    const bool log = span.low > 0.0 && span.high > log_from * span.low;
    snprintf(name, sizeof name, "label_%zu", panel);
    snprintf(label, sizeof label, *m->unit ? "%.80s / %.30s" : "%.80s", m->name, m->unit);
    gnuplot_text(to, name, label);
    snprintf(name, sizeof name, "log_%zu", panel);
    gnuplot_number(to, name, log ? 1.0 : 0.0);
    snprintf(name, sizeof name, "low_%zu", panel);
    gnuplot_number(to, name, span.low);
    snprintf(name, sizeof name, "high_%zu", panel);
    gnuplot_number(to, name, span.high);
}

/* What all panels come to. */
struct drawing {
    FILE *csv, *variables;
    size_t panels;
    double lowest;
};

/* A condition with all its directions, once. */
static void condition(struct drawing *d, const struct margins *all, size_t first)
{
    const struct margin *m = &all->margin[first];
    struct panel span = {m->nominal, m->nominal, d->lowest};
    bool draw = false;
    for (size_t i = 0; i < all->count; i++)
        draw = draw || (strcmp(all->margin[i].key, m->key) == 0 && drawable(&all->margin[i]));
    draw = draw && d->panels < FIGURE_MARGINS_PANELS;
    const size_t panel = draw ? d->panels + 1 : 0;
    for (size_t i = 0; i < all->count; i++)
        if (strcmp(all->margin[i].key, m->key) == 0)
            direction(d->csv, panel, &all->margin[i], &span);
    const double figure = isnan(all->outcome.at.power) ? all->outcome.at.within : all->outcome.at.power;
    row(d->csv, panel, m, "plan", (const double[2]){m->nominal, figure});
    if (!draw || !(span.high > span.low))
        return;
    d->panels = panel;
    d->lowest = span.lowest;
    describe(d->variables, panel, m, span);
}

static void frame(const struct drawing *d, const struct question *q)
{
    const double bar = q->has_against ? q->power : q->confidence;
    /* what falls further than that leaves the panel */
    const double lowest = 20.0 * floor(say_percent(fmax(d->lowest, bar - 0.4)) / 20.0);
    const size_t lines = (d->panels + COLUMNS - 1) / COLUMNS;
    gnuplot_text(d->variables, "figure_label", q->has_against ? "power / %" : "within / %");
    gnuplot_text(d->variables, "figure_title", q->has_against ? "power" : "studies within");
    gnuplot_number(d->variables, "bar", say_percent(bar));
    gnuplot_number(d->variables, "lowest", lowest > 0.0 ? lowest : 0.0);
    gnuplot_number(d->variables, "panels", (double)d->panels);
    gnuplot_number(d->variables, "height", (double)(FRAME_UNITS + ROW_UNITS * lines));
}

bool figure_margins(struct figures_pen *pen, const struct question *question, const struct margins *margins)
{
    struct files_text csv, text;
    size_t order[MARGIN_MOST];
    if (margins->count == 0)
        return true;
    if (!figures_open(&csv, &text))
        return false;
    struct drawing d = {.csv = csv.stream, .variables = text.stream, .lowest = 0.8};
    fprintf(csv.stream, "panel,condition,what,value [its unit],%s [%%]\n",
            question->has_against ? "power" : "share within");
    figure_margins_sorted(margins, order);
    for (size_t i = 0; i < margins->count; i++) {
        bool before = false;
        for (size_t k = 0; k < i; k++)
            before = before || strcmp(margins->margin[order[k]].key, margins->margin[order[i]].key) == 0;
        if (!before)
            condition(&d, margins, order[i]);
    }
    frame(&d, question);
    if (d.panels > 0)
        return figures_draw(pen, "margins", "margins.gp", &csv, &text);
    files_text_close(&text);
    files_text_free(&text);
    return files_text_save(&csv, pen->folder, "margins.csv", &pen->failure);
}
