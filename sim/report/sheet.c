#include "sim/report/sheet.h"

#include <stdlib.h>
#include <string.h>

#include "sim/report/json_out_print.h"
#include "sim/report/report_files.h"
#include "sim/report/say.h"
#include "sim/report/sheet_json.h"
#include "sim/report/sheet_notebook.h"
#include "sim/report/sheet_page.h"
#include "sim/report/terminal.h"
#include "sim/report/warnings.h"

enum { DONE = 0, FAILED = 1, REFUSED = 2, IMPOSSIBLE = 3 };

static const char *const notebook_name[] = {"notebook.csv", "notebook-second.csv"};

/* One sheet on its way out. */
struct job {
    const struct report_context *context;
    struct sheet_work work;
    struct warnings *warnings;
    json_t *object;
    struct files_failure failure;
};

/* What stands where the notebooks go: 0, or the status to end with. */
static int look(struct job *job)
{
    int status = DONE;
    for (size_t i = 0; i < job->work.polymers && status == DONE; i++) {
        char *path = files_path(job->context->folder, notebook_name[i]);
        const enum sheet_notebook_found found =
            path ? sheet_notebook_look(path, &job->failure) : SHEET_NOTEBOOK_UNREADABLE;
        if (found == SHEET_NOTEBOOK_TAKEN)
            snprintf(job->failure.text, sizeof job->failure.text,
                     "%.400s: holds what was measured, so it stays, and nothing is written; move it away, or say --out "
                     "DIR",
                     path);
        if (found != SHEET_NOTEBOOK_FREE)
            status = found == SHEET_NOTEBOOK_TAKEN ? REFUSED : FAILED;
        free(path);
    }
    return status;
}

static bool save_notebooks(struct job *job)
{
    bool good = true;
    for (size_t i = 0; i < job->work.polymers && good; i++) {
        char *path = files_path(job->context->folder, notebook_name[i]);
        good = path ? sheet_notebook_write(&job->work, path, &job->failure) : report_files_memory(&job->failure);
        free(path);
    }
    return good;
}

static bool save_page(struct job *job)
{
    struct files_text text;
    if (!files_text_open(&text))
        return report_files_memory(&job->failure);
    sheet_page_print(text.stream, job->context, &job->work, job->warnings);
    return files_text_save(&text, job->context->folder, "sheet.html", &job->failure);
}

static void times(const struct page *page, const struct sheet_work *w)
{
    for (size_t k = 0; k < DESIGN_MAX_LIQUIDS; k++) {
        const size_t i = k == 0 ? DESIGN_WATER : k == 1 ? DESIGN_BLANK : k - 1; /* the blank after the water */
        const struct expected_time *t = &w->expected[0].time[i];
        const struct design_liquid *q = &w->design.liquid[i];
        char label[32];
        if (!(t->mean_s > 0.0))
            continue;
        if (i == DESIGN_WATER || i == DESIGN_BLANK)
            snprintf(label, sizeof label, "%s", i == DESIGN_WATER ? "water" : "blank");
        else
            snprintf(label, sizeof label, "%s %zu", q->series == INTACT ? "intact" : "cleaved", q->level + 1);
        page_item(page, label, "%.1f s (%.1f to %.1f)", t->mean_s, t->low_s, t->high_s);
    }
}

static void weighings(const struct page *page, const struct sheet_work *w)
{
    for (size_t i = 0; i < w->stocks; i++)
        page_item(page, i == 0 ? "weigh" : "", "%s g of dry polymer into a %s mL flask: the %s stock, %s g/dL",
                  say_digits(say_g(w->stock[i].polymer_kg), 4).text, say_number(say_mL(w->stock[i].flask_m3)).text,
                  w->stock[i].name, say_digits(say_g_dL(w->stock[i].conc_kg_m3), 4).text);
    if (w->design.repeats > 1.0)
        page_item(page, "", "all of it %s times: %s%s", say_short(w->design.repeats, 3).text,
                  say_plural(w->plan->preparations, "preparation").text,
                  w->polymers > 1 ? " of each of two polymers" : "");
}

