#include "sim/judge/expected.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/spread.h"
#include "sim/bench/study.h"

/* Times of one liquid in one block, less the nominal time. */
struct sum {
    double n, off_s, square_s2;
};
struct slot {
    struct sum liquid[DESIGN_MAX_LIQUIDS];
};

/* What a block needs beside its own scratch: the trace, which nobody reads. */
struct sizes {
    size_t study, started, run;
};

static size_t up(size_t bytes)
{
    return (bytes + 63) / 64 * 64;
}

static struct sizes sizes_of(const struct study_job *job)
{
    const struct notebook_layout *const layout = &job->design->layout;
    return (struct sizes){up(study_scratch_size(job)), up(layout->fillings * sizeof(double[LANES])),
                          layout->fillings * layout->stride * sizeof(struct bench_traced_run)};
}

static void add_block(size_t block, const void *context, void *slot, void *scratch)
{
    const struct study_job *const job = context;
    const struct design *const d = job->design;
    const struct sizes sizes = sizes_of(job);
    unsigned char *const more = (unsigned char *)scratch + sizes.study;
    struct study_shown shown = {.trace = {(void *)more, (void *)(more + sizes.started)}};
    struct slot *const out = slot;
    memset(out, 0, sizeof *out);
    study_show(block, job, 0, scratch, &shown);
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const size_t i = design_liquid_of(d, &d->filling[f]);
        const struct notebook_run *const run = notebook_runs(&shown.book, f);
        struct sum *const sum = &out->liquid[i];
        for (size_t r = 0; r < d->filling[f].runs; r++)
            FOR_LANES(l)
            {
                const double off = run[r].time_s[l] - d->liquid[i].nominal_s;
                sum->n += 1.0;
                sum->off_s += off;
                sum->square_s2 += off * off;
            }
    }
}

static struct expected_time time_of(const struct slot *slots, size_t liquid, double nominal_s)
{
    struct sum all = {0};
    for (size_t b = 0; b < EXPECTED_STUDIES / LANES; b++) {
        const struct sum *const one = &slots[b].liquid[liquid];
        all.n += one->n;
        all.off_s += one->off_s;
        all.square_s2 += one->square_s2;
    }
    if (all.n == 0.0) return (struct expected_time){(double)NAN, (double)NAN, (double)NAN, (double)NAN};
    const double off = all.off_s / all.n, variance = fmax(0.0, (all.square_s2 - all.n * off * off) / (all.n - 1.0));
    const double mean = nominal_s + off, sd = sqrt(variance);
    return (struct expected_time){mean, sd, mean - 3.0 * sd, mean + 3.0 * sd};
}

bool expected_make(const struct scenario *s, const struct design *design, double fraction, struct expected *out)
{
    struct plan plan = *design->plan;
    struct design own = *design; /* the same fillings, on a plan without bubbles */
    plan.habits.bubble_chance = 0.0;
    plan.material.eta_u = plan.material.stated_eta_u;
    plan.material.a_u = plan.material.stated_a_u;
    own.plan = &plan;
    const struct study_job job = {.design = &own, .seed = scenario_seed(s), .fractions = 1, .fraction = {fraction}, .analyses = 1, .analysis = &plan.analysis};
    const struct sizes sizes = sizes_of(&job);
    struct slot *const slots = calloc(EXPECTED_STUDIES / LANES, sizeof *slots);
    const bool ok = slots && spread((struct spread_range){0, EXPECTED_STUDIES / LANES}, add_block, &job, slots,
                                    (struct spread_size){sizeof *slots, sizes.study + sizes.started + sizes.run});
    for (size_t i = 0; ok && i < DESIGN_MAX_LIQUIDS; i++) out->time[i] = time_of(slots, i, own.liquid[i].nominal_s);
    free(slots);
    return ok;
}
