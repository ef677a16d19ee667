/* Bath and liquid: rows from double integrals, closed forms, steps that
 * compose, and a fine Euler simulation. */
#include "check.h"
#include "reference.h"

#include <gsl/gsl_randist.h>
#include <math.h>
#include <string.h>

#include "models/bath.h"
#include "sim/base/streams.h"

enum { ROOM = 8, NORMALS = 16 };

/* A quantity as a sum of independent standard normals. */
struct sum {
    double of[NORMALS];
};

static struct sum plus(struct sum a, double share, struct sum b)
{
    for (int i = 0; i < NORMALS; i++)
        a.of[i] += share * b.of[i];
    return a;
}

static double covariance(struct sum a, struct sum b)
{
    double c = 0.0;
    for (int i = 0; i < NORMALS; i++)
        c += a.of[i] * b.of[i];
    return c;
}

static double deviation(struct sum a)
{
    return sqrt(covariance(a, a));
}

/* Bath and liquid, and how many normals they have used. */
struct course {
    struct sum x, l;
    int used;
};

struct outputs {
    struct sum of[BATH_OUTPUTS];
};

/* Take a step: its outputs, and the course after it. */
static struct outputs take(struct course *c, const struct bath_step *step)
{
    struct outputs out = {0};
    assert_true(c->used + BATH_OUTPUTS <= NORMALS);
    for (int i = 0; i < BATH_OUTPUTS; i++) {
        out.of[i] = plus(plus(out.of[i], step->from_x[i], c->x), step->from_l[i], c->l);
        for (int j = 0; j < BATH_OUTPUTS; j++)
            out.of[i].of[c->used + j] = step->noise[i][j];
    }
    c->used += BATH_OUTPUTS;
    c->x = out.of[BATH_X_NEXT];
    c->l = out.of[BATH_L_NEXT];
    return out;
}

/* The stationary state: what a long idle time leaves. Its third and fourth
 * normals are not used. */
static struct course stationary(struct bath_times times, double sigma_K)
{
    struct course c = {0};
    const double age = 60.0 * (times.correlation_s + times.lag_s);
    const struct bath_step idle = bath_idle(times, sigma_K, age, age);
    take(&c, &idle);
    c.used = 2;
    return c;
}

/* ---- standard deviations from a stationary start ---- */

/* Over a run without reset the bath's own mean is the liquid's mean and what
 * the liquid took up: all of a row follows from one step of each kind. */
struct row_parts {
    struct sum mean, reading, liquid;
};

static struct row_parts run_parts(const struct reference_row *row, enum bath_reads reads)
{
    const double run_s = reference_argument(row, 0);
    const struct bath_times times = {reference_argument(row, 1), reference_argument(row, 2)};
    struct course c = stationary(times, 1.0);
    const struct sum before = c.l;
    const struct bath_step step = bath_run(times, 1.0, run_s, 0.0, reads);
    const struct outputs out = take(&c, &step);
    const struct sum taken = plus(c.l, -1.0, before);
    return (struct row_parts){plus(out.of[BATH_L_MEAN], times.lag_s / run_s, taken), out.of[BATH_READING],
                              out.of[BATH_L_MEAN]};
}

static void from_a_stationary_start(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    size_t n = reference_read("bath.tsv", "bath.mean", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct row_parts p = run_parts(&row[i], BATH_READS_MEAN);
        check_row(deviation(p.mean), &row[i]);
        check_row(deviation(p.reading), &row[i]);
        check_close(deviation(plus(p.reading, -1.0, p.mean)), 0.0, 1e-7, "ROUND the root of a variance that cancels");
    }
    n = reference_read("bath.tsv", "bath.middle", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct row_parts p = run_parts(&row[i], BATH_READS_MIDDLE);
        check_row(deviation(plus(p.reading, -1.0, p.mean)), &row[i]);
    }
    n = reference_read("bath.tsv", "bath.ends", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct row_parts p = run_parts(&row[i], BATH_READS_ENDS);
        check_row(deviation(plus(p.reading, -1.0, p.mean)), &row[i]);
    }
    n = reference_read("bath.tsv", "bath.liquid", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct row_parts p = run_parts(&row[i], BATH_READS_MIDDLE);
        check_row(deviation(plus(p.liquid, -1.0, p.mean)), &row[i]);
    }
    n = reference_read("bath.tsv", "bath.middle.liquid", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct row_parts p = run_parts(&row[i], BATH_READS_MIDDLE);
        check_row(deviation(plus(p.reading, -1.0, p.liquid)), &row[i]);
    }
}

