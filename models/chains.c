#include "models/chains.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Sums run in so many strands side by side. */
enum { STRANDS = 8 };

/* A distribution worked out: P and its tails, each times x^(1+a), for x = 1 ..
 * length (a multiple of STRANDS; zeros behind). */
struct sums {
    size_t length;
    double *p, *q, *r; /* x^(1+a) P, 2 x^(1+a) Q, x^(1+a) R */
};

/* The density, not normalised; theta is the location. */
struct density {
    enum chains_kind kind;
    double k, variance, theta, ln_theta;
};

/* At N, whose logarithm is given too. */
static double density_at(const struct density *d, double N, double ln_N)
{
    const double z = ln_N - d->ln_theta;
    if (d->kind == CHAINS_SCHULZ_ZIMM) return exp((d->k - 1.0) * z - d->k * (N / d->theta - 1.0)); /* near 1 at its top */
    return exp(-0.5 * z * z / d->variance) / N;
}

static void move_to(struct density *d, double theta)
{
    d->theta = theta;
    d->ln_theta = log(theta);
}

/* Beyond this N less than 1e-12 of the moment N^m is left: eight standard
 * deviations of the moment's own logarithm, or the tail of a gamma density. */
static double furthest(const struct density *d, double m)
{
    if (d->kind == CHAINS_LOG_NORMAL) return d->theta * exp(m * d->variance + 7.3 * sqrt(d->variance));
    const double shape = d->k + m;
    return d->theta / d->k * (shape + 8.0 * sqrt(shape) + 32.0);
}

/* Moments of the discrete distribution: sums of P, N P, and N^m P. */
static void moments(const struct density *d, double m, double out[3])
{
    const size_t last = (size_t)ceil(furthest(d, m));
    out[0] = out[1] = out[2] = 0.0;
    for (size_t N = 1; N <= last; N++) {
        const double x = (double)N, ln_x = log(x), p = density_at(d, x, ln_x);
        out[0] += p;
        out[1] += p * x;
        out[2] += p * x * (m == 2.0 ? x : m == 1.0 ? 1.0 : exp((m - 1.0) * ln_x));
    }
}

/* The average asked for, in units, at the present theta. */
static double average_of(const struct density *d, enum polymer_average average, double a)
{
    double m[3];
    switch (average) {
    case AVERAGE_NUMBER: moments(d, 1.0, m); return m[1] / m[0];
    case AVERAGE_WEIGHT: moments(d, 2.0, m); return m[2] / m[1];
    default: moments(d, 1.0 + a, m); return pow(m[2] / m[1], 1.0 / a);
    }
}

/* The same of the continuous density with theta = 1: where to begin. */
static double continuous_average(const struct density *d, enum polymer_average average, double a)
{
    const double m = average == AVERAGE_NUMBER ? 0.0 : average == AVERAGE_WEIGHT ? 1.0 : a;
    if (d->kind == CHAINS_LOG_NORMAL) return exp(d->variance * (average == AVERAGE_NUMBER ? 0.5 : 1.0 + 0.5 * m));
    if (average == AVERAGE_NUMBER) return 1.0;
    return exp((lgamma(d->k + 1.0 + m) - lgamma(d->k + 1.0)) / m) / d->k;
}

/* Solve theta: the average is nearly proportional to it. */
static void locate(struct density *d, const struct chains_shape *shape, double a)
{
    double before = 0.0, gap_before = 0.0;
    move_to(d, shape->units / continuous_average(d, shape->average, a));
    for (int i = 0; i < 30; i++) {
        const double gap = average_of(d, shape->average, a) / shape->units - 1.0, now = d->theta;
        if (fabs(gap) < 1e-13) return;
        const double slope = i == 0 || gap == gap_before ? 1.0 / now : (gap - gap_before) / (now - before);
        before = now;
        gap_before = gap;
        move_to(d, now - gap / slope);
        if (fabs(gap) < 1e-7) return; /* what is left is of the square of that */
    }
}

