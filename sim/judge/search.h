/* The search for the cheapest plan that resolves. */
#ifndef VICINAL_JUDGE_SEARCH_H
#define VICINAL_JUDGE_SEARCH_H


#include "sim/judge/group_play.h"

enum { SEARCH_NONE = -1 };

struct search_result {
    size_t count;
    struct candidate *candidates;       /* count of them */
    long recommended;                   /* index, or SEARCH_NONE */
    struct outcome fresh;               /* the recommended plan's figures from studies that took no part */
    bool within_too_narrow;             /* narrower than the constants allow, for the recommended plan or the nearest miss */
    long nearest_miss;                  /* index when nothing resolves, or SEARCH_NONE (nothing was possible) */
    struct outcome nearest;             /* its figures at the cap */
    bool constants_are_limit;           /* the nearest miss would resolve with eta_u = a_u = 0 */
    long *by_choice;                    /* see search_choice */
    size_t spent, exhaustive;           /* studies played to decide, and what playing all to the cap would take */
    size_t groups;                      /* bench groups that were not struck out */
    size_t counts[STATUSES];
};

/* How to go about it. `exhaustive` plays every candidate to the cap and judges
 * it by the same rule. */
struct search_options {
    bool exhaustive;
    void (*progress)(void *context, double done); /* NULL: none; done from 0 to 1 */
    void *context;
};

/* False: out of memory. */
bool search_run(const struct scenario *s, struct search_options options, struct search_result *out);
void search_free(struct search_result *r);

/* Number of the first of the studies that take no part in the search: those of
 * the recommended plan's figures. */
size_t search_fresh_study(const struct scenario *s);

/* Index of the cheapest resolving candidate with that option, or SEARCH_NONE:
 * at equal cost the recommended one, then the one whose options are listed
 * first. */
long search_choice(const struct scenario *s, const struct search_result *r, size_t key, size_t option);

#endif
