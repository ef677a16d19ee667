#include "sim/judge/outcome.h"

#include <gsl/gsl_cdf.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/bench/cost.h"
#include "sim/judge/bar.h"

static const double coverage = 0.95; /* of the intervals */

const char *outcome_status_text(enum status status)
{
    static const char *const text[STATUSES] = {"resolves", "fails", "undecided", "impossible", "too dear"};
    return text[status];
}

static double equipment(const struct scenario *s, const struct plan *p)
{
    double sum = 0.0;
    if (!scenario_owned(s, p->tube.name)) sum += p->tube.price;
    if (!scenario_owned(s, p->bath.name)) sum += p->bath.price;
    if (!scenario_owned(s, p->thermometer.name)) sum += p->thermometer.price;
    if (!scenario_owned(s, p->timer.name)) sum += p->timer.price;
    return sum;
}

static void nothing(struct figures *f)
{
    const struct interval none = {(double)NAN, (double)NAN};
    *f = (struct figures){(double)NAN, (double)NAN, (double)NAN, (double)NAN, none, none, (double)NAN, (double)NAN, (double)NAN,
                          (double)NAN, (double)NAN, (double)NAN, (double)NAN, (double)NAN, (double)NAN};
}

static void lay_facts(const struct design *d, struct outcome *out)
{
    out->water_efflux_s = d->liquid[DESIGN_WATER].nominal_s;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        out->levels[q->series] = q->level + 1;
        out->concentration_kg_m3[q->series][q->level] = q->conc_kg_m3;
        out->nominal_efflux_s[q->series][q->level] = q->nominal_s;
    }
    out->level_flask_m3 = d->flasks.level_m3;
    for (size_t k = 0; k < SERIES; k++) {
        out->stock_flask_m3[k] = d->flasks.stock_m3[k];
        out->intrinsic[k] = (struct spread_of){d->chains.intrinsic_m3_kg[k], (double)NAN, (double)NAN};
        out->molar_mass[k] = (struct spread_of){d->chains.Mv_kg_mol[k], (double)NAN, (double)NAN};
    }
    out->days = d->days;
    out->polymer_kg = d->polymer_kg;
}

void outcome_nominal(const struct scenario *s, const struct plan *plan, const struct design *design, struct outcome *out)
{
    memset(out, 0, sizeof *out);
    nothing(&out->at);
    nothing(&out->se);
    out->status = STATUS_UNDECIDED;
    out->resolvable_against = out->resolvable_within = (double)NAN;
    out->margin_se = -INFINITY;
    out->truth = bar_truth(scenario_question(s));
    lay_facts(design, out);
    const char *const why = design_why(design, &plan->analysis);
    if (why) {
        snprintf(out->why, sizeof out->why, "%s", why);
        out->status = STATUS_IMPOSSIBLE;
        return;
    }
    const struct cost cost = cost_of(design, scenario_cost(s), design->nominal_clock_s, equipment(s, plan));
    out->at.clock_s = design->nominal_clock_s;
    out->at.hours_s = cost.hours_s;
    out->at.money = cost.money;
    if (cost_too_dear(design, scenario_cost(s), cost, out->why, sizeof out->why)) out->status = STATUS_TOO_DEAR;
}

/* Root-mean-square error about the truth, and its standard error. */
static void rmse_of(const double *x, size_t n, double truth, double *rmse, double *se)
{
    double sum = 0.0, sum2 = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double e2 = (x[i] - truth) * (x[i] - truth);
        sum += e2;
        sum2 += e2 * e2;
    }
    const double mean = sum / (double)n, variance = fmax(sum2 / (double)n - mean * mean, 0.0);
    *rmse = sqrt(mean);
    *se = mean > 0.0 ? sqrt(variance / (double)n) / (2.0 * *rmse) : 0.0;
}

/* Scatter of the ends of a shortest interval: from batches in the order of the
 * studies, carried to all n by the cube root that such ends follow. */
