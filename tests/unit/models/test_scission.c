/* Chains after cutting: published sums, brute sums over 2 x 2 matrices, and
 * the way back from two averages to the fraction. */
#include "check.h"
#include "reference.h"

#include <math.h>
#include <stdbool.h>
#include <stdlib.h>
#include <string.h>

#include "models/scission.h"

enum { ROOM = 16 };

static const struct scission_chance complete = {1.0, 0.0};

static struct polymer_sums sums_of(double a)
{
    struct polymer_sums sums;
    polymer_sums_make(&sums, a);
    return sums;
}

/* ---- exact sums computed with NumPy ---- */

static void hold_geometric(const char *quantity, double (*figure)(const struct scission_chains *, double xn, double p))
{
    struct reference_row row[ROOM];
    const size_t n = reference_read("polymer.tsv", quantity, row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double xn = reference_argument(&row[i], 0), p = reference_argument(&row[i], 1);
        const struct scission_chains chains = scission_cut(NEIGHBOURS_INDEPENDENT, p, complete, xn);
        check_row(figure(&chains, xn, p), &row[i]);
    }
}

static double number_average(const struct scission_chains *chains, double xn, double p)
{
    (void)xn, (void)p;
    return 44.05 * scission_xn(chains);
}

static double weight_average(const struct scission_chains *chains, double xn, double p)
{
    (void)xn, (void)p;
    return 44.05 * scission_xw(chains);
}

static double viscosity_average(const struct scission_chains *chains, double xn, double p)
{
    (void)xn, (void)p;
    const struct polymer_sums sums = sums_of(0.76);
    return 44.05 * scission_xv(&sums, chains);
}

static double usual_reduction(const struct scission_chains *chains, double xn, double p)
{
    const struct polymer_sums sums = sums_of(0.76);
    return 100.0 * (sums.r * (1.0 / scission_xv(&sums, chains) - 1.0 / polymer_xv_of_xn(&sums, xn)) / p - 1.0);
}

static void independent_cutting(void **state)
{
    (void)state;
    hold_geometric("geometric.Mn", number_average);
    hold_geometric("geometric.Mw", weight_average);
    hold_geometric("geometric.Mv", viscosity_average);
    hold_geometric("geometric.usual", usual_reduction);
    const struct reference_row row = reference_one("polymer.tsv", "base.Mv.cut");
    const struct scission_chains chains = scission_cut(NEIGHBOURS_INDEPENDENT, 0.015, complete, 1000.0);
    check_row(viscosity_average(&chains, 1000.0, 0.015), &row);
}

static enum scission_neighbours neighbours_of(const struct reference_row *row)
{
    char word[32];
    return strcmp(reference_word(row, 0, word), "excluded") == 0 ? NEIGHBOURS_EXCLUDED : NEIGHBOURS_INDEPENDENT;
}

static void both_rules(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    struct reference_row row[ROOM];
    size_t n = reference_read("polymer.tsv", "cut.xv", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct scission_chains chains = scission_cut(neighbours_of(&row[i]), reference_argument(&row[i], 2),
                                                           complete, reference_argument(&row[i], 1));
        check_row(scission_xv(&sums, &chains), &row[i]);
    }
    n = reference_read("polymer.tsv", "cut.usual", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double xn = reference_argument(&row[i], 1), p = reference_argument(&row[i], 2);
        const struct scission_chains chains = scission_cut(neighbours_of(&row[i]), p, complete, xn);
        check_row(usual_reduction(&chains, xn, p), &row[i]);
    }
    n = reference_read("polymer.tsv", "cut.mixed", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct scission_chance chance = {reference_argument(&row[i], 3), reference_argument(&row[i], 4)};
        const struct scission_chains chains = scission_cut(neighbours_of(&row[i]), reference_argument(&row[i], 2),
                                                           chance, reference_argument(&row[i], 1));
        check_row(scission_xv(&sums, &chains), &row[i]);
    }
}

