#include "sim/report/proposal_plans.h"

#include <math.h>
#include <stdlib.h>

#include "sim/report/markdown.h"
#include "sim/report/say.h"
#include "sim/report/terminal.h"

/* Keys that get a column of their own; what is open beyond them shares one. */
enum { KEY_COLUMNS = 8 };

/* Which plans stand in the table, and how. */
struct plans {
    const struct proposal *p;
    size_t *index, count, all;
    size_t key[KEY_COLUMNS], keys, further; /* keys with a choice */
    bool paid;
};

static const struct outcome *outcome_at(const struct plans *t, size_t i)
{
    return &t->p->planned->search->candidates[i].outcome;
}

/* ---- which ---- */

static void mark(const struct proposal *p, bool *named)
{
    const struct scenario *s = p->context->scenario;
    const struct search_result *r = p->planned->search;
    for (size_t i = 0; i < r->count; i++)
        named[i] = r->candidates[i].outcome.status == STATUS_RESOLVES;
    if (p->plan)
        named[p->index] = true;
    for (size_t k = 0; k < scenario_keys(s); k++)
        for (size_t o = 0; o < scenario_options(s, k); o++) {
            const long index = search_choice(s, r, k, o);
            if (index != SEARCH_NONE)
                named[index] = true;
        }
}

/* What a plan is sorted by: its cost, rounded as it is shown; when nothing
 * resolves what it misses by. */
static double rank(const struct plans *t, size_t i)
{
    const struct outcome *o = outcome_at(t, i);
    if (!t->p->resolves)
        return scenario_question(t->p->context->scenario)->has_against ? -o->at.power : -o->at.within;
    return scenario_cost(t->p->context->scenario)->least == LEAST_HOURS ? round(10.0 * say_hours(o->at.hours_s))
                                                                        : round(o->at.money);
}

/* The `room` first by rank, then by index, out of those marked: a heap whose
 * root is the last of them would do for more; here each is put into place. */
static void keep(struct plans *t, size_t i, size_t room)
{
    size_t place = t->count < room ? t->count : room;
    const double here = rank(t, i);
    while (place > 0 && rank(t, t->index[place - 1]) > here)
        place--;
    if (place == room)
        return;
    const size_t last = t->count < room ? t->count : room - 1;
    for (size_t k = last; k > place; k--)
        t->index[k] = t->index[k - 1];
    t->index[place] = i;
    if (t->count < room)
        t->count++;
}

static bool choose(struct plans *t)
{
    const struct search_result *r = t->p->planned->search;
    const size_t room = t->p->resolves ? PROPOSAL_PLANS_ROWS : PROPOSAL_PLANS_NEAREST;
    bool *named = calloc(r->count + 1, sizeof *named);
    t->index = calloc(PROPOSAL_PLANS_ROWS + 1, sizeof *t->index);
    if (named && t->index) {
        if (t->p->resolves)
            mark(t->p, named);
        for (size_t i = 0; i < r->count; i++)
            if (r->candidates[i].outcome.studies > 0 && (named[i] || !t->p->resolves)) {
                t->all++;
                keep(t, i, room);
            }
    }
    const bool good = named && t->index;
    free(named);
    return good;
}

static void columns(struct plans *t)
{
    const struct scenario *s = t->p->context->scenario;
    for (size_t k = 0; k < scenario_keys(s); k++) {
        if (scenario_options(s, k) < 2)
            continue;
        if (t->keys < KEY_COLUMNS)
            t->key[t->keys++] = k;
        else
            t->further++;
    }
}

/* ---- the table ---- */

static void heading(const struct plans *t, struct markdown_table *table)
{
    const struct scenario *s = t->p->context->scenario;
    markdown_cell(table, "Plan");
    for (size_t k = 0; k < t->keys; k++)
        markdown_cell(table, "%s", scenario_key(s, t->key[k]));
    if (t->further)
        markdown_cell(table, "further");
    if (scenario_question(s)->has_against)
        markdown_cell(table, "Power / %s", "%");
    if (scenario_question(s)->has_within)
        markdown_cell(table, "Within / %s", "%");
    markdown_cell(table, "Hours");
    markdown_cell(table, "Days");
    if (t->paid)
        markdown_cell(table, "%s", scenario_cost(s)->currency);
}

