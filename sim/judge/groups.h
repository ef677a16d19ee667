/* Bench groups: candidates that share one and the same bench work. */
#ifndef VICINAL_JUDGE_GROUPS_H
#define VICINAL_JUDGE_GROUPS_H

#include "sim/scenario/scenario.h"

/* Candidates that differ only in how the notebook is reduced; without a record
 * of the temperature also those whose thermometers have one calibration_u. */
struct group {
    size_t first, count; /* into groups.member */
};
struct groups {
    size_t count;
    struct group *group;
    size_t *member; /* indices of candidates, group by group, rising in each */
};

bool groups_make(const struct scenario *s, struct groups *out); /* false: out of memory */
void groups_free(struct groups *g);

/* Whether two candidates share their bench work. */
bool groups_same(const struct scenario *s, size_t a, size_t b);

#endif