static bool make_room(struct sums *s, size_t last)
{
    s->length = (last + STRANDS) / STRANDS * STRANDS;
    s->p = calloc(3 * s->length, sizeof *s->p);
    if (!s->p) return false;
    s->q = s->p + s->length;
    s->r = s->q + s->length;
    return true;
}

/* From P alone to all three: tails from behind, then the powers. Returns xn. */
static double finish(struct sums *s, double a)
{
    double sum = 0.0, tail = 0.0, beyond = 0.0, xn = 0.0;
    for (size_t i = 0; i < s->length; i++) sum += s->p[i];
    for (size_t i = s->length; i-- > 0;) {
        s->p[i] /= sum;
        s->q[i] = tail;   /* Q(x): all longer */
        s->r[i] = beyond; /* R(x) = sum of Q beyond x */
        beyond += tail;
        tail += s->p[i];
    }
    for (size_t i = 0; i < s->length; i++) {
        const double x = (double)(i + 1), power = exp((1.0 + a) * log(x));
        xn += x * s->p[i];
        s->p[i] *= power;
        s->q[i] *= 2.0 * power;
        s->r[i] *= power;
    }
    return xn;
}

/* F(d) term by term, until rho^x has nothing left to add. */
static double exact(const struct sums *s, double d)
{
    const double rho = 1.0 - d;
    double factor[STRANDS], sum[STRANDS] = {0}, total = 0.0, all = 1.0;
    for (int l = 0; l < STRANDS; l++) {
        factor[l] = all;
        all *= rho;
    }
    const double stop = d > 0.0 ? 60.0 / -log1p(-d) : (double)INFINITY;
    const size_t last = stop < (double)s->length ? ((size_t)stop + STRANDS) / STRANDS * STRANDS : s->length;
    for (size_t i = 0; i < last && i < s->length; i += STRANDS)
        for (int l = 0; l < STRANDS; l++) {
            sum[l] += factor[l] * (s->p[i + (size_t)l] + d * (s->q[i + (size_t)l] + d * s->r[i + (size_t)l]));
            factor[l] *= all;
        }
    for (int l = 0; l < STRANDS; l++) total += sum[l];
    return total;
}

/* The panels: Chebyshev series of ln F through their nodes, over d in the
 * first and over ln d in the others. */
static void tabulate(struct chains *c, const struct sums *s)
{
    enum { N = CHAINS_TERMS };
    const double pi = 3.14159265358979323846;
    c->first_d = fmin(0.125 / c->xn, 0.5 * CHAINS_MOST_CUT);
    for (c->panels = 1; c->panels < CHAINS_PANELS && ldexp(c->first_d, c->panels - 1) < CHAINS_MOST_CUT; c->panels++) {}
    for (int panel = 0; panel < c->panels; panel++) {
        double value[N];
        for (int k = 0; k < N; k++) {
            const double u = cos(pi * (k + 0.5) / N);
            const double d = panel == 0 ? 0.5 * c->first_d * (1.0 + u) : ldexp(c->first_d, panel - 1) * exp2(0.5 * (1.0 + u));
            value[k] = log(exact(s, d));
        }
        for (int j = 0; j < N; j++) {
            double sum = 0.0;
            for (int k = 0; k < N; k++) sum += value[k] * cos(pi * j * (k + 0.5) / N);
            c->term[panel][j] = sum * (j == 0 ? 1.0 : 2.0) / N;
        }
    }
}

static double clenshaw(const double *term, double u)
{
    double b1 = 0.0, b2 = 0.0;
    for (int j = CHAINS_TERMS - 1; j > 0; j--) {
        const double b = term[j] + 2.0 * u * b1 - b2;
        b2 = b1;
        b1 = b;
    }
    return term[0] + u * b1 - b2;
}

