/* Playing studies of one plan and keeping what they say. */
#ifndef VICINAL_JUDGE_PLAY_H
#define VICINAL_JUDGE_PLAY_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "sim/bench/study.h"

enum { PLAY_MAX_ANALYSES = 80 };

/* Running mean and spread of a thing that is not kept study by study. */
struct play_sum {
    size_t n;
    double mean, m2;
};

/* What one way of reducing gave, study by study. NaN is 'no answer'. */
struct play_sample {
    double *delta[STUDY_MAX_FRACTIONS]; /* [n] */
    struct play_sum intrinsic[SERIES], molar_mass[SERIES]; /* under the first fraction */
};

/* One bench group: a design, its fractions, and every way of reducing it. */
struct play {
    const struct design *design;
    uint64_t seed;
    size_t first_block;      /* studies start at first_block * LANES */
    struct draws_exchange exchange;
    bool measured;           /* see study.h */
    size_t fractions;
    double fraction[STUDY_MAX_FRACTIONS];
    size_t analyses;
    struct analysis analysis[PLAY_MAX_ANALYSES];
    bool active[PLAY_MAX_ANALYSES]; /* still to be reduced */
    struct play_sample sample[PLAY_MAX_ANALYSES];
    size_t n;                /* studies played */
    struct play_sum clock_s, spare_runs; /* under the first fraction */
};

/* All analyses active, nothing played. The room is made as studies come. */
void play_start(struct play *p, const struct design *design, uint64_t seed);

/* Play on until `n` studies are done for the active analyses. False: out of
 * memory. An analysis that is no longer active keeps what it has. */
bool play_until(struct play *p, size_t n);
void play_free(struct play *p);

/* Standard deviation (n - 1) and standard error of the mean. */
double play_sd(const struct play_sum *s);
double play_se(const struct play_sum *s);

#endif
