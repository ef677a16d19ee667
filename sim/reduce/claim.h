/* The error bar that an analyst would write beside a fraction, from one
 * notebook alone: the standard errors of the fitted lines, and glassware,
 * balance and dry content, carried to the fraction by the law of propagation.
 * Source: JCGM 100:2008 (GUM), 5.1.2, H.3; effective degrees of freedom by
 * Welch and Satterthwaite, G.4.1.
 * Left out by it, as in practice: what no scatter about a line shows (drifts,
 * calibrations, the pair, conversion, hydrolysis, solution offset). With a
 * common intercept both lines rest on the same times, which the usual error bar
 * takes as independent: it is then too short even for pure scatter (75 % instead
 * of 95 %, tests/unit/reduce/test_claim.c). */
#ifndef VICINAL_REDUCE_CLAIM_H
#define VICINAL_REDUCE_CLAIM_H

#include "sim/reduce/reduction.h"

/* Relative standard uncertainties of the concentrations that the analyst takes
 * from certificates: of each stock, and common to both. */
struct claim_glass {
    double stock[SERIES], common;
};

struct claim {
    double delta, u; /* not a number: no answer, or too few levels for an error bar */
    double freedom;  /* effective degrees of freedom */
};
struct claim claim_of(const struct assumed *a, const struct analysis *how, const struct reduction_levels *levels, const struct claim_glass *glass, int lane);

/* Half-width of the interval claimed at this coverage: t u. */
double claim_half_width(const struct claim *claim, double coverage);

/* Standard uncertainty and degrees of freedom of an intrinsic viscosity from
 * the scatter of its own levels. */
double claim_intrinsic_u(const struct analysis *how, size_t n, const double *conc, const double *relative, double *freedom);

#endif
