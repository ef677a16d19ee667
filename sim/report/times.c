#include "sim/report/times.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/files.h"
#include "sim/judge/show.h"
#include "sim/report/notebook_csv.h"

/* The path with a number before its ending; for free(). */
static char *numbered(const char *path, size_t number)
{
    const char *const slash = strrchr(path, '/'), *const dot = strrchr(path, '.');
    const size_t stem = dot && (!slash || dot > slash + 1) && dot != path ? (size_t)(dot - path) : strlen(path);
    const size_t size = strlen(path) + 24;
    char *const out = malloc(size);
    if (out) snprintf(out, size, "%.*s-%zu%s", (int)stem, path, number, path + stem);
    return out;
}

static struct notebook_row row_of(const struct show_run *run)
{
    const struct notebook_filling *const f = run->filling;
    return (struct notebook_row){
        .preparation = run->preparation + 1, .day = f->day + 1, .started_s = run->started_s, .solution = f->water ? "water" : f->blank ? "blank" : f->series == INTACT ? "intact" : "cleaved",
        .level = f->water || f->blank ? 0 : f->level + 1, .concentration_kg_m3 = f->water || f->blank ? (double)NAN : run->conc_kg_m3, .filling = f->number + 1,
        .run = run->run + 1, .time_s = run->time_s, .temperature_K = run->read_K};
}

static bool write_one(const struct report_context *context, const struct plan *plan, size_t study, const char *path, struct files_failure *failure)
{
    struct show_notebook notebook;
    struct notebook_row *rows = NULL;
    snprintf(failure->text, sizeof failure->text, "out of memory");
    bool good = show_notebook_make(context->scenario, plan, study, &notebook);
    if (good && notebook.runs == 0) {
        snprintf(failure->text, sizeof failure->text, "no notebook: the plan is impossible");
        good = false;
    }
    if (good) good = (rows = calloc(notebook.runs, sizeof *rows)) != NULL;
    for (size_t i = 0; good && i < notebook.runs; i++) rows[i] = row_of(&notebook.run[i]);
    if (good) {
        char words[200];
        snprintf(words, sizeof words, "%s in %s, %s, %s, %s; simulated study %zu", plan->grade.name, plan->tube.name, plan->bath.name,
                 plan->thermometer.name, plan->timer.name, study + 1);
        const struct notebook_csv csv = {.title = scenario_title(context->scenario), .plan = words, .timer_resolution_s = plan->timer.resolution_s,
                                         .thermometer_resolution_K = plan->thermometer.resolution_K, .rows = rows, .count = notebook.runs,
                                         .preparations = plan->preparations > 1};
        good = notebook_csv_write(path, &csv, failure);
    }
    free(rows);
    show_notebook_free(&notebook);
    return good;
}

int times_write(const struct report_context *context, size_t index, const char *path, size_t count)
{
    struct files_failure failure = {{0}};
    struct plan plan;
    bool good = true;
    scenario_plan(context->scenario, index, &plan);
    for (size_t i = 0; good && i < count; i++) {
        char *const name = count == 1 ? NULL : numbered(path, i + 1);
        good = write_one(context, &plan, i, name ? name : path, &failure);
        free(name);
    }
    if (!good) fprintf(context->err, "vicinal: %s\n", failure.text);
    return good ? 0 : 1;
}