/* All that is kept of a distribution whose P stands in s->p. */
static void keep(struct chains *c, struct sums *s, double a)
{
    c->xn = finish(s, a);
    c->whole = exact(s, 0.0);
    for (int i = 0; i < CHAINS_FIRST && (size_t)i < s->length; i++) {
        c->piece[0][i] = s->p[i];
        c->piece[1][i] = s->q[i];
        c->piece[2][i] = s->r[i];
    }
    tabulate(c, s);
    free(s->p);
}

static bool from_density(struct chains *c, struct chains_shape shape, double a)
{
    struct density d = {.kind = shape.kind, .k = 1.0 / (shape.dispersity - 1.0), .variance = log(shape.dispersity)};
    struct sums s;
    locate(&d, &shape, a);
    const size_t last = (size_t)ceil(furthest(&d, shape.average == AVERAGE_WEIGHT ? 2.0 : 1.0 + a));
    if (!make_room(&s, last)) return false;
    for (size_t i = 0; i < last; i++) s.p[i] = density_at(&d, (double)(i + 1), log((double)(i + 1)));
    keep(c, &s, a);
    return true;
}

static bool from_one_length(struct chains *c, double units, double a)
{
    struct sums s;
    const size_t N = units < 1.5 ? 1 : (size_t)floor(units + 0.5);
    if (!make_room(&s, N)) return false;
    s.p[N - 1] = 1.0;
    keep(c, &s, a);
    return true;
}

static void from_most_probable(struct chains *c, struct chains_shape shape)
{
    switch (shape.average) {
    case AVERAGE_NUMBER: c->xn = shape.units; break;
    case AVERAGE_WEIGHT: c->xn = 0.5 * (shape.units + 1.0); break; /* xw = 2 xn - 1 */
    case AVERAGE_VISCOSITY: c->xn = polymer_xn_of_xv(&c->sums, shape.units); break;
    }
    c->whole = chains_pieces(c, 0.0);
}

bool chains_make(struct chains *c, struct chains_shape shape, double a)
{
    bool ok = true;
    memset(c, 0, sizeof *c);
    c->kind = shape.kind;
    polymer_sums_make(&c->sums, a);
    switch (shape.kind) {
    case CHAINS_MOST_PROBABLE: from_most_probable(c, shape); break;
    case CHAINS_UNIFORM: ok = from_one_length(c, shape.units, a); break;
    default: ok = from_density(c, shape, a); break;
    }
    c->xv = pow(c->whole / c->xn, 1.0 / a);
    return ok;
}

/* n(x) = (1/q) (1-w)^2 w^(x-1), w = (1-q)(1-d): most-probable stays so. */
static double most_probable(const struct chains *c, double d)
{
    const double q = 1.0 / c->xn, one_minus_w = q + d - q * d;
    if (!(one_minus_w > 0.0 && one_minus_w < 2.0)) return (double)NAN;
    return c->xn * one_minus_w * one_minus_w * polymer_phi(&c->sums, 1.0 - one_minus_w, one_minus_w);
}

/* The second root's pieces are short. */
static double short_pieces(const struct chains *c, double d)
{
    double sum = 0.0, factor = 1.0;
    for (int i = 0; i < CHAINS_FIRST && fabs(factor) > 1e-30; i++) {
        sum += factor * (c->piece[0][i] + d * (c->piece[1][i] + d * c->piece[2][i]));
        factor *= 1.0 - d;
    }
    return sum;
}

double chains_pieces(const struct chains *c, double d)
{
    if (c->kind == CHAINS_MOST_PROBABLE) return most_probable(c, d);
    if (d >= 0.5) return short_pieces(c, d);
    if (d <= c->first_d) return d < 0.0 ? (double)NAN : exp(clenshaw(c->term[0], 2.0 * d / c->first_d - 1.0));
    int panel;
    const double part = frexp(d / c->first_d, &panel); /* d/first = part 2^panel, part in [1/2, 1) */
    if (part == 0.5) return exp(clenshaw(c->term[panel - 1], 1.0));
    return panel < c->panels ? exp(clenshaw(c->term[panel], 2.0 * log2(2.0 * part) - 1.0)) : (double)NAN;
}
