/* The answers of budget and margin as JSON, see json_out.h. */
#ifndef VICINAL_REPORT_JSON_OUT_BUDGET_H
#define VICINAL_REPORT_JSON_OUT_BUDGET_H

#include "sim/judge/budget.h"
#include "sim/report/json_out.h"

/* `outcome`, `pairs` of studies and the share of them `left_out`, `groups`,
 * `biases`, `claimed` (null where there is no error bar). Of a plan that was
 * not played only `why` and `status`. */
json_t *json_out_budget(const struct report_context *context, const struct budget *budget,
                        const struct warnings *warnings);

#endif
