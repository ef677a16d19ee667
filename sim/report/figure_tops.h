/* How concentrated the cleaved series should be. */
#ifndef VICINAL_REPORT_FIGURE_TOPS_H
#define VICINAL_REPORT_FIGURE_TOPS_H

#include "sim/judge/survey.h"
#include "sim/report/figures.h"

/* Standard deviation and bias over the top relative viscosity of the cleaved
 * series, for each extrapolation (tops.csv). False: a file could not be
 * written. */
bool figure_tops(struct figures_pen *pen, const struct plan *plan, const struct survey_tops *tops);

#endif
