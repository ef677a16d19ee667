/* Selective cutting of chains at their head-to-head links. */
#ifndef VICINAL_MODELS_SCISSION_H
#define VICINAL_MODELS_SCISSION_H

#include "models/chains.h"
#include "models/polymer.h"

enum scission_neighbours { NEIGHBOURS_EXCLUDED, NEIGHBOURS_INDEPENDENT };

/* Chance that a linkage is cut: head-to-head ones (both neighbours must carry
 * a hydroxyl: conversion times hydrolysis squared), and any other. */
struct scission_chance {
    double head_to_head, other;
};

/* The chance S(m) that m linkages in a row are all uncut, as a sum of two
 * powers: share_i (1 - d_i)^m. The second share is 0 for independent ones. */
struct scission_roots {
    double share[2], d[2];
};

/* `fraction` is the head-to-head share of the linkages, -0.5 to 0.5 (below
 * zero only as the continuation a reduction needs). */
struct scission_roots scission_roots(enum scission_neighbours neighbours, double fraction, struct scission_chance chance);

/* Viscosity average in units of any distribution after cutting. */
double scission_average(const struct chains *chains, const struct scission_roots *roots);

/* Most-probable chains after cutting. The chance S(m) that m linkages in a row are all uncut
 * is a sum of two powers, S(m) = sum_i share_i root_i^m: a two-state Markov
 * chain along the linkages (neighbours excluded), or one power (independent).
 * Started from a most-probable distribution, q = 1/xn, the number of chains of
 * x units per chain before is then
 *   n(x) = (1/q) sum_i share_i (1 - w_i)^2 w_i^(x-1),  w_i = (1 - q) root_i,
 * which follows from N(x) = P(x) S(x-1) + sum_{N>x} P(N) [2 f(x) + (N-x-1) g(x)]
 * with f(x) = S(x-1) - S(x) and g(x) = S(x-1) - 2 S(x) + S(x+1).
 * Checked: tests/unit/models/test_scission.c, against exact sums, and against
 * chains cut one by one. */
struct scission_chains {
    double share[2], w[2], one_minus_w[2];
};

/* xn >= 1. */
struct scission_chains scission_cut(enum scission_neighbours neighbours, double fraction, struct scission_chance chance, double xn);

/* Averages in units: viscosity, number, weight. The viscosity average is not a
 * number when no distribution belongs to the cut (w >= 1). */
double scission_xv(const struct polymer_sums *sums, const struct scission_chains *chains);
double scission_xn(const struct scission_chains *chains);
double scission_xw(const struct scission_chains *chains);

/* The head-to-head fraction whose cutting of most-probable chains of viscosity
 * average xv leaves xv_cut, other linkages uncut (secant on 1/xv, which is
 * nearly linear in the fraction; to rounding). Not a number when no fraction
 * up to 50 % does. */
double scission_fraction(enum scission_neighbours neighbours, double head_to_head_chance, const struct polymer_sums *sums, double xv, double xv_cut);

#endif
