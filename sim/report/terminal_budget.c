#include "sim/report/terminal_budget.h"

#include <math.h>

#include "sim/report/figure_budget.h"
#include "sim/report/reasons.h"
#include "sim/report/say.h"
#include "sim/report/terminal_trial.h"

void terminal_budget_why(const struct page *page, const struct budget *budget, const struct margins *margins,
                         const char *currency)
{
    struct reasons why = {0};
    if (budget)
        reasons_budget(&why, budget);
    if (margins)
        reasons_margins(&why, margins, currency);
    if (why.count == 0)
        return;
    page_blank(page);
    page_say(page, PAGE_BOLD, "Why");
    for (size_t i = 0; i < why.count; i++)
        page_point(page, why.text[i]);
}

/* "24.20 +- 0.41", right in its columns. */
static void share(const struct page *page, double x, double se)
{
    const double error = say_percent(se);
    fprintf(page->to, "  %7s +- %-5s", say_by_error(say_percent(x), error).text, say_digits(error, 2).text);
}

static void shares(const struct page *page, const struct budget *b)
{
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(b, order);
    page_blank(page);
    page_say(page, PAGE_BOLD, "Shares of the variance, from %s pairs of studies", say_count(b->studies).text);
    fprintf(page->to, "  %-20s  %16s  %16s  %16s\n", "", "by itself, %", "in total, %", "alone, points");
    for (size_t i = 0; i < count; i++) {
        const struct budget_group *g = &b->group[order[i]];
        fprintf(page->to, "  %-20s", sources_name(order[i]));
        share(page, g->first, g->first_se);
        share(page, g->total, g->total_se);
        fprintf(page->to, "  %16s\n", say_digits(say_percent(g->alone_sd), 3).text);
    }
    page_say(page, PAGE_PLAIN,
             "(In total: with all it takes part in. Alone: the standard deviation that it causes "
             "when every other spread is zero.)");
    if (b->left_out > 0.0)
        page_say(page, PAGE_PLAIN, "At most %s of the pairs gave no answer and are left out.",
                 say_share(b->left_out).text);
}

static void shifts(const struct page *page, const struct budget *b)
{
    page_blank(page);
    page_say(page, PAGE_BOLD, "Shifts of the mean, points");
    for (int i = 0; i < BUDGET_BIASES; i++) {
        const double shift = say_percent(b->bias[i].shift), se = say_percent(b->bias[i].se);
        if (isfinite(shift))
            fprintf(page->to, se >= 0.00005 ? "  %-36s %+.4f +- %.4f\n" : "  %-36s %+.4f\n",
                    budget_bias_name((enum budget_bias)i), shift, se);
    }
}

void terminal_budget(const struct page *page, const struct report_context *context, size_t index,
                     const struct budget *budget, const struct warnings *warnings)
{
    const struct scenario *s = context->scenario;
    const struct outcome *o = &budget->outcome;
    struct plan plan;
    scenario_plan(s, index, &plan);
    const struct terminal_subject subject = {.scenario = s, .plan = &plan, .outcome = o, .index = index};
    if (*scenario_title(s))
        page_say(page, PAGE_PLAIN, "%s", scenario_title(s));
    terminal_trial_verdict(page, &subject);
    if (o->studies > 0) {
        terminal_budget_why(page, budget, NULL, "");
        shares(page, budget);
        shifts(page, budget);
    }
    terminal_end(page, context, "budget.json", o, warnings);
}
