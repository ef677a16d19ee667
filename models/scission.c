#include "models/scission.h"

#include <math.h>

/* Roots and shares of S(m) for the Markov chain. States: head-to-head (H) and
 * other (N), P(N->H) = u = fraction/(1 - fraction), P(H->N) = 1. With cH, cN
 * the chances of a cut, root^2 - (1-u)(1-cN) root - u (1-cH)(1-cN) = 0, and
 * S(0) = 1, S(1) = 1 - mean cut chance. 1 - root_0 is found without
 * cancellation: at root = 1 the polynomial is cN + u cH - u cH cN. */
static void excluded_roots(double fraction, struct scission_chance chance, double one_minus_root[2], double share[2])
{
    const double u = fraction / (1.0 - fraction), cH = chance.head_to_head, cN = chance.other;
    const double b = (1.0 - u) * (1.0 - cN), c = u * (1.0 - cH) * (1.0 - cN);
    const double apart = 2e-6, width = fmax(sqrt(b * b + 4.0 * c), apart);
    /* d = 1 - root solves d^2 - (2 - b) d + (1 - b - c) = 0 */
    const double at_one = cN + u * cH - u * cH * cN;
    const double large = 0.5 * (2.0 - b + width);
    /* where the roots meet (half of all linkages, all cut) they are held apart: S(m)
     * is then off by the square of that */
    one_minus_root[0] = width == apart ? large - apart : at_one / large;
    one_minus_root[1] = large;
    const double cut = fraction * cH + (1.0 - fraction) * cN;
    share[1] = (cut - one_minus_root[0]) / (large - one_minus_root[0]);
    share[0] = 1.0 - share[1];
}

struct scission_roots scission_roots(enum scission_neighbours neighbours, double fraction, struct scission_chance chance)
{
    struct scission_roots roots = {{1.0, 0.0}, {fraction * chance.head_to_head + (1.0 - fraction) * chance.other, 1.0}};
    if (neighbours == NEIGHBOURS_EXCLUDED) excluded_roots(fraction, chance, roots.d, roots.share);
    return roots;
}

double scission_average(const struct chains *chains, const struct scission_roots *roots)
{
    double sum = 0.0;
    for (int i = 0; i < 2; i++)
        if (roots->share[i] != 0.0) sum += roots->share[i] * chains_pieces(chains, roots->d[i]);
    return pow(sum / chains->xn, 1.0 / chains->sums.a);
}

struct scission_chains scission_cut(enum scission_neighbours neighbours, double fraction, struct scission_chance chance, double xn)
{
    const struct scission_roots roots = scission_roots(neighbours, fraction, chance);
    struct scission_chains chains = {.share = {roots.share[0], roots.share[1]}};
    const double q = 1.0 / xn;
    for (int i = 0; i < 2; i++) {
        const double d = roots.d[i];
        chains.one_minus_w[i] = q + d - q * d;
        chains.w[i] = 1.0 - chains.one_minus_w[i];
    }
    return chains;
}

/* xv^a: not a number when no distribution belongs to the cut. */
static double power_sum(const struct polymer_sums *sums, const struct scission_chains *chains)
{
    double sum = 0.0;
    for (int i = 0; i < 2; i++) {
        if (chains->share[i] == 0.0) continue;
        const double d = chains->one_minus_w[i];
        if (!(d > 0.0 && d < 2.0)) return (double)NAN;
        sum += chains->share[i] * d * d * polymer_phi(sums, chains->w[i], d);
    }
    return sum;
}

double scission_xv(const struct polymer_sums *sums, const struct scission_chains *chains)
{
    return pow(power_sum(sums, chains), 1.0 / sums->a);
}

double scission_xn(const struct scission_chains *chains)
{
    double number = 0.0;
    for (int i = 0; i < 2; i++) number += chains->share[i] * chains->one_minus_w[i];
    return 1.0 / number;
}

/* sum x^2 w^(x-1) = (1 + w)/(1 - w)^3. */
double scission_xw(const struct scission_chains *chains)
{
    double sum = 0.0;
    for (int i = 0; i < 2; i++) sum += chains->share[i] * (1.0 + chains->w[i]) / chains->one_minus_w[i];
    return sum;
}

/* The fraction at which chains of xn, cut, have the leading root that chains of
 * xn_cut would have if they were most-probable: exact for independent
 * neighbours, close to it for excluded ones. */
static double first_guess(enum scission_neighbours neighbours, double c, double xn, double xn_cut)
{
    const double q = 1.0 / xn, root = (1.0 / xn_cut - q) / (1.0 - q);
    if (neighbours == NEIGHBOURS_INDEPENDENT) return root / c;
    const double u = root / (c - root * (1.0 - c));
    return u / (1.0 + u);
}

double scission_fraction(enum scission_neighbours neighbours, double head_to_head_chance, const struct polymer_sums *sums, double xv, double xv_cut)
{
    const struct scission_chance chance = {head_to_head_chance, 0.0};
    if (!(xv_cut >= 1.0 && xv >= 1.0)) return (double)NAN;
    const double xn = polymer_xn_of_xv(sums, xv), target = pow(xv_cut, sums->a);
    /* g is the deviation of 1/xv over its target; at fraction 0 nothing is cut */
    double d0 = 0.0, g0 = xv_cut / xv - 1.0;
    double d1 = first_guess(neighbours, head_to_head_chance, xn, polymer_xn_of_xv(sums, xv_cut));
    if (!(d1 > -1.0)) return (double)NAN;
    for (int i = 0; i < 60 && d1 != d0; i++) {
        d1 = fmin(d1, 0.5);
        const struct scission_chains chains = scission_cut(neighbours, d1, chance, xn);
        const double at = power_sum(sums, &chains);
        if (!(at > 0.0)) { /* past the longest chains: halve the way */
            d1 = 0.5 * (d0 + d1);
            continue;
        }
        const double g1 = polymer_power_less_one(at / target, -1.0 / sums->a);
        if (d1 == 0.5 && g1 < 0.0) return (double)NAN;
        if (g1 == g0) break;
        const double step = g1 * (d1 - d0) / (g1 - g0);
        d0 = d1;
        g0 = g1;
        d1 -= step;
        if (fabs(step) <= 1e-9 * fabs(d1)) break; /* the next would be below rounding */
    }
    return d1;
}
