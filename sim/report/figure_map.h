/* Where a plan resolves, over bath and fillings. */
#ifndef VICINAL_REPORT_FIGURE_MAP_H
#define VICINAL_REPORT_FIGURE_MAP_H

#include "sim/judge/survey.h"
#include "sim/report/figures.h"

/* The resolving map (map.csv): cells of the bath's fluctuation and the fillings
 * of each level, coloured by power or the share within, and the bar as a
 * contour. False: a file could not be written. */
bool figure_map(struct figures_pen *pen, const struct question *question, const struct survey_map *map);

#endif
