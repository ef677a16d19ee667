/* `plan:`, the options of every choice. */
#ifndef VICINAL_SCENARIO_CHOICES_H
#define VICINAL_SCENARIO_CHOICES_H

#include "sim/scenario/parts.h"

/* Reads `plan` (NULL: nothing is given) into the scenario's choices; the kit
 * must be there, and `polymer`, which gives the material. */
void choices_read(const struct reading *r, struct scenario *s, const struct document_node *given);

/* One --pick KEY=OPTION: cuts a list to one of its options. */
void choices_pick(const struct reading *r, struct scenario *s, const char *pick);

/* The choice of a key that `plan:` has. */
const struct choice *choices_find(const struct scenario *s, const char *key);

#endif
