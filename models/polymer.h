/* Vinyl polymer chains: the mean unit, averages of most-probable chain
 * lengths, and the Mark-Houwink-Sakurada relation. */
#ifndef VICINAL_MODELS_POLYMER_H
#define VICINAL_MODELS_POLYMER_H

enum polymer_average { AVERAGE_VISCOSITY, AVERAGE_WEIGHT, AVERAGE_NUMBER };

/* Mean molar mass of a unit [kg/mol] at a degree of hydrolysis h (mole
 * fraction): h repeat_unit + (1 - h) ester_unit. */
double polymer_unit_kg_mol(double hydrolysis, double repeat_unit_kg_mol, double ester_unit_kg_mol);

/* Mv/Mn of a long most-probable distribution, r(a) = ((1+a) Gamma(1+a))^(1/a).
 * Source: Flory and Leutner, J. Polym. Sci. 3 (1948) 880. */
double polymer_r(double a);

/* [eta] = K Mv^a (Mark-Houwink-Sakurada); K in m3/kg for M in g/mol, Mv in
 * kg/mol, [eta] in m3/kg; and its inverse. */
double polymer_intrinsic_viscosity(double K_m3_kg, double a, double Mv_kg_mol);
double polymer_viscosity_average(double K_m3_kg, double a, double intrinsic_m3_kg);

/* What the moment sum Phi(w) = sum_{x>=1} x^(1+a) w^(x-1), |w| < 1, needs for
 * one exponent: Li_{-(1+a)}(w)/w. Made once, const after. */
enum { POLYMER_NEAR = 26, POLYMER_POWERS = 400 };
struct polymer_sums {
    double a;
    double r;                  /* polymer_r(a) */
    double gamma;              /* Gamma(2+a) */
    double near[POLYMER_NEAR]; /* zeta(-(1+a)-k) (-1)^k/k! */
    double power[POLYMER_POWERS]; /* (i+1)^(1+a) */
};
void polymer_sums_make(struct polymer_sums *sums, double a);

/* Phi(w). For w >= 1/2 by the series about w = 1, with mu = -ln w
 * (Gamma(2+a) mu^-(2+a) + sum zeta(-(1+a)-k)(-mu)^k/k!, |mu| < 2 pi; e.g.
 * Wood, University of Kent report 15-92 (1992), eq. 9.3), else term by term.
 * `one_minus_w` is given apart so that nothing cancels. Relative 1e-13 for w
 * above -0.7; the terms run out near -0.9. */
double polymer_phi(const struct polymer_sums *sums, double w, double one_minus_w);

/* ratio^b - 1 for a ratio near 1, without loss: by the binomial series within
 * 1e-3 of 1 (relative 1e-14), else as it stands. */
double polymer_power_less_one(double ratio, double b);

/* Viscosity average in units, xv, of a most-probable distribution whose number
 * average is xn >= 1, and the xn of an xv >= 1 (to rounding). */
double polymer_xv_of_xn(const struct polymer_sums *sums, double xn);
double polymer_xn_of_xv(const struct polymer_sums *sums, double xv);

#endif
