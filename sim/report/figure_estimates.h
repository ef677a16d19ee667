/* How the estimates scatter under both fractions. */
#ifndef VICINAL_REPORT_FIGURE_ESTIMATES_H
#define VICINAL_REPORT_FIGURE_ESTIMATES_H

#include "sim/judge/trial.h"
#include "sim/report/figures.h"

/* Shares of the studies in equal steps, the critical value and what counts as
 * within (estimates.csv). A long tail is cut and its share said. False: a file
 * could not be written. */
bool figure_estimates(struct figures_pen *pen, const struct question *question, const struct outcome *outcome,
                      const struct estimates *estimates);

#endif
