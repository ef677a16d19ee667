#include "sim/report/proposal_why.h"

#include <math.h>
#include <string.h>

#include "sim/report/figure_budget.h"
#include "sim/report/figure_margins.h"
#include "sim/report/markdown.h"
#include "sim/report/reasons.h"
#include "sim/report/say.h"

static bool played_budget(const struct proposal *p)
{
    return p->planned->budget && p->planned->budget->outcome.studies > 0;
}

static bool played_margins(const struct proposal *p)
{
    return p->planned->margins && p->planned->margins->outcome.studies > 0;
}

static void sentences(FILE *to, const struct reasons *why)
{
    for (size_t i = 0; i < why->count; i++)
        markdown_point(to, "%s", why->text[i]);
    markdown_gap(to);
}

/* ---- the budget ---- */

/* "24.2 ± 0.4" in %. */
static void with_error(struct markdown_table *table, double value, double se)
{
    const double error = say_percent(se);
    const int decimals = error >= 0.095 ? 1 : 2;
    if (!isfinite(value))
        markdown_cell(table, "-");
    else
        markdown_cell(table, "%.*f ± %.*f", decimals, say_percent(value), decimals, error);
}

static void budget_figure(const struct proposal *p, const struct budget *b)
{
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(b, order);
    char shows[300] = "Bar chart of the share of the variance that each source of error is behind. ";
    if (count == 0 || !figures_drawn(p->pen, "budget"))
        return;
    const size_t used = strlen(shows);
    snprintf(shows + used, sizeof shows - used, "The greatest is %s with %.1f %%; the table below has them all.",
             sources_name(order[0]), say_percent(b->group[order[0]].total));
    markdown_figure(p->to, &(struct markdown_figure){"budget.svg", shows,
                                                     "Which source of error is behind how much of the variance of the "
                                                     "result, with Monte Carlo errors; sources below 0.1 % are left "
                                                     "out."});
}

static void shares(const struct proposal *p, const struct budget *b)
{
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(b, order);
    struct markdown_table table = markdown_table(p->to, "lrrr");
    markdown_heading(p->to, 3, "Shares of the variance");
    markdown_paragraph(p->to,
                       "From %s pairs of simulated studies (Sobol' indices by Jansen's estimators). In total: with all "
                       "that a source takes part in. Alone: the standard deviation that it causes when every other "
                       "spread is zero.",
                       say_count(b->studies).text);
    markdown_cell(&table, "Source");
    markdown_cell(&table, "By itself / %s", "%");
    markdown_cell(&table, "In total / %s", "%");
    markdown_cell(&table, "Alone / points");
    for (size_t i = 0; i < count; i++) {
        const struct budget_group *g = &b->group[order[i]];
        markdown_cell(&table, "%s", sources_name(order[i]));
        with_error(&table, g->first, g->first_se);
        with_error(&table, g->total, g->total_se);
        markdown_cell(&table, "%s", say_digits(say_percent(g->alone_sd), 3).text);
    }
    markdown_gap(p->to);
    if (b->left_out > 0.0)
        markdown_paragraph(p->to, "At most %s of the pairs gave no answer and are left out.",
                           say_share(b->left_out).text);
}

static void shifts(const struct proposal *p, const struct budget *b)
{
    struct markdown_table table = markdown_table(p->to, "lr");
    markdown_heading(p->to, 3, "Shifts of the mean");
    markdown_paragraph(p->to, "What the mean of the results shifts by when a correction is neglected, or by an effect "
                              "that is there:");
    markdown_cell(&table, "Correction or effect");
    markdown_cell(&table, "Shift / points");
    for (int i = 0; i < BUDGET_BIASES; i++) {
        const double shift = say_percent(b->bias[i].shift), se = say_percent(b->bias[i].se);
        markdown_cell(&table, "%s", budget_bias_name((enum budget_bias)i));
        if (!isfinite(shift))
            markdown_cell(&table, "-");
        else if (se >= 0.00005)
            markdown_cell(&table, "%+.4f ± %.4f", shift, se);
        else
            markdown_cell(&table, "%+.4f", shift);
    }
    markdown_gap(p->to);
}

static void claimed(const struct proposal *p, const struct budget *b)
{
    char shows[200];
    if (!isfinite(b->coverage) || !figures_drawn(p->pen, "claimed"))
        return;
    snprintf(shows, sizeof shows, "Bar: the claimed 95 %% interval holds the truth in %.1f %% of simulated studies.",
             say_percent(b->coverage));
    markdown_figure(p->to, &(struct markdown_figure){"claimed.svg", shows,
                                                     "How often the 95 % interval that is claimed from one notebook "
                                                     "(line fits, glassware, water; Welch-Satterthwaite) holds the "
                                                     "truth."});
}

void proposal_why_budget(const struct proposal *p)
{
    const struct budget *b = p->planned->budget;
    struct reasons why = {0};
    if (!played_budget(p))
        return;
    reasons_budget(&why, b);
    markdown_heading(p->to, 2, "Error budget");
    sentences(p->to, &why);
    budget_figure(p, b);
    shares(p, b);
    shifts(p, b);
    claimed(p, b);
}

/* ---- the margins ---- */

void proposal_why_figure(const struct proposal *p)
{
    if (!played_margins(p) || !figures_drawn(p->pen, "margins"))
        return;
    markdown_figure(p->to,
                    &(struct markdown_figure){
                        "margins.svg",
                        "Small panels, one for each of the conditions with the least room: how what the plan "
                        "reaches falls as the condition gets worse. The table of margins has the numbers.",
                        "How what the plan reaches falls with each condition, one at a time; the conditions with "
                        "the least room, the tightest first."});
}

static void condition(struct markdown_table *table, const struct margin *m)
{
    markdown_cell(table, "%s", m->name);
    markdown_cell(table, "%s", reasons_value(m->nominal, m->unit).text);
    if (m->verdict == MARGIN_FOUND)
        markdown_cell(table, "%s %s%s%s ± %s", m->up ? "up to" : "down to", say_by_error(m->worst, m->se).text,
                      *m->unit ? " " : "", m->unit, say_digits(m->se, 2).text);
    else
        markdown_cell(table, "%s: %s", m->up ? "up" : "down", margin_verdict_text(m->verdict));
}

void proposal_why_margins(const struct proposal *p)
{
    const struct margins *m = p->planned->margins;
    struct markdown_table table = markdown_table(p->to, "lrr");
    struct reasons why = {0};
    size_t order[MARGIN_MOST];
    if (!played_margins(p))
        return;
    reasons_margins(&why, m, scenario_cost(p->context->scenario)->currency);
    figure_margins_sorted(m, order);
    markdown_heading(p->to, 2, "Margins");
    sentences(p->to, &why);
    if (m->count == 0 || figure_margins_room(&m->margin[order[m->count - 1]]) <= 0.0)
        return; /* none has a margin */
    markdown_paragraph(p->to,
                       "How far each condition may go, all others as planned, until the plan no longer resolves; "
                       "± is the Monte Carlo uncertainty. The least room comes first.");
    markdown_cell(&table, "Condition");
    markdown_cell(&table, "Planned");
    markdown_cell(&table, "It still resolves");
    for (size_t i = 0; i < m->count; i++)
        condition(&table, &m->margin[order[i]]);
    markdown_gap(p->to);
}