/* ---- identities ---- */

/* Complete conversion, nothing else cut: 1/xn' = 1/xn + delta (1 - 1/xn),
 * whatever the neighbours. */
static void number_average_counts_the_cuts(void **state)
{
    (void)state;
    const enum scission_neighbours rule[] = {NEIGHBOURS_EXCLUDED, NEIGHBOURS_INDEPENDENT};
    for (int i = 0; i < 2; i++)
        for (double xn = 1.0; xn < 1e5; xn *= 7.0)
            for (double delta = 0.0; delta < 0.21; delta += 0.01) {
                const struct scission_chains chains = scission_cut(rule[i], delta, complete, xn);
                check_round(1.0 / scission_xn(&chains), 1.0 / xn + delta * (1.0 - 1.0 / xn), 16.0);
            }
}

static void nothing_cut_changes_nothing(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    const struct scission_chance none = {0.0, 0.0};
    const enum scission_neighbours rule[] = {NEIGHBOURS_EXCLUDED, NEIGHBOURS_INDEPENDENT};
    for (int i = 0; i < 2; i++)
        for (double xn = 2.0; xn < 1e5; xn *= 5.0) {
            const struct scission_chains chains = scission_cut(rule[i], 0.1, none, xn),
                                         without = scission_cut(rule[i], 0.0, complete, xn);
            check_round(scission_xv(&sums, &chains), polymer_xv_of_xn(&sums, xn), 200.0);
            check_round(scission_xv(&sums, &without), polymer_xv_of_xn(&sums, xn), 200.0);
            check_round(scission_xw(&chains), 2.0 * xn - 1.0, 16.0);
        }
}

/* Neighbours that are never both head-to-head, half of them, complete: every
 * second linkage is cut, nothing longer than two units is left. */
static void half_of_the_linkages(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    const struct reference_row row = reference_one("polymer.tsv", "cut.half");
    const double xn = reference_argument(&row, 1), fraction = reference_argument(&row, 2);
    const struct scission_chains chains = scission_cut(NEIGHBOURS_EXCLUDED, fraction, complete, xn);
    check_row(scission_xv(&sums, &chains), &row);
    check_close(scission_xn(&chains), 1.0 / (1.0 / xn + fraction * (1.0 - 1.0 / xn)), 1e-9, "SERIES equal roots are held 2e-6 apart");
}

/* ---- the way back ---- */

static void hold_inverse(enum scission_neighbours rule, double chance, const struct polymer_sums *sums, double xn)
{
    const double xv = polymer_xv_of_xn(sums, xn);
    for (int i = -9; i < 50; i++) {
        const double fraction = i < 0 ? 0.1 * i / (xn * chance) : 0.01 * i;
        if (fraction < -0.5)
            continue;
        const struct scission_chains chains = scission_cut(rule, fraction, (struct scission_chance){chance, 0.0}, xn);
        /* d(1/xv)/d(fraction) is near chance/r, and 1/xv is known to 1e-13 of itself */
        check_close(scission_fraction(rule, chance, sums, xv, scission_xv(sums, &chains)), fraction,
                    1e-13 * (fraction + 2.0 / (xn * chance) + 0.01), "ROUND phi to 1e-13 times the condition");
    }
}

static void fraction_goes_back(void **state)
{
    (void)state;
    const double exponent[] = {0.5, 0.76, 1.0}, chance[] = {1.0, 0.95, 0.6, 0.2}, xn[] = {20.0, 200.0, 1000.0, 5000.0};
    for (size_t e = 0; e < 3; e++) {
        const struct polymer_sums sums = sums_of(exponent[e]);
        for (size_t i = 0; i < 4; i++)
            for (size_t j = 0; j < 4; j++) {
                hold_inverse(NEIGHBOURS_EXCLUDED, chance[i], &sums, xn[j]);
                hold_inverse(NEIGHBOURS_INDEPENDENT, chance[i], &sums, xn[j]);
            }
    }
}

