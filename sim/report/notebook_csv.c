#include "sim/report/notebook_csv.h"

#include <math.h>

#include "sim/report/say.h"

/* How many decimals a value has that is a multiple of the resolution. */
static int decimals(double resolution)
{
    enum { MOST = 9 };
    if (!(resolution > 0.0))
        return MOST;
    int n = 0;
    for (double r = resolution; n < MOST && fabs(r - round(r)) > 1e-9 * r; n++)
        r = resolution * pow(10.0, n + 1);
    return n;
}

/* A comment never breaks its line. */
static void comment(FILE *to, const char *label, const char *text)
{
    if (!text || !*text)
        return;
    fprintf(to, "# %s", label);
    for (; *text; text++)
        fputc((unsigned char)*text < ' ' ? ' ' : *text, to);
    fputc('\n', to);
}

static void count(FILE *to, size_t n)
{
    if (n > 0)
        fprintf(to, "%zu", n);
    fputc(',', to);
}

static void line(FILE *to, const struct notebook_csv *n, const struct notebook_row *row)
{
    if (n->preparations)
        count(to, row->preparation);
    count(to, row->day);
    if (isfinite(row->started_s)) {
        const unsigned long minutes = (unsigned long)floor(say_minutes(row->started_s));
        fprintf(to, "%lu:%02lu", minutes / 60, minutes % 60);
    }
    fprintf(to, ",%s,", row->solution);
    count(to, row->level);
    if (isfinite(row->concentration_kg_m3))
        fprintf(to, "%.10g", say_g_dL(row->concentration_kg_m3));
    fputc(',', to);
    count(to, row->filling);
    count(to, row->run);
    if (isfinite(row->time_s))
        fprintf(to, "%.*f", decimals(n->timer_resolution_s), row->time_s);
    fputc(',', to);
    if (isfinite(row->temperature_K))
        fprintf(to, "%.*f", decimals(n->thermometer_resolution_K), say_celsius(row->temperature_K));
    fputs(",\n", to);
}

void notebook_csv_print(FILE *to, const struct notebook_csv *notebook)
{
    static const char *const invented[] = {"Invented times: a simulated study, nothing here was measured.", NULL};
    comment(to, "", notebook->title);
    comment(to, "Plan: ", notebook->plan);
    for (const char *const *remark = notebook->remarks ? notebook->remarks : invented; *remark; remark++)
        comment(to, "", *remark);
    if (notebook->preparations)
        fputs("preparation,", to);
    fputs("day,started,solution,level,concentration [g/dL],filling,run,time [s],temperature [degC],note\n", to);
    for (size_t i = 0; i < notebook->count; i++)
        line(to, notebook, &notebook->rows[i]);
}

bool notebook_csv_write(const char *path, const struct notebook_csv *notebook, struct files_failure *failure)
{
    struct files_text text = {0};
    bool good = files_text_open(&text);
    if (good) {
        notebook_csv_print(text.stream, notebook);
        good = files_text_close(&text);
    }
    if (good)
        good = files_write(path, text.bytes, text.size, failure);
    else
        snprintf(failure->text, sizeof failure->text, "%s: out of memory", path);
    files_text_free(&text);
    return good;
}
