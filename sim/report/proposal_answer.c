#include "sim/report/proposal_answer.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/report/described.h"
#include "sim/report/markdown.h"
#include "sim/report/say.h"
#include "sim/report/ways_out.h"

static const struct question *question(const struct proposal *p)
{
    return scenario_question(p->context->scenario);
}

/* ---- the question ---- */

static void limits(const struct proposal *p)
{
    const struct cost_rules *c = scenario_cost(p->context->scenario);
    char text[240] = "";
    size_t used = 0;
    if (isfinite(c->at_most_hours))
        used += (size_t)snprintf(text + used, sizeof text - used, "; %s h", say_short(c->at_most_hours, 4).text);
    if (isfinite(c->at_most_days))
        used += (size_t)snprintf(text + used, sizeof text - used, "; %s days", say_short(c->at_most_days, 4).text);
    if (isfinite(c->at_most_polymer_kg))
        used += (size_t)snprintf(text + used, sizeof text - used, "; %s g of polymer",
                                 say_short(say_g(c->at_most_polymer_kg), 4).text);
    if (isfinite(c->at_most_money))
        snprintf(text + used, sizeof text - used, "; %s %.40s", say_short(c->at_most_money, 6).text, c->currency);
    if (*text)
        markdown_paragraph(p->to, "It may take at most %s.", text + 2);
}

void proposal_answer_question(const struct proposal *p)
{
    static const char *const found[] = {"found elsewhere, so that the uncertainty of K and a counts in full",
                                        "found with the same K and a, whose uncertainty cancels and is left out",
                                        "that of a second polymer of the same grade, which is measured alongside"};
    const struct question *q = question(p);
    markdown_heading(p->to, 2, "The question");
    markdown_paragraph(p->to,
                       "The head-to-head (1,2-glycol) fraction of a vinyl polymer is found by capillary viscometry: "
                       "water and a dilution series are timed, the head-to-head links are cut, the cut polymer is "
                       "timed, both are extrapolated to intrinsic viscosity and turned into molar masses, and the "
                       "difference of their reciprocals gives the fraction. The polymer is thought to hold %s.",
                       say_share(q->expect).text);
    if (q->has_against)
        markdown_paragraph(p->to,
                           "Which study tells it apart from %s (%s, %s confidence, with a power of at least %s)? The "
                           "other fraction is %s.",
                           say_share(q->against).text, q->sides == SIDES_TWO ? "two-sided" : "one-sided",
                           say_share(q->confidence).text, say_share(q->power).text, found[q->against_is]);
    if (q->has_within)
        markdown_paragraph(p->to, "Which study comes within %s points of the true fraction, in at least %s of cases?",
                           say_short(say_percent(q->within), 4).text, say_share(q->confidence).text);
    limits(p);
}

/* ---- the answer ---- */

static struct say known_to(const struct outcome *o, double error)
{
    struct say s;
    if (error > 0.0)
        snprintf(s.text, sizeof s.text, "Monte Carlo error %.20s", say_digits(error, 2).text);
    else
        snprintf(s.text, sizeof s.text, "all of %.20s studies", say_count(o->studies).text);
    return s;
}

void proposal_answer_reached(const struct proposal *p, char *text, size_t size)
{
    const struct question *q = question(p);
    const struct outcome *o = p->outcome;
    const double power = say_percent(o->at.power), power_se = say_percent(o->se.power);
    const double share = say_percent(o->at.within), share_se = say_percent(o->se.within);
    size_t used = 0;
    *text = '\0';
    if (q->has_against)
        used = (size_t)snprintf(text, size, "a power of %s %% (%s; asked: %s)", say_by_error(power, power_se).text,
                                known_to(o, power_se).text, say_share(q->power).text);
    if (q->has_within && used < size)
        snprintf(text + used, size - used, "%s%s %% of studies within %s points of the truth (%s; asked: %s)",
                 q->has_against ? " and " : "", say_by_error(share, share_se).text,
                 say_short(say_percent(q->within), 4).text, known_to(o, share_se).text, say_share(q->confidence).text);
}

static void takes(const struct proposal *p, char *text, size_t size)
{
    const struct outcome *o = p->outcome;
    char money[80] = "";
    if (terminal_paid(o))
        snprintf(money, sizeof money, " and %.0f %.40s", o->at.money, scenario_cost(p->context->scenario)->currency);
    snprintf(text, size, "%s, %s h of work, %s g of polymer%s", say_plural(o->days, "day").text,
             say_digits(say_hours(o->at.hours_s), 3).text, say_digits(say_g(o->polymer_kg), 3).text, money);
}

/* How to read the study's result. */
static void decide(const struct proposal *p)
{
    const struct question *q = question(p);
    const struct outcome *o = p->outcome;
    const bool more = q->expect > q->against;
    if (q->has_against && q->against_is == AGAINST_MEASURED)
        markdown_paragraph(p->to,
                           "Decide at a difference of %s points: when the first polymer's estimate less the second's "
                           "is %s that, the first holds %s.",
                           say_points_of(o->at.critical).text, more ? "above" : "below", more ? "more" : "less");
    else if (q->has_against)
        markdown_paragraph(p->to, "Decide at %s: an estimate %s it is not %s but %s.", say_points(o->at.critical).text,
                           more ? "above" : "below", say_share(q->against).text, more ? "more" : "less");
    else if (isfinite(o->resolvable_within))
        markdown_paragraph(p->to, "In %s of studies the estimate comes within %s points.",
                           say_share(q->confidence).text, say_digits(say_percent(o->resolvable_within), 3).text);
}

