/* The bench: fillings and runs of LANES studies along the clock. */
#ifndef VICINAL_BENCH_BENCH_H
#define VICINAL_BENCH_BENCH_H

#include "sim/bench/truth.h"

/* One fraction's bench: what changes as the clock runs. */
struct bench {
    const struct design *design;
    struct truth truth;
    struct notebook book;
    double clock_s[LANES];          /* of the day */
    double day_K[LANES], drift_K_s[LANES];
    double bath_K[LANES];           /* x: the bath about its mean */
    double liquid_K[LANES];         /* l: the liquid's answer to x */
    double lag_K[LANES];            /* what is left of the liquid's deviation from the bath's course */
    double done_s[LANES];           /* clock of the days that are over */
    double spare_runs[LANES];
    double (*started_s)[LANES];     /* [fillings] clock of the day when a filling began, or NULL */
};

/* Open a day with its draws (DRAWS_DAY slots). */
void bench_open_day(struct bench *b, double draws[][LANES]);

/* One filling: clean and fill, wait, the planned runs, and spare ones while
 * they disagree. Writes the notebook. */
void bench_fill(struct bench *b, size_t filling, struct draws_filling *draws);

#endif
