#include "sim/judge/sobol.h"

#include <math.h>
#include <stdbool.h>

static bool whole(const double *a, const double *b, const double *mixed, size_t i)
{
    return isfinite(a[i]) && isfinite(b[i]) && isfinite(mixed[i]);
}

/* Mean of half the squared difference from `from`, over the variance; its
 * standard error by the influence of each triple on both. */
static struct sobol_share half_squares(const struct sobol *s, size_t n, const double *const sample[3], const double *from, const double mv[2])
{
    const double count = (double)s->used, mean = mv[0], variance = mv[1];
    double sum = 0.0, influence2 = 0.0;
    for (size_t i = 0; i < n; i++)
        if (whole(sample[0], sample[1], sample[2], i)) sum += (from[i] - sample[2][i]) * (from[i] - sample[2][i]) / (2.0 * variance);
    const double share = sum / count;
    for (size_t i = 0; i < n; i++) {
        if (!whole(sample[0], sample[1], sample[2], i)) continue;
        const double d = (from[i] - sample[2][i]) * (from[i] - sample[2][i]) / (2.0 * variance) - share;
        const double da = sample[0][i] - mean, db = sample[1][i] - mean;
        const double v = 0.5 * (da * da + db * db) / variance - 1.0;
        influence2 += (d - share * v) * (d - share * v);
    }
    return (struct sobol_share){share, sqrt(influence2) / count};
}

struct sobol sobol_of(size_t n, const double *a, const double *b, const double *mixed)
{
    struct sobol s = {{0.0, 0.0}, {0.0, 0.0}, 0};
    double mv[2] = {0.0, 0.0};
    for (size_t i = 0; i < n; i++) s.used += whole(a, b, mixed, i);
    if (s.used < 2) return s;
    const double count = (double)s.used;
    for (size_t i = 0; i < n; i++)
        if (whole(a, b, mixed, i)) mv[0] += 0.5 * (a[i] + b[i]) / count;
    for (size_t i = 0; i < n; i++)
        if (whole(a, b, mixed, i)) mv[1] += 0.5 * ((a[i] - mv[0]) * (a[i] - mv[0]) + (b[i] - mv[0]) * (b[i] - mv[0])) / count;
    if (!(mv[1] > 0.0)) return s;
    const double *const sample[3] = {a, b, mixed};
    s.first = half_squares(&s, n, sample, b, mv);
    s.first.value = 1.0 - s.first.value;
    s.total = half_squares(&s, n, sample, a, mv);
    return s;
}
