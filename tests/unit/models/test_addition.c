/* Adding solvent to what is in the tube: the joint step of bath and liquid over
 * the mixing and the wait, against the response of the linear system to noise,
 * integrated here.
 * Bath: dx = -x/tau dt + sqrt(2/tau) dW; liquid: tau_f dl/dt = x - l; both in
 * units of the bath's standard deviation. Source: model.md, bath and liquid. */
#include "check.h"

#include <math.h>
#include <stdlib.h>

#include "models/bath.h"

/* What x and l are u seconds after a unit of x (l = 0): exp(-u/tau), and the
 * liquid's answer to it. Unlike time constants. */
static double answer(struct bath_times t, double u)
{
    const double alpha = 1.0 / t.correlation_s, beta = 1.0 / t.lag_s;
    return beta * (exp(-alpha * u) - exp(-beta * u)) / (beta - alpha);
}

/* An addition as asked for. */
struct addition {
    struct bath_times times;
    double sigma_K, mix_s, wait_s, kept;
};

/* The answer at the end to noise u seconds before it. */
static void kernel(const struct addition *a, double u, double out[2])
{
    const double alpha = 1.0 / a->times.correlation_s, beta = 1.0 / a->times.lag_s;
    out[0] = exp(-alpha * u);
    if (u <= a->wait_s)
        out[1] = answer(a->times, u);
    else /* in the first stretch: by what x and what is kept of l do in the second */
        out[1] = answer(a->times, a->wait_s) * exp(-alpha * (u - a->wait_s)) + exp(-beta * a->wait_s) * a->kept * answer(a->times, u - a->wait_s);
}

/* Covariance of the noise: 2/tau times the integral of kernel products, by
 * Simpson's rule on each stretch. */
static void covariance(const struct addition *a, double out[2][2])
{
    enum { STEPS = 4000 };
    const double edge[3] = {0.0, a->wait_s, a->wait_s + a->mix_s};
    for (int i = 0; i < 4; i++) out[i / 2][i % 2] = 0.0;
    for (int part = 0; part < 2; part++) {
        const double h = (edge[part + 1] - edge[part]) / STEPS;
        for (int k = 0; k <= STEPS && h > 0.0; k++) {
            double at[2];
            const double weight = (k == 0 || k == STEPS ? 1.0 : k % 2 ? 4.0 : 2.0) * h / 3.0;
            /* the second stretch starts just beyond the edge */
            kernel(a, part == 1 && k == 0 ? nextafter(edge[1], 1e9) : edge[part] + k * h, at);
            for (int i = 0; i < 2; i++)
                for (int j = 0; j < 2; j++) out[i][j] += weight * 2.0 / a->times.correlation_s * at[i] * at[j];
        }
    }
}

static struct bath_step step_of(const struct addition *a)
{
    return bath_addition(a->times, a->sigma_K, a->mix_s, a->wait_s, a->kept);
}

static double noise_covariance(const struct bath_step *s, int i, int j)
{
    double sum = 0.0;
    for (int k = 0; k < BATH_OUTPUTS; k++) sum += s->noise[i][k] * s->noise[j][k];
    return sum;
}

static const struct addition additions[] = {
    {{300.0, 60.0}, 0.02, 180.0, 600.0, 0.7}, {{60.0, 300.0}, 0.3, 180.0, 120.0, 0.4}, {{30.0, 100.0}, 1.0, 50.0, 40.0, 1.0},
    {{1000.0, 20.0}, 0.1, 5.0, 90.0, 0.55},   {{120.0, 45.0}, 0.5, 200.0, 10.0, 0.0},  {{120.0, 45.0}, 0.5, 60.0, 0.0, 0.8},
};
enum { ADDITIONS = sizeof additions / sizeof *additions };

/* Means and covariance. SERIES: Simpson's rule with 4000 steps, h^4/180 of a
 * fourth derivative below (1/20 s)^4: 1e-9 at most. */
