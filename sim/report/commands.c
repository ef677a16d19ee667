#include "sim/report/commands.h"

#include <string.h>

#include "sim/judge/forecast.h"
#include "sim/report/json_out_print.h"
#include "sim/report/kit_print.h"
#include "sim/report/progress.h"
#include "sim/report/report_budget.h"
#include "sim/report/report_margin.h"
#include "sim/report/sheet.h"
#include "sim/report/times.h"

static int out_of_memory(const struct report_context *context)
{
    fputs("vicinal: out of memory\n", context->err);
    return COMMANDS_FAILED;
}

static void on_progress(void *context, double done)
{
    progress_update(context, done);
}

/* What is reported of a search besides itself, about the recommended plan or
 * the nearest miss: estimates from the studies its figures come from, the
 * resolving map, where more work makes it worse, its budget and margins. */
struct around {
    struct estimates estimates;
    struct survey_map map;
    struct worse worse[4];
    size_t worse_count;
    struct budget budget;
    struct margins margins;
    bool has_plan;
};

static bool look_around(const struct scenario *s, const struct search_result *r, struct around *out)
{
    const bool found = r->recommended != SEARCH_NONE;
    const long index = found ? r->recommended : r->nearest_miss;
    struct plan plan;
    struct outcome again;
    memset(out, 0, sizeof *out);
    if (index == SEARCH_NONE) return true;
    scenario_plan(s, (size_t)index, &plan);
    out->has_plan = true;
    return trial_run(s, &plan, (struct trial_options){.first_study = found ? search_fresh_study(s) : 0}, &again, &out->estimates) &&
           survey_map_make(s, &plan, &out->map) &&
           worse_find(s, (size_t)index, sizeof out->worse / sizeof *out->worse, out->worse, &out->worse_count) &&
           budget_run(s, &plan, (struct budget_options){0}, &out->budget) && margin_run(s, &plan, (struct margin_options){0}, &out->margins);
}

int commands_plan(const struct report_context *context, const struct commands_options *options)
{
    struct around around = {.worse_count = 0};
    struct search_result result;
    struct progress progress;
    progress_start(&progress, context->err, options->quiet);
    bool ok = search_run(context->scenario, (struct search_options){.progress = on_progress, .context = &progress}, &result);
    const bool searched = ok;
    if (ok) ok = look_around(context->scenario, &result, &around);
    progress_end(&progress);
    int status = COMMANDS_FAILED;
    if (ok) {
        struct report_planned planned = {.search = &result, .worse = around.worse, .worse_count = around.worse_count};
        if (around.estimates.n) planned.estimates = &around.estimates;
        if (around.has_plan) {
            planned.map = &around.map;
            planned.budget = &around.budget;
            planned.margins = &around.margins;
        }
        status = report_plan(context, &planned);
        if (status == COMMANDS_DONE && result.recommended == SEARCH_NONE) status = COMMANDS_NOT_RESOLVED;
    } else
        out_of_memory(context);
    trial_free_estimates(&around.estimates);
    if (searched) search_free(&result);
    return status;
}

/* A scenario that leaves a choice open is refused with the open keys named. */
static bool closed(const struct report_context *context, const struct commands_options *options)
{
    const struct scenario *const s = context->scenario;
    char open[512] = "";
    size_t used = 0;
    for (size_t k = 0; k < scenario_keys(s); k++)
        if (scenario_options(s, k) > 1 && used < sizeof open)
            used += (size_t)snprintf(open + used, sizeof open - used, "%s%s", used ? ", " : "", scenario_key(s, k));
    if (used == 0) return true;
    fprintf(context->err, "vicinal: %s: this command speaks of one plan, but a choice is open in: %s; close it with --pick KEY=OPTION\n",
            options->path, open);
    return false;
}

/* All that is played of one plan. */
struct tried {
    struct plan plan;
    struct outcome outcome;
    struct estimates estimates;
    struct example example;
    struct show_notebook notebook;
    struct survey_curve curve;
    struct survey_tops tops;
    bool narrow, played;
};

