/* The bench sheet as JSON. Masses in g, volumes in mL, concentrations in
 * kg/m3, clock in minutes, efflux times in s. */
#ifndef VICINAL_REPORT_SHEET_JSON_H
#define VICINAL_REPORT_SHEET_JSON_H

#include <jansson.h>

#include "sim/report/report.h"
#include "sim/report/sheet_work.h"
#include "sim/report/warnings.h"

/* The head of every command's object, then `sheet`; of an impossible plan
 * `why` and `status` instead. NULL without memory. */
json_t *sheet_json_make(const struct report_context *context, const struct sheet_work *work,
                        const struct warnings *warnings);

#endif
