/* The search for the cheapest plan that resolves. */
#ifndef VICINAL_JUDGE_SEARCH_H
#define VICINAL_JUDGE_SEARCH_H

#include "sim/judge/outcome.h"
#include "sim/scenario/scenario.h"

enum { SEARCH_NONE = -1 };

/* One candidate after the search; of a struck-out one only status and why
 * (and what is nominal) stand. */
struct candidate {
    struct outcome outcome;
};

struct search_result {
    size_t count;
    struct candidate *candidates;       /* count of them */
    long recommended;                   /* index, or SEARCH_NONE */
    struct outcome fresh;               /* the recommended plan's figures from studies that took no part */
    long nearest_miss;                  /* index when nothing resolves, or SEARCH_NONE (nothing was possible) */
    struct outcome nearest;             /* its figures at the cap */
    bool constants_are_limit;           /* the nearest miss would resolve with eta_u = a_u = 0 */
    /* cheapest_by_choice[key][option]: index or SEARCH_NONE; flattened, see search_choice */
    long *by_choice;
    size_t spent, exhaustive;           /* studies played, and what playing all to the cap would take */
    size_t counts[STATUSES];
};

/* Index of the cheapest resolving candidate with that option, or SEARCH_NONE. */
long search_choice(const struct scenario *s, const struct search_result *r, size_t key, size_t option);

#endif
