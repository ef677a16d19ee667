/* The rows of `polymer` and `cleavage`; each table ends with a row whose
 * key is NULL. */
#ifndef VICINAL_SCENARIO_KEYS_POLYMER_H
#define VICINAL_SCENARIO_KEYS_POLYMER_H

#include "sim/scenario/keys.h"

extern const struct keys_row keys_polymer_head[];     /* material */
extern const struct keys_row keys_polymer_material[]; /* what an entry of kit.materials has too */
extern const struct keys_row keys_polymer_rest[];
extern const struct keys_row keys_polymer_cleavage[];

#endif
