/* The entries one can choose from: the built-in kit and the scenario's. */
#ifndef VICINAL_SCENARIO_KIT_H
#define VICINAL_SCENARIO_KIT_H

#include "sim/scenario/parts.h"

/* The built-in kit, then what a scenario's `kit` (NULL: nothing) adds and
 * changes, every entry filled. */
void kit_read(const struct reading *r, struct kit *kit, const struct document_node *given);

/* An entry by its name; NULL when there is none. */
const struct record *kit_find(const struct kit *kit, enum keys_id kind, const char *name);

/* Finds the entry that a good value names; complains when there is none. */
void kit_resolve(const struct reading *r, const struct kit *kit, enum keys_id kind, struct value *value);

#endif
