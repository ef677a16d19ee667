/* Numbers for the tests of the judge, from the program's own streams. */
#ifndef VICINAL_TESTS_UNIT_JUDGE_NUMBERS_H
#define VICINAL_TESTS_UNIT_JUDGE_NUMBERS_H

#include <gsl/gsl_randist.h>

#include "bench/still.h"
#include "sim/base/streams.h"

struct numbers {
    struct streams_state state;
    gsl_rng rng;
};

/* A stream by number; not to be moved once opened. */
static inline void numbers_open(struct numbers *n, uint64_t which)
{
    n->state = streams_open(streams_study_key(1948, which), STREAMS_STUDY, (struct streams_place){0});
    n->rng = (gsl_rng){streams_type, &n->state};
}

static inline double numbers_normal(struct numbers *n)
{
    return gsl_ran_gaussian_ziggurat(&n->rng, 1.0);
}

static inline double numbers_between(struct numbers *n, double low, double high)
{
    return low + (high - low) * gsl_rng_uniform(&n->rng);
}

#endif
