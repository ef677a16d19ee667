/* From a notebook to the head-to-head fraction. */
#ifndef VICINAL_REDUCE_REDUCTION_H
#define VICINAL_REDUCE_REDUCTION_H

#include "sim/reduce/line.h"
#include "sim/reduce/notebook.h"

/* What every way of reducing starts from: the time of each filling, and each
 * day's means over its water and blank fillings, lane by lane [s]. */
struct reduction_times {
    double (*filling_s)[LANES]; /* [fillings] */
    double (*water_s)[LANES];   /* [days] */
    double (*blank_s)[LANES];   /* [days] zero where there is none */
};
size_t reduction_size(const struct notebook_layout *layout);
struct reduction_times reduction_place(const struct notebook_layout *layout, void *memory);

/* Steps 1 and 2: bring to the set temperature (done run by run on entry), keep
 * the best runs, combine them, and average the water (and blank) of each day;
 * a day without water (blank) of its own takes the first that was measured. */
void reduction_combine(const struct assumed *a, const struct notebook *book, struct reduction_times *times);

/* Relative viscosity of every level, lane by lane. */
struct reduction_levels {
    double relative[SERIES][ASSUMED_MAX_LEVELS][LANES];
};
/* Step 3: C from the day's water, then eta_r filling by filling, against the
 * water or, for the cleaved series, the blank with the same C. */
void reduction_relative(const struct assumed *a, const struct analysis *how, const struct notebook *book, const struct reduction_times *times,
                        struct reduction_levels *out);

/* Step 4: [eta] (m3/kg where conc is in kg/m3) from n relative viscosities by
 * the chosen extrapolation. `lines`, when not NULL, gets the fitted line, and
 * for a common intercept the second one. Not a number when there is no answer.
 * Sources: Huggins, J. Am. Chem. Soc. 64 (1942) 2716; Kraemer, Ind. Eng. Chem.
 * 30 (1938) 1200; Solomon and Ciuta, J. Appl. Polym. Sci. 6 (1962) 683. */
double reduction_extrapolate(const struct analysis *how, size_t n, const double *conc, const double *relative, struct line lines[2]);

/* Step 5: the fraction from the two molar masses (viscosity average, kg/mol).
 * continuous: M0 r(a) (1/Mv' - 1/Mv)/(X h^2), Flory and Leutner 1948;
 * discrete: the fraction whose exact cutting of most-probable chains gives it.
 * Not a number is 'no answer'. */
double reduction_fraction(const struct assumed *a, enum chain_statistics statistics, const double Mv_kg_mol[SERIES]);

/* Steps 3 to 5 for all lanes. delta is not a number for 'no answer'. */
struct reduction_result {
    double delta[LANES];
    double intrinsic_m3_kg[SERIES][LANES], molar_mass_kg_mol[SERIES][LANES];
};
void reduction_run(const struct assumed *a, const struct analysis *how, const struct notebook *book, const struct reduction_times *times,
                   struct reduction_result *out);

#endif