static void against_the_integrals(void **state)
{
    (void)state;
    for (size_t n = 0; n < ADDITIONS; n++) {
        const struct addition *const a = &additions[n];
        const double alpha = 1.0 / a->times.correlation_s, beta = 1.0 / a->times.lag_s, total = a->mix_s + a->wait_s;
        const struct bath_step s = step_of(a);
        double cov[2][2], from_x[2];
        kernel(a, nextafter(total, 1e9), from_x); /* a unit of x at the start */
        for (int i = 0; i < 2; i++) check_close(s.from_x[i], from_x[i], 1e-12, "ROUND a dozen doublings of a step");
        check_close(s.from_l[BATH_X_NEXT], 0.0, 0.0, "TEXT the bath does not know the liquid");
        check_close(s.from_l[BATH_L_NEXT], a->kept * exp(-beta * total), 1e-12, "ROUND a dozen doublings of a step");
        check_close(s.from_x[BATH_X_NEXT], exp(-alpha * total), 1e-12, "ROUND a dozen doublings of a step");
        covariance(a, cov);
        for (int i = 0; i < 2; i++)
            for (int j = 0; j < 2; j++)
                check_close(noise_covariance(&s, i, j), a->sigma_K * a->sigma_K * cov[i][j], 1e-8 * a->sigma_K * a->sigma_K, "SERIES Simpson's rule");
    }
}

static void alike(const struct bath_step *a, const struct bath_step *b, double sigma_K)
{
    for (int i = 0; i < 2; i++) {
        check_close(a->from_x[i], b->from_x[i], 1e-13, "ROUND a dozen doublings of a step");
        check_close(a->from_l[i], b->from_l[i], 1e-13, "ROUND a dozen doublings of a step");
        for (int j = 0; j < 2; j++)
            check_close(noise_covariance(a, i, j), noise_covariance(b, i, j), 1e-13 * sigma_K * sigma_K, "ROUND a dozen doublings of a step");
    }
}

/* All kept: it does not matter where the stretch is parted. */
static void all_kept_is_one_longer_stretch(void **state)
{
    (void)state;
    for (size_t n = 0; n < ADDITIONS; n++) {
        struct addition a = additions[n], b = a;
        const double total = a.mix_s + a.wait_s;
        a.kept = b.kept = 1.0;
        a.mix_s = 0.3 * total;
        a.wait_s = 0.7 * total;
        b.mix_s = 0.0;
        b.wait_s = total;
        const struct bath_step x = step_of(&a), y = step_of(&b);
        alike(&x, &y, a.sigma_K);
    }
}

/* Nothing kept: the liquid is new, as when the tube is filled. */
static void nothing_kept_is_a_fresh_filling(void **state)
{
    (void)state;
    for (size_t n = 0; n < ADDITIONS; n++) {
        struct addition a = additions[n];
        a.kept = 0.0;
        const struct bath_step x = step_of(&a), y = bath_idle(a.times, a.sigma_K, a.mix_s, a.wait_s);
        alike(&x, &y, a.sigma_K);
        check_close(x.from_l[BATH_L_NEXT], 0.0, 0.0, "TEXT nothing is left");
    }
}

/* Where bath and liquid have settled they stay: with all kept the covariance of
 * both, sigma^2 (1, s; s, s), s = tau/(tau + tau_f), is carried into itself. */
static void settled_stays_settled(void **state)
{
    (void)state;
    for (size_t n = 0; n < ADDITIONS; n++) {
        struct addition a = additions[n];
        a.kept = 1.0;
        const struct bath_step s = step_of(&a);
        const double share = a.times.correlation_s / (a.times.correlation_s + a.times.lag_s), v = a.sigma_K * a.sigma_K;
        const double before[2][2] = {{v, v * share}, {v * share, v * share}};
        for (int i = 0; i < 2; i++)
            for (int j = 0; j < 2; j++) {
                const double f[2][2] = {{s.from_x[i], s.from_l[i]}, {s.from_x[j], s.from_l[j]}};
                double after = noise_covariance(&s, i, j);
                for (int k = 0; k < 2; k++)
                    for (int l = 0; l < 2; l++) after += f[0][k] * before[k][l] * f[1][l];
                check_close(after, before[i][j], 1e-12 * v, "ROUND a dozen doublings of a step");
            }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(against_the_integrals), cmocka_unit_test(all_kept_is_one_longer_stretch),
                                       cmocka_unit_test(nothing_kept_is_a_fresh_filling), cmocka_unit_test(settled_stays_settled)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
