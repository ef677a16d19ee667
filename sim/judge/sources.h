/* The groups of error sources, by name, and the spreads of a plan that belong to
 * each. */
#ifndef VICINAL_JUDGE_SOURCES_H
#define VICINAL_JUDGE_SOURCES_H

#include "sim/bench/draws.h"
#include "sim/scenario/plan.h"

enum { SOURCES = DRAWS_GROUPS };

/* In the trade's words: "K and a", "hand timing", ... */
const char *sources_name(enum draws_group group);

/* The plan with every spread zero but those of the group; DRAWS_GROUPS: of
 * none. */
struct plan sources_alone(const struct plan *plan, enum draws_group group);

#endif
