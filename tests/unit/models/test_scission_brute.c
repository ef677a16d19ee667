/* Cutting by brute force: sums over every chain length with 2 x 2 matrices,
 * and chains that are cut one by one. */
#include "check.h"

#include <math.h>
#include <stdbool.h>
#include <stdlib.h>

#include "models/scission.h"
#include "sim/base/streams.h"

/* What is cut, and how. */
struct knife {
    enum scission_neighbours rule;
    double fraction;
    struct scission_chance chance;
    double xn;
};

/* The last three: a fraction below zero (the continuation that a reduction
 * needs), and low conversion, where one root is far below zero. */
static const struct knife knives[] = {
    {NEIGHBOURS_EXCLUDED, 0.015, {1.0, 0.0}, 50.0},      {NEIGHBOURS_EXCLUDED, 0.02, {0.95, 0.0005}, 60.0},
    {NEIGHBOURS_EXCLUDED, 0.2, {0.6, 0.01}, 40.0},       {NEIGHBOURS_INDEPENDENT, 0.02, {0.95, 0.0005}, 60.0},
    {NEIGHBOURS_INDEPENDENT, 0.2, {0.6, 0.01}, 40.0},    {NEIGHBOURS_EXCLUDED, -0.005, {0.95, 0.0}, 50.0},
    {NEIGHBOURS_INDEPENDENT, -0.005, {0.95, 0.0}, 50.0}, {NEIGHBOURS_EXCLUDED, 0.45, {0.3, 0.02}, 30.0},
};
enum { KNIVES = sizeof knives / sizeof *knives, LONGEST = 3600 };

/* Weights of the two states (head-to-head or not) of one linkage. */
struct pair {
    double hh, other;
};

static struct pair stationary(const struct knife *k)
{
    return (struct pair){k->fraction, 1.0 - k->fraction};
}

/* From one linkage to the next. */
static struct pair onward(const struct knife *k, struct pair p)
{
    const double all = p.hh + p.other;
    if (k->rule == NEIGHBOURS_INDEPENDENT)
        return (struct pair){all * k->fraction, all * (1.0 - k->fraction)};
    const double u = k->fraction / (1.0 - k->fraction);
    return (struct pair){p.other * u, p.hh + p.other * (1.0 - u)};
}

static struct pair cut(const struct knife *k, struct pair p)
{
    return (struct pair){p.hh * k->chance.head_to_head, p.other * k->chance.other};
}

static struct pair uncut(const struct knife *k, struct pair p)
{
    return (struct pair){p.hh * (1.0 - k->chance.head_to_head), p.other * (1.0 - k->chance.other)};
}

static double weight(struct pair p)
{
    return p.hh + p.other;
}

/* S(m), f(x), g(x) of model.md, from a walk along the linkages. */
struct walk {
    double S[LONGEST], f[LONGEST], g[LONGEST];
};

static struct walk *walk_of(const struct knife *k)
{
    struct walk *const w = malloc(sizeof *w);
    assert_non_null(w);
    struct pair whole = stationary(k), after_cut = onward(k, cut(k, stationary(k)));
    w->S[0] = 1.0;
    w->f[0] = w->g[0] = 0.0;
    for (int x = 1; x < LONGEST; x++) { /* whole: x - 1 linkages uncut, now at the next */
        w->f[x] = weight(cut(k, whole));
        w->g[x] = weight(cut(k, after_cut));
        w->S[x] = weight(uncut(k, whole));
        whole = onward(k, uncut(k, whole));
        after_cut = onward(k, uncut(k, after_cut));
    }
    return w;
}

static struct scission_chains chains_of(const struct knife *k)
{
    return scission_cut(k->rule, k->fraction, k->chance, k->xn);
}

static void uncut_stretches(void **state)
{
    (void)state;
    for (size_t i = 0; i < KNIVES; i++) {
        struct walk *const w = walk_of(&knives[i]);
        const struct scission_chains chains = chains_of(&knives[i]);
        const double goes_on = 1.0 - 1.0 / knives[i].xn;
        for (int m = 0; m < 400; m++) {
            double S = 0.0;
            for (int r = 0; r < 2; r++)
                S += chains.share[r] * pow(chains.w[r] / goes_on, m);
            check_close(S, w->S[m], 1e-14 * (2.0 + m) * fabs(w->S[m]) + 1e-18, "ROUND the power m of a root");
        }
        free(w);
    }
}

/* n(x) = P(x) S(x-1) + sum_{N>x} P(N) [2 f(x) + (N-x-1) g(x)], N up to where
 * P(N) is below 1e-26. */
static double brute_number(const struct knife *k, const struct walk *w, int x)
{
    const double q = 1.0 / k->xn;
    double sum = q * pow(1.0 - q, x - 1) * w->S[x - 1];
    for (int N = x + 1; N < LONGEST; N++)
        sum += q * pow(1.0 - q, N - 1) * (2.0 * w->f[x] + (N - x - 1) * w->g[x]);
    return sum;
}

static double closed_number(const struct knife *k, const struct scission_chains *chains, int x)
{
    double sum = 0.0;
    for (int r = 0; r < 2; r++)
        sum += chains->share[r] * chains->one_minus_w[r] * chains->one_minus_w[r] * pow(chains->w[r], x - 1);
    return sum * k->xn;
}

