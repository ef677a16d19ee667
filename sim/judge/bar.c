#include "sim/judge/bar.h"

#include <math.h>
#include <stdlib.h>

#include "sim/judge/moments.h"

double bar_level(const struct question *q)
{
    return q->sides == SIDES_TWO ? 0.5 * (1.0 + q->confidence) : q->confidence;
}

double bar_truth(const struct question *q)
{
    return q->against_is == AGAINST_MEASURED && q->has_against ? q->expect - q->against : q->expect;
}

double bar_null(const struct question *q)
{
    return q->against_is == AGAINST_MEASURED ? 0.0 : q->against;
}

static double turned(const struct question *q, double delta)
{
    if (isnan(delta)) return -INFINITY;
    return q->expect > q->against ? delta : -delta;
}

/* Density of rising values at a point; those without an answer lie at minus
 * infinity. */
static double density_at(const double *sorted, size_t n, double at)
{
    size_t none = 0;
    while (none < n && isinf(sorted[none])) none++;
    return n - none > 1 ? moments_density(sorted, n, moments_scale(sorted + none, n - none), at) : 0.0;
}

bool bar_power_of(const struct question *q, const double *expect, const double *against, size_t n, struct bar_power *out)
{
    const double level = bar_level(q), count = (double)n;
    double *const sorted = malloc(2 * n * sizeof *sorted);
    if (!sorted) return false;
    double *const other = sorted + n;
    for (size_t i = 0; i < n; i++) {
        sorted[i] = turned(q, against[i]);
        other[i] = turned(q, expect[i]);
    }
    moments_sort(sorted, n);
    const double critical = moments_quantile(sorted, n, level);
    size_t beyond = 0, both = 0;
    for (size_t i = 0; i < n; i++) {
        beyond += other[i] > critical;
        both += other[i] > critical && turned(q, against[i]) > critical;
    }
    const double at = isfinite(critical) ? critical : 0.0;
    const double here = density_at(sorted, n, at);
    moments_sort(other, n);
    const double there = density_at(other, n, at);
    *out = (struct bar_power){
        .critical = q->expect > q->against ? critical : -critical,
        .power = isfinite(critical) ? (double)beyond / count : 0.0,
        .both = (double)both / count,
        .density_ratio = here > 0.0 ? there / here : 0.0,
        .critical_se = here > 0.0 ? sqrt(level * (1.0 - level) / count) / here : 0.0};
    free(sorted);
    return true;
}

double bar_power_se(const struct question *q, const struct bar_power *at, double p, size_t n)
{
    const double c = bar_level(q), r = at->density_ratio;
    const double v = p * (1.0 - p) + r * r * c * (1.0 - c) - 2.0 * r * (at->both - (1.0 - c) * p);
    return sqrt(fmax(v, 0.0) / (double)n);
}

double bar_share(const struct question *q, const double *expect, size_t n)
{
    size_t inside = 0;
    for (size_t i = 0; i < n; i++) inside += fabs(expect[i] - bar_truth(q)) <= q->within;
    return (double)inside / (double)n;
}

static enum verdict verdict_of(double figure, double bar, double se)
{
    if (figure - bar > BAR_BAND * se) return VERDICT_PASSES;
    if (bar - figure > BAR_BAND * se) return VERDICT_FAILS;
    return VERDICT_OPEN;
}

struct bar_look bar_look(const struct question *q, double share, const struct bar_power *power, size_t n, size_t cap)
{
    const double to_cap = sqrt((double)n / (double)cap);
    struct bar_look look = {VERDICT_PASSES, INFINITY};
    const double bars[2] = {q->confidence, q->power};
    const bool asked[2] = {q->has_within, q->has_against};
    for (int i = 0; i < 2; i++) {
        if (!asked[i]) continue;
        const double figure = i == 0 ? share : power->power;
        const double se = i == 0 ? sqrt(bars[0] * (1.0 - bars[0]) / (double)n) : bar_power_se(q, power, bars[1], n);
        const enum verdict v = verdict_of(figure, bars[i], se);
        look.margin_se = fmin(look.margin_se, (figure - bars[i]) / (fmax(se, 1e-12) * to_cap));
        if (v == VERDICT_FAILS || (v == VERDICT_OPEN && look.verdict == VERDICT_PASSES)) look.verdict = v;
    }
    return look;
}

size_t bar_first_look(const struct question *q)
{
    double b = q->confidence;
    if (q->has_against && q->power > b) b = q->power;
    size_t n = 256;
    while ((double)n <= 11.0 / (1.0 - b)) n *= 2;
    return n;
}