static void average_of_the_bath(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("bath.tsv", "bath.average", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double run_s = reference_argument(&row[i], 0), tau = reference_argument(&row[i], 1), x = run_s / tau;
        const struct bath_times times = {tau, 60.0};
        struct course c = stationary(times, 1.0);
        const struct bath_step step = bath_run(times, 1.0, run_s, 60.0, BATH_READS_MEAN);
        const double factor = deviation(take(&c, &step).of[BATH_READING]);
        check_row(factor, &row[i]);
        check_close(factor, sqrt(2.0 * (x + expm1(-x))) / x, 1e-13, "ROUND some dozens of products");
    }
}

/* ---- closed forms ---- */

static void stationary_state(void **state)
{
    (void)state;
    const double tau[] = {10.0, 59.9999, 60.0, 60.0001, 600.0};
    for (int i = 0; i < 5; i++) {
        const struct course c = stationary((struct bath_times){tau[i], 60.0}, 0.02);
        const double both = 0.0004 * tau[i] / (tau[i] + 60.0); /* var l = cov x l = sigma^2 tau/(tau + tau_f) */
        check_close(covariance(c.x, c.x), 0.0004, 1e-16, "ROUND some dozens of products");
        check_close(covariance(c.l, c.l), both, 1e-16, "ROUND some dozens of products");
        check_close(covariance(c.x, c.l), both, 1e-16, "ROUND some dozens of products");
    }
}

/* The answer of l to x is tau/(tau - tau_f) (e^-s/tau - e^-s/tau_f), and
 * (s/tau) e^-s/tau where the two meet. */
static double answer(double tau, double lag, double s)
{
    if (tau == lag)
        return s / tau * exp(-s / tau);
    return tau / (tau - lag) * exp(-s / lag) * expm1(s * (tau - lag) / (tau * lag));
}

static void what_the_start_leaves(void **state)
{
    (void)state;
    const double tau[] = {5.0, 30.0, 59.999999, 60.0, 60.000001, 300.0, 1e5}, lag = 60.0, run = 200.0, reset = 45.0;
    for (int i = 0; i < 7; i++) {
        const double t = tau[i];
        const struct bath_times times = {t, lag};
        const struct bath_step mean = bath_run(times, 1.0, run, reset, BATH_READS_MEAN),
                               middle = bath_run(times, 1.0, run, reset, BATH_READS_MIDDLE),
                               ends = bath_run(times, 1.0, run, reset, BATH_READS_ENDS);
        const char *const why = "ROUND some dozens of products";
        check_close(mean.from_x[BATH_X_NEXT], exp(-(run + reset) / t), 1e-13, why);
        check_close(mean.from_l[BATH_X_NEXT], 0.0, 0.0, why);
        check_close(mean.from_x[BATH_L_NEXT], answer(t, lag, run + reset), 1e-13, why);
        check_close(mean.from_l[BATH_L_NEXT], exp(-(run + reset) / lag), 1e-13, why);
        check_close(mean.from_l[BATH_L_MEAN], -lag / run * expm1(-run / lag), 1e-13, why);
        check_close(mean.from_x[BATH_L_MEAN], -t / run * expm1(-run / t) - lag / run * answer(t, lag, run), 1e-13, why);
        check_close(mean.from_x[BATH_READING], -t / run * expm1(-run / t), 1e-13, why);
        check_close(middle.from_x[BATH_READING], exp(-0.5 * run / t), 1e-13, why);
        check_close(ends.from_x[BATH_READING], 0.5 + 0.5 * exp(-run / t), 1e-13, why);
        check_close(mean.from_l[BATH_READING], 0.0, 1e-16, why);
    }
}

/* Gillespie 1996: the variances of x and of its mean that a step adds, and
 * their covariance. */
static void what_a_step_adds(void **state)
{
    (void)state;
    const double tau[] = {5.0, 60.0, 300.0, 1e4}, run = 200.0;
    for (int i = 0; i < 4; i++) {
        const double x = run / tau[i], decay = -expm1(-x);
        const struct bath_step step = bath_run((struct bath_times){tau[i], 60.0}, 0.1, run, 0.0, BATH_READS_MEAN);
        struct course c = {0};
        const struct outputs out = take(&c, &step);
        const double averaged = 2.0 * (x - decay) / (x * x) - decay * decay / (x * x);
        const char *const why = "ROUND some dozens of products";
        check_close(covariance(out.of[BATH_X_NEXT], out.of[BATH_X_NEXT]), -0.01 * expm1(-2.0 * x), 1e-15, why);
        check_close(covariance(out.of[BATH_READING], out.of[BATH_READING]), 0.01 * averaged, 1e-14, why);
        check_close(covariance(out.of[BATH_READING], out.of[BATH_X_NEXT]), 0.01 * decay * decay / x, 1e-15, why);
    }
}