static void answer(const struct job *job)
{
    const struct page page = page_on(job->context->out);
    const struct sheet_work *w = &job->work;
    const struct cost_rules *cost = scenario_cost(w->scenario);
    page_say(&page, PAGE_GOOD, "The bench sheet is %s/sheet.html, to be printed or read on a phone.",
             job->context->folder);
    page_say(&page, PAGE_PLAIN, "Planned, nothing measured: the notebook to fill in is notebook.csv beside it%s.",
             w->polymers > 1 ? ", that of the second polymer notebook-second.csv" : "");
    page_blank(&page);
    page_item(&page, "takes", "%s, %s h at the tube, %s h hands-on before it", say_plural(w->design.days, "day").text,
              say_digits(say_hours(w->design.nominal_clock_s), 3).text,
              say_digits(say_hours(w->design.preparation_s), 3).text);
    page_item(&page, "waits", "%s for dissolving and %s for the cleavage, before day 1",
              say_while(cost->dissolving_wait_s).text, say_while(cost->cleavage_wait_s).text);
    weighings(&page, w);
    page_blank(&page);
    page_say(&page, PAGE_BOLD, "Expected times%s, and the range outside which to look for a bubble or a mistake",
             w->polymers > 1 ? " of the first polymer" : "");
    times(&page, w);
    terminal_warnings(&page, job->warnings);
}

static bool prepare(struct job *job, const struct plan *plan)
{
    struct outcome nominal = {0};
    if (!sheet_work_make(job->context->scenario, plan, &job->work))
        return report_files_memory(&job->failure);
    outcome_nominal(job->context->scenario, plan, &job->work.design, &nominal);
    if (!sheet_work_why(&job->work))
        nominal.studies = EXPECTED_STUDIES; /* played, though not judged: warn of its nominal times and molar masses */
    job->warnings = warnings_collect(job->context->scenario, plan, &nominal, false);
    job->object = job->warnings ? sheet_json_make(job->context, &job->work, job->warnings) : NULL;
    return job->object ? true : report_files_memory(&job->failure);
}

static int tell_why(struct job *job)
{
    const struct page page = page_on(job->context->out);
    if (job->context->json)
        json_out_print(job->context->out, job->object);
    else
        page_say(&page, PAGE_BAD, "This plan is impossible: %s. Nothing was written.", sheet_work_why(&job->work));
    return IMPOSSIBLE;
}

static int write_all(struct job *job)
{
    const struct report_context *c = job->context;
    const int there = look(job);
    if (there != DONE)
        return there;
    /* cut to this plan, where the scenario holds more than one */
    const size_t cut = scenario_candidates(c->scenario) > 1 ? job->work.plan->index : SIZE_MAX;
    const bool good = files_folder(c->folder, &job->failure) &&
                      report_files_scenario(c, "scenario.resolved.yaml", cut, &job->failure) && save_notebooks(job) &&
                      save_page(job) && report_files_log(c, &job->failure);
    if (!good)
        return FAILED;
    if (c->json)
        json_out_print(c->out, job->object);
    else
        answer(job);
    return DONE;
}

int sheet_write(const struct report_context *context, size_t index)
{
    struct job job = {.context = context};
    struct plan plan;
    int status = FAILED;
    scenario_plan(context->scenario, index, &plan);
    if (prepare(&job, &plan))
        status = sheet_work_why(&job.work) ? tell_why(&job) : write_all(&job);
    if ((status == DONE || status == IMPOSSIBLE) && !report_files_flushed(context, &job.failure))
        status = FAILED;
    if (status == FAILED || status == REFUSED)
        report_files_failed(context, &job.failure);
    json_decref(job.object);
    warnings_free(job.warnings);
    sheet_work_free(&job.work);
    return status;
}
