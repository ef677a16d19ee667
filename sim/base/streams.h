/* Random streams: one PCG64-DXSM generator for every (seed, study, purpose,
 * place), so that a number depends on what it is for and on nothing else.
 * Source: O'Neill, HMC-CS-2014-0905 (2014), and the published DXSM output
 * function with its 64-bit multiplier. */
#ifndef VICINAL_BASE_STREAMS_H
#define VICINAL_BASE_STREAMS_H

#include <gsl/gsl_rng.h>
#include <stdint.h>

__extension__ typedef unsigned __int128 streams_u128;

struct streams_state {
    streams_u128 state, increment; /* the increment is odd */
};

/* One step of the 128-bit linear congruential generator. */
static inline streams_u128 streams_step(streams_u128 state, streams_u128 multiplier, streams_u128 increment)
{
    return state * multiplier + increment;
}

/* The DXSM output of the state before the step; then the step. */
static inline uint64_t streams_next(struct streams_state *s)
{
    const uint64_t multiplier = UINT64_C(0xda942042e4dd58b5);
    uint64_t high = (uint64_t)(s->state >> 64);
    const uint64_t low = (uint64_t)s->state | 1U;
    s->state = streams_step(s->state, multiplier, s->increment);
    high ^= high >> 32;
    high *= multiplier;
    high ^= high >> 48;
    return high * low;
}

/* Uniform on [0, 1), 53 bits. */
static inline double streams_uniform(struct streams_state *s)
{
    return (double)(streams_next(s) >> 11) * 0x1p-53;
}

/* The generator for GSL's distributions; its state is a struct streams_state. */
extern const gsl_rng_type *const streams_type;

/* What a stream is for. New purposes go behind. */
enum streams_purpose {
    STREAMS_STUDY,       /* once for the study */
    STREAMS_POLYMER,     /* once for each polymer */
    STREAMS_PREPARATION, /* once for each preparation */
    STREAMS_STOCK,
    STREAMS_LEVEL,
    STREAMS_DAY,
    STREAMS_FILLING, /* a filling with its runs, spare ones last */
    STREAMS_ORDER,   /* the deal of a shuffled order */
    STREAMS_PURPOSES
};

enum streams_solution { STREAMS_NONE, STREAMS_WATER, STREAMS_INTACT, STREAMS_CLEAVED, STREAMS_BLANK };

/* Where in the study; each below 256, the level below 65536. For water and blank
 * the day stands for the level. */
struct streams_place {
    unsigned polymer, preparation, solution, level, filling;
};

/* The part of the key that a whole study shares. */
uint64_t streams_study_key(uint64_t seed, uint64_t study);

/* Open the stream of a purpose and place within a study. */
struct streams_state streams_open(uint64_t study_key, enum streams_purpose purpose, struct streams_place place);

#endif
