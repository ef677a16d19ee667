/* Which times are to be expected at the bench, liquid by liquid. */
#ifndef VICINAL_JUDGE_EXPECTED_H
#define VICINAL_JUDGE_EXPECTED_H

#include "sim/bench/design.h"
#include "sim/scenario/scenario.h"

/* Studies that are played for it. */
enum { EXPECTED_STUDIES = 2048 };

/* The times that are read of one liquid, planned runs without a bubble: mean
 * and standard deviation over studies, days, fillings and runs, and mean -+ 3
 * standard deviations, outside which lies about one run in 400. NaN for a
 * liquid that no filling takes. */
struct expected_time {
    double mean_s, sd_s, low_s, high_s;
};
struct expected {
    struct expected_time time[DESIGN_MAX_LIQUIDS]; /* numbered as in design.h */
};

/* Play the first preparation of EXPECTED_STUDIES studies of a polymer that
 * holds `fraction`, for a design that can be carried out. K and a wander as the
 * scenario states, also where the question leaves their uncertainty out: the
 * times at the bench know nothing of the question. False: out of memory. */
bool expected_make(const struct scenario *s, const struct design *design, double fraction, struct expected *out);

#endif
