#include "models/bath.h"

#include <math.h>
#include <string.h>

/* State of the linear system: x, its integral over the step in units of the
 * step, and l. */
enum { X, I, L, N };

struct transition {
    double phi[N][N];   /* state after = phi state before + noise */
    double cov[N][N];   /* covariance of the noise, sigma = 1 */
};

typedef const double (*rows)[N];

static void multiply(double out[N][N], const double a[N][N], const double b[N][N])
{
    double r[N][N];
    for (int i = 0; i < N; i++)
        for (int j = 0; j < N; j++) {
            r[i][j] = 0.0;
            for (int k = 0; k < N; k++) r[i][j] += a[i][k] * b[k][j];
        }
    memcpy(out, r, sizeof r);
}

/* out = m c m^T */
static void carry_over(double out[N][N], const double m[N][N], const double c[N][N])
{
    double mt[N][N], r[N][N];
    for (int i = 0; i < N; i++)
        for (int j = 0; j < N; j++) mt[i][j] = m[j][i];
    multiply(r, m, c);
    multiply(out, (rows)r, (rows)mt);
}

/* Exact over h seconds when h is short against both time constants: the series
 * phi = sum (A h)^n/n!, cov = sum h^(n+1)/(n+1)! M^n(D), M(S) = A S + S A^T. */
