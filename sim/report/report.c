#include "sim/report/report.h"

#include <stdlib.h>
#include <string.h>
#include <time.h>

#include "sim/report/candidates_csv.h"
#include "sim/report/figure_clock.h"
#include "sim/report/figure_cost.h"
#include "sim/report/figure_estimates.h"
#include "sim/report/figure_extrapolation.h"
#include "sim/report/figure_map.h"
#include "sim/report/figure_power.h"
#include "sim/report/figure_tops.h"
#include "sim/report/json_out_plan.h"
#include "sim/report/json_out_print.h"
#include "sim/report/run_log.h"
#include "sim/report/terminal_plan.h"
#include "sim/report/terminal_trial.h"
#include "sim/report/warnings.h"

double report_clock(void)
{
    struct timespec now = {0, 0};
    clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

static bool without_memory(struct files_failure *failure)
{
    snprintf(failure->text, sizeof failure->text, "out of memory");
    return false;
}

static int failed(const struct report_context *context, const struct files_failure *failure)
{
    fprintf(context->err, "vicinal: %s\n", *failure->text ? failure->text : "out of memory");
    return 1;
}

/* The scenario with all its lists, or cut to one plan. */
static bool save_scenario(const struct report_context *context, const char *name, size_t index,
                          struct files_failure *failure)
{
    char *yaml = scenario_resolved_yaml(context->scenario, index);
    char *path = yaml ? files_path(context->folder, name) : NULL;
    const bool good = path ? files_write(path, yaml, strlen(yaml), failure) : without_memory(failure);
    free(path);
    free(yaml);
    return good;
}

static bool save_json(const struct report_context *context, const char *name, json_t *object,
                      struct files_failure *failure)
{
    struct files_text text;
    if (!object || !files_text_open(&text))
        return without_memory(failure);
    json_out_print(text.stream, object);
    return files_text_save(&text, context->folder, name, failure);
}

static bool save_candidates(const struct report_context *context, const struct search_result *search,
                            struct files_failure *failure)
{
    struct files_text text;
    if (!files_text_open(&text))
        return without_memory(failure);
    candidates_csv_print(text.stream, context->scenario, search);
    return files_text_save(&text, context->folder, "candidates.csv", failure);
}

static bool save_log(const struct report_context *context, struct files_failure *failure)
{
    struct files_text text;
    if (!files_text_open(&text))
        return without_memory(failure);
    run_log_print(text.stream, context);
    return files_text_save(&text, context->folder, "run.log", failure);
}

/* What came of the figures: without gnuplot their numbers are there, and a
 * figure that failed is no reason to throw the run away; one line says so. */
static void tell_drawn(const struct report_context *context, const struct figures_pen *pen)
{
    if (pen->drawn == GNUPLOT_MISSING)
        fprintf(context->err, "vicinal: no gnuplot, so no figures; their numbers are in %s\n", context->folder);
    else if (pen->drawn == GNUPLOT_FAILED)
        fprintf(context->err, "vicinal: %s\n", pen->failure.text);
}

static bool draw_plan(const struct report_context *context, const struct report_planned *planned,
                      struct files_failure *failure)
{
    const struct search_result *r = planned->search;
    const struct question *q = scenario_question(context->scenario);
    struct figures_pen pen = {.folder = context->folder, .drawn = GNUPLOT_DRAWN};
    bool good = figure_cost(&pen, context->scenario, r);
    if (good && planned->estimates)
        good = figure_estimates(&pen, q, r->recommended != SEARCH_NONE ? &r->fresh : &r->nearest, planned->estimates);
    if (good && planned->map)
        good = figure_map(&pen, q, planned->map);
    if (good)
        tell_drawn(context, &pen);
    else
        *failure = pen.failure;
    return good;
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
        tell_drawn(context, &pen);
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

/* The answer on stdout; false when it could not be written. */
static bool flushed(const struct report_context *context, struct files_failure *failure)
{
    if (fflush(context->out) == 0 && !ferror(context->out))
        return true;
    snprintf(failure->text, sizeof failure->text, "the answer could not be written");
    return false;
}

int report_plan(const struct report_context *context, const struct report_planned *planned)
{
    const struct search_result *r = planned->search;
    struct files_failure failure = {""};
    struct warnings *warnings = plan_warnings(context, planned);
    json_t *object = warnings ? json_out_plan(context, r, warnings) : NULL;
    bool good = object ? files_folder(context->folder, &failure) : without_memory(&failure);
    good = good && save_scenario(context, "scenario.resolved.yaml", SIZE_MAX, &failure) &&
           save_candidates(context, r, &failure);
    if (good && r->recommended != SEARCH_NONE)
        good = save_scenario(context, "recommended.yaml", (size_t)r->recommended, &failure);
    good = good && save_json(context, "plan.json", object, &failure) && draw_plan(context, planned, &failure) &&
           save_log(context, &failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_plan(&page, context, planned, warnings);
        good = flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : failed(context, &failure);
}

int report_trial(const struct report_context *context, const struct report_tried *tried)
{
    struct files_failure failure = {""};
    struct plan plan;
    scenario_plan(context->scenario, tried->index, &plan);
    struct warnings *warnings = warnings_collect(context->scenario, &plan, tried->outcome, tried->within_too_narrow);
    json_t *object = warnings ? json_out_trial(context, tried->outcome, warnings) : NULL;
    bool good = object ? files_folder(context->folder, &failure) : without_memory(&failure);
    good = good && save_scenario(context, "scenario.resolved.yaml", SIZE_MAX, &failure) &&
           save_json(context, "trial.json", object, &failure) && draw_trial(context, tried, &failure) &&
           save_log(context, &failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_trial(&page, context, tried, warnings);
        good = flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : failed(context, &failure);
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
    bool good = object ? true : without_memory(&failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_check(&page, context, seconds, warnings);
        good = flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : failed(context, &failure);
}
