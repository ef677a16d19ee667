#include "sim/judge/trial.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/judge/bar.h"
#include "sim/judge/sources.h"

static void one_analysis(struct play *p, const struct analysis *how)
{
    p->analyses = 1;
    p->analysis[0] = *how;
    p->active[0] = true;
}

/* Power against another fraction than the question's, on the same draws;
 * below 0: out of memory. With a second polymer measured alongside, what it
 * holds changes the differences under both. */
static double power_against(const struct scenario *s, const struct play *base, double against)
{
    struct question q = *scenario_question(s);
    struct bar_power power;
    struct play p;
    q.against = against;
    play_start(&p, base->design, base->seed);
    p.first_block = base->first_block;
    p.measured = base->measured;
    if (p.measured) p.fraction[p.fractions++] = q.expect;
    p.fraction[p.fractions++] = against;
    one_analysis(&p, &base->analysis[0]);
    const bool played = play_until(&p, base->n);
    const double *const expect = p.measured ? p.sample[0].delta[0] : base->sample[0].delta[0];
    const bool ok = played && bar_power_of(&q, expect, p.sample[0].delta[p.fractions - 1], base->n, &power);
    play_free(&p);
    return ok ? power.power : -1.0;
}

/* The fraction nearest to expect, on the side of against, that is told apart
 * with the asked power: bracketing outwards from against, then bisection with
 * secants (Illinois). NaN: none within 0 to 20 %. */
static bool resolvable_against(const struct scenario *s, const struct play *base, double power_here, double *out)
{
    const struct question *const q = scenario_question(s);
    const double sign = q->against > q->expect ? 1.0 : -1.0;
    const double furthest = sign > 0.0 ? 0.2 - q->expect : q->expect;
    double near = 0.0, near_gap = -q->power, far = fabs(q->against - q->expect), far_gap = power_here - q->power;
    *out = (double)NAN;
    while (far_gap < 0.0) {
        if (far >= furthest) return true;
        near = far;
        near_gap = far_gap;
        far = fmin(1.5 * far, furthest);
        const double p = power_against(s, base, q->expect + sign * far);
        if (p < 0.0) return false;
        far_gap = p - q->power;
    }
    for (int i = 0; i < 24 && far - near > 2e-3 * far; i++) {
        double middle = near + (far - near) * near_gap / (near_gap - far_gap);
        const double edge = 0.1 * (far - near);
        middle = fmin(fmax(middle, near + edge), far - edge);
        const double p = power_against(s, base, q->expect + sign * middle);
        if (p < 0.0) return false;
        if (p < q->power) {
            near = middle;
            near_gap = p - q->power;
        } else {
            far = middle;
            far_gap = p - q->power;
        }
    }
    *out = q->expect + sign * far;
    return true;
}

/* The half-width within which the asked share of all studies falls; NaN when
 * too many give no answer. */
static bool resolvable_within(const struct question *q, const double *expect, size_t n, double *out)
{
    double *const error = malloc(n * sizeof *error);
    if (!error) return false;
    for (size_t i = 0; i < n; i++) error[i] = isnan(expect[i]) ? (double)INFINITY : fabs(expect[i] - bar_truth(q));
    moments_sort(error, n);
    const double at = moments_quantile(error, n, q->confidence);
    *out = isfinite(at) ? at : (double)NAN;
    free(error);
    return true;
}

static bool look_deeper(const struct scenario *s, const struct play *play, struct outcome *out)
{
    const struct question *const q = scenario_question(s);
    bool ok = true;
    if (q->has_against) ok = resolvable_against(s, play, out->at.power, &out->resolvable_against);
    if (ok && q->has_within) ok = resolvable_within(q, play->sample[0].delta[0], play->n, &out->resolvable_within);
    return ok;
}

/* Play to the cap in steps, so that progress can be told. */
static bool play_with_progress(struct play *p, size_t cap, const struct trial_options *options)
{
    bool ok = true;
    for (size_t n = 0; ok && n < cap;) {
        n = n + 4096 < cap ? n + 4096 : cap;
        ok = play_until(p, n);
        if (options->progress) options->progress(options->context, (options->deep ? 0.5 : 1.0) * (double)n / (double)cap);
    }
    return ok;
}

static bool play_plan(const struct scenario *s, const struct design *design, const struct trial_options *options, struct outcome *out,
                      struct estimates *estimates)
{
    struct play p;
    play_start(&p, design, scenario_seed(s));
    p.first_block = options->first_study / LANES;
    outcome_fractions(scenario_question(s), &p);
    one_analysis(&p, &design->plan->analysis);
    bool ok = play_with_progress(&p, scenario_studies(s), options) && outcome_of(s, design->plan, &p, 0, out);
    if (ok && options->deep) ok = look_deeper(s, &p, out);
    if (ok && estimates) {
        *estimates = (struct estimates){p.n, p.sample[0].delta[0], p.sample[0].delta[1]};
        p.sample[0].delta[0] = p.sample[0].delta[1] = NULL;
    }
    play_free(&p);
    return ok;
}

bool trial_run(const struct scenario *s, const struct plan *plan, struct trial_options options, struct outcome *out, struct estimates *estimates)
{
    struct design design;
    if (estimates) *estimates = (struct estimates){0};
    bool ok = design_make(&design, plan, scenario_cost(s), scenario_question(s));
    if (ok) {
        outcome_nominal(s, plan, &design, out);
        if (out->status == STATUS_UNDECIDED) ok = play_plan(s, &design, &options, out, estimates);
    }
    design_free(&design);
    return ok;
}

void trial_free_estimates(struct estimates *e)
{
    free(e->expect);
    free(e->against);
    *e = (struct estimates){0};
}

bool trial_too_narrow(const struct scenario *s, const struct plan *plan, bool *too_narrow)
{
    const struct question *const q = scenario_question(s);
    *too_narrow = false;
    if (!q->has_within || (plan->material.eta_u == 0.0 && plan->material.a_u == 0.0)) return true;
    const struct plan bare = sources_alone(plan, DRAWS_GROUP_PAIR);
    struct design design;
    struct play p;
    bool ok = design_make(&design, &bare, scenario_cost(s), q);
    if (ok && !design_why(&design, &bare.analysis)) {
        play_start(&p, &design, scenario_seed(s));
        outcome_fractions(q, &p);
        one_analysis(&p, &bare.analysis);
        ok = play_until(&p, scenario_studies(s));
        if (ok) *too_narrow = bar_share(q, p.sample[0].delta[0], p.n) < q->confidence;
        play_free(&p);
    }
    design_free(&design);
    return ok;
}