/* An Mv' above Mv is met by a fraction below zero, however far above. */
static void fraction_below_zero(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    const enum scission_neighbours rule[] = {NEIGHBOURS_EXCLUDED, NEIGHBOURS_INDEPENDENT};
    const double longer[] = {1.0001, 1.1, 2.0, 10.0, 1000.0}, xv = polymer_xv_of_xn(&sums, 1000.0);
    for (int i = 0; i < 2; i++)
        for (size_t j = 0; j < sizeof longer / sizeof *longer; j++) {
            const double fraction = scission_fraction(rule[i], 0.95, &sums, xv, longer[j] * xv);
            const struct scission_chains chains =
                scission_cut(rule[i], fraction, (struct scission_chance){0.95, 0.0}, 1000.0);
            assert_true(fraction < 0.0 && fraction > -0.0011);
            check_close(scission_xv(&sums, &chains) / (longer[j] * xv), 1.0, 1e-12 * longer[j],
                        "ROUND the condition grows with the length");
        }
}

/* What 50 % leaves is the least; anything below it is no answer. */
static void hold_the_end(enum scission_neighbours rule, double chance, double least)
{
    const struct polymer_sums sums = sums_of(0.76);
    const double xv = polymer_xv_of_xn(&sums, 1000.0);
    check_close(scission_fraction(rule, chance, &sums, xv, least * 1.0001), 0.5, 2e-4,
                "SERIES 1e-4 of the least length");
    assert_true(isnan(scission_fraction(rule, chance, &sums, xv, least * 0.9999)));
    for (double shorter = 0.4; shorter < 0.99 * least; shorter += 0.1)
        assert_true(isnan(scission_fraction(rule, chance, &sums, xv, shorter)));
}

static void no_fraction_is_no_number(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    const enum scission_neighbours rule[] = {NEIGHBOURS_EXCLUDED, NEIGHBOURS_INDEPENDENT};
    const double chance[] = {0.99, 0.95, 0.6, 0.2}, xv = polymer_xv_of_xn(&sums, 1000.0);
    for (int i = 0; i < 2; i++) {
        for (size_t j = 0; j < 4; j++) {
            const struct scission_chains half =
                scission_cut(rule[i], 0.5, (struct scission_chance){chance[j], 0.0}, 1000.0);
            hold_the_end(rule[i], chance[j], scission_xv(&sums, &half));
        }
        assert_true(isnan(scission_fraction(rule[i], 0.95, &sums, 0.5, 0.4)));
        assert_true(isnan(scission_fraction(rule[i], 0.95, &sums, xv, (double)NAN)));
        /* more than every cut taken back: no distribution */
        const struct scission_chains none = scission_cut(rule[i], -0.0011, complete, 1000.0);
        assert_true(isnan(scission_xv(&sums, &none)));
    }
}

/* The same when every head-to-head linkage is cut: conversion complete, or not
 * allowed for. */
static void no_fraction_when_all_are_cut(void **state)
{
    (void)state;
    const struct polymer_sums sums = sums_of(0.76);
    const struct scission_chains half = scission_cut(NEIGHBOURS_INDEPENDENT, 0.5, complete, 1000.0);
    hold_the_end(NEIGHBOURS_INDEPENDENT, 1.0, scission_xv(&sums, &half));
    hold_the_end(NEIGHBOURS_EXCLUDED, 1.0, reference_one("polymer.tsv", "cut.half").number);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(independent_cutting),
        cmocka_unit_test(both_rules),
        cmocka_unit_test(number_average_counts_the_cuts),
        cmocka_unit_test(nothing_cut_changes_nothing),
        cmocka_unit_test(half_of_the_linkages),
        cmocka_unit_test(fraction_goes_back),
        cmocka_unit_test(fraction_below_zero),
        cmocka_unit_test(no_fraction_is_no_number),
        cmocka_unit_test(no_fraction_when_all_are_cut),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
