/* A plan laid out: what to weigh, dilute and time, when, and everything that
 * is the same in all its simulated studies. Made once per plan, const after. */
#ifndef VICINAL_BENCH_DESIGN_H
#define VICINAL_BENCH_DESIGN_H

#include <stdbool.h>
#include <stddef.h>

#include "models/bath.h"
#include "models/polymer.h"
#include "sim/reduce/assumed.h"
#include "sim/reduce/notebook.h"
#include "sim/scenario/plan.h"

/* A liquid that goes into the tube: water (number 0), then the levels of the
 * intact series, then those of the cleaved, each from dilute to concentrated;
 * behind the room for them the blank. */
enum { DESIGN_WATER, DESIGN_LEVELS, DESIGN_BLANK = DESIGN_LEVELS + SERIES * PLAN_MAX_LEVELS, DESIGN_MAX_LIQUIDS };
struct design_liquid {
    size_t series, level;      /* of a polymer solution */
    double conc_kg_m3;         /* nominal; 0 for water and blank */
    double reagent;            /* w: share of the cleaved stock's reagent strength; 1 for the blank */
    double nominal_s;          /* efflux time at set_K by nominal values */
    struct bath_step step;     /* bath and liquid over a run and its reset */
    double lag_mean, lag_left; /* a deviation of the liquid at the start of a run: its mean over the run, and what is left after the reset */
    /* in the tube: volume there, and what is added to the level before it */
    double volume_m3, added_m3;
    struct bath_step addition; /* bath and liquid from the last reset to the first run */
    /* standard uncertainties of the relative concentration by dilution */
    bool diluted;
    double pipette_u, delivery_u, flask_u;
};

struct design_chains {
    double xn, unit_kg_mol;
    double Mv_kg_mol[SERIES], intrinsic_m3_kg[SERIES]; /* nominal: at the expected fraction */
};

struct design_flasks {
    double level_m3;           /* 0: no diluted level, no such flask */
    double stock_m3[SERIES];   /* a shared stock stands in both */
    double stock_conc_kg_m3[SERIES];
    double weighing_u[SERIES]; /* relative, of the stock's concentration */
};

struct design {
    const struct plan *plan;
    double expect;
    char why[160]; /* not empty: the plan is impossible, and what is missing */

    struct water_fit water;
    struct chains lengths;       /* of the grade */
    struct design_chains chains;
    struct design_flasks flasks;
    struct assumed assumed;

    size_t liquids; /* water and levels */
    struct design_liquid liquid[DESIGN_MAX_LIQUIDS];
    struct bath_step idle;
    double lag_wait; /* what is left of a deviation of the liquid after the wait */
    double lag_mix;  /* and after an addition has been mixed in */

    struct notebook_layout layout;
    struct notebook_filling *filling; /* layout.fillings of them */
    /* totals over preparations and polymers; the layout is that of each */
    double repeats;         /* preparations times polymers */
    size_t days;
    double nominal_clock_s; /* the bench, spare runs apart */
    double preparation_s;   /* hands-on, before the bench */
    double polymer_kg;
};

/* Lay a plan out for the question's expected fraction. False: out of memory. A
 * plan that cannot be carried out is a design with `why`. The plan must outlive
 * it. */
bool design_make(struct design *d, const struct plan *plan, const struct cost_rules *cost, const struct question *question);
void design_free(struct design *d);

/* Why a plan reduced in this way is impossible, with what is missing; NULL when
 * it is not. */
const char *design_why(const struct design *d, const struct analysis *how);

/* Which liquid a filling takes. */
size_t design_liquid_of(const struct design *d, const struct notebook_filling *filling);

/* Nominal duration of a filling [s], from cleaning (or the addition) to the
 * last reset. */
double design_filling_s(const struct design *d, const struct notebook_filling *filling);

#endif
