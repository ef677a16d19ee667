#include "sim/reduce/notebook.h"

#include <string.h>

static size_t runs_bytes(const struct notebook_layout *layout)
{
    return layout->fillings * layout->stride * sizeof(struct notebook_run);
}

size_t notebook_size(const struct notebook_layout *layout)
{
    return runs_bytes(layout) + layout->fillings * LANES;
}

struct notebook notebook_place(const struct notebook_layout *layout, void *memory)
{
    unsigned char *const bytes = memory;
    struct notebook book = {.layout = layout, .run = memory};
    book.made = (unsigned char(*)[LANES])(bytes + runs_bytes(layout));
    return book;
}

LANES_WIDE void notebook_bring_to_set(const struct assumed *a, struct notebook_run *run)
{
    if (!a->record)
        memcpy(run->at_set_s, run->time_s, sizeof run->at_set_s);
    else
        FOR_LANES(l) run->at_set_s[l] = assumed_at_set(a, run->time_s[l], run->read_K[l]);
}

/* Spans that differ by less are a tie: times are read to 0.01 s or coarser, and
 * their differences carry rounding. */
static const double tie_s = 1e-9;

static void sort(double *x, size_t n)
{
    for (size_t i = 1; i < n; i++) {
        const double v = x[i];
        size_t j = i;
        for (; j > 0 && x[j - 1] > v; j--) x[j] = x[j - 1];
        x[j] = v;
    }
}

double notebook_best(const struct notebook *book, size_t filling, int lane, double best[])
{
    const struct notebook_run *const run = notebook_runs(book, filling);
    const size_t n = book->layout->filling[filling].runs, made = book->made[filling][lane];
    double sorted[NOTEBOOK_MAX_RUNS];
    for (size_t i = 0; i < made; i++) sorted[i] = run[i].at_set_s[lane];
    sort(sorted, made);
    size_t first = 0;
    double least = sorted[n - 1] - sorted[0];
    for (size_t i = 1; i + n <= made; i++)
        if (sorted[i + n - 1] - sorted[i] < least - tie_s) {
            least = sorted[i + n - 1] - sorted[i];
            first = i;
        }
    memcpy(best, sorted + first, n * sizeof *best);
    return least;
}

static double mean(const double *x, size_t n)
{
    double sum = 0.0;
    for (size_t i = 0; i < n; i++) sum += x[i];
    return sum / (double)n;
}

bool notebook_agrees(const struct assumed *a, const struct notebook *book, size_t filling, int lane)
{
    const size_t n = book->layout->filling[filling].runs;
    double best[NOTEBOOK_MAX_RUNS];
    return n == 1 || notebook_best(book, filling, lane, best) <= a->agreement * mean(best, n);
}

LANES_WIDE void notebook_agree(const struct assumed *a, const struct notebook *book, size_t filling, bool out[LANES])
{
    const struct notebook_run *const run = notebook_runs(book, filling);
    const size_t n = book->layout->filling[filling].runs;
    double least[LANES], most[LANES], sum[LANES] = {0};
    FOR_LANES(l) least[l] = most[l] = run[0].at_set_s[l];
    for (size_t i = 0; i < n; i++)
        FOR_LANES(l)
        {
            const double t = run[i].at_set_s[l];
            least[l] = t < least[l] ? t : least[l];
            most[l] = t > most[l] ? t : most[l];
            sum[l] += t;
        }
    FOR_LANES(l) out[l] = most[l] - least[l] <= a->agreement * (sum[l] / (double)n);
}

void notebook_filling_time(const struct assumed *a, const struct notebook *book, size_t filling, double out_s[LANES])
{
    const size_t n = book->layout->filling[filling].runs;
    const struct notebook_run *const run = notebook_runs(book, filling);
    double sum[LANES] = {0};
    for (size_t i = 0; i < n; i++) FOR_LANES(l) sum[l] += run[i].at_set_s[l];
    FOR_LANES(l) out_s[l] = sum[l] / (double)n;
    FOR_LANES(l)
    {
        if (a->combine == COMBINE_MEAN && book->made[filling][l] == n) continue; /* nothing to choose */
        double best[NOTEBOOK_MAX_RUNS];
        notebook_best(book, filling, l, best);
        out_s[l] = a->combine == COMBINE_MEAN ? mean(best, n) : 0.5 * (best[(n - 1) / 2] + best[n / 2]);
    }
}