static bool try_plan(const struct scenario *s, struct progress *progress, struct tried *t)
{
    const struct trial_options options = {.deep = true, .progress = on_progress, .context = progress};
    const bool curve = scenario_question(s)->has_against;
    memset(t, 0, sizeof *t);
    scenario_plan(s, 0, &t->plan);
    bool ok = trial_run(s, &t->plan, options, &t->outcome, &t->estimates);
    t->played = ok && t->estimates.n > 0;
    if (!t->played) return ok;
    return trial_too_narrow(s, &t->plan, &t->narrow) && show_example(s, &t->plan, 0, &t->example) &&
           show_notebook_make(s, &t->plan, 0, &t->notebook) && survey_tops_make(s, &t->plan, &t->tops) &&
           (!curve || survey_curve_make(s, &t->plan, t->outcome.at.critical, &t->curve));
}

/* Budget and margins can be had of any plan that can be carried out. */
static int carried_out(int status, const struct outcome *outcome)
{
    return status == COMMANDS_DONE && outcome->studies == 0 ? COMMANDS_NOT_RESOLVED : status;
}

int commands_trial(const struct report_context *context, const struct commands_options *options)
{
    struct tried t;
    struct progress progress;
    if (!closed(context, options)) return COMMANDS_WRONG;
    progress_start(&progress, context->err, options->quiet);
    const bool ok = try_plan(context->scenario, &progress, &t);
    progress_end(&progress);
    int status = COMMANDS_FAILED;
    if (ok) {
        struct report_tried tried = {.outcome = &t.outcome, .within_too_narrow = t.narrow};
        if (t.played) {
            tried.estimates = &t.estimates;
            tried.example = &t.example;
            tried.notebook = &t.notebook;
            tried.tops = &t.tops;
            if (scenario_question(context->scenario)->has_against) tried.curve = &t.curve;
        }
        status = report_trial(context, &tried);
        if (status == COMMANDS_DONE && options->times) status = times_write(context, 0, options->times, options->notebooks ? options->notebooks : 1);
        if (status == COMMANDS_DONE && t.outcome.status != STATUS_RESOLVES) status = COMMANDS_NOT_RESOLVED;
    } else
        out_of_memory(context);
    show_notebook_free(&t.notebook);
    trial_free_estimates(&t.estimates);
    return status;
}

int commands_budget(const struct report_context *context, const struct commands_options *options)
{
    struct budget budget;
    struct plan plan;
    struct progress progress;
    if (!closed(context, options)) return COMMANDS_WRONG;
    scenario_plan(context->scenario, 0, &plan);
    progress_start(&progress, context->err, options->quiet);
    const bool ok = budget_run(context->scenario, &plan, (struct budget_options){on_progress, &progress}, &budget);
    progress_end(&progress);
    return ok ? carried_out(report_budget(context, 0, &budget), &budget.outcome) : out_of_memory(context);
}

int commands_margin(const struct report_context *context, const struct commands_options *options)
{
    struct margins margins;
    struct plan plan;
    struct progress progress;
    if (!closed(context, options)) return COMMANDS_WRONG;
    scenario_plan(context->scenario, 0, &plan);
    progress_start(&progress, context->err, options->quiet);
    const bool ok = margin_run(context->scenario, &plan, (struct margin_options){on_progress, &progress}, &margins);
    progress_end(&progress);
    return ok ? carried_out(report_margin(context, 0, &margins), &margins.outcome) : out_of_memory(context);
}

int commands_sheet(const struct report_context *context, const struct commands_options *options)
{
    return closed(context, options) ? sheet_write(context, 0) : COMMANDS_WRONG;
}

int commands_check(const struct report_context *context)
{
    double seconds = 0.0;
    if (!forecast_seconds(context->scenario, &seconds)) return out_of_memory(context);
    return report_check(context, seconds);
}

int commands_kit(const struct report_context *context)
{
    if (!context->json) return kit_print_text(context->scenario, context->out);
    json_t *const object = kit_print_json(context->scenario, context->version);
    if (!object) return out_of_memory(context);
    json_out_print(context->out, object);
    return COMMANDS_DONE;
}
