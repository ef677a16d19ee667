/* Weighing and diluting: which flasks a plan takes and how well they are
 * known. */
#ifndef VICINAL_BENCH_FLASKS_H
#define VICINAL_BENCH_FLASKS_H

#include "sim/bench/design.h"

/* Choose the flasks of a design whose levels are laid out: volumes, strength
 * of the stocks, reagent share of each level, uncertainties of weighing and
 * dilution, polymer used. Says what is missing in d->why. */
void flasks_choose(struct design *d);

/* Hands-on time before the bench [s]: per stock, per level made in a flask,
 * and the cleavage. */
double flasks_preparation_s(const struct design *d, const struct cost_rules *cost);

#endif
