/* Studies side by side: everything a study computes is computed for LANES
 * studies at once, in plain loops that a compiler turns into wide registers.
 * Lanes never mix, so the count changes no result. */
#ifndef VICINAL_BASE_LANES_H
#define VICINAL_BASE_LANES_H

enum { LANES = 8 };

#define FOR_LANES(l) for (int l = 0; l < LANES; l++)

#endif
