/* Every combination of the options of `plan:`, and each as a compiled plan. */
#ifndef VICINAL_SCENARIO_CANDIDATES_H
#define VICINAL_SCENARIO_CANDIDATES_H

#include "sim/scenario/parts.h"

/* More combinations than this are refused. */
#define CANDIDATES_MAX 1000000000u

/* Counts them: the key listed first varies slowest, and single-point is
 * counted once over `weighting`. False: more than CANDIDATES_MAX, or a key
 * without option. The others here come after it. */
bool candidates_count(struct scenario *s);

/* Which option of every key candidate `index` takes. */
void candidates_options(const struct scenario *s, size_t index, size_t option[PARTS_PLAN_KEYS]);

/* Works out the chain lengths of every grade with every material, which the
 * plans then point to. False: out of memory. */
bool candidates_make_chains(struct scenario *s);

/* Candidate `index`, in SI units. */
void candidates_plan(const struct scenario *s, size_t index, struct plan *out);

#endif
