/* The bench: fillings and runs of LANES studies along the clock. */
#ifndef VICINAL_BENCH_BENCH_H
#define VICINAL_BENCH_BENCH_H

#include "sim/bench/truth.h"

/* What is in the tube: what the runs of a filling have in common. */
struct bench_filled {
    const struct design_liquid *liquid;
    size_t series;           /* whose interaction the liquid has */
    double constant[LANES];  /* C f_h */
    double slow[LANES];      /* dust, drainage, and the solution's offset, on the time */
    double coil[LANES];      /* y in the tube */
    double polymer[LANES];   /* c in the tube [kg/m3] */
    double made_coil[LANES], made_polymer[LANES]; /* the same without what was carried over */
    double volume_m3[LANES]; /* dilution in the tube: the true volume there */
    double thick[LANES];     /* viscosity over that of water, at the set temperature */
    double gradient_K[LANES];
};

/* What a look at one study wants to know besides its notebook; caller's arrays. */
struct bench_traced_run {
    double bath_K[LANES];   /* the bath when the run begins */
    double liquid_K[LANES]; /* the liquid's mean over the run */
};
struct bench_trace {
    double (*started_s)[LANES];    /* [fillings] clock of the day when a filling began */
    struct bench_traced_run *run;  /* [fillings * stride] */
};

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
    struct bench_filled filled;     /* the filling, or loading, of now; before it the last one */
    const struct bench_trace *trace; /* NULL: nobody looks */
};

/* Open a day with its draws (DRAWS_DAY slots). */
void bench_open_day(struct bench *b, double draws[][LANES]);

/* One filling: clean and fill (or add solvent and mix), wait, the planned runs,
 * and spare ones while they disagree. Writes the notebook. `delivery`, standard
 * normals, is that of the charge or addition in the tube; else not looked at. */
void bench_fill(struct bench *b, size_t filling, struct draws_filling *draws, const double delivery[LANES]);

#endif
