#include "sim/report/proposal_choices.h"

#include <math.h>
#include <stdint.h>
#include <stdio.h>

#include "sim/report/decisions.h"
#include "sim/report/markdown.h"
#include "sim/report/proposal_why.h"
#include "sim/report/terminal.h"

static bool paid(const struct proposal *p)
{
    return p->outcome && terminal_paid(p->outcome);
}

struct say proposal_choices_more(const struct proposal *p, const struct outcome *other)
{
    const struct cost_rules *cost = scenario_cost(p->context->scenario);
    const struct outcome *best = &p->planned->search->candidates[p->planned->search->recommended].outcome;
    const bool hours = cost->least == LEAST_HOURS;
    const double more = hours ? round(10.0 * say_hours(other->at.hours_s)) - round(10.0 * say_hours(best->at.hours_s))
                              : round(other->at.money) - round(best->at.money);
    struct say s = {"no more"};
    if (fabs(more) < 0.5)
        return s;
    if (hours)
        snprintf(s.text, sizeof s.text, "%+.1f h", more / 10.0);
    else
        snprintf(s.text, sizeof s.text, "%+.0f %.40s", more, cost->currency);
    return s;
}

static void cost_cells(const struct proposal *p, struct markdown_table *table, const struct outcome *o)
{
    markdown_cell(table, "%.1f", say_hours(o->at.hours_s));
    markdown_cell(table, "%zu", o->days);
    if (paid(p))
        markdown_cell(table, "%.0f", o->at.money);
}

static void empty_cells(const struct proposal *p, struct markdown_table *table)
{
    for (int i = 0; i < (paid(p) ? 3 : 2); i++)
        markdown_cell(table, "-");
}

/* ---- when something resolves ---- */

static void option_row(const struct proposal *p, struct markdown_table *table, size_t key, size_t option)
{
    const struct scenario *s = p->context->scenario;
    const struct search_result *r = p->planned->search;
    const long index = search_choice(s, r, key, option);
    markdown_cell(table, "%s: %s", scenario_key(s, key), scenario_option(s, key, option));
    if (index == SEARCH_NONE) {
        empty_cells(p, table);
        markdown_cell(table, "nothing resolves");
        return;
    }
    const struct outcome *o = &r->candidates[index].outcome;
    cost_cells(p, table, o);
    if (scenario_option_of(s, (size_t)r->recommended, key) == option)
        markdown_cell(table, "recommended");
    else
        markdown_cell(table, "%s", proposal_choices_more(p, o).text);
}

/* ---- when nothing resolves ---- */

static double reached(const struct question *q, const struct outcome *o)
{
    if (o->studies == 0)
        return -1.0;
    return q->has_against ? o->at.power : o->at.within;
}

/* The plan with an option that reaches most; SIZE_MAX when none was played. */
static size_t best_with(const struct proposal *p, size_t key, size_t option)
{
    const struct scenario *s = p->context->scenario;
    const struct question *q = scenario_question(s);
    const struct search_result *r = p->planned->search;
    size_t best = SIZE_MAX;
    for (size_t i = 0; i < r->count; i++) {
        const double here = reached(q, &r->candidates[i].outcome);
        if (here >= 0.0 && scenario_option_of(s, i, key) == option &&
            (best == SIZE_MAX || here > reached(q, &r->candidates[best].outcome)))
            best = i;
    }
    return best;
}

static void missed_row(const struct proposal *p, struct markdown_table *table, size_t key, size_t option)
{
    const struct scenario *s = p->context->scenario;
    const size_t best = best_with(p, key, option);
    markdown_cell(table, "%s: %s", scenario_key(s, key), scenario_option(s, key, option));
    if (best == SIZE_MAX) {
        empty_cells(p, table);
        markdown_cell(table, "impossible");
        return;
    }
    const struct outcome *o = &p->planned->search->candidates[best].outcome;
    cost_cells(p, table, o);
    markdown_cell(table, "%.0f %%", say_percent(reached(scenario_question(s), o)));
}

/* ---- the tables ---- */

static void heading_row(const struct proposal *p, struct markdown_table *table)
{
    markdown_cell(table, "Choice");
    markdown_cell(table, "Hours");
    markdown_cell(table, "Days");
    if (paid(p))
        markdown_cell(table, "%s", scenario_cost(p->context->scenario)->currency);
    if (p->resolves)
        markdown_cell(table, "Beside the plan");
    else
        markdown_cell(table, scenario_question(p->context->scenario)->has_against ? "Power" : "Within");
}

