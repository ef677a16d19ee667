#include "sim/report/notebook_study.h"

#include <math.h>
#include <stdlib.h>

#include "sim/report/notebook_csv.h"

static struct notebook_row row_of(const struct show_run *run)
{
    const struct notebook_filling *f = run->filling;
    return (struct notebook_row){
        .day = f->day + 1,
        .started_s = run->started_s,
        .solution = f->water              ? "water"
                    : f->series == INTACT ? "intact"
                                          : "cleaved",
        .level = f->water ? 0 : f->level + 1,
        .concentration_kg_m3 = f->water ? (double)NAN : run->conc_kg_m3,
        .filling = f->number + 1,
        .run = run->run + 1,
        .time_s = run->time_s,
        .temperature_K = run->read_K,
    };
}

/* "grade middle, tube suspended-0c, ..." for free(), or NULL without memory. */
static char *in_words(const struct scenario *s, size_t index)
{
    struct files_text text;
    if (!files_text_open(&text))
        return NULL;
    for (size_t k = 0; k < scenario_keys(s); k++)
        fprintf(text.stream, "%s%s %s", k > 0 ? ", " : "", scenario_key(s, k),
                scenario_option(s, k, scenario_option_of(s, index, k)));
    if (files_text_close(&text))
        return text.bytes;
    files_text_free(&text);
    return NULL;
}

bool notebook_study_write(const char *path, const struct scenario *scenario, size_t index,
                          const struct show_notebook *book, struct files_failure *failure)
{
    struct plan plan;
    scenario_plan(scenario, index, &plan);
    struct notebook_row *rows = malloc((book->runs ? book->runs : 1) * sizeof *rows);
    char *words = in_words(scenario, index);
    bool good = rows && words;
    for (size_t i = 0; good && i < book->runs; i++)
        rows[i] = row_of(&book->run[i]);
    const struct notebook_csv csv = {.title = scenario_title(scenario),
                                     .plan = words,
                                     .timer_resolution_s = plan.timer.resolution_s,
                                     .thermometer_resolution_K = plan.thermometer.resolution_K,
                                     .rows = rows,
                                     .count = book->runs};
    if (good)
        good = notebook_csv_write(path, &csv, failure);
    else
        snprintf(failure->text, sizeof failure->text, "%s: out of memory", path);
    free(words);
    free(rows);
    return good;
}