static struct interval shortest_se(const double *x, size_t n)
{
    enum { BATCHES = 16 };
    const size_t m = n / BATCHES;
    double low[BATCHES], high[BATCHES];
    double *const batch = malloc((m ? m : 1) * sizeof *batch);
    struct interval se = {(double)NAN, (double)NAN};
    if (!batch || m < 8) {
        free(batch);
        return se;
    }
    for (size_t b = 0; b < BATCHES; b++) {
        memcpy(batch, x + b * m, m * sizeof *batch);
        moments_sort(batch, m);
        const struct interval i = moments_shortest(batch, m, coverage);
        low[b] = i.low;
        high[b] = i.high;
    }
    free(batch);
    const double shrink = cbrt(1.0 / BATCHES);
    se.low = moments_of(low, BATCHES).sd * shrink;
    se.high = moments_of(high, BATCHES).sd * shrink;
    return se;
}

static double quantile_se(const double *sorted, size_t n, double scale, double p, double at)
{
    const double density = moments_density(sorted, n, scale, at);
    return density > 0.0 ? sqrt(p * (1.0 - p) / (double)n) / density : 0.0;
}

/* What the answered estimates say. `x` keeps the order of the studies. */
static bool describe(const double *x, size_t n, struct outcome *out)
{
    if (n < 2) return true;
    double *const sorted = malloc(n * sizeof *sorted);
    if (!sorted) return false;
    memcpy(sorted, x, n * sizeof *sorted);
    moments_sort(sorted, n);
    const struct moments m = moments_of(x, n);
    out->at.mean = m.mean;
    out->at.bias = m.mean - out->truth;
    out->at.sd = m.sd;
    out->se.mean = out->se.bias = m.mean_se;
    out->se.sd = m.sd_se;
    rmse_of(x, n, out->truth, &out->at.rmse, &out->se.rmse);
    out->at.interval = moments_symmetric(sorted, n, coverage);
    out->at.shortest = moments_shortest(sorted, n, coverage);
    const double tail = 0.5 * (1.0 - coverage);
    const double scale = moments_scale(sorted, n);
    out->se.interval = (struct interval){quantile_se(sorted, n, scale, tail, out->at.interval.low), quantile_se(sorted, n, scale, tail, out->at.interval.high)};
    out->se.shortest = shortest_se(x, n);
    free(sorted);
    return true;
}

/* Standard error of a share, taken at (k + 1)/(n + 2) so that none or all of n
 * does not pass for certain (Laplace's rule of succession). */
static double share_se(double p, size_t n)
{
    const double count = (double)n, at = (p * count + 1.0) / (count + 2.0);
    return sqrt(at * (1.0 - at) / count);
}

/* Share of the estimates under `against` that a plain comparison with
 * `against` would call different: beyond z of their own standard deviations.
 * Its standard error allows for that deviation being estimated too. Sorts x. */
static void plain_false_alarm(const struct question *q, double *x, size_t n, size_t all, struct outcome *out)
{
    if (n < 2) return;
    moments_sort(x, n);
    const struct moments m = moments_of(x, n);
    const double z = gsl_cdf_ugaussian_Pinv(bar_level(q)), sign = q->expect > q->against ? 1.0 : -1.0;
    const double edge = bar_null(q) + sign * z * m.sd, count = (double)all;
    const double pull = m.sd > 0.0 ? moments_density(x, n, moments_scale(x, n), edge) * z / (2.0 * m.sd) : 0.0;
    double sum = 0.0, sum2 = 0.0, beyond = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double d = x[i] - m.mean, influence = (sign * (x[i] - edge) > 0.0 ? 1.0 : 0.0) - pull * (d * d - m.sd * m.sd);
        beyond += sign * (x[i] - edge) > 0.0 ? 1.0 : 0.0;
        sum += influence;
        sum2 += influence * influence;
    }
    out->at.plain_false_alarm = beyond / count;
    out->se.plain_false_alarm = fmax(sqrt(fmax(sum2 / count - sum * sum / (count * count), 0.0) / count), share_se(0.0, all));
}

