/* Liquid water at 0.1 MPa. */
#ifndef VICINAL_MODELS_WATER_H
#define VICINAL_MODELS_WATER_H

/* What the density formula is good for; a set or room temperature stays
 * further inside, so that a wandering bath does too. */
#define WATER_MIN_K 273.15
#define WATER_MAX_K 313.15

/* Viscosity of water [Pa s] at T [K].
 * eta/1e-6 = 280.68 T~^-1.9 + 511.45 T~^-7.7 + 61.131 T~^-19.6 + 0.45903 T~^-40,
 * T~ = T/300 K.  Valid 253.15 to 383.15 K.
 * Source: IAPWS SR6-08(2011), eq. for the viscosity at 0.1 MPa.
 * Checked: the release's table values and the iapws library,
 * tests/unit/models/test_water.c, tests/reference/water.tsv.
 * Left out: pressure (1e-5 per 0.1 MPa near room temperature). */
double water_viscosity(double T_K);

/* Density of air-free water [kg/m3] at T [K], 0 to 40 degC.
 * rho = a5 [1 - (t + a1)^2 (t + a2)/(a3 (t + a4))], t in degC.
 * Source: Tanaka et al., Metrologia 38 (2001) 301, eq. 1 and table 1 (CIPM).
 * Checked: tests/unit/models/test_water.c.
 * Left out: dissolved air (at most 5e-6). */
static inline double water_density(double T_K)
{
    const double t = T_K - 273.15;
    const double d = t - 3.983035;
    return 999.974950 * (1.0 - d * d * (t + 301.797) / (522528.9 * (t + 69.34881)));
}

/* The viscosity law as one polynomial, for the millions of calls of a
 * simulated study: powers of (T - 294.15 K)/26 K. */
enum { WATER_TERMS = 18 }; /* even */
struct water_fit {
    double term[WATER_TERMS];
};

/* Fit through the Chebyshev nodes of 268.15 to 320.15 K; within 1e-12 of
 * water_viscosity there (tested). */
struct water_fit water_fit_make(void);

static inline double water_fit_viscosity(const struct water_fit *w, double T_K)
{
    const double u = (T_K - 294.15) * (1.0 / 26.0);
    const double u2 = u * u;
    double even = w->term[WATER_TERMS - 2], odd = w->term[WATER_TERMS - 1];
    for (int i = WATER_TERMS - 4; i >= 0; i -= 2) { /* two chains side by side */
        even = even * u2 + w->term[i];
        odd = odd * u2 + w->term[i + 1];
    }
    return even + u * odd;
}

/* Kinematic viscosity [m2/s] at T [K]. */
static inline double water_fit_kinematic(const struct water_fit *w, double T_K)
{
    return water_fit_viscosity(w, T_K) / water_density(T_K);
}

#endif