static void numbers_of_every_length(void **state)
{
    (void)state;
    for (size_t i = 0; i < KNIVES; i++) {
        struct walk *const w = walk_of(&knives[i]);
        const struct scission_chains chains = chains_of(&knives[i]);
        for (int x = 1; x < 600; x += x < 20 ? 1 : 37) {
            const double expected = brute_number(&knives[i], w, x);
            check_close(closed_number(&knives[i], &chains, x), expected, 1e-13 * (10.0 + x) * fabs(expected) + 1e-16,
                        "ROUND the power x of w");
        }
        free(w);
    }
}

static void averages_of_all_lengths(void **state)
{
    (void)state;
    struct polymer_sums sums;
    polymer_sums_make(&sums, 0.76);
    for (size_t i = 0; i < KNIVES; i++) {
        struct walk *const w = walk_of(&knives[i]);
        const struct scission_chains chains = chains_of(&knives[i]);
        double number = 0.0, mass = 0.0, square = 0.0, moment = 0.0;
        for (int x = 1; x < LONGEST; x++) {
            const double n = brute_number(&knives[i], w, x);
            number += n;
            mass += n * x;
            square += n * x * x;
            moment += n * pow(x, 1.76);
        }
        check_close(mass / knives[i].xn, 1.0, 1e-12, "ROUND every unit is somewhere");
        check_close(scission_xn(&chains) * number / mass, 1.0, 1e-12, "ROUND sums of 3600 terms");
        check_close(scission_xw(&chains) * mass / square, 1.0, 1e-12, "ROUND sums of 3600 terms");
        check_close(scission_xv(&sums, &chains) / pow(moment / mass, 1.0 / 0.76), 1.0, 1e-12,
                    "ROUND sums of 3600 terms");
        free(w);
    }
}

/* ---- chains cut one by one ---- */

enum { CHAINS = 40000, SHORT = 6, FIGURES = 3 + SHORT };

/* Sums over chains of a figure that should be zero on average. */
struct tally {
    double sum[FIGURES], squares[FIGURES];
};

/* One chain's pieces: their number, the sums of x^2 and x^1.76, and how many
 * are 1, 2 ... SHORT units long. */
struct pieces {
    double number, squares, moment, shorter[SHORT];
};

static void keep(struct pieces *p, long x)
{
    p->number += 1.0;
    p->squares += (double)x * (double)x;
    p->moment += pow((double)x, 1.76);
    if (x <= SHORT)
        p->shorter[x - 1] += 1.0;
}

static struct pieces cut_chain(const struct knife *k, struct streams_state *dice, long units)
{
    struct pieces pieces = {0};
    bool hh = streams_uniform(dice) < k->fraction;
    long length = 1;
    for (long linkage = 1; linkage < units; linkage++) {
        if (streams_uniform(dice) < (hh ? k->chance.head_to_head : k->chance.other)) {
            keep(&pieces, length);
            length = 0;
        }
        length++;
        const double next = k->rule == NEIGHBOURS_INDEPENDENT ? k->fraction
                            : hh                              ? 0.0
                                                              : k->fraction / (1.0 - k->fraction);
        hh = streams_uniform(dice) < next;
    }
    keep(&pieces, length);
    return pieces;
}

static void count(struct tally *tally, const struct knife *k, struct streams_state *dice)
{
    struct polymer_sums sums;
    polymer_sums_make(&sums, 0.76);
    const struct scission_chains chains = chains_of(k);
    const double xn = scission_xn(&chains), xw = scission_xw(&chains), xv = pow(scission_xv(&sums, &chains), 0.76);
    for (int i = 0; i < CHAINS; i++) {
        const long units = 1 + (long)(log(1.0 - streams_uniform(dice)) / log1p(-1.0 / k->xn));
        const struct pieces p = cut_chain(k, dice, units);
        const double mass = (double)units;
        double off[FIGURES] = {xn * p.number - mass, p.squares - xw * mass, p.moment - xv * mass};
        for (int x = 1; x <= SHORT; x++)
            off[2 + x] = p.shorter[x - 1] - closed_number(k, &chains, x);
        for (int j = 0; j < FIGURES; j++) {
            tally->sum[j] += off[j];
            tally->squares[j] += off[j] * off[j];
        }
    }
}

/* 5 standard errors of a mean over 40,000 chains: false alarm 6e-7 a figure,
 * 4e-5 in all. */
static void chains_cut_one_by_one(void **state)
{
    (void)state;
    for (size_t i = 0; i < KNIVES; i++) {
        if (knives[i].fraction < 0.0)
            continue;
        struct streams_state dice = streams_open(streams_study_key(2024, i), STREAMS_STUDY, (struct streams_place){0});
        struct tally tally = {{0}, {0}};
        struct knife longer = knives[i];
        longer.xn *= 5.0;
        count(&tally, &longer, &dice);
        for (int j = 0; j < FIGURES; j++) {
            const double mean = tally.sum[j] / CHAINS, variance = tally.squares[j] / CHAINS - mean * mean;
            check_close(mean, 0.0, 5.0 * sqrt(variance / CHAINS), "STAT 5 standard errors, false alarm 6e-7");
        }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(uncut_stretches),
        cmocka_unit_test(numbers_of_every_length),
        cmocka_unit_test(averages_of_all_lengths),
        cmocka_unit_test(chains_cut_one_by_one),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
