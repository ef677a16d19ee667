/* One plan in depth. */
#ifndef VICINAL_JUDGE_TRIAL_H
#define VICINAL_JUDGE_TRIAL_H

#include "sim/judge/outcome.h"
#include "sim/reduce/line.h"

/* The estimates behind an outcome, for the figures: n studies under each
 * fraction, study by study; NaN is 'no answer'. `against` is NULL when the
 * question does not ask it. */
struct estimates {
    size_t n;
    double *expect, *against;
};

/* One synthetic study for the extrapolation plot: per series the levels'
 * nominal concentrations, relative viscosities, and what the analyst's line
 * gives. */
struct example_level {
    double concentration_kg_m3, relative_viscosity;
};
struct example {
    size_t levels[SERIES];
    struct example_level level[SERIES][PLAN_MAX_LEVELS];
    double intrinsic_m3_kg[SERIES];
    /* the analyst's fitted line(s), in the coordinates of the extrapolation:
     * first eta_sp/c (huggins), ln eta_r/c (kraemer) or ln(eta_sp/c) (martin)
     * against c; second used by common-intercept (kraemer) only. SI. NaN for
     * single-point. */
    double intercept[SERIES][2], slope[SERIES][2];
    double estimate;
};

/* What to look for besides the figures. */
struct trial_options {
    size_t first_study; /* a multiple of LANES */
    bool deep;          /* resolvable_against and resolvable_within too */
    void (*progress)(void *context, double done); /* NULL: none */
    void *context;
};

/* Play one plan to the cap. `estimates`, when not NULL, gets what is for
 * trial_free_estimates. A plan that is impossible or too dear by nominal times
 * has only its status, and no estimates. False: out of memory. */
bool trial_run(const struct scenario *s, const struct plan *plan, struct trial_options options, struct outcome *out, struct estimates *estimates);
void trial_free_estimates(struct estimates *e);

/* Whether `within` is narrower than the constants allow: with every spread but
 * eta_u and a_u zero its share stays below `confidence`. False: out of memory. */
bool trial_too_narrow(const struct scenario *s, const struct plan *plan, bool *too_narrow);

#endif
