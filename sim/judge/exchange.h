/* What replicates it takes to make up for a worse bath. */
#ifndef VICINAL_JUDGE_EXCHANGE_H
#define VICINAL_JUDGE_EXCHANGE_H

#include "sim/judge/margin.h"

/* How a plan stands that is played to at most `studies`: its margin over the bar
 * in standard errors, -1000 when it is impossible, and its power (or share
 * within). False: out of memory. */
struct exchange_look {
    double margin, figure;
};
bool exchange_margin(const struct scenario *s, const struct plan *plan, size_t studies, struct exchange_look *out);

/* With a bath twice as bad (fluctuation, drift, day and gradient), the cheapest
 * replicates (fillings up to five more in both series, runs up to four more)
 * that resolve again, and what they cost beyond the plan; nothing is found when
 * the plan itself does not resolve. */
bool exchange_find(const struct scenario *s, const struct plan *plan, struct margin_exchange *out, bool *found);

#endif