static size_t answered(const double *x, size_t n, double *kept)
{
    size_t count = 0;
    for (size_t i = 0; i < n; i++)
        if (isfinite(x[i])) kept[count++] = x[i];
    return count;
}

static bool decide(const struct scenario *s, const double *const delta[], size_t n, struct outcome *out)
{
    const struct question *const q = scenario_question(s);
    struct bar_power power = {0};
    double share = 0.0;
    if (q->has_within) {
        share = bar_share(q, delta[0], n);
        out->at.within = share;
        out->se.within = share_se(share, n);
    }
    if (q->has_against) {
        if (!bar_power_of(q, delta[0], delta[1], n, &power)) return false;
        out->at.critical = power.critical;
        out->se.critical = power.critical_se;
        out->at.power = power.power;
        out->se.power = fmax(bar_power_se(q, &power, power.power, n), share_se(power.power, n));
    }
    const struct bar_look look = bar_look(q, share, &power, n, scenario_studies(s));
    out->margin_se = look.margin_se;
    out->status = look.verdict == VERDICT_PASSES ? STATUS_RESOLVES : look.verdict == VERDICT_FAILS ? STATUS_FAILS : STATUS_UNDECIDED;
    return true;
}

static void lay_costs(const struct scenario *s, const struct plan *plan, const struct play *play, struct outcome *out)
{
    const struct cost_rules *const rules = scenario_cost(s);
    const double price = equipment(s, plan);
    const struct cost cost = cost_of(play->design, rules, play->clock_s.mean, price);
    out->at.spare_runs = play->spare_runs.mean;
    out->se.spare_runs = play_se(&play->spare_runs);
    out->at.clock_s = play->clock_s.mean;
    out->se.clock_s = out->se.hours_s = play_se(&play->clock_s);
    out->at.hours_s = cost.hours_s;
    out->at.money = cost.money;
    out->se.money = out->se.hours_s / 3600.0 * rules->hour;
    /* before the cap only what is too dear beyond its own scatter */
    const double scatter = play->n < scenario_studies(s) ? BAR_BAND : 0.0;
    const struct cost least = {cost.hours_s - scatter * out->se.hours_s, cost.money - scatter * out->se.money};
    if (cost_too_dear(play->design, rules, least, out->why, sizeof out->why)) out->status = STATUS_TOO_DEAR;
}

bool outcome_of(const struct scenario *s, const struct plan *plan, const struct play *play, size_t a, struct outcome *out)
{
    const struct question *const q = scenario_question(s);
    const struct play_sample *const sample = &play->sample[a];
    const size_t n = play->n;
    outcome_nominal(s, plan, play->design, out);
    double *const kept = malloc(n * sizeof *kept);
    if (!kept) return false;
    out->studies = n;
    const size_t count = answered(sample->delta[0], n, kept);
    out->at.no_answer = 1.0 - (double)count / (double)n;
    out->se.no_answer = share_se(out->at.no_answer, n);
    bool ok = describe(kept, count, out);
    if (q->has_against) {
        out->at.plain_false_alarm = 0.0;
        plain_false_alarm(q, kept, answered(sample->delta[1], n, kept), n, out);
    }
    free(kept);
    for (size_t k = 0; k < SERIES; k++) {
        out->intrinsic[k].mean = sample->intrinsic[k].mean;
        out->intrinsic[k].sd = play_sd(&sample->intrinsic[k]);
        out->molar_mass[k].mean = sample->molar_mass[k].mean;
        out->molar_mass[k].sd = play_sd(&sample->molar_mass[k]);
    }
    ok = ok && decide(s, (const double *const *)sample->delta, n, out);
    lay_costs(s, plan, play, out);
    return ok;
}

void outcome_fractions(const struct question *q, struct play *play)
{
    play->fraction[play->fractions++] = q->expect;
    if (q->has_against) play->fraction[play->fractions++] = q->against;
    play->measured = q->has_against && q->against_is == AGAINST_MEASURED;
}
