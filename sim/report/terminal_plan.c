#include "sim/report/terminal_plan.h"

#include <stdlib.h>

#include "sim/report/say.h"
#include "sim/report/terminal_budget.h"
#include "sim/report/terminal_choices.h"
#include "sim/report/ways_out.h"

static struct terminal_subject subject_of(const struct scenario *s, long index, struct plan *plan,
                                          const struct outcome *outcome)
{
    scenario_plan(s, (size_t)index, plan);
    return (struct terminal_subject){.scenario = s, .plan = plan, .outcome = outcome, .index = (size_t)index};
}

static void resolved(const struct page *page, const struct report_context *context, const struct search_result *r)
{
    const struct scenario *s = context->scenario;
    struct plan plan;
    const struct terminal_subject subject = subject_of(s, r->recommended, &plan, &r->fresh);
    char *asked = terminal_question(scenario_question(s));
    page_say(page, PAGE_GOOD, "It resolves: the plan below %s.", asked ? asked : "");
    free(asked);
    terminal_figures(page, &subject);
    page_blank(page);
    page_say(page, PAGE_BOLD, "The cheapest plan that resolves");
    terminal_bench(page, &subject);
}

static void way_out(const struct page *page, const struct question *q, const struct search_result *r)
{
    struct ways_out ways;
    ways_out_list(q, r, &ways);
    page_blank(page);
    page_say(page, PAGE_BOLD, "%s", ways_out_limit(q, r));
    page_say(page, PAGE_PLAIN, "Ways out:");
    for (size_t i = 0; i < ways.count; i++)
        page_point(page, ways.text[i]);
}

static void reasons(const struct page *page, const struct search_result *r)
{
    struct ways_out_reason reason[WAYS_OUT_REASONS];
    const size_t count = ways_out_reasons(r, reason);
    for (size_t i = 0; i < count; i++)
        page_item(page, say_plural(reason[i].plans, "plan").text, "%s: %s", outcome_status_text(reason[i].status),
                  reason[i].why);
}

static void missed(const struct page *page, const struct report_context *context, const struct search_result *r)
{
    const struct scenario *s = context->scenario;
    const struct question *q = scenario_question(s);
    char *asked = terminal_question(q);
    page_say(page, PAGE_BAD, "Nothing resolves: no plan of the %s offered %s.", say_count(r->count).text,
             asked ? asked : "");
    free(asked);
    if (r->nearest_miss == SEARCH_NONE) {
        page_say(page, PAGE_PLAIN, "None of them is possible and within what it may cost:");
        reasons(page, r);
        return;
    }
    struct plan plan;
    const struct terminal_subject subject = subject_of(s, r->nearest_miss, &plan, &r->nearest);
    page_say(page, PAGE_PLAIN, "The nearest miss is the plan below.");
    terminal_figures(page, &subject);
    way_out(page, q, r);
    page_blank(page);
    page_say(page, PAGE_BOLD, "The nearest miss");
    terminal_bench(page, &subject);
}

static void counted(const struct page *page, const struct report_context *context, const struct search_result *r)
{
    page_blank(page);
    page_say(page, PAGE_PLAIN, "%s weighed: %s resolve, %s fail, %s undecided, %s impossible, %s too dear.",
             say_plural(r->count, "plan").text, say_count(r->counts[STATUS_RESOLVES]).text,
             say_count(r->counts[STATUS_FAILS]).text, say_count(r->counts[STATUS_UNDECIDED]).text,
             say_count(r->counts[STATUS_IMPOSSIBLE]).text, say_count(r->counts[STATUS_TOO_DEAR]).text);
    page_say(page, PAGE_PLAIN, "%s simulated studies played; playing every plan to the end would take %s.",
             say_count(r->spent).text, say_count(r->exhaustive).text);
    page_say(page, PAGE_PLAIN, "All plans are in %s/candidates.csv, the figures and the rest beside it.",
             context->folder);
}

void terminal_plan(const struct page *page, const struct report_context *context, const struct report_planned *planned,
                   const struct warnings *warnings)
{
    const struct search_result *r = planned->search;
    if (*scenario_title(context->scenario))
        page_say(page, PAGE_PLAIN, "%s", scenario_title(context->scenario));
    if (r->recommended != SEARCH_NONE)
        resolved(page, context, r);
    else
        missed(page, context, r);
    terminal_choices(page, context->scenario, r);
    terminal_budget_why(page, planned->budget, planned->margins, scenario_cost(context->scenario)->currency);
    terminal_warnings(page, warnings);
    counted(page, context, r);
    if (r->recommended != SEARCH_NONE)
        fprintf(page->to, "Next: vicinal trial %s/recommended.yaml\n", context->folder);
}
