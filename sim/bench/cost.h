/* What a study costs: hours, polymer, money. */
#ifndef VICINAL_BENCH_COST_H
#define VICINAL_BENCH_COST_H

#include "sim/bench/design.h"

struct cost {
    double hours_s, money;
};

/* From a clock [s] (nominal, or the mean of studies), with `equipment` the
 * price of what is not owned. */
struct cost cost_of(const struct design *d, const struct cost_rules *rules, double clock_s, double equipment);

/* Whether that is above an at_most; says which in why[size]. */
bool cost_too_dear(const struct design *d, const struct cost_rules *rules, struct cost cost, char *why, size_t size);

/* What the plan is least in, as it is compared: rounded to 0.1 h or 1 unit of
 * currency. */
double cost_rounded(const struct cost_rules *rules, struct cost cost);

#endif
