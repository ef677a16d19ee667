/* Moments, quantiles and coverage intervals against JCGM 101:2008, examples
 * 9.2, 9.3, 9.4 and the definitions of 7.7 and 7.9, with inputs drawn from the
 * program's own streams. Exact values: checks.md section 2. Never against
 * another Monte Carlo result's printed digits.
 *
 * STAT: z = 4.5 standard errors, 7e-6 false alarms each, seeds fixed. Of a
 * quantile sqrt(p (1 - p)/M)/density; ends of a shortest interval scatter
 * several times more and follow a cube root: their length is tested, and the
 * ends in a wide band. */
#include "judge/numbers.h"

#include "sim/judge/moments.h"

enum { M = 400000 };
static const double z = 4.5;

struct stage {
    double *y, *sorted;
};

static int set_up(void **state)
{
    struct stage *const g = calloc(1, sizeof *g);
    assert_non_null(g);
    g->y = calloc(M, sizeof *g->y);
    g->sorted = calloc(M, sizeof *g->sorted);
    assert_true(g->y && g->sorted);
    *state = g;
    return 0;
}

static int tear_down(void **state)
{
    struct stage *const g = *state;
    free(g->y);
    free(g->sorted);
    free(g);
    return 0;
}

static void sorted(struct stage *g)
{
    memcpy(g->sorted, g->y, M * sizeof *g->y);
    moments_sort(g->sorted, M);
}

/* What is known exactly of an output. */
struct exact {
    double mean, u;
    double kurtosis;                 /* fourth central moment over u^4 */
    struct interval symmetric;
    double density;                  /* at the ends of it */
};

static void is(struct stage *g, const struct exact *e)
{
    sorted(g);
    const struct moments m = moments_of(g->y, M);
    const struct interval i = moments_symmetric(g->sorted, M, 0.95);
    const double mean_se = e->u / sqrt(M), u_se = e->u * sqrt((e->kurtosis - 1.0) / 4.0 / M), end_se = sqrt(0.025 * 0.975 / M) / e->density;
    still_near("mean", m.mean, e->mean, z * mean_se);
    still_near("u", m.sd, e->u, z * u_se);
    still_near("low", i.low, e->symmetric.low, z * end_se);
    still_near("high", i.high, e->symmetric.high, z * end_se);
    /* the errors that are printed: STAT, a spread of a spread (2 %) */
    still_close_to("error of the mean", m.mean_se, mean_se, 0.02);
    still_close_to("error of u", m.sd_se, u_se, 0.05);
}

/* 9.2.2: four N(0, 1): +-3.919927969; density there 2.9e-2/sigma of 2. */
static void four_normals(void **state)
{
    struct stage *const g = *state;
    struct numbers n;
    numbers_open(&n, 1);
    for (size_t i = 0; i < M; i++) g->y[i] = numbers_normal(&n) + numbers_normal(&n) + numbers_normal(&n) + numbers_normal(&n);
    const struct exact e = {0.0, 2.0, 3.0, {-3.919927969, 3.919927969}, exp(-0.5 * 1.959963985 * 1.959963985) / sqrt(2.0 * acos(-1.0)) / 2.0};
    is(g, &e);
    const struct interval s = moments_shortest(g->sorted, M, 0.95);
    still_close_to("length of the shortest", s.high - s.low, 7.839855938, 0.005);
    assert_true(s.high - s.low <= e.symmetric.high - e.symmetric.low + 0.05);
}

/* 9.2.3: four rectangular, u = 1 each: half-width 2 sqrt3 (2 - (3/5)^(1/4)).
 * The density of a sum of four on (-r, r), r = sqrt3, is (4r - y)^3/(96 r^4)
 * in the tail; kurtosis 3 - 1.2/4. */
static void four_rectangular(void **state)
{
    struct stage *const g = *state;
    struct numbers n;
    const double r = sqrt(3.0), half = 3.879406741;
    numbers_open(&n, 2);
    for (size_t i = 0; i < M; i++) {
        g->y[i] = 0.0;
        for (int k = 0; k < 4; k++) g->y[i] += numbers_between(&n, -r, r);
    }
    still_near("half-width", half, 2.0 * r * (2.0 - pow(0.6, 0.25)), 5e-10);
    const struct exact e = {0.0, 2.0, 3.0 - 1.2 / 4.0, {-half, half}, pow(4.0 * r - half, 3.0) / (96.0 * pow(r, 4.0))};
    is(g, &e);
}

/* 9.2.4: three rectangular with u = 1, one with u = 10: half-width 17.0158141,
 * u = sqrt 103. Density in the flanks below that of the wide one alone,
 * 1/(20 sqrt3); kurtosis from the fourth moments, 1.8 for each:
 * (3 x 1.8 + 18000 + 6 (3 + 300))/103^2. */
