/* Chains of every distribution drawn and cut one by one, linkage by linkage,
 * and the time that a table takes. */
#include "check.h"

#include <math.h>
#include <stdlib.h>
#include <time.h>

#include "models/scission.h"
#include "sim/base/streams.h"

static const double a_pvoh = 0.76;
enum { LONGEST = 20000, CHAINS = 12000 };

static struct chains *make(struct chains_shape shape, double a)
{
    struct chains *const c = malloc(sizeof *c);
    assert_non_null(c);
    assert_true(chains_make(c, shape, a));
    return c;
}

/* Running sums of the number distribution at whole numbers; theta is where the
 * density's logarithm is, found by halving so that the number average is met. */
static double cumulate(const struct chains_shape *s, double theta, double sum[LONGEST + 1])
{
    const double k = 1.0 / (s->dispersity - 1.0), v = log(s->dispersity);
    double units = 0.0;
    sum[0] = 0.0;
    for (int N = 1; N <= LONGEST; N++) {
        const double z = log(N / theta), nearest = floor(theta + 0.5);
        const double log_p[] = {[CHAINS_MOST_PROBABLE] = (N - 1) * log1p(-1.0 / theta), [CHAINS_SCHULZ_ZIMM] = (k - 1.0) * z - k * N / theta,
                                [CHAINS_LOG_NORMAL] = -0.5 * z * z / v - z, [CHAINS_UNIFORM] = N == (int)nearest ? 0.0 : -1e3};
        const double p = exp(log_p[s->kind]);
        sum[N] = sum[N - 1] + p;
        units += N * p;
    }
    return units / sum[LONGEST];
}

static void make_cumulated(const struct chains_shape *s, double sum[LONGEST + 1])
{
    double low = 0.2 * s->units, high = 2.0 * s->units;
    for (int i = 0; i < 40 && s->kind != CHAINS_UNIFORM; i++) {
        const double middle = 0.5 * (low + high);
        if (cumulate(s, middle, sum) < s->units)
            low = middle;
        else
            high = middle;
    }
    cumulate(s, s->kind == CHAINS_UNIFORM ? s->units : low, sum);
}

static int draw_length(struct streams_state *stream, const double sum[LONGEST + 1])
{
    const double u = streams_uniform(stream) * sum[LONGEST];
    int low = 0, high = LONGEST;
    while (high - low > 1) {
        const int middle = (low + high) / 2;
        if (sum[middle] <= u)
            low = middle;
        else
            high = middle;
    }
    return high;
}

/* How chains are cut. */
struct knife {
    enum scission_neighbours rule;
    double fraction;
    struct scission_chance chance;
};

/* Cut one chain; adds up x^(1+a) and the number of pieces. */
static void cut_one(struct streams_state *stream, const struct knife *k, int length, double out[2])
{
    const double u = k->fraction / (1.0 - k->fraction);
    bool hh = streams_uniform(stream) < k->fraction;
    int piece = 1;
    out[0] = out[1] = 0.0;
    for (int linkage = 1; linkage < length; linkage++) {
        if (streams_uniform(stream) < (hh ? k->chance.head_to_head : k->chance.other)) {
            out[0] += pow(piece, 1.0 + a_pvoh);
            out[1] += 1.0;
            piece = 0;
        }
        piece++;
        if (k->rule == NEIGHBOURS_EXCLUDED)
            hh = !hh && streams_uniform(stream) < u;
        else
            hh = streams_uniform(stream) < k->fraction;
    }
    out[0] += pow(piece, 1.0 + a_pvoh);
    out[1] += 1.0;
}

/* Mean of y over mean of n, chain by chain, and its standard error. */
struct ratio {
    double value, se;
};
static struct ratio ratio_of(const double *y, const double *n)
{
    double sum_y = 0.0, sum_n = 0.0, squares = 0.0;
    for (int i = 0; i < CHAINS; i++) {
        sum_y += y[i];
        sum_n += n[i];
    }
    for (int i = 0; i < CHAINS; i++) squares += pow(y[i] - sum_y / sum_n * n[i], 2.0);
    return (struct ratio){sum_y / sum_n, sqrt(squares) / sum_n};
}

/* STAT: sum of x^(1+a) over sum of x is xv'^a, pieces over units 1/xn' = 1/xn +
 * p (1 - 1/xn), p the mean chance of a cut; each within 5 standard errors of
 * its own. 8 cases, 16 numbers at 5.7e-7: chance of a false alarm 1e-5 for one
 * seed, which is fixed. */
static void chains_cut_one_by_one(void **state)
{
    (void)state;
    static const struct knife knives[] = {{NEIGHBOURS_EXCLUDED, 0.03, {0.95, 0.0005}}, {NEIGHBOURS_INDEPENDENT, 0.03, {0.95, 0.0005}}};
    static double sum[LONGEST + 1], power[CHAINS], pieces[CHAINS], units[CHAINS];
    for (int kind = CHAINS_MOST_PROBABLE; kind <= CHAINS_UNIFORM; kind++) {
        const struct chains_shape shape = {(enum chains_kind)kind, 1.6, AVERAGE_NUMBER, 180.0};
        struct chains *const c = make(shape, a_pvoh);
        make_cumulated(&shape, sum);
        for (unsigned rule = 0; rule < 2; rule++) {
            const struct knife *const k = &knives[rule];
            struct streams_state stream = streams_open(streams_study_key(20260301, rule), STREAMS_STUDY, (struct streams_place){.level = (unsigned)kind});
            for (int i = 0; i < CHAINS; i++) {
                double out[2];
                const int length = draw_length(&stream, sum);
                cut_one(&stream, k, length, out);
                units[i] = length;
                power[i] = out[0];
                pieces[i] = out[1];
            }
            const struct scission_roots roots = scission_roots(k->rule, k->fraction, k->chance);
            const struct ratio by_power = ratio_of(power, units), by_number = ratio_of(pieces, units);
            const double p = k->fraction * k->chance.head_to_head + (1.0 - k->fraction) * k->chance.other;
            check_close(by_power.value, pow(scission_average(c, &roots), a_pvoh), 5.0 * by_power.se, "STAT 5 standard errors");
            check_close(by_number.value, 1.0 / c->xn + p * (1.0 - 1.0 / c->xn), 5.0 * by_number.se, "STAT 5 standard errors");
            assert_true(by_power.se < 0.01 * by_power.value && by_number.se < 0.01 * by_number.value);
        }
        free(c);
    }
}

/* Log-normal, dispersity 2, xn 2000: below 0.2 s of processor time (the best of
 * three, for other programs share the caches; a sanitizer takes its own). */
static void built_in_time(void **state)
{
    (void)state;
#ifdef __SANITIZE_ADDRESS__
    const double allowed_s = 3.0;
#else
    const double allowed_s = 0.2;
#endif
    double best_s = 1e9;
    for (int i = 0; i < 3; i++) {
        const clock_t before = clock();
        free(make((struct chains_shape){CHAINS_LOG_NORMAL, 2.0, AVERAGE_VISCOSITY, 2000.0}, a_pvoh));
        best_s = fmin(best_s, (double)(clock() - before) / CLOCKS_PER_SEC);
    }
    print_message("table built in %.3f s\n", best_s);
    assert_true(best_s < allowed_s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(chains_cut_one_by_one), cmocka_unit_test(built_in_time)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