static struct transition short_transition(struct bath_times times, double h)
{
    const double a[N][N] = {
        [X] = {-h / times.correlation_s, 0.0, 0.0}, [I] = {h, 0.0, 0.0}, [L] = {h / times.lag_s, 0.0, -h / times.lag_s}};
    double power[N][N] = {{1, 0, 0}, {0, 1, 0}, {0, 0, 1}};
    double spread[N][N] = {[X] = {2.0 * h / times.correlation_s, 0.0, 0.0}};
    struct transition t = {.phi = {{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}};
    for (int n = 1; n < 24; n++) {
        double left[N][N];
        multiply(left, a, (rows)spread);
        multiply(power, a, (rows)power);
        for (int i = 0; i < N; i++)
            for (int j = 0; j < N; j++) {
                t.cov[i][j] += spread[i][j] / n;
                power[i][j] /= n;
                t.phi[i][j] += power[i][j];
            }
        for (int i = 0; i < N; i++)
            for (int j = 0; j < N; j++) spread[i][j] = (left[i][j] + left[j][i]) / n;
    }
    return t;
}

/* a, then b. */
static struct transition chain(const struct transition *a, const struct transition *b)
{
    struct transition t;
    multiply(t.phi, b->phi, a->phi);
    carry_over(t.cov, b->phi, a->cov);
    for (int i = 0; i < N; i++)
        for (int j = 0; j < N; j++) t.cov[i][j] += b->cov[i][j];
    return t;
}

/* Over any time: a short step, doubled as often as it takes. No case where the
 * two time constants meet. */
static struct transition transition(struct bath_times times, double s)
{
    double h = s;
    int doublings = 0;
    while (h > 0.25 * fmin(times.correlation_s, times.lag_s)) {
        h *= 0.5;
        doublings++;
    }
    struct transition t = short_transition(times, h);
    while (doublings-- > 0) t = chain(&t, &t);
    return t;
}

/* Lower Cholesky factor of a covariance that may be singular. */
static void factor(double noise[BATH_OUTPUTS][BATH_OUTPUTS], double cov[BATH_OUTPUTS][BATH_OUTPUTS], double sigma)
{
    for (int j = 0; j < BATH_OUTPUTS; j++) {
        double d = cov[j][j];
        for (int k = 0; k < j; k++) d -= noise[j][k] * noise[j][k];
        const double root = d > 1e-14 * cov[j][j] ? sqrt(d) : 0.0;
        noise[j][j] = root;
        for (int i = j + 1; i < BATH_OUTPUTS; i++) {
            double s = cov[i][j];
            for (int k = 0; k < j; k++) s -= noise[i][k] * noise[j][k];
            noise[i][j] = root > 0.0 ? s / root : 0.0;
        }
    }
    for (int i = 0; i < BATH_OUTPUTS; i++)
        for (int j = 0; j < BATH_OUTPUTS; j++) noise[i][j] = j > i ? 0.0 : noise[i][j] * sigma;
}

/* Add g c g^T to the outputs' covariance. */
static void collect(double out[BATH_OUTPUTS][BATH_OUTPUTS], const double g[BATH_OUTPUTS][N], const double c[N][N])
{
    for (int i = 0; i < BATH_OUTPUTS; i++)
        for (int j = 0; j < BATH_OUTPUTS; j++)
            for (int k = 0; k < N; k++)
                for (int l = 0; l < N; l++) out[i][j] += g[i][k] * c[k][l] * g[j][l];
}

/* g = rows of output functionals on a later state, carried back to the state
 * before `t`, plus what they take from the state right after it. */
static void carry_back(double g[BATH_OUTPUTS][N], const double later[BATH_OUTPUTS][N], const struct transition *t, const double here[BATH_OUTPUTS][N])
{
    for (int i = 0; i < BATH_OUTPUTS; i++)
        for (int j = 0; j < N; j++) {
            double s = here[i][j];
            for (int k = 0; k < N; k++) s += later[i][k] * t->phi[k][j];
            g[i][j] = s;
        }
}

/* The whole as three steps in a row: to the middle of the run, to its end, and
 * through the reset. Each output is a sum of functionals on the states after
 * them (and on the start). */
struct functionals {
    double start[BATH_OUTPUTS][N], middle[BATH_OUTPUTS][N], end[BATH_OUTPUTS][N], after[BATH_OUTPUTS][N];
};

static struct functionals run_functionals(struct bath_times times, double run_s, enum bath_reads reads)
{
    struct functionals f = {0};
    f.after[BATH_X_NEXT][X] = 1.0;
    f.after[BATH_L_NEXT][L] = 1.0;
    /* mean of l = mean of x - tau_f (l_end - l_start)/run */
    f.end[BATH_L_MEAN][I] = 1.0 / run_s;
    f.end[BATH_L_MEAN][L] = -times.lag_s / run_s;
    f.start[BATH_L_MEAN][L] = times.lag_s / run_s;
    switch (reads) {
    case BATH_READS_MEAN: f.end[BATH_READING][I] = 1.0 / run_s; break;
    case BATH_READS_MIDDLE: f.middle[BATH_READING][X] = 1.0; break;
    case BATH_READS_ENDS:
        f.start[BATH_READING][X] = 0.5;
        f.end[BATH_READING][X] = 0.5;
        break;
    }
    return f;
}

struct bath_step bath_run(struct bath_times times, double sigma_K, double run_s, double reset_s, enum bath_reads reads)
{
    const struct transition half = transition(times, 0.5 * run_s), reset = transition(times, reset_s);
    const struct functionals f = run_functionals(times, run_s, reads);
    double g2[BATH_OUTPUTS][N], g1[BATH_OUTPUTS][N], g0[BATH_OUTPUTS][N], cov[BATH_OUTPUTS][BATH_OUTPUTS] = {{0}};
    carry_back(g2, f.after, &reset, f.end);
    carry_back(g1, (rows)g2, &half, f.middle);
    carry_back(g0, (rows)g1, &half, f.start);
    collect(cov, f.after, reset.cov);
    collect(cov, (rows)g2, half.cov);
    collect(cov, (rows)g1, half.cov);
    struct bath_step step = {0};
    for (int i = 0; i < BATH_OUTPUTS; i++) {
        step.from_x[i] = g0[i][X];
        step.from_l[i] = g0[i][L];
    }
    factor(step.noise, cov, sigma_K);
    return step;
}

/* Two stretches with a change of the liquid between them: the share `kept` of
 * l is carried from the end of the first into the second. */
static struct bath_step two_stretches(struct bath_times times, double sigma_K, double first_s, double second_s, double kept)
{
    const struct transition first = transition(times, first_s), second = transition(times, second_s);
    const int row[2] = {X, L};
    double cov[BATH_OUTPUTS][BATH_OUTPUTS] = {{0}};
    struct bath_step step = {0};
    for (int i = 0; i < 2; i++) {
        /* what output i takes of x and l at the end of the first stretch */
        const double by_x = second.phi[row[i]][X], by_l = second.phi[row[i]][L] * kept;
        step.from_x[i] = by_x * first.phi[X][X] + by_l * first.phi[L][X];
        step.from_l[i] = by_l * first.phi[L][L];
        for (int j = 0; j < 2; j++) {
            const double and_x = second.phi[row[j]][X], and_l = second.phi[row[j]][L] * kept;
            cov[i][j] = second.cov[row[i]][row[j]] + by_x * and_x * first.cov[X][X] + by_l * and_l * first.cov[L][L] +
                        (by_x * and_l + by_l * and_x) * first.cov[X][L];
        }
    }
    factor(step.noise, cov, sigma_K);
    return step;
}

struct bath_step bath_idle(struct bath_times times, double sigma_K, double empty_s, double wait_s)
{
    return two_stretches(times, sigma_K, empty_s, wait_s, 0.0);
}

struct bath_step bath_addition(struct bath_times times, double sigma_K, double mix_s, double wait_s, double kept)
{
    return two_stretches(times, sigma_K, mix_s, wait_s, kept);
}
