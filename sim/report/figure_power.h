/* Power against the true fraction. */
#ifndef VICINAL_REPORT_FIGURE_POWER_H
#define VICINAL_REPORT_FIGURE_POWER_H

#include "sim/judge/survey.h"
#include "sim/report/figures.h"

/* The power curve (power.csv). False: a file could not be written. */
bool figure_power(struct figures_pen *pen, const struct question *question, const struct survey_curve *curve);

#endif