static void one_dominates(void **state)
{
    struct stage *const g = *state;
    struct numbers n;
    const double r = sqrt(3.0), half = 17.015814100;
    numbers_open(&n, 3);
    for (size_t i = 0; i < M; i++) {
        g->y[i] = numbers_between(&n, -10.0 * r, 10.0 * r);
        for (int k = 0; k < 3; k++) g->y[i] += numbers_between(&n, -r, r);
    }
    /* the density at `half`: share of three rectangular beyond half - 10 r = -0.305, 0.566, of 1/(20 r) */
    const struct exact e = {0.0, sqrt(103.0), (3.0 * 1.8 + 18000.0 + 6.0 * 303.0) / (103.0 * 103.0), {-half, half}, 0.566 / (20.0 * r)};
    is(g, &e);
}

/* 9.3 mass calibration: 1.234000 mg, u 0.07547974 (first-order 0.053851648
 * would be 29 % off), shortest 95 % [1.084433, 1.383567]. */
static void mass_calibration(void **state)
{
    struct stage *const g = *state;
    struct numbers n;
    numbers_open(&n, 4);
    for (size_t i = 0; i < M; i++) {
        const double m = 1e5 + 0.050 * numbers_normal(&n), d = 1.234 + 0.020 * numbers_normal(&n);
        const double air = numbers_between(&n, 1.10, 1.30), weight = numbers_between(&n, 7000.0, 9000.0), reference = numbers_between(&n, 7950.0, 8050.0);
        g->y[i] = (m + d) * (1.0 + (air - 1.2) * (1.0 / weight - 1.0 / reference)) - 1e5;
    }
    sorted(g);
    const struct moments m = moments_of(g->y, M);
    still_near("mean", m.mean, 1.234, z * 0.07547974 / sqrt(M));
    still_near("u", m.sd, 0.07547974, z * 0.07547974 / sqrt(2.0 * M)); /* lighter tails than normal: a wider band than needed */
    const struct interval s = moments_shortest(g->sorted, M, 0.95), y = moments_symmetric(g->sorted, M, 0.95);
    still_close_to("length", s.high - s.low, 1.383567 - 1.084433, 0.004);
    still_near("low", s.low, 1.084433, 0.005); /* the wide band */
    still_near("high", s.high, 1.383567, 0.005);
    assert_true(s.high - s.low <= y.high - y.low);
}

/* 9.4 comparison loss X1^2 + X2^2, u = 0.005: skewed, and at 0 first order says
 * u = 0. In units of 1e-6. It is u^2 times a non-central chi-squared of two
 * degrees, l = (x1/u)^2: kurtosis 3 + 12 (2 + 4 l)/(2 + 2 l)^2. */
struct loss {
    double x1, mean, u;
    struct interval shortest, symmetric;
};

/* Density of s = v/u^2 on two degrees, non-centrality l: exp(-(s + l)/2)
 * I0(sqrt(l s))/2, by its own series. */
static double chi_density(double s, double l)
{
    double term = 1.0, sum = 1.0;
    for (int k = 1; k < 400; k++) {
        term *= l * s / 4.0 / k / k;
        sum += term;
    }
    return 0.5 * exp(-0.5 * (s + l)) * sum;
}

static void comparison_loss(void **state)
{
    static const struct loss rows[3] = {{0.0, 50.0, 50.0, {0.0, 149.79}, {1.27, 184.44}},
                                        {0.010, 150.0, 111.803, {0.0, 366.01}, {8.55, 427.12}},
                                        {0.050, 2550.0, 502.494, {1593.6, 3548.6}, {1638.48, 3603.36}}};
    struct stage *const g = *state;
    for (int k = 0; k < 3; k++) {
        const struct loss *const row = &rows[k];
        const double l = row->x1 * row->x1 / 2.5e-5, p = 0.025 * 0.975 / M;
        struct numbers n;
        numbers_open(&n, 10 + (uint64_t)k);
        for (size_t i = 0; i < M; i++) {
            const double a = row->x1 + 0.005 * numbers_normal(&n), b = 0.005 * numbers_normal(&n);
            g->y[i] = 1e6 * (a * a + b * b);
        }
        sorted(g);
        const struct moments m = moments_of(g->y, M);
        const struct interval y = moments_symmetric(g->sorted, M, 0.95), s = moments_shortest(g->sorted, M, 0.95);
        const double kurtosis = 3.0 + 12.0 * (2.0 + 4.0 * l) / (2.0 + 2.0 * l) / (2.0 + 2.0 * l);
        still_near("mean", m.mean, row->mean, z * row->u / sqrt(M));
        still_near("u", m.sd, row->u, z * row->u * sqrt((kurtosis - 1.0) / 4.0 / M) + 5e-4);
        still_near("low", y.low, row->symmetric.low, 5e-3 + z * sqrt(p) / (chi_density(row->symmetric.low / 25.0, l) / 25.0));
        still_near("high", y.high, row->symmetric.high, 5e-3 + z * sqrt(p) / (chi_density(row->symmetric.high / 25.0, l) / 25.0));
        still_near("shortest, low", s.low, row->shortest.low, 0.05 * row->u);
        still_near("shortest, high", s.high, row->shortest.high, 0.05 * row->u);
        still_close_to("shortest, length", s.high - s.low, row->shortest.high - row->shortest.low, 0.01);
    }
}

