#include "sim/report/terminal_plan.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/report/say.h"
#include "sim/report/terminal_budget.h"
#include "sim/report/terminal_choices.h"

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

/* What the nearest miss could be asked instead, rounded to the safe side. */
static void wider_question(const struct page *page, const struct question *q, const struct outcome *o)
{
    char text[120];
    if (q->has_against && isfinite(o->resolvable_against)) {
        const bool more = q->expect > q->against;
        const double points = say_percent(o->resolvable_against) * 100.0;
        const double safe = (more ? floor(points) : ceil(points)) / 100.0;
        snprintf(text, sizeof text, "ask the wider question (question.against: %.2f %%)", safe);
        if (safe > 0.0)
            page_point(page, text);
    }
    if (q->has_within && isfinite(o->resolvable_within)) {
        const double safe = ceil(say_percent(o->resolvable_within) * 100.0) / 100.0;
        snprintf(text, sizeof text, "ask the wider question (question.within: %.2f %%)", safe);
        page_point(page, text);
    }
}

static void way_out(const struct page *page, const struct question *q, const struct search_result *r)
{
    const bool constants = r->constants_are_limit || (q->has_within && r->within_too_narrow);
    const bool bench = !r->constants_are_limit;
    const char *limit = "The bench is the limit: even with K and a known exactly this plan would not resolve.";
    if (!bench)
        limit = "The constants are the limit, not the bench: with K and a known exactly this plan would resolve.";
    else if (constants)
        limit = "Both are the limit: the uncertainty of K and a alone is too wide, and even with K and a known exactly "
                "this plan would not resolve.";
    page_blank(page);
    page_say(page, PAGE_BOLD, "%s", limit);
    page_say(page, PAGE_PLAIN, "Ways out:");
    if (constants)
        page_point(page, "compare with a fraction found with the same K and a, whose uncertainty cancels then "
                         "(question.against_is: same-constants)");
    if (constants && q->has_against && q->against_is == AGAINST_STATED)
        page_point(page, "measure a second polymer of the same grade alongside, which shares K and a "
                         "(question.against_is: measured)");
    if (bench)
        page_point(page, "offer more replicates, a steadier bath, a finer thermometer or another tube");
    wider_question(page, q, &r->nearest);
}

/* Why nothing was possible: the reasons that were found, each once, with the
 * number of plans that it strikes out. */
static void reasons(const struct page *page, const struct search_result *r)
{
    enum { SHOWN = 5 };
    size_t shown = 0;
    for (size_t i = 0; i < r->count && shown < SHOWN; i++) {
        const char *why = r->candidates[i].outcome.why;
        size_t same = 0, before = 0;
        if (!why[0])
            continue;
        for (size_t k = 0; k < r->count; k++)
            if (strcmp(r->candidates[k].outcome.why, why) == 0) {
                same++;
                if (k < i)
                    before++;
                if (before)
                    break;
            }
        if (before)
            continue;
        page_item(page, say_plural(same, "plan").text, "%s: %s", outcome_status_text(r->candidates[i].outcome.status),
                  why);
        shown++;
    }
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
