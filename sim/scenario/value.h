/* One value: from what is written to what is computed with. */
#ifndef VICINAL_SCENARIO_VALUE_H
#define VICINAL_SCENARIO_VALUE_H

#include "sim/scenario/parts.h"

/* Reads what is given for a key, and says what is wrong with it. The entries
 * that names stand for are not looked up here. */
struct value value_read(const struct reading *r, const struct keys_row *row, const struct document_node *given);

/* The default of a key; absent when it has none. */
struct value value_default(const struct reading *r, const struct keys_row *row);

/* Do two good values of a key mean the same? */
bool value_same(const struct keys_row *row, const struct value *a, const struct value *b);

#endif
