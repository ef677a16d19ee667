#include "sim/report/report.h"

#include <time.h>

#include "sim/report/candidates_csv.h"
#include "sim/report/figure_budget.h"
#include "sim/report/figure_claimed.h"
#include "sim/report/figure_clock.h"
#include "sim/report/figure_cost.h"
#include "sim/report/figure_estimates.h"
#include "sim/report/figure_extrapolation.h"
#include "sim/report/figure_map.h"
#include "sim/report/figure_margins.h"
#include "sim/report/figure_power.h"
#include "sim/report/figure_tops.h"
#include "sim/report/json_out_plan.h"
#include "sim/report/json_out_print.h"
#include "sim/report/proposal.h"
#include "sim/report/report_files.h"
#include "sim/report/terminal_plan.h"
#include "sim/report/terminal_trial.h"
#include "sim/report/warnings.h"

double report_clock(void)
{
    struct timespec now = {0, 0};
    clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

static bool save_candidates(const struct report_context *context, const struct search_result *search,
                            struct files_failure *failure)
{
    struct files_text text;
    if (!files_text_open(&text))
        return report_files_memory(failure);
    candidates_csv_print(text.stream, context->scenario, search);
    return files_text_save(&text, context->folder, "candidates.csv", failure);
}

/* The figures, then the report that shows them. */
static bool save_proposal(const struct report_context *context, const struct report_planned *planned,
                          const struct warnings *warnings, struct files_failure *failure)
{
    const struct search_result *r = planned->search;
    const struct question *q = scenario_question(context->scenario);
    struct figures_pen pen = {.folder = context->folder, .drawn = GNUPLOT_DRAWN};
    bool good = figure_cost(&pen, context->scenario, r);
    if (good && planned->estimates)
        good = figure_estimates(&pen, q, r->recommended != SEARCH_NONE ? &r->fresh : &r->nearest, planned->estimates);
    if (good && planned->map)
        good = figure_map(&pen, q, planned->map);
    if (good && planned->budget && planned->budget->outcome.studies > 0)
        good = figure_budget(&pen, planned->budget) && figure_claimed(&pen, planned->budget);
    if (good && planned->margins && planned->margins->outcome.studies > 0)
        good = figure_margins(&pen, q, planned->margins);
    if (!good) {
        *failure = pen.failure;
        return false;
    }
    report_files_drawn(context, &pen);
    return proposal_write(context, planned, warnings, &pen, failure);
}

static bool draw_trial(const struct report_context *context, const struct report_tried *tried,
                       struct files_failure *failure)
{
    struct plan plan;
    struct figures_pen pen = {.folder = context->folder, .drawn = GNUPLOT_DRAWN};
    bool good = true;
    scenario_plan(context->scenario, tried->index, &plan);
    if (tried->estimates)
        good = figure_estimates(&pen, scenario_question(context->scenario), tried->outcome, tried->estimates);
    if (good && tried->example)
        good = figure_extrapolation(&pen, &plan, tried->example);
    if (good && tried->notebook)
        good = figure_clock(&pen, tried->notebook);
    if (good && tried->curve)
        good = figure_power(&pen, scenario_question(context->scenario), tried->curve);
    if (good && tried->tops)
        good = figure_tops(&pen, &plan, tried->tops);
    if (good)
        report_files_drawn(context, &pen);
    else
        *failure = pen.failure;
    return good;
}

static struct warnings *plan_warnings(const struct report_context *context, const struct report_planned *planned)
{
    const struct search_result *r = planned->search;
    const struct scenario *s = context->scenario;
    const bool resolves = r->recommended != SEARCH_NONE;
    const long index = resolves ? r->recommended : r->nearest_miss;
    if (index == SEARCH_NONE)
        return warnings_collect(s, NULL, NULL, r->within_too_narrow);
    struct plan plan;
    scenario_plan(s, (size_t)index, &plan);
    struct warnings *w = warnings_collect(s, &plan, resolves ? &r->fresh : &r->nearest, r->within_too_narrow);
    if (w)
        warnings_add_worse(w, s, planned->worse, planned->worse_count);
    return w;
}

int report_plan(const struct report_context *context, const struct report_planned *planned)
{
    const struct search_result *r = planned->search;
    struct files_failure failure = {""};
    struct warnings *warnings = plan_warnings(context, planned);
    json_t *object = warnings ? json_out_plan(context, r, warnings) : NULL;
    bool good = object ? files_folder(context->folder, &failure) : report_files_memory(&failure);
    good = good && report_files_scenario(context, "scenario.resolved.yaml", SIZE_MAX, &failure) &&
           save_candidates(context, r, &failure);
    if (good && r->recommended != SEARCH_NONE)
        good = report_files_scenario(context, "recommended.yaml", (size_t)r->recommended, &failure);
    good = good && report_files_json(context, "plan.json", object, &failure) && save_proposal(context, planned, warnings, &failure) &&
           report_files_log(context, &failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_plan(&page, context, planned, warnings);
        good = report_files_flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : report_files_failed(context, &failure);
}

int report_trial(const struct report_context *context, const struct report_tried *tried)
{
    struct files_failure failure = {""};
    struct plan plan;
    scenario_plan(context->scenario, tried->index, &plan);
    struct warnings *warnings = warnings_collect(context->scenario, &plan, tried->outcome, tried->within_too_narrow);
    json_t *object = warnings ? json_out_trial(context, tried->outcome, warnings) : NULL;
    bool good = object ? files_folder(context->folder, &failure) : report_files_memory(&failure);
    good = good && report_files_scenario(context, "scenario.resolved.yaml", SIZE_MAX, &failure) &&
           report_files_json(context, "trial.json", object, &failure) && draw_trial(context, tried, &failure) &&
           report_files_log(context, &failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_trial(&page, context, tried, warnings);
        good = report_files_flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : report_files_failed(context, &failure);
}

int report_check(const struct report_context *context, double seconds)
{
    struct files_failure failure = {""};
    struct plan plan;
    const bool one = scenario_candidates(context->scenario) == 1;
    if (one)
        scenario_plan(context->scenario, 0, &plan);
    struct warnings *warnings = warnings_collect(context->scenario, one ? &plan : NULL, NULL, false);
    json_t *object = warnings ? json_out_check(context, seconds, warnings) : NULL;
    bool good = object ? true : report_files_memory(&failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_check(&page, context, seconds, warnings);
        good = report_files_flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : report_files_failed(context, &failure);
}