static void a_still_bath(void **state)
{
    (void)state;
    const struct bath_times times = {300.0, 60.0};
    const struct bath_step run = bath_run(times, 0.0, 200.0, 60.0, BATH_READS_MIDDLE),
                           loud = bath_run(times, 3.0, 200.0, 60.0, BATH_READS_MIDDLE),
                           one = bath_run(times, 1.0, 200.0, 60.0, BATH_READS_MIDDLE);
    assert_memory_equal(run.from_x, one.from_x, sizeof one.from_x);
    for (int i = 0; i < BATH_OUTPUTS; i++)
        for (int j = 0; j < BATH_OUTPUTS; j++) {
            assert_true(run.noise[i][j] == 0.0);
            check_round(loud.noise[i][j], 3.0 * one.noise[i][j], 2.0);
            if (j > i)
                assert_true(one.noise[i][j] == 0.0);
        }
}

/* ---- steps that compose ---- */

static void same_law(struct sum a[4], struct sum b[4])
{
    for (int i = 0; i < 4; i++)
        for (int j = 0; j <= i; j++)
            check_close(covariance(a[i], a[j]), covariance(b[i], b[j]), 1e-13, "ROUND some dozens of products");
}

static const struct bath_times kinds[] = {{120.0, 60.0}, {60.0, 60.0}, {30.0, 60.0}, {900.0, 25.0}};
enum { KINDS = sizeof kinds / sizeof *kinds };

/* Two half runs are one whole run: state after it and both means. */
static void two_halves_are_a_whole(void **state)
{
    (void)state;
    for (int k = 0; k < KINDS; k++) {
        struct course a = stationary(kinds[k], 1.0), b = a;
        const struct bath_step whole = bath_run(kinds[k], 1.0, 240.0, 0.0, BATH_READS_MEAN),
                               half = bath_run(kinds[k], 1.0, 120.0, 0.0, BATH_READS_MEAN);
        struct outputs w = take(&a, &whole), first = take(&b, &half), h = take(&b, &half);
        for (int i = BATH_L_MEAN; i <= BATH_READING; i++)
            h.of[i] = plus(plus((struct sum){{0}}, 0.5, first.of[i]), 0.5, h.of[i]);
        same_law(w.of, h.of);
        for (int i = 0; i < BATH_OUTPUTS; i++) { /* and with the start */
            check_close(covariance(w.of[i], stationary(kinds[k], 1.0).x),
                        covariance(h.of[i], stationary(kinds[k], 1.0).x), 1e-13, "ROUND as above");
            check_close(covariance(w.of[i], stationary(kinds[k], 1.0).l),
                        covariance(h.of[i], stationary(kinds[k], 1.0).l), 1e-13, "ROUND as above");
        }
    }
}

/* A run with its reset is a run and then a time without one; an idle time is
 * one without liquid and then one with it. */
static void reset_and_wait_are_steps(void **state)
{
    (void)state;
    for (int k = 0; k < KINDS; k++) {
        struct course a = stationary(kinds[k], 1.0), b = a;
        const struct bath_step whole = bath_run(kinds[k], 1.0, 200.0, 60.0, BATH_READS_MIDDLE),
                               run = bath_run(kinds[k], 1.0, 200.0, 0.0, BATH_READS_MIDDLE),
                               reset = bath_run(kinds[k], 1.0, 60.0, 0.0, BATH_READS_MEAN);
        struct outputs w = take(&a, &whole), p = take(&b, &run);
        take(&b, &reset);
        p.of[BATH_X_NEXT] = b.x;
        p.of[BATH_L_NEXT] = b.l;
        same_law(w.of, p.of);

        struct course c = stationary(kinds[k], 1.0), d = c;
        const struct bath_step idle = bath_idle(kinds[k], 1.0, 480.0, 600.0),
                               empty = bath_run(kinds[k], 1.0, 480.0, 0.0, BATH_READS_MEAN),
                               wait = bath_run(kinds[k], 1.0, 600.0, 0.0, BATH_READS_MEAN);
        take(&c, &idle);
        take(&d, &empty);
        d.l = (struct sum){{0}}; /* poured */
        take(&d, &wait);
        same_law((struct sum[4]){c.x, c.l}, (struct sum[4]){d.x, d.l});
    }
}

