/* Chain-length distributions, whole and cut.
 *
 * A number distribution P(N) on whole N >= 1: most-probable (geometric),
 * Schulz-Zimm (N^(k-1) exp(-k N/theta), k = 1/(D - 1)), log-normal (ln N normal
 * in number, variance ln D), or uniform (one length). The continuous densities
 * are taken at whole numbers and normalised; theta is solved so that the stated
 * average is met by the discrete sums.
 *
 * Cutting with a single root (each linkage uncut with rho = 1 - d, by itself)
 * leaves n(x) = rho^(x-1) [P(x) + 2 d Q(x) + d^2 R(x)] pieces of length x per
 * chain, Q(x) = sum_{N>x} P(N), R(x) = sum_{N>x} (N-x-1) P(N); a Markov chain of
 * linkages is a sum of two such terms (scission.h). All that is asked of them is
 *   F(d) = sum_x x^(1+a) n(x),
 * closed for most-probable chains, else a table of ln F over ln d.
 * Sources: Zimm, J. Chem. Phys. 16 (1948) 1093; the sums are counting.
 * Checked: tests/unit/models/test_chains.c (exact sums, the table's bound,
 * chains cut one by one).
 * Left out: chains longer than where 1e-12 of each moment used is left. */
#ifndef VICINAL_MODELS_CHAINS_H
#define VICINAL_MODELS_CHAINS_H

#include <stdbool.h>

#include "models/polymer.h"

enum chains_kind { CHAINS_MOST_PROBABLE, CHAINS_SCHULZ_ZIMM, CHAINS_LOG_NORMAL, CHAINS_UNIFORM };

/* What describes a distribution: dispersity Mw/Mn of the middle two (1.001 to
 * 2.5), and one average of the chain length in units (above 1). */
struct chains_shape {
    enum chains_kind kind;
    double dispersity;
    enum polymer_average average;
    double units;
};

/* The table: ln F over ln d in panels of a factor of two, each a polynomial of
 * Chebyshev's; below the first panel one over d itself. Within 1e-10 of F. */
enum { CHAINS_TERMS = 18, CHAINS_PANELS = 28, CHAINS_FIRST = 96 };
#define CHAINS_MOST_CUT 0.4

struct chains {
    enum chains_kind kind;
    struct polymer_sums sums;
    double xn, xv;         /* number and viscosity average, in units */
    double whole;          /* F(0) */
    double first_d;        /* upper end of the first panel */
    int panels;
    double term[CHAINS_PANELS][CHAINS_TERMS];
    double piece[3][CHAINS_FIRST]; /* x^(1+a) times P, 2 Q, R for the shortest */
};

/* Work out a distribution for the exponent a. False: out of memory. */
bool chains_make(struct chains *c, struct chains_shape shape, double a);

/* F(d) for a chance of a cut d: 0 to CHAINS_MOST_CUT, or 0.5 to 1.5 (the second
 * root of a Markov chain; its rho is small). */
double chains_pieces(const struct chains *c, double d);

#endif
