/* The rows of the kit's entries, materials and benches apart; each table ends with a row whose
 * key is NULL. */
#ifndef VICINAL_SCENARIO_KEYS_KIT_H
#define VICINAL_SCENARIO_KEYS_KIT_H

#include "sim/scenario/keys.h"

extern const struct keys_row keys_kit_entry[]; /* name and like, which each has */
extern const struct keys_row keys_kit_grades[];
extern const struct keys_row keys_kit_tubes[];
extern const struct keys_row keys_kit_baths[];
extern const struct keys_row keys_kit_thermometers[];
extern const struct keys_row keys_kit_timers[];

#endif
