/* One study along the clock. */
#ifndef VICINAL_REPORT_FIGURE_CLOCK_H
#define VICINAL_REPORT_FIGURE_CLOCK_H

#include "sim/judge/show.h"
#include "sim/report/figures.h"

/* Efflux times of one simulated study over their nominal ones along the clock,
 * and the temperatures of bath and liquid under them (clock.csv). False: a file
 * could not be written. */
bool figure_clock(struct figures_pen *pen, const struct show_notebook *notebook);

#endif
