#include "sim/judge/budget.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/judge/bar.h"
#include "sim/judge/claimed.h"
#include "sim/judge/sobol.h"
#include "sim/judge/trial.h"

/* Studies behind a standard deviation alone, and behind a shift. */
enum { BUDGET_FEW = 4096 };

/* A budget on its way. */
struct work {
    const struct scenario *s;
    const struct plan *plan;
    struct budget_options options;
    size_t done, steps;
};

static void step(struct work *w)
{
    w->done++;
    if (w->options.progress) w->options.progress(w->options.context, (double)w->done / (double)w->steps);
}

/* Play a plan under the expected fraction (or the difference) in one or two
 * ways; the estimates are for free(). False: out of memory. */
struct ask {
    const struct plan *plan;
    size_t studies, analyses;
    struct analysis analysis[2];
    uint32_t exchange;
};

static bool estimates(const struct work *w, const struct ask *ask, double *out[2])
{
    struct design design;
    struct play p;
    out[0] = out[1] = NULL;
    bool ok = design_make(&design, ask->plan, scenario_cost(w->s), scenario_question(w->s));
    play_start(&p, &design, scenario_seed(w->s));
    if (ok && !design_why(&design, &ask->analysis[0])) {
        outcome_fractions(scenario_question(w->s), &p);
        if (!p.measured) p.fractions = 1;
        p.exchange = (struct draws_exchange){scenario_seed(w->s) ^ UINT64_C(0x5bd1e995f00dcafe), ask->exchange};
        p.analyses = ask->analyses;
        for (size_t a = 0; a < ask->analyses; a++) {
            p.analysis[a] = ask->analysis[a];
            p.active[a] = true;
        }
        ok = play_until(&p, ask->studies);
        for (size_t a = 0; ok && a < ask->analyses; a++) {
            out[a] = p.sample[a].delta[0];
            p.sample[a].delta[0] = NULL;
        }
        play_free(&p);
    }
    design_free(&design);
    return ok;
}

static size_t few(const struct work *w)
{
    return scenario_studies(w->s) < BUDGET_FEW ? scenario_studies(w->s) : BUDGET_FEW;
}

static bool shares(struct work *w, struct budget *out)
{
    const size_t n = scenario_studies(w->s);
    struct ask ask = {.plan = w->plan, .studies = n, .analyses = 1, .analysis = {w->plan->analysis}};
    double *a[2], *b[2], *mixed[2];
    size_t worst = 0;
    bool ok = estimates(w, &ask, a);
    ask.exchange = (UINT32_C(1) << SOURCES) - 1;
    ok = estimates(w, &ask, b) && ok && a[0] && b[0];
    for (size_t g = 0; ok && g < SOURCES; g++) {
        ask.exchange = UINT32_C(1) << g;
        ok = estimates(w, &ask, mixed) && mixed[0];
        if (!ok) break;
        const struct sobol s = sobol_of(n, a[0], b[0], mixed[0]);
        struct budget_group *const group = &out->group[g];
        group->first = s.first.value;
        group->first_se = s.first.se;
        group->total = s.total.value;
        group->total_se = s.total.se;
        if (n - s.used > worst) worst = n - s.used;
        free(mixed[0]);
        step(w);
    }
    out->studies = n;
    out->left_out = (double)worst / (double)n;
    free(a[0]);
    free(b[0]);
    return ok;
}

static size_t keep_answers(double *x, size_t n)
{
    size_t count = 0;
    for (size_t i = 0; i < n; i++)
        if (isfinite(x[i])) x[count++] = x[i];
    return count;
}

static bool alone(struct work *w, struct budget *out)
{
    for (size_t g = 0; g < SOURCES; g++) {
        const struct plan only = sources_alone(w->plan, (enum draws_group)g);
        const struct ask ask = {.plan = &only, .studies = few(w), .analyses = 1, .analysis = {only.analysis}};
        double *x[2];
        if (!estimates(w, &ask, x) || !x[0]) return false;
        const size_t n = keep_answers(x[0], ask.studies);
        if (n > 1) {
            const struct moments m = moments_of(x[0], n);
            out->group[g].alone_sd = m.sd;
            out->group[g].alone_sd_se = m.sd_se;
        }
        free(x[0]);
        step(w);
    }
    return true;
}

