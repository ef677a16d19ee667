/* The days of a study, laid out beforehand from nominal times. */
#ifndef VICINAL_BENCH_DAYS_H
#define VICINAL_BENCH_DAYS_H

#include "sim/bench/design.h"

/* Put the fillings of a design in order and on days: d->filling, d->layout and
 * the nominal clock. Says in d->why when a day cannot hold its water and one
 * filling. False: out of memory. */
bool days_lay_out(struct design *d);

#endif
