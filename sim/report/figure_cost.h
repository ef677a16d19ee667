/* What every plan costs against what it reaches. */
#ifndef VICINAL_REPORT_FIGURE_COST_H
#define VICINAL_REPORT_FIGURE_COST_H

#include "sim/judge/search.h"
#include "sim/report/figures.h"

/* Cost of all plans that were played, in what the cheapest is least in,
 * against power, or against the share within where only that is asked
 * (cost.csv). Where both are asked the share has its own (share.csv). Nothing
 * where no plan was played. False: a file could not be written. */
bool figure_cost(struct figures_pen *pen, const struct scenario *scenario, const struct search_result *search);

#endif
