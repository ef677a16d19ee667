/* What is true in LANES simulated studies: seen in this room only. */
#ifndef VICINAL_BENCH_TRUTH_H
#define VICINAL_BENCH_TRUTH_H

#include "sim/bench/design.h"
#include "sim/bench/draws.h"

/* Which of the polymers measured alongside (0 or 1), and which preparation. */
struct truth_where {
    unsigned polymer, preparation;
};

/* What is drawn once for a study, a polymer, a preparation, whatever the
 * fraction. */
struct truth_draws {
    double study[DRAWS_STUDY][LANES];
    double polymer[DRAWS_POLYMER][LANES];
    double preparation[DRAWS_PREPARATION][LANES];
    double stock[SERIES][DRAWS_STOCK][LANES];
    double level[DESIGN_MAX_LIQUIDS][DRAWS_LEVEL][LANES];
};
void truth_draw(const struct design *d, const struct draws_key *key, struct truth_where where, struct truth_draws *out);

struct truth {
    double kinetic[LANES];        /* E [m2 s] or B [m2] */
    double solution_slow[LANES];  /* 1 + o: every polymer solution against water */
    double calibration_K[LANES];  /* e_cal */
    double interaction[SERIES][LANES];
    double pipette_m3[LANES];     /* what the one pipette delivers too much */
    double conc_kg_m3[DESIGN_MAX_LIQUIDS][LANES]; /* as made; in the tube only the top level's */
    double coil[DESIGN_MAX_LIQUIDS][LANES];       /* y = [eta] c as made, at the set temperature */
};

/* The truth of studies whose polymer holds `fraction`. */
void truth_of(const struct design *d, const struct truth_draws *draws, double fraction, struct truth *out);

#endif