/* ---- a fine simulation ---- */

enum { PATHS = 20000, FIGURES = 8 };
static const double run_s = 100.0, reset_s = 30.0, dt_s = 0.1;

/* One path by Euler's steps: x and l at the start and after the reset, mean of
 * l, and of x its mean, middle and ends. */
static void walk(struct bath_times times, gsl_rng *dice, double out[FIGURES])
{
    const long steps = lround(run_s / dt_s), all = lround((run_s + reset_s) / dt_s);
    const double share = times.correlation_s / (times.correlation_s + times.lag_s),
                 kick = sqrt(2.0 * dt_s / times.correlation_s);
    double x = gsl_ran_gaussian_ziggurat(dice, 1.0),
           l = share * x + sqrt(share * (1.0 - share)) * gsl_ran_gaussian_ziggurat(dice, 1.0);
    double sum_x = 0.0, sum_l = 0.0;
    out[0] = x;
    out[1] = l;
    out[7] = 0.5 * x;
    for (long i = 0; i < all; i++) {
        const double mean_l = l, mean_x = x;
        if (i == steps / 2)
            out[6] = x;
        if (i == steps)
            out[7] += 0.5 * x;
        l += (x - l) * dt_s / times.lag_s;
        x += kick * gsl_ran_gaussian_ziggurat(dice, 1.0) - x * dt_s / times.correlation_s;
        if (i < steps) {
            sum_x += 0.5 * (mean_x + x);
            sum_l += 0.5 * (mean_l + l);
        }
    }
    out[2] = x;
    out[3] = l;
    out[4] = sum_l / (double)steps;
    out[5] = sum_x / (double)steps;
}

/* The same figures of the exact step; those of the three readings share what
 * the rest is made of, so each comes with its own step. */
static void exact(struct bath_times times, enum bath_reads reads, struct sum out[6])
{
    struct course c = stationary(times, 1.0);
    const struct bath_step step = bath_run(times, 1.0, run_s, reset_s, reads);
    out[0] = c.x;
    out[1] = c.l;
    const struct outputs o = take(&c, &step);
    for (int i = 0; i < BATH_OUTPUTS; i++)
        out[2 + i] = o.of[i];
}

/* 5 standard errors of a covariance, sqrt((c_ii c_jj + c_ij^2)/n), false alarm
 * 6e-7 each, 4e-5 for all; Euler's own error is half of dt over the shorter
 * time constant, 0.2 %. */
static void a_fine_simulation(void **state)
{
    (void)state;
    const struct bath_times times = {40.0, 25.0};
    struct streams_state key = streams_open(streams_study_key(7, 7), STREAMS_DAY, (struct streams_place){0});
    gsl_rng *const dice = gsl_rng_alloc(streams_type);
    memcpy(gsl_rng_state(dice), &key, sizeof key);
    double sum[FIGURES][FIGURES] = {{0}};
    for (int p = 0; p < PATHS; p++) {
        double figure[FIGURES];
        walk(times, dice, figure);
        for (int i = 0; i < FIGURES; i++)
            for (int j = 0; j < FIGURES; j++)
                sum[i][j] += figure[i] * figure[j] / PATHS;
    }
    gsl_rng_free(dice);
    const enum bath_reads reads[] = {BATH_READS_MEAN, BATH_READS_MIDDLE, BATH_READS_ENDS};
    for (int r = 0; r < 3; r++) {
        struct sum of[6];
        exact(times, reads[r], of);
        for (int i = 0; i < 6; i++)
            for (int j = 0; j <= i; j++) {
                const double c = covariance(of[i], of[j]),
                             size = sqrt(covariance(of[i], of[i]) * covariance(of[j], of[j]));
                check_close(sum[i == 5 ? 5 + r : i][j == 5 ? 5 + r : j], c,
                            5.0 * sqrt((size * size + c * c) / PATHS) + 0.002 * size,
                            "STAT 5 standard errors, false alarm 6e-7, and SERIES of Euler's step");
            }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(from_a_stationary_start), cmocka_unit_test(average_of_the_bath),
        cmocka_unit_test(stationary_state),        cmocka_unit_test(what_the_start_leaves),
        cmocka_unit_test(what_a_step_adds),        cmocka_unit_test(a_still_bath),
        cmocka_unit_test(two_halves_are_a_whole),  cmocka_unit_test(reset_and_wait_are_steps),
        cmocka_unit_test(a_fine_simulation),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
