/* Figure: the share of the variance that each source of error is behind. */
#ifndef VICINAL_REPORT_FIGURE_BUDGET_H
#define VICINAL_REPORT_FIGURE_BUDGET_H

#include "sim/judge/budget.h"
#include "sim/report/figures.h"

/* The sources by their total share, the greatest first; gives back how many
 * there are that any share is known of. */
size_t figure_budget_sorted(const struct budget *budget, enum draws_group order[SOURCES]);

/* budget.csv has every source, the figure those above 0.1 % (and the first
 * three). Nothing to draw is no failure. False: a CSV could not be written. */
bool figure_budget(struct figures_pen *pen, const struct budget *budget);

#endif
