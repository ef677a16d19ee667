/* What single values cannot show: rules between them. */
#ifndef VICINAL_SCENARIO_CHECK_H
#define VICINAL_SCENARIO_CHECK_H

#include "sim/scenario/parts.h"

/* Complains about every rule between values that is broken, where the value
 * stands that breaks it. All sections are read and filled. */
void check_scenario(const struct reading *r, const struct scenario *s);

#endif
