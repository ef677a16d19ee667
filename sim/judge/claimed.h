/* What the analyst's own error bar is worth. */
#ifndef VICINAL_JUDGE_CLAIMED_H
#define VICINAL_JUDGE_CLAIMED_H

#include "sim/judge/outcome.h"

/* How often the 95 % interval claimed from one notebook (sim/reduce/claim.h)
 * covers the truth, over the simulated studies at the expected fraction, of
 * those with an answer; of the first preparation and polymer. NaN when the
 * levels are too few for an error bar. False: out of memory. */
bool claimed_coverage(const struct scenario *s, const struct plan *plan, double *coverage, double *se);

#endif
