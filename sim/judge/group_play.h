/* One bench group, played until all of its candidates are decided. */
#ifndef VICINAL_JUDGE_GROUP_PLAY_H
#define VICINAL_JUDGE_GROUP_PLAY_H

#include "sim/judge/outcome.h"
#include "sim/scenario/scenario.h"

/* One candidate after the search; of a struck-out one only status and why
 * (and what is nominal) stand. */
struct candidate {
    struct outcome outcome;
};

struct group_job {
    const struct scenario *s;
    const size_t *members; /* indices of candidates that share their bench work */
    size_t count;
    bool to_cap; /* one look, at the cap; else at n0, 2 n0, 4 n0 ... */
};

struct group_tally {
    size_t spent;      /* studies played, one per fraction */
    size_t exhaustive; /* the same if played to the cap; 0 when all are struck out */
};

/* Play a group and write the outcome of each member into candidates[member].
 * No study is spent on a candidate that is decided. False: out of memory. */
bool group_play(const struct group_job *job, struct candidate *candidates, struct group_tally *tally);

#endif
