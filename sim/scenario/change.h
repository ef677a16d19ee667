/* What --set changes in a document, before it is checked. */
#ifndef VICINAL_SCENARIO_CHANGE_H
#define VICINAL_SCENARIO_CHANGE_H

#include "sim/scenario/document.h"

/* `set` is PATH=VALUE: PATH keys and names of entries with points between,
 * VALUE one YAML value.  What is missing on the way is made; an entry of
 * the kit that is made so is marked `made`, for it must be a built-in one. */
void change_set(struct arena *a, struct document_node *root, const char *set, struct complaints *out);

/* Before the '=' of a PATH=VALUE or KEY=OPTION; NULL when there is none. */
const char *change_value(const char *text);

/* "--set PATH", in the arena. NULL: out of memory. */
const char *change_option(struct arena *a, const char *option, const char *text);

#endif
