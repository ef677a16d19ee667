/* The answer of margin as JSON, see json_out.h. */
#ifndef VICINAL_REPORT_JSON_OUT_MARGIN_H
#define VICINAL_REPORT_JSON_OUT_MARGIN_H

#include "sim/judge/margin.h"
#include "sim/report/json_out.h"

/* `outcome`, `margins`, `exchange`. Values stand in the unit that is named
 * beside them. No entry in `exchange`: not looked for; one with `replicates`
 * "none" and nulls: none that is offered makes up for it. Of a plan that was
 * not played only `why` and `status`. */
json_t *json_out_margin(const struct report_context *context, const struct margins *margins,
                        const struct warnings *warnings);

#endif
