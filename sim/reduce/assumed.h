/* What an analyst knows when a notebook is reduced: nominal values only. */
#ifndef VICINAL_REDUCE_ASSUMED_H
#define VICINAL_REDUCE_ASSUMED_H

#include <stdbool.h>
#include <stddef.h>

#include "models/analysis.h"
#include "models/polymer.h"
#include "models/scission.h"
#include "models/tube.h"
#include "models/water.h"

enum { ASSUMED_MAX_LEVELS = 12 };

struct assumed {
    /* temperature */
    bool record; /* the temperature of each run was read */
    double set_K;
    struct water_fit water;
    double water_m2_s; /* nu_w at set_K */
    /* agreement of the runs of a filling */
    double agreement;
    enum combine combine;
    /* tube */
    enum tube_ends ends;
    double kinetic; /* E [m2 s] or B [m2] */
    bool blank_reference; /* the blank's time is t_0 of the cleaved series */
    /* solutions: nominal concentrations and density over that of water */
    size_t levels[SERIES];
    double conc_kg_m3[SERIES][ASSUMED_MAX_LEVELS];
    double density_ratio[SERIES][ASSUMED_MAX_LEVELS];
    /* polymer */
    double K_m3_kg, a, unit_kg_mol, r;
    enum scission_neighbours neighbours;
    double head_to_head_chance; /* X h^2 where it is allowed for, else 1 */
    const struct polymer_sums *sums;
};

/* A time [s] brought to set_K with the temperature [K] read in its run:
 * t nu_w(set)/nu_w(read). An analyst's approximation: strictly nu + 3 k (flared)
 * or nu + 2 k scales, 1e-4 to 2e-4 of t per kelvin in a fast tube. */
static inline double assumed_at_set(const struct assumed *a, double time_s, double read_K)
{
    return time_s * a->water_m2_s / water_fit_kinematic(&a->water, read_K);
}

#endif
