/* The resolved scenario: every default written out. */
#ifndef VICINAL_SCENARIO_RESOLVE_H
#define VICINAL_SCENARIO_RESOLVE_H

#include <jansson.h>

#include "sim/scenario/parts.h"

/* The whole as a tree in the order of the key table, texts as given or as
 * the defaults have them; the entries of the kit that are used in full, and
 * no other. `like` is gone, for nothing is left to be taken. `index` SIZE_MAX
 * keeps all lists of options, else they are cut to that candidate's. NULL:
 * out of memory. */
const struct document_node *resolve_tree(struct arena *a, const struct scenario *s, size_t index);

char *resolve_yaml(const struct document_node *tree);   /* for free() */
json_t *resolve_json(const struct document_node *tree); /* for json_decref() */

#endif
