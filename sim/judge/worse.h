/* More work that makes a plan worse, and why. */
#ifndef VICINAL_JUDGE_WORSE_H
#define VICINAL_JUDGE_WORSE_H

#include "sim/judge/outcome.h"

enum worse_cause { WORSE_DRIFT, WORSE_SPARE_RUNS, WORSE_DAYS, WORSE_UNKNOWN };

/* A dearer plan that differs from a cheaper one only in fillings or runs and
 * has the lower figure (power, or share within) all the same. */
struct worse {
    size_t cheaper, dearer; /* indices of candidates */
    double figure[2];       /* of both, in that order */
    enum worse_cause cause;
};

/* Of the candidates that differ from `subject` only in fillings or runs, it
 * included, each played to the cap (at most WORSE_PLANS of them): those pairs
 * where the dearer one's figure is lower by more than 3.3 standard errors of
 * the difference (taken as of independent ones, which same draws only make
 * smaller). Both are then played again with drift_u = 0, then with spare_runs =
 * 0, then on one endless day: what turns the order (to within one standard
 * error of the difference) is the cause. Of each dearer plan the worst pair; at
 * most `room`, *count of them. False: out of memory. */
enum { WORSE_PLANS = 24 };
bool worse_find(const struct scenario *s, size_t subject, size_t room, struct worse *out, size_t *count);

#endif
