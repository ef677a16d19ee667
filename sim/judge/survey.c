#include "sim/judge/survey.h"

#include <math.h>
#include <stdlib.h>

#include "sim/judge/bar.h"

static size_t studies_of(const struct scenario *s)
{
    return scenario_studies(s) < SURVEY_STUDIES ? scenario_studies(s) : SURVEY_STUDIES;
}

/* Lay a plan out and play it; false: out of memory. When it is impossible
 * nothing is played. Ends with end. */
struct surveyed {
    struct design design;
    struct play play;
};

static bool begin(const struct scenario *s, const struct plan *plan, struct surveyed *v)
{
    const bool ok = design_make(&v->design, plan, scenario_cost(s), scenario_question(s));
    play_start(&v->play, &v->design, scenario_seed(s));
    return ok;
}

static void add_analysis(struct play *p, const struct analysis *how)
{
    p->active[p->analyses] = true;
    p->analysis[p->analyses++] = *how;
}

static void end(struct surveyed *v)
{
    play_free(&v->play);
    design_free(&v->design);
}

/* Power, or the share within, of one plan; NaN when it is impossible. */
static bool figure_of(const struct scenario *s, const struct plan *plan, double *figure)
{
    const struct question *const q = scenario_question(s);
    struct surveyed v;
    struct bar_power power;
    bool ok = begin(s, plan, &v);
    *figure = (double)NAN;
    if (ok && !design_why(&v.design, &plan->analysis)) {
        outcome_fractions(q, &v.play);
        add_analysis(&v.play, &plan->analysis);
        ok = play_until(&v.play, studies_of(s));
        double *const *const delta = v.play.sample[0].delta;
        if (ok && q->has_against) ok = bar_power_of(q, delta[0], delta[1], v.play.n, &power);
        if (ok) *figure = q->has_against ? power.power : bar_share(q, delta[0], v.play.n);
    }
    end(&v);
    return ok;
}

bool survey_map_make(const struct scenario *s, const struct plan *plan, struct survey_map *out)
{
    bool ok = true;
    out->fluctuation_now_K = plan->bath.fluctuation_K;
    out->fillings_now = plan->fillings[CLEAVED];
    for (size_t i = 0; ok && i < SURVEY_BATHS; i++) {
        struct plan changed = *plan;
        out->fluctuation_K[i] = changed.bath.fluctuation_K = 0.005 * pow(100.0, (double)i / (SURVEY_BATHS - 1));
        for (size_t j = 0; ok && j < SURVEY_FILLINGS; j++) {
            changed.fillings[INTACT] = changed.fillings[CLEAVED] = j + 1;
            ok = figure_of(s, &changed, &out->figure[i][j]);
        }
    }
    return ok;
}

/* Estimates of the polymers that hold a fraction, against the second polymer
 * when there is one. */
static bool share_beyond(const struct scenario *s, const struct surveyed *base, double fraction, double critical, double *share)
{
    const struct question *const q = scenario_question(s);
    struct play p;
    size_t beyond = 0;
    play_start(&p, &base->design, scenario_seed(s));
    p.fraction[p.fractions++] = fraction;
    if (q->against_is == AGAINST_MEASURED) {
        p.fraction[p.fractions++] = q->against;
        p.measured = true;
    }
    add_analysis(&p, &base->design.plan->analysis);
    const bool ok = play_until(&p, studies_of(s));
    for (size_t i = 0; ok && i < p.n; i++) {
        const double delta = p.sample[0].delta[0][i];
        beyond += q->expect > q->against ? delta > critical : delta < critical;
    }
    *share = ok ? (double)beyond / (double)p.n : 0.0;
    play_free(&p);
    return ok;
}

bool survey_curve_make(const struct scenario *s, const struct plan *plan, double critical, struct survey_curve *out)
{
    const struct question *const q = scenario_question(s);
    const double step = q->expect - q->against;
    struct surveyed v;
    bool ok = begin(s, plan, &v);
    for (size_t i = 0; ok && i < SURVEY_FRACTIONS; i++) {
        const double at = q->against + step * (-0.5 + 2.0 * (double)i / (SURVEY_FRACTIONS - 1)); /* half a step before to half beyond */
        out->fraction[i] = fmin(fmax(at, 0.0), 0.2);
        ok = share_beyond(s, &v, out->fraction[i], critical, &out->power[i]);
        const double n = (double)studies_of(s), p = (out->power[i] * n + 1.0) / (n + 2.0);
        out->se[i] = sqrt(p * (1.0 - p) / n);
    }
    end(&v);
    return ok;
}

static void tops_of(const struct play *p, const size_t which[], double truth, double *sd, double *bias)
{
    double *const kept = malloc(p->n * sizeof *kept);
    for (size_t a = 0; kept && a < p->analyses; a++) {
        size_t n = 0;
        for (size_t i = 0; i < p->n; i++)
            if (isfinite(p->sample[a].delta[0][i])) kept[n++] = p->sample[a].delta[0][i];
        if (n < 2) continue;
        const struct moments m = moments_of(kept, n);
        sd[which[a]] = m.sd;
        bias[which[a]] = m.mean - truth;
    }
    free(kept);
}

bool survey_tops_make(const struct scenario *s, const struct plan *plan, struct survey_tops *out)
{
    const struct question *const q = scenario_question(s);
    bool ok = true;
    for (size_t i = 0; ok && i < SURVEY_TOPS; i++) {
        struct plan changed = *plan;
        struct surveyed v;
        size_t which[SURVEY_EXTRAPOLATIONS];
        out->top[i] = changed.top[CLEAVED] = 1.15 + 0.15 * (double)i;
        for (size_t e = 0; e < SURVEY_EXTRAPOLATIONS; e++) out->sd[i][e] = out->bias[i][e] = (double)NAN;
        ok = begin(s, &changed, &v);
        for (size_t e = 0; ok && e < SURVEY_EXTRAPOLATIONS; e++) {
            struct analysis how = plan->analysis;
            how.extrapolation = (enum extrapolation)e;
            if (design_why(&v.design, &how)) continue;
            which[v.play.analyses] = e;
            add_analysis(&v.play, &how);
        }
        if (ok && v.play.analyses > 0) {
            v.play.fraction[v.play.fractions++] = q->expect;
            ok = play_until(&v.play, studies_of(s));
            if (ok) tops_of(&v.play, which, q->expect, out->sd[i], out->bias[i]);
        }
        end(&v);
    }
    return ok;
}
