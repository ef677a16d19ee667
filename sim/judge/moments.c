#include "sim/judge/moments.h"

#include <gsl/gsl_sort.h>
#include <math.h>

struct moments moments_of(const double *x, size_t n)
{
    const double count = (double)n;
    double sum = 0.0, m2 = 0.0, m4 = 0.0;
    for (size_t i = 0; i < n; i++) sum += x[i];
    const double mean = sum / count;
    for (size_t i = 0; i < n; i++) {
        const double d2 = (x[i] - mean) * (x[i] - mean);
        m2 += d2;
        m4 += d2 * d2;
    }
    const double variance = m2 / (count - 1.0), sd = sqrt(variance);
    const double of_variance = fmax(m4 / count - variance * variance * (count - 3.0) / (count - 1.0), 0.0) / count;
    return (struct moments){mean, sd, sd / sqrt(count), sd > 0.0 ? sqrt(of_variance) / (2.0 * sd) : 0.0};
}

void moments_sort(double *x, size_t n)
{
    gsl_sort(x, 1, n);
}

double moments_quantile(const double *sorted, size_t n, double p)
{
    const double at = p * (double)(n - 1);
    const size_t i = (size_t)at;
    if (i + 1 >= n) return sorted[n - 1];
    const double part = at - (double)i;
    return part == 0.0 ? sorted[i] : sorted[i] + part * (sorted[i + 1] - sorted[i]);
}

/* q of JCGM 101, 7.7.1: how many values an interval spans. */
static size_t spanned(size_t n, double p)
{
    const double product = p * (double)n, whole = rint(product);
    const double q = fabs(product - whole) < 1e-9 * product ? whole : floor(product + 0.5);
    return q < (double)n ? (size_t)q : n - 1;
}

struct interval moments_symmetric(const double *sorted, size_t n, double p)
{
    const size_t q = spanned(n, p), left = n - q;
    const size_t r = left % 2 == 0 ? left / 2 : (left + 1) / 2;
    return (struct interval){sorted[r - 1], sorted[r + q - 1]};
}

struct interval moments_shortest(const double *sorted, size_t n, double p)
{
    const size_t q = spanned(n, p);
    size_t best = 0;
    for (size_t r = 1; r + q < n; r++)
        if (sorted[r + q] - sorted[r] < sorted[best + q] - sorted[best]) best = r;
    return (struct interval){sorted[best], sorted[best + q]};
}

double moments_scale(const double *sorted, size_t n)
{
    const double quartiles = (moments_quantile(sorted, n, 0.75) - moments_quantile(sorted, n, 0.25)) / 1.349;
    const double sd = moments_of(sorted, n).sd;
    return quartiles > 0.0 && quartiles < sd ? quartiles : sd;
}

double moments_density(const double *x, size_t n, double scale, double at)
{
    const double h = 2.34 * scale * pow((double)n, -0.2);
    if (!(h > 0.0)) return 0.0;
    double sum = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double u = (x[i] - at) / h;
        if (u > -1.0 && u < 1.0) sum += 1.0 - u * u;
    }
    return 0.75 * sum / ((double)n * h);
}

double moments_tolerance(double u, int digits)
{
    const double power = pow(10.0, floor(log10(u)) - digits + 1);
    const double written = rint(u / power) * power; /* may gain a digit: 9.96 to two is 10 */
    return 0.5 * pow(10.0, floor(log10(written) + 1e-12) - digits + 1);
}
