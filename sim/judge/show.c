#include "sim/judge/show.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* A study played again for its notebook. */
struct shown {
    struct study_job job;
    void *scratch, *times_memory;
    struct study_shown study;
};

static bool prepare(const struct scenario *s, const struct design *d, struct shown *out)
{
    memset(out, 0, sizeof *out);
    out->job = (struct study_job){.design = d, .seed = scenario_seed(s), .fractions = 1, .fraction = {scenario_question(s)->expect},
                                  .analyses = 1, .analysis = &d->plan->analysis};
    out->scratch = aligned_alloc(64, (study_scratch_size(&out->job) + 63) / 64 * 64);
    out->times_memory = malloc(reduction_size(&d->layout));
    out->study.trace.started_s = malloc(d->layout.fillings * sizeof *out->study.trace.started_s);
    out->study.trace.run = malloc(d->layout.fillings * d->layout.stride * sizeof *out->study.trace.run);
    return out->scratch && out->times_memory && out->study.trace.started_s && out->study.trace.run;
}

static void forget(struct shown *s)
{
    free(s->scratch);
    free(s->times_memory);
    free(s->study.trace.started_s);
    free(s->study.trace.run);
}

static void reduce_example(const struct design *d, const struct shown *shown, int lane, struct example *out)
{
    const struct analysis *const how = &d->plan->analysis;
    struct reduction_times times = reduction_place(&d->layout, shown->times_memory);
    struct reduction_levels levels;
    struct reduction_result result;
    reduction_combine(&d->assumed, &shown->study.book, &times);
    reduction_relative(&d->assumed, how, &shown->study.book, &times, &levels);
    reduction_run(&d->assumed, how, &shown->study.book, &times, &result);
    out->estimate = result.delta[lane];
    for (size_t s = 0; s < SERIES; s++) {
        double relative[ASSUMED_MAX_LEVELS];
        struct line lines[2] = {{(double)NAN, (double)NAN}, {(double)NAN, (double)NAN}};
        out->levels[s] = d->assumed.levels[s];
        for (size_t j = 0; j < out->levels[s]; j++) {
            relative[j] = levels.relative[s][j][lane];
            out->level[s][j] = (struct example_level){d->assumed.conc_kg_m3[s][j], relative[j]};
        }
        out->intrinsic_m3_kg[s] = reduction_extrapolate(how, out->levels[s], d->assumed.conc_kg_m3[s], relative, lines);
        for (int k = 0; k < 2; k++) {
            out->intercept[s][k] = lines[k].intercept;
            out->slope[s][k] = lines[k].slope;
        }
    }
}

bool show_example(const struct scenario *s, const struct plan *plan, size_t study, struct example *out)
{
    struct design design;
    struct shown shown = {0};
    memset(out, 0, sizeof *out);
    bool ok = design_make(&design, plan, scenario_cost(s), scenario_question(s));
    if (ok && !design_why(&design, &plan->analysis)) {
        ok = prepare(s, &design, &shown);
        if (ok) study_show(study / LANES, &shown.job, 0, shown.scratch, &shown.study);
        if (ok) reduce_example(&design, &shown, (int)(study % LANES), out);
        forget(&shown);
    }
    design_free(&design);
    return ok;
}

static void list_runs(const struct design *d, const struct shown *shown, int lane, unsigned preparation, struct show_notebook *out)
{
    const struct habits *const h = &d->plan->habits;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct design_liquid *const q = &d->liquid[design_liquid_of(d, &d->filling[f])];
        const struct notebook_run *const run = notebook_runs(&shown->study.book, f);
        const struct bench_traced_run *const traced = &shown->study.trace.run[f * d->layout.stride];
        const double before_s = d->filling[f].added ? h->add_and_mix_s : h->clean_and_fill_s;
        const double first_s = shown->study.trace.started_s[f][lane] + before_s + h->equilibrate_s;
        for (size_t r = 0; r < shown->study.book.made[f][lane]; r++)
            out->run[out->runs++] = (struct show_run){
                .preparation = preparation, .filling = &d->filling[f], .run = r, .started_s = first_s + (double)r * (q->nominal_s + h->reset_s), .time_s = run[r].time_s[lane],
                .read_K = d->assumed.record ? run[r].read_K[lane] : (double)NAN, .conc_kg_m3 = q->conc_kg_m3,
                .nominal_s = q->nominal_s, .bath_K = traced[r].bath_K[lane], .liquid_K = traced[r].liquid_K[lane]};
    }
}

bool show_notebook_make(const struct scenario *s, const struct plan *plan, size_t study, struct show_notebook *out)
{
    struct shown shown = {0};
    memset(out, 0, sizeof *out);
    bool ok = design_make(&out->design, plan, scenario_cost(s), scenario_question(s));
    if (ok && !design_why(&out->design, &plan->analysis)) {
        const struct notebook_layout *const layout = &out->design.layout;
        out->run = calloc(layout->fillings * layout->stride * plan->preparations, sizeof *out->run);
        ok = out->run && prepare(s, &out->design, &shown);
        for (unsigned i = 0; ok && i < plan->preparations; i++) {
            study_show(study / LANES, &shown.job, i, shown.scratch, &shown.study);
            list_runs(&out->design, &shown, (int)(study % LANES), i, out);
        }
        forget(&shown);
    }
    return ok;
}

void show_notebook_free(struct show_notebook *n)
{
    free(n->run);
    n->run = NULL;
    design_free(&n->design);
}