static void resolved(const struct proposal *p)
{
    const struct search_result *r = p->planned->search;
    char reached[300], cost[240], *asked = terminal_question(question(p));
    proposal_answer_reached(p, reached, sizeof reached);
    takes(p, cost, sizeof cost);
    markdown_strong(p->to, "It resolves: the plan below %s, with %s.", asked ? asked : "", reached);
    if (r->count == 1)
        markdown_paragraph(p->to, "It takes %s.", cost);
    else
        markdown_paragraph(p->to, "It takes %s, and is the cheapest of the %s that resolve, among %s weighed.", cost,
                           say_count(r->counts[STATUS_RESOLVES]).text, say_plural(r->count, "plan").text);
    decide(p);
    free(asked);
}

static void impossible(const struct proposal *p)
{
    struct ways_out_reason reason[WAYS_OUT_REASONS];
    const size_t count = ways_out_reasons(p->planned->search, reason);
    markdown_paragraph(p->to, "None of them is possible and within what it may cost:");
    for (size_t i = 0; i < count; i++)
        markdown_point(p->to, "%s: %s: %s", say_plural(reason[i].plans, "plan").text,
                       outcome_status_text(reason[i].status), reason[i].why);
    markdown_gap(p->to);
}

static void missed(const struct proposal *p)
{
    const struct search_result *r = p->planned->search;
    char reached[300], cost[240], *asked = terminal_question(question(p));
    struct ways_out ways;
    markdown_strong(p->to, "Nothing resolves: none of the %s offered %s.", say_plural(r->count, "plan").text,
                    asked ? asked : "");
    free(asked);
    if (!p->outcome) {
        impossible(p);
        return;
    }
    proposal_answer_reached(p, reached, sizeof reached);
    takes(p, cost, sizeof cost);
    markdown_paragraph(p->to, "The nearest miss, described below, reaches %s; it takes %s.", reached, cost);
    markdown_paragraph(p->to, "%s", ways_out_limit(question(p), r));
    markdown_heading(p->to, 3, "Ways out");
    ways_out_list(question(p), r, &ways);
    for (size_t i = 0; i < ways.count; i++)
        markdown_point(p->to, "%s", ways.text[i]);
    markdown_gap(p->to);
}

static void estimates(const struct proposal *p)
{
    const struct question *q = question(p);
    char shows[400], caption[300];
    if (!p->outcome || !figures_drawn(p->pen, "estimates"))
        return;
    snprintf(shows, sizeof shows,
             "Histogram of the estimates of %s simulated studies: mean %s %%, standard deviation %s points%s%s.",
             say_count(p->outcome->studies).text, say_digits(say_percent(p->outcome->at.mean), 4).text,
             say_digits(say_percent(p->outcome->at.sd), 2).text, q->has_against ? "; decided at " : "",
             q->has_against ? say_points(p->outcome->at.critical).text : "");
    snprintf(caption, sizeof caption, "How the results of %s simulated studies of this plan scatter%s.",
             say_count(p->outcome->studies).text,
             q->has_against ? ", for both fractions that are to be told apart" : "");
    markdown_figure(p->to, &(struct markdown_figure){"estimates.svg", shows, caption});
}

void proposal_answer_answer(const struct proposal *p)
{
    markdown_heading(p->to, 2, "The answer");
    if (p->resolves)
        resolved(p);
    else
        missed(p);
    estimates(p);
}

/* ---- the plan ---- */

/* A row that is open as long as lines without a label go on with it. */
struct rows {
    struct markdown_table table;
    bool open;
};

static void line(void *context, const char *label, const char *text)
{
    struct rows *rows = context;
    if (*label && rows->open)
        markdown_cell_close(&rows->table);
    if (*label) {
        markdown_cell(&rows->table, "%s", label);
        markdown_cell_open(&rows->table);
        rows->open = true;
    } else {
        fputs("; ", rows->table.to);
    }
    markdown_text(rows->table.to, text);
}

static void warned(const struct proposal *p)
{
    if (p->warnings->count == 0)
        return;
    markdown_heading(p->to, 3, "Warnings");
    for (size_t i = 0; i < p->warnings->count; i++)
        markdown_point(p->to, "%s", p->warnings->text[i]);
    markdown_gap(p->to);
}

void proposal_answer_plan(const struct proposal *p)
{
    struct rows rows = {.table = markdown_table(p->to, "ll")};
    if (p->plan) {
        const struct terminal_subject subject = {
            .scenario = p->context->scenario, .plan = p->plan, .outcome = p->outcome, .index = p->index};
        markdown_heading(p->to, 2, p->resolves ? "The plan" : "The nearest miss");
        markdown_cell(&rows.table, "What");
        markdown_cell(&rows.table, "Plan");
        described_plan(&subject, line, &rows);
        if (rows.open)
            markdown_cell_close(&rows.table);
        markdown_gap(p->to);
    }
    warned(p);
}
