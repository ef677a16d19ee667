/* The answer of `plan` as JSON: what the search found. */
#ifndef VICINAL_REPORT_JSON_OUT_PLAN_H
#define VICINAL_REPORT_JSON_OUT_PLAN_H

#include "sim/report/json_out.h"

/* Candidates that resolve or are named elsewhere, the recommended one or the
 * nearest miss (with "limit": "constants" or "bench"), the cheapest by choice,
 * what was spent. NULL without memory. */
json_t *json_out_plan(const struct report_context *context, const struct search_result *search,
                      const struct warnings *warnings);

#endif