/* "runs 3, levels 4": of the keys that have no column. */
static void further(const struct plans *t, struct markdown_table *table, size_t i)
{
    const struct scenario *s = t->p->context->scenario;
    bool any = false;
    markdown_cell_open(table);
    for (size_t k = t->key[t->keys - 1] + 1; k < scenario_keys(s); k++) {
        if (scenario_options(s, k) < 2)
            continue;
        fputs(any ? ", " : "", table->to);
        markdown_text(table->to, scenario_key(s, k));
        fputc(' ', table->to);
        markdown_text(table->to, scenario_option(s, k, scenario_option_of(s, i, k)));
        any = true;
    }
    markdown_cell_close(table);
}

static void row(const struct plans *t, struct markdown_table *table, size_t i)
{
    const struct scenario *s = t->p->context->scenario;
    const struct outcome *o = outcome_at(t, i);
    if (t->p->plan && i == t->p->index)
        markdown_cell(table, "%zu %s", i, t->p->resolves ? "recommended" : "nearest miss");
    else
        markdown_cell(table, "%zu", i);
    for (size_t k = 0; k < t->keys; k++)
        markdown_cell(table, "%s", scenario_option(s, t->key[k], scenario_option_of(s, i, t->key[k])));
    if (t->further)
        further(t, table, i);
    if (scenario_question(s)->has_against)
        markdown_cell(table, "%.1f", say_percent(o->at.power));
    if (scenario_question(s)->has_within)
        markdown_cell(table, "%.1f", say_percent(o->at.within));
    markdown_cell(table, "%.1f", say_hours(o->at.hours_s));
    markdown_cell(table, "%zu", o->days);
    if (t->paid)
        markdown_cell(table, "%.0f", o->at.money);
}

static void explain(const struct plans *t)
{
    const struct search_result *r = t->p->planned->search;
    markdown_paragraph(t->p->to, "%s weighed: %s resolve, %s fail, %s undecided, %s impossible, %s too dear.",
                       say_plural(r->count, "plan").text, say_count(r->counts[STATUS_RESOLVES]).text,
                       say_count(r->counts[STATUS_FAILS]).text, say_count(r->counts[STATUS_UNDECIDED]).text,
                       say_count(r->counts[STATUS_IMPOSSIBLE]).text, say_count(r->counts[STATUS_TOO_DEAR]).text);
    if (t->p->resolves && t->count < t->all)
        markdown_paragraph(t->p->to, "The %s cheapest of the %s that resolve:", say_count(t->count).text,
                           say_count(t->all).text);
    else if (t->p->resolves)
        markdown_paragraph(t->p->to, "All that resolve, the cheapest first:");
    else if (t->count > 0)
        markdown_paragraph(t->p->to, "The %s that come nearest:", say_plural(t->count, "plan").text);
}

void proposal_plans(const struct proposal *p)
{
    struct plans t = {.p = p, .paid = p->outcome && terminal_paid(p->outcome)};
    char align[KEY_COLUMNS + 8] = "l";
    size_t used = 1;
    columns(&t);
    markdown_heading(p->to, 2, "All plans");
    if (choose(&t)) {
        const struct question *q = scenario_question(p->context->scenario);
        const size_t texts = t.keys + (t.further > 0), numbers = 2u + q->has_against + q->has_within + t.paid;
        for (size_t i = 0; i < texts + numbers; i++)
            align[used++] = i < texts ? 'l' : 'r';
        align[used] = '\0';
        explain(&t);
        struct markdown_table table = markdown_table(p->to, align);
        if (t.count > 0)
            heading(&t, &table);
        for (size_t i = 0; i < t.count; i++)
            row(&t, &table, t.index[i]);
        markdown_gap(p->to);
    }
    free(t.index);
}
