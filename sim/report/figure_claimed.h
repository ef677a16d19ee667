/* Figure: how often the interval that is claimed from one notebook holds the
 * truth. */
#ifndef VICINAL_REPORT_FIGURE_CLAIMED_H
#define VICINAL_REPORT_FIGURE_CLAIMED_H

#include "sim/judge/budget.h"
#include "sim/report/figures.h"

/* Nothing when there is no error bar to claim. False: a CSV could not be
 * written. */
bool figure_claimed(struct figures_pen *pen, const struct budget *budget);

#endif
