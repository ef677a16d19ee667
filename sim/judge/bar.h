/* The bar that a plan must clear, and when it is decided. */
#ifndef VICINAL_JUDGE_BAR_H
#define VICINAL_JUDGE_BAR_H

#include <stdbool.h>
#include <stddef.h>

#include "sim/scenario/plan.h"

/* A plan passes or fails once its figure is this many standard errors, taken
 * at the bar, away from it. */
#define BAR_BAND 3.3

enum verdict { VERDICT_OPEN, VERDICT_PASSES, VERDICT_FAILS };

/* Level of the one-sided quantile that decides: `confidence`, or half of what
 * it leaves for two sides. */
double bar_level(const struct question *q);

/* What the estimates are about under `expect` and under `against`: the fraction,
 * or, with a second polymer measured alongside, the difference. */
double bar_truth(const struct question *q);
double bar_null(const struct question *q);

/* What a power rests on, from n studies under both fractions on the same
 * draws. Values are turned so that `expect` lies above; 'no answer' counts as
 * not beyond. */
struct bar_power {
    double critical, power;
    double both;          /* share beyond the critical value under both */
    double density_ratio; /* of the densities under expect and against, at it */
    double critical_se;
};
bool bar_power_of(const struct question *q, const double *expect, const double *against, size_t n, struct bar_power *out);

/* Standard error of a power p from n studies, with that of the critical value:
 * sqrt((p (1-p) + q^2 c (1-c) - 2 q (both - (1-c) p))/n), c the level. */
double bar_power_se(const struct question *q, const struct bar_power *at, double p, size_t n);

/* Share of n estimates within +-within of the truth; 'no answer' is without. */
double bar_share(const struct question *q, const double *expect, size_t n);

/* One look: the margin over the bar in standard errors at the bar as they are
 * at `cap` studies, the smaller when two are asked; and the verdict at n. */
struct bar_look {
    enum verdict verdict;
    double margin_se;
};
struct bar_look bar_look(const struct question *q, double share, const struct bar_power *power, size_t n, size_t cap);

/* The first look: the power of two next above 11/(1 - b), at least 256. */
size_t bar_first_look(const struct question *q);

#endif
