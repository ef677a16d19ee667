#include "sim/report/figure_estimates.h"

#include <math.h>
#include <stdlib.h>

#include "sim/report/say.h"

enum { MOST_BINS = 128, WANTED_BINS = 64, FEWEST_BINS = 16 };

/* Equal steps from low to high, fractions. */
struct bins {
    double low, step;
    size_t count;
    double expect[MOST_BINS], against[MOST_BINS]; /* shares of the studies */
};

static int ascending(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;
    return (x > y) - (x < y);
}

/* Widen [low, high] by the middle 99.8 % of the answers, or, of a long tail,
 * by three times the distance of the quartiles beyond them. */
static void widen(const double *values, size_t n, double *low, double *high)
{
    double *sorted = malloc((n ? n : 1) * sizeof *sorted);
    size_t answers = 0;
    if (!sorted)
        return;
    for (size_t i = 0; i < n; i++)
        if (isfinite(values[i]))
            sorted[answers++] = values[i];
    if (answers > 0) {
        qsort(sorted, answers, sizeof *sorted, ascending);
        const size_t cut = answers / 1000;
        const double lower = sorted[answers / 4], upper = sorted[answers - 1 - answers / 4];
        const double first = fmax(sorted[cut], lower - 3.0 * (upper - lower));
        const double last = fmin(sorted[answers - 1 - cut], upper + 3.0 * (upper - lower));
        if (first < *low)
            *low = first;
        if (last > *high)
            *high = last;
    }
    free(sorted);
}

/* A step of 1, 2 or 5 times a power of ten in points, so that about as many
 * bins as a histogram of n needs cover the range. */
static struct bins layout(double low, double high, size_t n)
{
    struct bins b = {.count = 0};
    double wanted = 2.0 * cbrt((double)n);
    wanted = wanted < FEWEST_BINS ? FEWEST_BINS : wanted > WANTED_BINS ? WANTED_BINS : wanted;
    const double rough = say_percent(high - low) / wanted;
    if (!(rough > 0.0) || !isfinite(rough))
        return b;
    const double ten = pow(10.0, floor(log10(rough))), lead = rough / ten;
    const double step = ten * (lead <= 1.4 ? 1.0 : lead <= 3.0 ? 2.0 : lead <= 7.0 ? 5.0 : 10.0);
    const double first = floor(say_percent(low) / step);
    b.step = step;
    b.low = first * step;
    b.count = (size_t)(floor(say_percent(high) / step) - first) + 1;
    if (b.count > MOST_BINS)
        b.count = MOST_BINS;
    return b;
}

/* Shares of all n studies; gives back the share that lies outside the bins
 * or is no answer. */
static double deal(const struct bins *b, const double *values, size_t n, double *shares)
{
    size_t inside = 0;
    for (size_t k = 0; k < b->count; k++)
        shares[k] = 0.0;
    for (size_t i = 0; i < n; i++) {
        const double place = floor((say_percent(values[i]) - b->low) / b->step);
        if (!(place >= 0.0 && place < (double)b->count))
            continue;
        shares[(size_t)place] += 1.0 / (double)n;
        inside++;
    }
    return 1.0 - (double)inside / (double)n;
}

static void rows(FILE *to, const struct bins *b, const struct question *q)
{
    fprintf(to, "from [%%],studies at %s [%%]", say_share(q->expect).text);
    if (q->has_against)
        fprintf(to, ",studies at %s [%%]", say_share(q->against).text);
    fputc('\n', to);
    for (size_t k = 0; k < b->count + 2; k++) { /* a zero at either end closes the outline */
        const bool end = k == 0 || k == b->count + 1;
        const double from = b->low + b->step * (double)(k == 0 ? 0 : k - 1);
        fprintf(to, "%s,%s", say_digits(from, 12).text, say_digits(end ? 0.0 : 100.0 * b->expect[k - 1], 6).text);
        if (q->has_against)
            fprintf(to, ",%s", say_digits(end ? 0.0 : 100.0 * b->against[k - 1], 6).text);
        fputc('\n', to);
    }
}

static void variables(FILE *to, const struct bins *b, const struct question *q, const struct outcome *o)
{
    char text[120];
    snprintf(text, sizeof text, "studies in each step of %s points / %%", say_number(b->step).text);
    gnuplot_text(to, "share_label", text);
    const bool measured = q->has_against && q->against_is == AGAINST_MEASURED;
    snprintf(text, sizeof text, measured ? "if they differ by %s points" : "if the truth is %s",
             measured ? say_points_of(o->truth).text : say_share(q->expect).text);
    gnuplot_text(to, "expect_label", text);
    snprintf(text, sizeof text, measured ? "if they do not differ" : "if the truth is %s", say_share(q->against).text);
    gnuplot_text(to, "against_label", q->has_against ? text : "");
    snprintf(text, sizeof text, measured ? "decide at %s points" : "decide at %s",
             measured ? say_points_of(o->at.critical).text : say_points(o->at.critical).text);
    gnuplot_text(to, "critical_label", q->has_against ? text : "");
    snprintf(text, sizeof text, "%.40s ± %.40s points", say_share(o->truth).text,
             say_short(say_percent(q->within), 4).text);
    gnuplot_text(to, "within_label", q->has_within ? text : "");
    gnuplot_number(to, "expect", say_percent(o->truth));
    gnuplot_text(to, "estimate_label", measured ? "estimated difference of the two / points" : "estimated head-to-head fraction / %");
    gnuplot_number(to, "within", q->has_within ? say_percent(q->within) : (double)NAN);
    gnuplot_number(to, "critical", q->has_against ? say_percent(o->at.critical) : (double)NAN);
    gnuplot_number(to, "low", b->low - b->step);
    gnuplot_number(to, "high", b->low + b->step * (double)(b->count + 1));
}

bool figure_estimates(struct figures_pen *pen, const struct question *question, const struct outcome *outcome,
                      const struct estimates *estimates)
{
    double low = outcome->truth, high = outcome->truth;
    const bool two = question->has_against && estimates->against;
    widen(estimates->expect, estimates->n, &low, &high);
    if (two)
        widen(estimates->against, estimates->n, &low, &high);
    struct bins b = layout(low, high, estimates->n);
    if (b.count == 0)
        return true; /* no scatter: nothing to draw */
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    const double outside = deal(&b, estimates->expect, estimates->n, b.expect);
    const double other = two ? deal(&b, estimates->against, estimates->n, b.against) : 0.0;
    rows(csv.stream, &b, question);
    variables(text.stream, &b, question, outcome);
    gnuplot_number(text.stream, "outside", say_percent(outside > other ? outside : other));
    return figures_draw(pen, "estimates", "estimates.gp", &csv, &text);
}
