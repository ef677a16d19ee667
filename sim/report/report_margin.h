/* The files and the answer of the command margin. */
#ifndef VICINAL_REPORT_REPORT_MARGIN_H
#define VICINAL_REPORT_REPORT_MARGIN_H

#include "sim/judge/margin.h"
#include "sim/report/report.h"

/* Write margin.json, the figures, scenario.resolved.yaml and run.log, then answer;
 * `index` of the plan in the scenario. 0, or 1 after a message. */
int report_margin(const struct report_context *context, size_t index, const struct margins *margins);

#endif
