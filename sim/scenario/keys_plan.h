/* The rows of `plan` and `cost`; each table ends with a row whose
 * key is NULL. */
#ifndef VICINAL_SCENARIO_KEYS_PLAN_H
#define VICINAL_SCENARIO_KEYS_PLAN_H

#include "sim/scenario/keys.h"

extern const struct keys_row keys_plan_rows[];
extern const struct keys_row keys_plan_cost[];
extern const struct keys_row keys_plan_at_most[];

#endif
