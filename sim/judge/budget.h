/* Which error source costs how much of the variance of one plan, what neglected
 * corrections shift, and what the analyst's own error bar is worth. */
#ifndef VICINAL_JUDGE_BUDGET_H
#define VICINAL_JUDGE_BUDGET_H

#include "sim/judge/outcome.h"
#include "sim/judge/sources.h"

/* One group of sources: its share of the variance by itself (first) and with
 * all it takes part in (total), Sobol's indices by Jansen's estimators; and the
 * standard deviation it causes when every other spread is zero. Standard errors
 * are Monte Carlo. */
struct budget_group {
    double first, first_se, total, total_se, alone_sd, alone_sd_se;
};

/* What the mean estimate shifts by when a correction is left out, or by an
 * effect that is there. */
enum budget_bias {
    BUDGET_DENSITY, BUDGET_KINETIC_ENERGY, BUDGET_REAGENT, BUDGET_CONVERSION, BUDGET_NONSPECIFIC, BUDGET_CARRY_OVER,
    BUDGET_SOLUTION_OFFSET, BUDGET_CHAIN_STATISTICS, BUDGET_CURVATURE, BUDGET_BIASES
};
const char *budget_bias_name(enum budget_bias bias);
struct budget_shift {
    double shift, se;
};

struct budget {
    struct outcome outcome;
    size_t studies;     /* pairs of studies behind the shares */
    double left_out;    /* share of them left out for 'no answer' */
    struct budget_group group[SOURCES];
    struct budget_shift bias[BUDGET_BIASES];
    double coverage, coverage_se; /* of the 95 % interval claimed from one notebook */
};

struct budget_options {
    void (*progress)(void *context, double done); /* NULL: none */
    void *context;
};

/* False: out of memory. An impossible plan has only its outcome's status. */
bool budget_run(const struct scenario *s, const struct plan *plan, struct budget_options options, struct budget *out);

#endif
