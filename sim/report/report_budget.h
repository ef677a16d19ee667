/* The files and the answer of the command budget. */
#ifndef VICINAL_REPORT_REPORT_BUDGET_H
#define VICINAL_REPORT_REPORT_BUDGET_H

#include "sim/judge/budget.h"
#include "sim/report/report.h"

/* Write budget.json, the figures, scenario.resolved.yaml and run.log, then answer;
 * `index` of the plan in the scenario. 0, or 1 after a message. */
int report_budget(const struct report_context *context, size_t index, const struct budget *budget);

#endif