/* Mean of x less y over the studies in which both answer. */
static struct budget_shift shift_of(const double *x, const double *y, size_t n)
{
    double sum = 0.0, squares = 0.0, count = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double d = x[i] - y[i];
        if (!isfinite(d)) continue;
        sum += d;
        squares += d * d;
        count += 1.0;
    }
    if (count < 2.0) return (struct budget_shift){(double)NAN, (double)NAN};
    const double mean = sum / count;
    return (struct budget_shift){mean, sqrt(fmax(squares / count - mean * mean, 0.0) / count)};
}

const char *budget_bias_name(enum budget_bias bias)
{
    static const char *const name[BUDGET_BIASES] = {
        "density neglected", "kinetic energy neglected", "spent reagent and blank", "conversion and hydrolysis neglected", "nonspecific scission",
        "carry-over", "solution offset", "continuous chain statistics", "curvature of the extrapolation"};
    return name[bias];
}

/* The two plans (or ways of reducing) whose difference is a bias: with what is
 * neglected or there, and without. */
static void two_ways(enum budget_bias bias, struct plan with[2])
{
    struct plan *const bad = &with[0], *const good = &with[1];
    switch (bias) {
    case BUDGET_DENSITY: bad->analysis.density_corrected = !(good->analysis.density_corrected = true); break;
    case BUDGET_KINETIC_ENERGY: bad->analysis.kinetic_corrected = !(good->analysis.kinetic_corrected = true); break;
    case BUDGET_REAGENT: good->cleavage.reagent_viscosity = good->cleavage.reagent_density = 0.0; break;
    case BUDGET_CONVERSION: bad->cleavage.correct_conversion = !(good->cleavage.correct_conversion = true); break;
    case BUDGET_NONSPECIFIC: good->cleavage.nonspecific = 0.0; break;
    case BUDGET_CARRY_OVER: good->habits.carry_over = 0.0; break;
    case BUDGET_SOLUTION_OFFSET: good->tube.solution_offset = 0.0; break;
    case BUDGET_CHAIN_STATISTICS:
        bad->analysis.chain_statistics = CHAIN_CONTINUOUS;
        good->analysis.chain_statistics = CHAIN_DISCRETE;
        break;
    default: /* curvature: the line that fits the law of the solution has none */
        good->analysis.extrapolation = good->material.law == SOLUTION_MARTIN ? MARTIN : HUGGINS;
        break;
    }
}

static bool shifts(struct work *w, struct budget *out)
{
    for (int b = 0; b < BUDGET_BIASES; b++) {
        struct plan way[2] = {*w->plan, *w->plan};
        double *x[2] = {NULL, NULL};
        bool ok = true;
        two_ways((enum budget_bias)b, way);
        for (int k = 0; ok && k < 2; k++) {
            const struct ask ask = {.plan = &way[k], .studies = few(w), .analyses = 1, .analysis = {way[k].analysis}};
            double *one[2];
            ok = estimates(w, &ask, one);
            x[k] = one[0];
        }
        out->bias[b] = x[0] && x[1] ? shift_of(x[0], x[1], few(w)) : (struct budget_shift){(double)NAN, (double)NAN};
        free(x[0]);
        free(x[1]);
        if (!ok) return false;
        step(w);
    }
    return true;
}

bool budget_run(const struct scenario *s, const struct plan *plan, struct budget_options options, struct budget *out)
{
    struct work w = {.s = s, .plan = plan, .options = options, .steps = 2 * SOURCES + BUDGET_BIASES + 1};
    memset(out, 0, sizeof *out);
    if (!trial_run(s, plan, (struct trial_options){0}, &out->outcome, NULL)) return false;
    if (out->outcome.studies == 0) return true;
    const bool ok = shares(&w, out) && alone(&w, out) && shifts(&w, out) && claimed_coverage(s, plan, &out->coverage, &out->coverage_se);
    step(&w);
    return ok;
}
