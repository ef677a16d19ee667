/* Numbers that sum a sample up: moments, quantiles, coverage intervals. */
#ifndef VICINAL_JUDGE_MOMENTS_H
#define VICINAL_JUDGE_MOMENTS_H

#include <stddef.h>

struct interval {
    double low, high;
};

struct moments {
    double mean, sd;         /* sd with n - 1 */
    double mean_se, sd_se;   /* standard errors; that of sd from the fourth moment */
};

/* Of n >= 2 values; two passes. */
struct moments moments_of(const double *x, size_t n);

/* Sort rising (heapsort of GSL; NaN is not allowed). */
void moments_sort(double *x, size_t n);

/* Quantile of rising values, p in [0, 1]: order statistics, linearly
 * interpolated at (n - 1) p. */
double moments_quantile(const double *sorted, size_t n, double p);

/* Probabilistically symmetric and shortest coverage interval of n >= 2 rising
 * values. Source: JCGM 101:2008, 7.7. */
struct interval moments_symmetric(const double *sorted, size_t n, double p);
struct interval moments_shortest(const double *sorted, size_t n, double p);

/* How wide n >= 2 rising values spread: the lesser of their standard deviation
 * and their interquartile range over 1.349, so that no wild value counts
 * (Silverman, Density Estimation (1986), 3.4.2). */
double moments_scale(const double *sorted, size_t n);

/* Density at `at`, by Epanechnikov's kernel 2.34 scale n^(-1/5) wide (ibid.,
 * for a normal shape). */
double moments_density(const double *x, size_t n, double scale, double at);

/* Numerical tolerance of a standard uncertainty given to `digits` significant
 * digits: half a unit of the last one. Source: JCGM 101:2008, 7.9.2. */
double moments_tolerance(double u, int digits);

#endif
