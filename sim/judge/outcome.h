/* What n simulated studies of one plan say. */
#ifndef VICINAL_JUDGE_OUTCOME_H
#define VICINAL_JUDGE_OUTCOME_H

#include <stdbool.h>
#include <stddef.h>

#include "sim/judge/moments.h"
#include "sim/judge/play.h"
#include "sim/scenario/scenario.h"

enum status { STATUS_RESOLVES, STATUS_FAILS, STATUS_UNDECIDED, STATUS_IMPOSSIBLE, STATUS_TOO_DEAR, STATUSES };
const char *outcome_status_text(enum status status);

/* One solution's intrinsic viscosity (m3/kg) or molar mass (kg/mol). */
struct spread_of {
    double truth, mean, sd;
};

/* Fractions, shares as plain numbers; SI otherwise. What the question does
 * not ask for is NaN. The same struct holds the standard errors. */
struct figures {
    double mean, bias, sd, rmse;
    struct interval interval, shortest;
    double within;                              /* share within +-within of the truth */
    double critical, power, plain_false_alarm;
    double no_answer, spare_runs, clock_s;      /* per study; clock_s the bench alone */
    double hours_s, money;                      /* with preparation; money with prices */
};

struct outcome {
    enum status status;
    char why[160];                              /* for impossible and too dear: what is missing */
    size_t studies;
    double truth;
    struct figures at, se;
    double resolvable_against, resolvable_within; /* NaN: not looked for, or none */
    struct spread_of intrinsic[SERIES], molar_mass[SERIES];
    /* nominal facts of the plan */
    size_t levels[SERIES];
    double concentration_kg_m3[SERIES][PLAN_MAX_LEVELS];
    double nominal_efflux_s[SERIES][PLAN_MAX_LEVELS], water_efflux_s;
    double level_flask_m3, stock_flask_m3[SERIES];
    size_t days;
    double polymer_kg;
    double margin_se;                           /* figure minus bar in standard errors at the cap; of two, the smaller */
};

/* What is nominal: the plan laid out and its cost by nominal times; status
 * impossible or too dear where that already shows, else undecided. */
void outcome_nominal(const struct scenario *s, const struct plan *plan, const struct design *design, struct outcome *out);

/* Add what the studies played so far say of analysis number `a`: figures with
 * standard errors, and the status of a look at n studies (decided by the rule
 * of bar.h; undecided is left to the caller to be gone on with). `plan` may
 * differ from the design's in what the bench does not see. False: out of
 * memory. */
bool outcome_of(const struct scenario *s, const struct plan *plan, const struct play *play, size_t a, struct outcome *out);

/* Start a play for the question's fractions: expect, and against if asked. */
void outcome_fractions(const struct question *q, struct play *play);

#endif
