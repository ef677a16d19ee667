/* The extrapolation to zero concentration of one synthetic study. */
#ifndef VICINAL_REPORT_FIGURE_EXTRAPOLATION_H
#define VICINAL_REPORT_FIGURE_EXTRAPOLATION_H

#include "sim/judge/trial.h"
#include "sim/report/figures.h"

/* Every level and the analyst's line in the coordinates of the plan's
 * extrapolation, dL/g over g/dL, both series (extrapolation.csv). False: a file
 * could not be written. */
bool figure_extrapolation(struct figures_pen *pen, const struct plan *plan, const struct example *example);

#endif
