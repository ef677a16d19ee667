#include "sim/report/report_budget.h"

#include "sim/report/figure_budget.h"
#include "sim/report/figure_claimed.h"
#include "sim/report/json_out_budget.h"
#include "sim/report/json_out_print.h"
#include "sim/report/report_files.h"
#include "sim/report/terminal_budget.h"
#include "sim/report/warnings.h"

static bool draw(const struct report_context *context, const struct budget *budget, struct files_failure *failure)
{
    struct figures_pen pen = {.folder = context->folder, .drawn = GNUPLOT_DRAWN};
    const bool good = figure_budget(&pen, budget) && figure_claimed(&pen, budget);
    if (good)
        report_files_drawn(context, &pen);
    else
        *failure = pen.failure;
    return good;
}

int report_budget(const struct report_context *context, size_t index, const struct budget *budget)
{
    struct files_failure failure = {""};
    struct plan plan;
    scenario_plan(context->scenario, index, &plan);
    struct warnings *warnings = warnings_collect(context->scenario, &plan, &budget->outcome, false);
    json_t *object = warnings ? json_out_budget(context, budget, warnings) : NULL;
    bool good = object ? files_folder(context->folder, &failure) : report_files_memory(&failure);
    good = good && report_files_scenario(context, "scenario.resolved.yaml", SIZE_MAX, &failure) &&
           report_files_json(context, "budget.json", object, &failure);
    if (good && budget->outcome.studies > 0)
        good = draw(context, budget, &failure);
    good = good && report_files_log(context, &failure);
    if (good) {
        const struct page page = page_on(context->out);
        if (context->json)
            json_out_print(context->out, object);
        else
            terminal_budget(&page, context, index, budget, warnings);
        good = report_files_flushed(context, &failure);
    }
    json_decref(object);
    warnings_free(warnings);
    return good ? 0 : report_files_failed(context, &failure);
}
