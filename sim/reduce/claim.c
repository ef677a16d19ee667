#include "sim/reduce/claim.h"

#include <gsl/gsl_cdf.h>
#include <math.h>

/* Ordinates of one line, as reduction_extrapolate fits them. */
static double ordinate(enum extrapolation e, double conc, double relative)
{
    switch (e) {
    case KRAEMER: return log(relative) / conc;
    case MARTIN: return log((relative - 1.0) / conc);
    default: return (relative - 1.0) / conc;
    }
}

/* The levels of a series, weighted. */
struct levels {
    size_t n;
    const double *conc, *relative;
    double weight[ASSUMED_MAX_LEVELS];
};

/* Weighted residual sum of squares of one line about its fit. */
static double residuals(enum extrapolation e, const struct levels *l, struct line line)
{
    double sum = 0.0;
    for (size_t i = 0; i < l->n; i++) {
        const double r = ordinate(e, l->conc[i], l->relative[i]) - line.intercept - line.slope * l->conc[i];
        sum += l->weight[i] * r * r;
    }
    return sum;
}

/* Variance of an intercept over that of a residual of weight 1. */
static double leverage(const struct levels *l)
{
    double sw = 0.0, swx = 0.0, swxx = 0.0;
    for (size_t i = 0; i < l->n; i++) {
        sw += l->weight[i];
        swx += l->weight[i] * l->conc[i];
        swxx += l->weight[i] * l->conc[i] * l->conc[i];
    }
    return 1.0 / (sw - swx * swx / swxx);
}

static double single_point_u(size_t n, const double *conc, const double *relative, double *freedom)
{
    double value[ASSUMED_MAX_LEVELS], mean = 0.0, squares = 0.0;
    const double count = (double)n;
    for (size_t i = 0; i < n; i++) {
        value[i] = sqrt(2.0 * (relative[i] - 1.0 - log(relative[i]))) / conc[i];
        mean += value[i] / count;
    }
    for (size_t i = 0; i < n; i++) squares += (value[i] - mean) * (value[i] - mean);
    *freedom = count - 1.0;
    return n > 1 ? sqrt(squares / (count * (count - 1.0))) : (double)NAN;
}

double claim_intrinsic_u(const struct analysis *how, size_t n, const double *conc, const double *relative, double *freedom)
{
    struct levels l = {.n = n, .conc = conc, .relative = relative};
    struct line line[2] = {{0.0, 0.0}, {0.0, 0.0}};
    if (how->extrapolation == SINGLE_POINT) return single_point_u(n, conc, relative, freedom);
    const double intrinsic = reduction_extrapolate(how, n, conc, relative, line), count = (double)n;
    for (size_t i = 0; i < n; i++) l.weight[i] = how->weighting == WEIGHT_C_SQUARED ? conc[i] * conc[i] : 1.0;
    if (how->extrapolation == COMMON_INTERCEPT) {
        const double sum = residuals(HUGGINS, &l, line[0]) + residuals(KRAEMER, &l, line[1]);
        *freedom = 2.0 * count - 3.0;
        return sqrt(sum / *freedom * leverage(&l) / 2.0);
    }
    *freedom = count - 2.0;
    if (n < 3) return (double)NAN;
    const double u = sqrt(residuals(how->extrapolation, &l, line[0]) / *freedom * leverage(&l));
    return how->extrapolation == MARTIN ? u * intrinsic : u;
}

/* d delta/d ln [eta] of each series, by central differences. */
static void sensitivities(const struct assumed *a, const struct analysis *how, const double intrinsic[SERIES], double out[SERIES])
{
    const double h = 1e-4;
    for (size_t s = 0; s < SERIES; s++) {
        double delta[2];
        for (int k = 0; k < 2; k++) {
            double Mv[SERIES];
            for (size_t t = 0; t < SERIES; t++)
                Mv[t] = polymer_viscosity_average(a->K_m3_kg, a->a, intrinsic[t] * (t == s ? 1.0 + (k == 0 ? -h : h) : 1.0));
            delta[k] = reduction_fraction(a, how->chain_statistics, Mv);
        }
        out[s] = (delta[1] - delta[0]) / (2.0 * h);
    }
}

struct claim claim_of(const struct assumed *a, const struct analysis *how, const struct reduction_levels *levels, const struct claim_glass *glass, int lane)
{
    double intrinsic[SERIES], Mv[SERIES], by[SERIES], line_u[SERIES], freedom[SERIES];
    struct claim claim = {(double)NAN, (double)NAN, 0.0};
    for (size_t s = 0; s < SERIES; s++) {
        double relative[ASSUMED_MAX_LEVELS];
        for (size_t j = 0; j < a->levels[s]; j++) relative[j] = levels->relative[s][j][lane];
        intrinsic[s] = reduction_extrapolate(how, a->levels[s], a->conc_kg_m3[s], relative, NULL);
        if (!(intrinsic[s] > 0.0)) return claim;
        Mv[s] = polymer_viscosity_average(a->K_m3_kg, a->a, intrinsic[s]);
        line_u[s] = claim_intrinsic_u(how, a->levels[s], a->conc_kg_m3[s], relative, &freedom[s]) / intrinsic[s];
    }
    claim.delta = reduction_fraction(a, how->chain_statistics, Mv);
    sensitivities(a, how, intrinsic, by);
    double variance = 0.0, fourth = 0.0;
    for (size_t s = 0; s < SERIES; s++) {
        const double part = by[s] * by[s] * line_u[s] * line_u[s];
        variance += part + by[s] * by[s] * glass->stock[s] * glass->stock[s];
        fourth += part * part / freedom[s];
    }
    const double common = (by[INTACT] + by[CLEAVED]) * glass->common;
    variance += common * common;
    claim.u = sqrt(variance);
    claim.freedom = fourth > 0.0 ? variance * variance / fourth : (double)INFINITY;
    return claim;
}

double claim_half_width(const struct claim *claim, double coverage)
{
    const double p = 0.5 * (1.0 + coverage);
    /* beyond a million degrees of freedom t is the normal deviate to 1e-6 */
    return claim->u * (claim->freedom < 1e6 ? gsl_cdf_tdist_Pinv(p, claim->freedom) : gsl_cdf_ugaussian_Pinv(p));
}
