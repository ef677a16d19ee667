#include "sim/report/terminal_margins.h"

#include "sim/report/figure_margins.h"
#include "sim/report/reasons.h"
#include "sim/report/say.h"
#include "sim/report/terminal_budget.h"
#include "sim/report/terminal_trial.h"

static void condition(const struct page *page, const struct margin *m)
{
    const int pad = 34 - page_width(m->name);
    fprintf(page->to, "  %s%*s %14s ", m->name, pad > 0 ? pad : 0, "", reasons_value(m->nominal, m->unit).text);
    if (m->verdict == MARGIN_FOUND)
        fprintf(page->to, " %s %s +- %s%s%s\n", m->up ? "up to  " : "down to", say_by_error(m->worst, m->se).text,
                say_digits(m->se, 2).text, *m->unit ? " " : "", m->unit);
    else
        fprintf(page->to, " %s %s\n", m->up ? "up:    " : "down:  ", margin_verdict_text(m->verdict));
}

static void conditions(const struct page *page, const struct margins *m)
{
    size_t order[MARGIN_MOST];
    figure_margins_sorted(m, order);
    page_blank(page);
    page_say(page, PAGE_BOLD, "How far each condition may go, the least room first");
    fprintf(page->to, "  %-34s %14s  %s\n", "", "planned", "it still resolves");
    for (size_t i = 0; i < m->count; i++)
        condition(page, &m->margin[order[i]]);
}

void terminal_margins(const struct page *page, const struct report_context *context, size_t index,
                      const struct margins *margins, const struct warnings *warnings)
{
    const struct scenario *s = context->scenario;
    const struct outcome *o = &margins->outcome;
    struct plan plan;
    scenario_plan(s, index, &plan);
    const struct terminal_subject subject = {.scenario = s, .plan = &plan, .outcome = o, .index = index};
    if (*scenario_title(s))
        page_say(page, PAGE_PLAIN, "%s", scenario_title(s));
    terminal_trial_verdict(page, &subject);
    if (o->studies > 0) {
        terminal_budget_why(page, NULL, margins, scenario_cost(s)->currency);
        conditions(page, margins);
    }
    terminal_end(page, context, "margin.json", o, warnings);
}
