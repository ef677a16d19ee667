/* A section of a scenario, or an entry of the kit, as a row of values. */
#ifndef VICINAL_SCENARIO_RECORD_H
#define VICINAL_SCENARIO_RECORD_H

#include "sim/scenario/parts.h"

/* Reads what is given; `given` may be NULL (nothing is). What is left out
 * stays absent. NULL: out of memory. */
struct record *record_read(const struct reading *r, const struct keys_section *section,
                           const struct document_node *given);

/* Says that a section has no such key, and which it may be. */
void record_refuse_key(const struct reading *r, const struct keys_section *section, const struct document_node *node);

/* What is still absent: from `parent` (NULL: none), matched by row, then
 * from the defaults. */
void record_fill(const struct reading *r, struct record *record, const struct record *parent);

/* The value of a key that the section has. */
struct value *record_value(const struct record *record, const char *key);
/* Its number; NaN when absent or bad. */
double record_number(const struct record *record, const char *key);
bool record_is_good(const struct record *record, const char *key);

/* Writes every good value that has a member into the section's struct. */
void record_compile(const struct record *record, void *target);
/* The same for one value. */
void record_store(const struct keys_row *row, const struct value *value, void *target);

#endif
