/* Glass capillary kinematic viscometers (ISO 3105). */
#ifndef VICINAL_MODELS_TUBE_H
#define VICINAL_MODELS_TUBE_H

#include <math.h>

enum tube_ends { TUBE_FLARED, TUBE_SQUARE };

/* Kinetic-energy coefficient of flared ends, E [m2 s] in k = E/t^2.
 * E = 52.5 V^(3/2)/(L (C d)^(1/2)), E in mm2 s, V in mL, L and d in mm, C in
 * mm2/s2 (the same as 1.66 with L and d in cm).
 * Source: ISO 3105; the coefficient follows from m = 0.037 sqrt(Re), Cannon,
 * Manning and Bell, Anal. Chem. 32 (1960) 355 (from memory).
 * Left out: its own uncertainty, which is a scenario's kinetic_u. */
double tube_kinetic_flared(double bulb_m3, double length_m, double bore_m, double constant_m2_s2);

/* Kinetic-energy coefficient of square-cut ends, B [m2] in k = B/t.
 * B = m V/(8 pi L), m = 1.1.  Source: ISO 3105 (from memory). */
double tube_kinetic_square(double bulb_m3, double length_m);

/* The tube constant [m2/s2] that the geometry gives by Poiseuille's law,
 * C = pi g d^4 H/(128 V L), g = 9.80665 m/s2. */
double tube_constant_poiseuille(double bore_m, double head_m, double bulb_m3, double length_m);

/* Head factor f_h of one filling, 1 when nothing is wrong:
 * (cos theta + (offset/H) sin theta)(1 - dV/(A_r H)).
 * theta [rad] tilt in the plane of the bulbs, offset_over_head the horizontal
 * distance of the bulbs over the mean head, charge_share dV/(A_r H), zero for
 * a suspended level.  Source: geometry of the hydrostatic head.
 * The sine and cosine are their series to theta^9 and theta^10: within 1e-10
 * below 0.3 rad (tested). */
static inline double tube_head_factor(double theta, double offset_over_head, double charge_share)
{
    const double q = theta * theta;
    const double c = 1.0 - q / 2.0 * (1.0 - q / 12.0 * (1.0 - q / 30.0 * (1.0 - q / 56.0 * (1.0 - q / 90.0))));
    const double s = theta * (1.0 - q / 6.0 * (1.0 - q / 20.0 * (1.0 - q / 42.0 * (1.0 - q / 72.0))));
    return (c + offset_over_head * s) * (1.0 - charge_share);
}

/* The kinetic-energy term k(t) [m2/s] of an efflux time [s]; `coefficient` is
 * E [m2 s] or B [m2] as the ends ask. */
static inline double tube_kinetic(enum tube_ends ends, double coefficient, double t_s)
{
    return ends == TUBE_FLARED ? coefficient / (t_s * t_s) : coefficient / t_s;
}

/* Kinematic viscosity [m2/s] from an efflux time [s]: nu = C t - k(t). */
static inline double tube_viscosity(double constant_m2_s2, enum tube_ends ends, double coefficient, double t_s)
{
    return constant_m2_s2 * t_s - tube_kinetic(ends, coefficient, t_s);
}

/* Efflux time [s] of a liquid of kinematic viscosity nu [m2/s]: the root of
 * C t - k(t) = nu.  One step of t = (nu + k(t))/C from t = nu/C, then Newton,
 * a fixed count of steps so that many run side by side.  To rounding while k
 * is below a tenth of nu (tested); plans beyond that are refused. */
enum { TUBE_STEPS = 3 };
static inline double tube_efflux(double constant_m2_s2, enum tube_ends ends, double coefficient, double nu)
{
    const double power = ends == TUBE_FLARED ? 2.0 : 1.0;
    const double per_constant = 1.0 / constant_m2_s2;
    double t = nu * per_constant;
    t = (nu + tube_kinetic(ends, coefficient, t)) * per_constant;
    for (int i = 0; i < TUBE_STEPS; i++) {
        const double rate = 1.0 / t;
        const double k = ends == TUBE_FLARED ? coefficient * rate * rate : coefficient * rate;
        t -= (constant_m2_s2 * t - k - nu) / (constant_m2_s2 + power * k * rate);
    }
    return t;
}

#endif
