/* Error sources that a scenario sets to exactly zero. */
#ifndef VICINAL_SCENARIO_ZERO_H
#define VICINAL_SCENARIO_ZERO_H

#include "sim/scenario/parts.h"

/* Finds them, in the order of the key table, among the values and entries in
 * use. False: out of memory. */
bool zero_find(struct scenario *s);

#endif
