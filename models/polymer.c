#include "models/polymer.h"

#include <gsl/gsl_sf_gamma.h>
#include <gsl/gsl_sf_zeta.h>
#include <math.h>

double polymer_unit_kg_mol(double hydrolysis, double repeat_unit_kg_mol, double ester_unit_kg_mol)
{
    return hydrolysis * repeat_unit_kg_mol + (1.0 - hydrolysis) * ester_unit_kg_mol;
}

double polymer_r(double a)
{
    return pow((1.0 + a) * gsl_sf_gamma(1.0 + a), 1.0 / a);
}

double polymer_intrinsic_viscosity(double K_m3_kg, double a, double Mv_kg_mol)
{
    return K_m3_kg * pow(1000.0 * Mv_kg_mol, a);
}

double polymer_viscosity_average(double K_m3_kg, double a, double intrinsic_m3_kg)
{
    return 0.001 * pow(intrinsic_m3_kg / K_m3_kg, 1.0 / a);
}

void polymer_sums_make(struct polymer_sums *sums, double a)
{
    sums->a = a;
    sums->r = polymer_r(a);
    sums->gamma = gsl_sf_gamma(2.0 + a);
    double over_factorial = 1.0;
    for (int k = 0; k < POLYMER_NEAR; k++) {
        if (k > 0) over_factorial /= -k;
        sums->near[k] = gsl_sf_zeta(-(1.0 + a) - k) * over_factorial;
    }
    for (int i = 0; i < POLYMER_POWERS; i++) sums->power[i] = pow(i + 1.0, 1.0 + a);
}

/* Terms of the series about w = 1 that still count at mu: each gains a factor
 * of about mu/(2 pi). */
static int near_terms(double mu)
{
    return mu < 0.03 ? 8 : mu < 0.2 ? 12 : POLYMER_NEAR;
}

double polymer_phi(const struct polymer_sums *sums, double w, double one_minus_w)
{
    if (w >= 0.5) {
        const double mu = -log1p(-one_minus_w);
        double rest = 0.0;
        for (int k = near_terms(mu) - 1; k >= 0; k--) rest = rest * mu + sums->near[k];
        return (sums->gamma * exp(-(2.0 + sums->a) * log(mu)) + rest) / w;
    }
    double sum = 0.0, factor = 1.0;
    for (int i = 0; i < POLYMER_POWERS; i++) {
        const double term = sums->power[i] * factor;
        sum += term;
        if (fabs(term) <= 1e-17 * fabs(sum)) break;
        factor *= w;
    }
    return sum;
}

double polymer_xv_of_xn(const struct polymer_sums *sums, double xn)
{
    const double q = 1.0 / xn;
    return pow(q * q * polymer_phi(sums, 1.0 - q, q), 1.0 / sums->a);
}

double polymer_power_less_one(double ratio, double b)
{
    const double x = ratio - 1.0;
    if (fabs(x) > 1e-3) return pow(ratio, b) - 1.0;
    return b * x * (1.0 + (b - 1.0) / 2.0 * x * (1.0 + (b - 2.0) / 3.0 * x * (1.0 + (b - 3.0) / 4.0 * x * (1.0 + (b - 4.0) / 5.0 * x))));
}

/* xv = r (1/q - 1/2) + O(q), q = 1/xn, gives the start and the slope; each step
 * then gains a factor of about q^2; the last is one after which less than
 * 1e-13 is left. */
double polymer_xn_of_xv(const struct polymer_sums *sums, double xv)
{
    const double target = pow(xv, sums->a);
    double q = fmin(1.0 / (xv / sums->r + 0.5), 1.0);
    for (int i = 0; i < 100; i++) {
        const double at = q * q * polymer_phi(sums, 1.0 - q, q);
        const double step = q * (1.0 - 0.5 * q) * polymer_power_less_one(at / target, -1.0 / sums->a);
        q = fmin(q - step, 1.0);
        if (fabs(step) * q <= 1e-13) break;
    }
    return 1.0 / q;
}
