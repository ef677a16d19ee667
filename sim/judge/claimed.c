#include "sim/judge/claimed.h"

#include <math.h>
#include <stdlib.h>

#include "sim/base/spread.h"
#include "sim/reduce/claim.h"

/* What a block of studies is played and claimed with. */
struct claiming {
    const struct design *design;
    struct study_job job;
    struct claim_glass glass;
    double truth;
    size_t studies;
};

struct counted {
    unsigned answered, covered;
};

static size_t times_offset(const struct claiming *c)
{
    return (study_scratch_size(&c->job) + 63) / 64 * 64;
}

static size_t trace_offset(const struct claiming *c)
{
    return times_offset(c) + (reduction_size(&c->design->layout) + 63) / 64 * 64;
}

static size_t scratch_size(const struct claiming *c)
{
    const struct notebook_layout *const l = &c->design->layout;
    return trace_offset(c) + l->fillings * sizeof(double[LANES]) + l->fillings * l->stride * sizeof(struct bench_traced_run);
}

static void claim_block(size_t block, const void *context, void *slot, void *scratch)
{
    const struct claiming *const c = context;
    const struct notebook_layout *const layout = &c->design->layout;
    unsigned char *const bytes = scratch;
    struct study_shown shown;
    struct reduction_times times = reduction_place(layout, bytes + times_offset(c));
    struct reduction_levels levels;
    struct counted count = {0, 0};
    shown.trace.started_s = (void *)(bytes + trace_offset(c));
    shown.trace.run = (void *)(bytes + trace_offset(c) + layout->fillings * sizeof(double[LANES]));
    study_show(block, &c->job, 0, scratch, &shown);
    reduction_combine(&c->design->assumed, &shown.book, &times);
    reduction_relative(&c->design->assumed, c->job.analysis, &shown.book, &times, &levels);
    FOR_LANES(l)
    {
        if (block * LANES + (size_t)l >= c->studies) break;
        const struct claim claim = claim_of(&c->design->assumed, c->job.analysis, &levels, &c->glass, l);
        if (!isfinite(claim.delta) || !isfinite(claim.u)) continue;
        count.answered++;
        count.covered += fabs(claim.delta - c->truth) <= claim_half_width(&claim, 0.95);
    }
    *(struct counted *)slot = count;
}

static bool count_all(const struct claiming *c, double *coverage, double *se)
{
    const size_t blocks = (c->studies + LANES - 1) / LANES;
    struct counted *const slots = calloc(blocks, sizeof *slots);
    const struct spread_size size = {sizeof *slots, scratch_size(c)};
    if (!slots || !spread((struct spread_range){0, blocks}, claim_block, c, slots, size)) {
        free(slots);
        return false;
    }
    double answered = 0.0, covered = 0.0;
    for (size_t i = 0; i < blocks; i++) {
        answered += slots[i].answered;
        covered += slots[i].covered;
    }
    free(slots);
    *coverage = answered > 0.0 ? covered / answered : (double)NAN;
    const double at = (covered + 1.0) / (answered + 2.0);
    *se = answered > 0.0 ? sqrt(at * (1.0 - at) / answered) : (double)NAN;
    return true;
}

bool claimed_coverage(const struct scenario *s, const struct plan *plan, double *coverage, double *se)
{
    const struct question *const q = scenario_question(s);
    struct design design;
    bool ok = design_make(&design, plan, scenario_cost(s), q);
    *coverage = *se = (double)NAN;
    if (ok && !design_why(&design, &plan->analysis)) {
        struct claiming c = {.design = &design, .truth = q->expect, .studies = scenario_studies(s)};
        c.job = (struct study_job){.design = &design, .seed = scenario_seed(s), .fractions = 1, .fraction = {q->expect}, .analyses = 1, .analysis = &plan->analysis};
        for (size_t k = 0; k < SERIES; k++) c.glass.stock[k] = plan->solutions.shared_stock ? 0.0 : design.flasks.weighing_u[k];
        c.glass.common = plan->solutions.shared_stock ? hypot(plan->solutions.dry_content_u, design.flasks.weighing_u[INTACT]) : plan->solutions.dry_content_u;
        ok = count_all(&c, coverage, se);
    }
    design_free(&design);
    return ok;
}
