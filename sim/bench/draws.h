/* Every random deviate of a study, drawn into arrays before anything is
 * computed. Standard normals unless a slot says otherwise; what they are
 * multiplied with is the bench's business, so that switching a source off
 * moves no other number. */
#ifndef VICINAL_BENCH_DRAWS_H
#define VICINAL_BENCH_DRAWS_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "models/analysis.h"
#include "models/bath.h"
#include "sim/base/lanes.h"
#include "sim/base/streams.h"
#include "sim/reduce/notebook.h"

/* Slots of each stream, in the order in which they are drawn; new ones go
 * behind. */
enum draws_study {
    DRAWS_PAIR_MIDDLE, DRAWS_PAIR_SLOPE, /* z1, z2 of the pair */
    DRAWS_CALIBRATION,
    DRAWS_KINETIC,
    DRAWS_SOLUTION_OFFSET,
    DRAWS_PIPETTE,
    DRAWS_HYDROLYSIS,
    DRAWS_INTERACTION, DRAWS_INTERACTION_CLEAVED,
    DRAWS_STUDY
};
enum draws_polymer { DRAWS_DRY_CONTENT, DRAWS_POLYMER };
enum draws_preparation { DRAWS_CONVERSION, DRAWS_PREPARATION };
enum draws_stock { DRAWS_WEIGHING, DRAWS_STOCK };
enum draws_level { DRAWS_DELIVERY, DRAWS_FLASK, DRAWS_LEVEL };
enum draws_day { DRAWS_DAY_OFFSET, DRAWS_DRIFT, DRAWS_BATH_START, DRAWS_DAY };
enum draws_filling_slot {
    DRAWS_TILT, DRAWS_CHARGE, DRAWS_FILLING_TIME, DRAWS_GRADIENT,
    DRAWS_IDLE_X, DRAWS_IDLE_L, /* bath and liquid while filling and waiting */
    DRAWS_FILLING
};
enum draws_run {
    DRAWS_BATH, /* the joint step of bath and liquid */
    DRAWS_READING = DRAWS_BATH + BATH_OUTPUTS,
    DRAWS_HAND,     /* stop less start, in units of one press's scatter times sqrt 2 */
    DRAWS_MENISCUS, /* lower less upper mark, likewise */
    DRAWS_BUBBLE,   /* uniform on [0, 1): below the chance there is one, and the rest is its delay */
    DRAWS_RUN
};

/* Groups of deviates, as a budget of errors names them. */
enum draws_group {
    DRAWS_GROUP_PAIR, DRAWS_GROUP_CALIBRATION, DRAWS_GROUP_KINETIC, DRAWS_GROUP_OFFSET, DRAWS_GROUP_DILUTION, DRAWS_GROUP_HYDROLYSIS,
    DRAWS_GROUP_INTERACTION, DRAWS_GROUP_DRY_CONTENT, DRAWS_GROUP_CONVERSION, DRAWS_GROUP_WEIGHING, DRAWS_GROUP_DAYS, DRAWS_GROUP_FLUCTUATION,
    DRAWS_GROUP_TILT, DRAWS_GROUP_CHARGE, DRAWS_GROUP_FILLING, DRAWS_GROUP_GRADIENT, DRAWS_GROUP_READING, DRAWS_GROUP_HAND, DRAWS_GROUP_MARKS,
    DRAWS_GROUP_BUBBLES,
    DRAWS_GROUPS
};

/* Deal `count` numbers into an order, from the scenario's seed alone: the same
 * for every study. */
void draws_deal(uint64_t seed, size_t count, size_t order[]);

/* What keys the streams of LANES studies side by side. A group whose bit stands
 * in `exchange` is drawn from the streams of the other seed. */
struct draws_key {
    uint64_t study[LANES], other[LANES];
    uint32_t exchange; /* bits 1 << enum draws_group; 0: none */
};
struct draws_exchange {
    uint64_t other_seed;
    uint32_t groups;
};
struct draws_key draws_key(uint64_t seed, uint64_t first_study, struct draws_exchange exchange);

/* `slots` standard normals of a purpose and place. */
void draws_normals(const struct draws_key *key, enum streams_purpose purpose, struct streams_place place, size_t slots, double out[][LANES]);

/* A filling: its own slots, then its runs in order; spare runs continue the
 * stream only where they are made. */
struct draws_filling {
    struct streams_state stream[LANES], other[LANES];
    uint32_t exchange;
    unsigned char drawn[LANES]; /* runs drawn */
    double once[DRAWS_FILLING][LANES];
    double run[NOTEBOOK_MAX_RUNS][DRAWS_RUN][LANES];
};
void draws_open_filling(struct draws_filling *d, const struct draws_key *key, struct streams_place place, size_t runs);

/* Make sure that run number `run` (from 0) is drawn in a lane. */
void draws_spare(struct draws_filling *d, int lane, size_t run);

#endif
