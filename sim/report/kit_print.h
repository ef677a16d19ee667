/* `vicinal kit`: everything that can be chosen, and every key of a scenario
 * with its default, unit, range, meaning and source. */
#ifndef VICINAL_REPORT_KIT_PRINT_H
#define VICINAL_REPORT_KIT_PRINT_H

#include <jansson.h>
#include <stdio.h>

#include "sim/scenario/scenario.h"

/* As text, at most 90 columns wide. The scenario is one that was read, with
 * its own entries among those of the kit, or scenario_built_in(). 0, or 1
 * when memory ran out or `out` took no more. */
int kit_print_text(const struct scenario *s, FILE *out);

/* The same as one object: program, version, verb, `kit` {KIND: [{"name",
 * KEY: {"value", "source"}, ...}]}, `flasks` [{"volume_mL", "tolerance_mL":
 * {"A", "B"}}] and `keys` {SECTION: [{"key", "default" (null: none), "unit",
 * "range" or "options", "help", "source"}]}. For json_decref(); NULL: out of
 * memory. */
json_t *kit_print_json(const struct scenario *s, const char *version);

#endif