static void options_table(const struct proposal *p, enum decisions decision)
{
    const struct scenario *s = p->context->scenario;
    struct markdown_table table = markdown_table(p->to, paid(p) ? "lrrrr" : "lrrr");
    if (p->resolves)
        markdown_paragraph(p->to, "What the cheapest plan with each option takes:");
    else
        markdown_paragraph(p->to, "Nothing resolves with any of these; this is the most that was reached with each, "
                                  "on a few hundred studies where it is far from what is asked:");
    heading_row(p, &table);
    for (size_t k = 0; k < scenario_keys(s); k++)
        for (size_t o = 0; scenario_options(s, k) > 1 && o < scenario_options(s, k); o++) {
            if (decisions_of(scenario_key(s, k)) != decision)
                continue;
            if (p->resolves)
                option_row(p, &table, k, o);
            else
                missed_row(p, &table, k, o);
        }
    markdown_gap(p->to);
}

/* Keys of a decision that are left open, or that are not. */
static size_t count(const struct scenario *s, enum decisions decision, bool open)
{
    size_t n = 0;
    for (size_t k = 0; k < scenario_keys(s); k++)
        n += decisions_of(scenario_key(s, k)) == decision && (scenario_options(s, k) > 1) == open;
    return n;
}

/* What was not weighed: "tube constant-50, timer by-hand". */
static void settled(const struct proposal *p, enum decisions decision)
{
    const struct scenario *s = p->context->scenario;
    bool any = false;
    if (count(s, decision, false) == 0)
        return;
    fputs("Settled beforehand, with one option each: ", p->to);
    for (size_t k = 0; k < scenario_keys(s); k++) {
        if (decisions_of(scenario_key(s, k)) != decision || scenario_options(s, k) > 1)
            continue;
        fputs(any ? ", " : "", p->to);
        markdown_text(p->to, scenario_key(s, k));
        fputc(' ', p->to);
        markdown_text(p->to, scenario_option(s, k, 0));
        any = true;
    }
    fputs(".\n\n", p->to);
}

/* ---- the figures ---- */

static void figure_of_cost(const struct proposal *p)
{
    const struct search_result *r = p->planned->search;
    const struct question *q = scenario_question(p->context->scenario);
    const bool hours = scenario_cost(p->context->scenario)->least == LEAST_HOURS;
    char shows[400];
    snprintf(shows, sizeof shows,
             "Scatter plot of every plan that was played: what it reaches against its %s. %s resolve, %s fail, %s are "
             "undecided.",
             hours ? "hours" : "price", say_count(r->counts[STATUS_RESOLVES]).text,
             say_count(r->counts[STATUS_FAILS]).text, say_count(r->counts[STATUS_UNDECIDED]).text);
    if (figures_drawn(p->pen, "cost"))
        markdown_figure(p->to, &(struct markdown_figure){"cost.svg", shows,
                                                         "What every plan costs against what it reaches. Plans far "
                                                         "from what is asked are decided on a few hundred studies and "
                                                         "scatter accordingly."});
    if (q->has_against && q->has_within && figures_drawn(p->pen, "share"))
        markdown_figure(p->to, &(struct markdown_figure){"share.svg", shows,
                                                         "The same with the share of studies that come within what "
                                                         "is asked."});
}

static void figure_of_map(const struct proposal *p)
{
    const struct survey_map *m = p->planned->map;
    char shows[400];
    if (!m || !figures_drawn(p->pen, "map"))
        return;
    snprintf(shows, sizeof shows,
             "Map of what the plan reaches over the bath's fluctuation (0.005 to 0.5 K) and the number of fillings of "
             "each level (1 to 6); the plan itself stands at %s K and %zu.",
             say_short(m->fluctuation_now_K, 3).text, m->fillings_now);
    markdown_figure(p->to, &(struct markdown_figure){"map.svg", shows,
                                                     "Where the plan resolves: left of the line it does. Steadier "
                                                     "baths are to the left, more fillings above."});
}

void proposal_choices(const struct proposal *p)
{
    for (int d = 0; d < DECISIONS; d++) {
        const enum decisions decision = (enum decisions)d;
        const bool open = count(p->context->scenario, decision, true) > 0;
        if (decision == DECISIONS_REDUCING && !open)
            continue;
        markdown_heading(p->to, 2, decisions_name(decision));
        if (open)
            options_table(p, decision);
        settled(p, decision);
        if (decision == DECISIONS_GLASS)
            figure_of_cost(p);
        if (decision == DECISIONS_REPLICATES)
            figure_of_map(p);
        if (decision == DECISIONS_TEMPERATURE)
            proposal_why_figure(p);
    }
}
