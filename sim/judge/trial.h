/* One plan in depth. */
#ifndef VICINAL_JUDGE_TRIAL_H
#define VICINAL_JUDGE_TRIAL_H

#include "sim/judge/outcome.h"

/* The estimates behind an outcome, for the figures: n studies under each
 * fraction, study by study; NaN is 'no answer'. `against` is NULL when the
 * question does not ask it. */
struct estimates {
    size_t n;
    double *expect, *against;
};

/* One synthetic study for the extrapolation plot: per series the levels'
 * nominal concentrations, reduced relative viscosities, and what the
 * analyst's line gives. */
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

#endif
