/* Mean and spread of what a test collects, and the bands it may lie in. */
#ifndef VICINAL_TESTS_UNIT_BENCH_SAMPLE_H
#define VICINAL_TESTS_UNIT_BENCH_SAMPLE_H

#include "bench/still.h"

struct sample {
    double n, mean, m2;
};

static inline void sample_add(struct sample *s, double x)
{
    const double d = x - s->mean;
    s->n += 1.0;
    s->mean += d / s->n;
    s->m2 += d * (x - s->mean);
}

static inline double sample_sd(const struct sample *s)
{
    return sqrt(s->m2 / (s->n - 1.0));
}

/* STAT: z standard errors of n normal values. A false alarm 7e-6 each. */
#define SAMPLE_Z 4.5
static inline void sample_is_normal(const char *what, const struct sample *s, double mean, double sd)
{
    still_near(what, s->mean, mean, SAMPLE_Z * sd / sqrt(s->n));
    still_close_to(what, sample_sd(s), sd, SAMPLE_Z / sqrt(2.0 * s->n));
}

#endif
