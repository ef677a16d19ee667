/* The answers as JSON, one object each. Fractions and shares are plain
 * numbers, times of the bench in hours, polymer in g, concentrations in
 * kg/m3, intrinsic viscosities in m3/kg, molar masses in kg/mol, flasks in
 * mL. What the question does not ask for is absent; a figure that no study
 * gave is null. Each function returns a new object, NULL without memory. */
#ifndef VICINAL_REPORT_JSON_OUT_H
#define VICINAL_REPORT_JSON_OUT_H

#include <jansson.h>

#include "sim/base/files.h"
#include "sim/judge/outcome.h"
#include "sim/judge/search.h"
#include "sim/report/report.h"
#include "sim/report/warnings.h"

/* What every command's object opens with: program, version, verb, seed,
 * scenario, warnings, zero_sources. */
json_t *json_out_head(const struct report_context *context, const char *verb, const struct warnings *warnings);

/* One outcome. `deep`: what the plan can just tell apart was looked for, so
 * that `resolvable` is there, with null where there is none. */
json_t *json_out_outcome(const struct question *question, const struct outcome *outcome, bool deep);

/* Add the plan's `outcome`, or, of a plan that was not played (false then),
 * `why` and `status`. */
bool json_out_played(json_t *object, const struct report_context *context, const struct outcome *outcome, bool deep);

json_t *json_out_trial(const struct report_context *context, const struct outcome *outcome,
                       const struct warnings *warnings);
json_t *json_out_check(const struct report_context *context, double seconds, const struct warnings *warnings);

#endif
