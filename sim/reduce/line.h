/* Straight lines by weighted least squares. */
#ifndef VICINAL_REDUCE_LINE_H
#define VICINAL_REDUCE_LINE_H

#include <stddef.h>

struct line {
    double intercept, slope;
};

/* Least squares of y on x, n >= 2 different x; weight[i] is that of the squared
 * residual, NULL means 1. Not a number when the x do not differ. */
struct line line_fit(size_t n, const double *x, const double *y, const double *weight);

/* What the fit says of itself: standard errors, the correlation of intercept
 * and slope, and the residual standard deviation; n >= 3, equal weights.
 * Source: JCGM 100:2008, H.3. */
struct line_errors {
    double intercept_u, slope_u, correlation, residual_sd;
};
struct line_errors line_errors(size_t n, const double *x, const double *y, struct line line);

/* Two lines over the same x with one intercept, fitted together; out[] gets
 * both (their intercepts are equal). */
void line_fit_common(size_t n, const double *x, const double *const y[2], const double *weight, struct line out[2]);

#endif
