/* Power where it is known exactly: the dry content is the only source, so that
 * the estimate is a falling function of one normal deviate z, the same under
 * both fractions. The critical value is the estimate under `against` at
 * z = -1.6449, and power is Phi(z*) where the estimate under `expect` equals
 * it: found by bisection through a bench worked by hand, without any study.
 * Source: checks.md section 3 (Currie; the Monte Carlo error of power). */
#include "bench/sample.h"

#include "sim/base/spread.h"
#include "sim/judge/bar.h"
#include "sim/judge/play.h"

static const double expect = 0.015, against = 0.0149, z_level = -1.6448536;

struct exact {
    struct scenario *s;
    struct plan p;
    struct still_bench b;
    struct still_hand *hand;
    double z_star, critical, power, se_over_binomial;
};

static double estimate(struct exact *x, double fraction, double z)
{
    FOR_LANES(l) x->hand->draws.polymer[DRAWS_DRY_CONTENT][l] = z;
    still_hand_work(x->hand, fraction);
    return still_hand_reduce(x->hand).delta[0];
}

static double slope(struct exact *x, double fraction, double z)
{
    return (estimate(x, fraction, z + 1e-4) - estimate(x, fraction, z - 1e-4)) / 2e-4;
}

/* z at which the estimate under `expect` is the critical value. */
static double find(struct exact *x)
{
    double low = -8.0, high = 8.0;
    x->critical = estimate(x, against, z_level);
    while (high - low > 1e-10) {
        const double z = 0.5 * (low + high);
        *(estimate(x, expect, z) > x->critical ? &low : &high) = z;
    }
    return low;
}

static double phi(double x)
{
    return exp(-0.5 * x * x) / sqrt(2.0 * acos(-1.0));
}

/* The dry content's uncertainty is set so that power is 0.90: z* = 1.2816. */
static int set_up(void **state)
{
    struct exact *const x = calloc(1, sizeof *x);
    assert_non_null(x);
    x->p = still_short_plan(&x->s);
    for (size_t k = 0; k < SERIES; k++) x->p.levels[k] = 2;
    x->p.analysis.extrapolation = MARTIN;
    still_open(&x->b, &x->p, x->s, expect);
    x->hand = still_hand_open(&x->b.design);
    double low = 1e-4, high = 0.05;
    while (high - low > 1e-10) {
        x->p.solutions.dry_content_u = 0.5 * (low + high);
        *(find(x) > 1.2815516 ? &low : &high) = x->p.solutions.dry_content_u;
    }
    x->z_star = find(x);
    x->power = 0.5 * erfc(-x->z_star / sqrt(2.0));
    const double ratio = phi(x->z_star) / fabs(slope(x, expect, x->z_star)) * fabs(slope(x, against, z_level)) / phi(z_level), c = 0.95;
    x->se_over_binomial = sqrt((0.09 + ratio * ratio * c * (1.0 - c) - 2.0 * ratio * ((1.0 - c) - (1.0 - c) * 0.9)) / 0.09);
    *state = x;
    return 0;
}

static int tear_down(void **state)
{
    struct exact *const x = *state;
    still_hand_close(x->hand);
    still_close(&x->b);
    scenario_free(x->s);
    free(x);
    return 0;
}

static void played(const struct exact *x, uint64_t seed, size_t n, struct bar_power *power)
{
    const struct question q = {.expect = expect, .against = against, .has_against = true, .confidence = 0.95, .power = 0.9};
    struct play play;
    play_start(&play, &x->b.design, seed);
    play.fractions = 2;
    play.fraction[0] = expect;
    play.fraction[1] = against;
    play.analyses = 1;
    play.analysis[0] = x->p.analysis;
    play.active[0] = true;
    assert_true(play_until(&play, n));
    assert_true(bar_power_of(&q, play.sample[0].delta[0], play.sample[0].delta[1], n, power));
    play_free(&play);
}

/* The premises: the estimate falls with z under both fractions, and the error
 * of power is that of a shift 1.529 (TABLE; but for the
 * curvature, SERIES 1 %: the two fractions lie close together). */
static void premises(void **state)
{
    struct exact *const x = *state;
    double before[2] = {(double)INFINITY, (double)INFINITY};
    for (double z = -4.5; z <= 4.5; z += 0.25)
        for (int k = 0; k < 2; k++) {
            const double now = estimate(x, k ? against : expect, z);
            assert_true(now < before[k]);
            before[k] = now;
        }
    print_message("dry content %.4f %%, critical %.5f %%, power %.6f, error %.4f times the binomial one\n", 100.0 * x->p.solutions.dry_content_u,
                  100.0 * x->critical, x->power, x->se_over_binomial);
    still_near("power", x->power, 0.9, 1e-6);
    still_close_to("error of power", x->se_over_binomial, 1.529, 0.01);
}

/* STAT: 4.5 standard errors from normal theory, 7e-6 each, seed fixed. */
static void against_the_exact_value(void **state)
{
    struct exact *const x = *state;
    enum { N = 40000 };
    struct bar_power power;
    played(x, 5, N, &power);
    still_near("power", power.power, x->power, 4.5 * x->se_over_binomial * sqrt(0.09 / N));
    const double critical_se = sqrt(0.95 * 0.05 / N) / phi(z_level) * fabs(slope(x, against, z_level));
    still_near("critical value", power.critical, x->critical, 4.5 * critical_se);
    still_close_to("its printed error", power.critical_se, critical_se, 0.06); /* kernel density: 1.3 % times 4.5 */
}

/* The spread of power over many seeds is what theory says, about 1.53 times
 * the binomial error, and bar_power_se prints it. STAT: of a spread over 1500
 * seeds 1/sqrt(3000) = 1.8 %, times 4.5 8.2 %; of the mean of the printed
 * errors 1 %, and SERIES: densities smoothed over 0.67 sd, 3 %. */
static void true_error_of_power(void **state)
{
    const struct exact *const x = *state;
    enum { SEEDS = 1500, N = 500 };
    const struct question q = {.expect = expect, .against = against, .has_against = true, .confidence = 0.95, .power = 0.9};
    struct sample power = {0}, printed = {0};
    for (uint64_t seed = 1; seed <= SEEDS; seed++) {
        struct bar_power at;
        played(x, seed, N, &at);
        sample_add(&power, at.power);
        sample_add(&printed, bar_power_se(&q, &at, 0.9, N));
    }
    const double binomial = sqrt(0.09 / N);
    print_message("spread %.4f, printed %.4f times the binomial error\n", sample_sd(&power) / binomial, printed.mean / binomial);
    still_near("mean power", power.mean, 0.9, 0.002); /* the quantile's bias, of order 1/N */
    still_close_to("spread", sample_sd(&power) / binomial, x->se_over_binomial, 0.082);
    still_close_to("printed", printed.mean / binomial, x->se_over_binomial, 0.04);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(premises), cmocka_unit_test(against_the_exact_value), cmocka_unit_test(true_error_of_power)};
    spread_set_threads(1); /* tests run side by side */
    return cmocka_run_group_tests(tests, set_up, tear_down);
}