/* 7.7: q = pM, or int(pM + 1/2) when that is no whole number; symmetric:
 * r = (M - q)/2, or int((M - q + 1)/2). By hand. */
static void sampled_intervals(void **state)
{
    (void)state;
    double y[1000];
    for (int i = 0; i < 1000; i++) y[i] = i + 1;
    struct interval s = moments_symmetric(y, 1000, 0.95); /* q 950, r 25 */
    assert_true(s.low == 25.0 && s.high == 975.0);
    s = moments_symmetric(y, 999, 0.95); /* 949.05: q 949, r 25 */
    assert_true(s.low == 25.0 && s.high == 974.0);
    s = moments_symmetric(y, 990, 0.95); /* 940.5: q 941, M - q = 49: r int(25) */
    assert_true(s.low == 25.0 && s.high == 966.0);
    s = moments_symmetric(y, 20, 0.95); /* q 19, r int((1 + 1)/2) = 1 */
    assert_true(s.low == 1.0 && s.high == 20.0);
    s = moments_symmetric(y, 2, 0.5); /* q 1, r 1 */
    assert_true(s.low == 1.0 && s.high == 2.0);
    double x[10] = {0, 1, 2, 3, 10, 10.5, 11, 11.5, 12, 20}; /* p 0.5: q 5; spans 10.5 9.5 9 8.5 10 */
    s = moments_shortest(x, 10, 0.5);
    assert_true(s.low == 3.0 && s.high == 12.0);
    s = moments_shortest(x, 10, 0.3); /* q 3: 3 9 8.5 8 1.5 1.5 9: the first of two */
    assert_true(s.low == 10.0 && s.high == 11.5);
    const double w[6] = {0.0, 4.0, 6.0, 8.0, 8.5, 9.0}; /* q 3: 8 4.5 3: the last */
    s = moments_shortest(w, 6, 0.5);
    assert_true(s.low == 6.0 && s.high == 9.0);
}

/* Order statistics, linearly interpolated at (n - 1) p. ROUND: 1e-15. */
static void quantiles(void **state)
{
    (void)state;
    const double x[5] = {1.0, 2.0, 4.0, 8.0, 16.0};
    static const double p[7] = {0.0, 0.25, 0.5, 0.6, 0.9, 0.975, 1.0}, expected[7] = {1.0, 2.0, 4.0, 5.6, 12.8, 15.2, 16.0};
    for (int i = 0; i < 7; i++) still_close_to("quantile", moments_quantile(x, 5, p[i]), expected[i], 1e-15);
    assert_true(moments_quantile(x, 1, 0.95) == 1.0);
    const double with_none[4] = {(double)-INFINITY, (double)-INFINITY, 1.0, 2.0};
    assert_true(moments_quantile(with_none, 4, 0.0) == (double)-INFINITY);
    assert_true(moments_quantile(with_none, 4, 2.0 / 3.0) == 1.0);
}

/* 7.9.2: rows of checks.md section 2. ROUND: 1e-12. */
static void tolerance(void **state)
{
    (void)state;
    still_close_to("0.0754 to 1", moments_tolerance(0.0754, 1), 0.005, 1e-12);
    still_close_to("9.96 to 1", moments_tolerance(9.96, 1), 5.0, 1e-12);
    still_close_to("0.0996 to 2", moments_tolerance(0.0996, 2), 0.005, 1e-12);
}

/* Kernel density of normal values at the 95 % quantile and the mean. STAT 4.5
 * of sqrt(f R/(n h)), R = 0.6; SERIES: h^2 f''/10, below 1 % here. */
static void density(void **state)
{
    struct stage *const g = *state;
    struct numbers n;
    const size_t count = 20000;
    numbers_open(&n, 20);
    for (size_t i = 0; i < count; i++) g->y[i] = 3.0 + 0.5 * numbers_normal(&n);
    const double h = 2.34 * 0.5 * pow((double)count, -0.2);
    for (int i = 0; i < 2; i++) {
        const double at = i ? 1.6448536 : 0.0, f = exp(-0.5 * at * at) / sqrt(2.0 * acos(-1.0)) / 0.5;
        still_near("density", moments_density(g->y, count, 0.5, 3.0 + 0.5 * at), f, z * sqrt(f * 0.6 / ((double)count * h)) + 0.015 * f);
    }
    assert_true(moments_density(g->y, count, 0.0, 3.0) == 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(four_normals), cmocka_unit_test(four_rectangular), cmocka_unit_test(one_dominates), cmocka_unit_test(mass_calibration),
        cmocka_unit_test(comparison_loss), cmocka_unit_test(sampled_intervals), cmocka_unit_test(quantiles), cmocka_unit_test(tolerance),
        cmocka_unit_test(density),
    };
    return cmocka_run_group_tests(tests, set_up, tear_down);
}
