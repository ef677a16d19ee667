/* How long a search may take. */
#ifndef VICINAL_JUDGE_FORECAST_H
#define VICINAL_JUDGE_FORECAST_H

#include "sim/scenario/scenario.h"

/* Expected computing time of `plan` [s] on the threads in use: a few studies
 * of the first plan that is possible are played and timed, every bench group
 * is taken to be decided at its second look on average, and a dozen plans to
 * be played to the cap. A guess to within a factor of about three. False: out
 * of memory. */
bool forecast_seconds(const struct scenario *s, double *seconds);

#endif
