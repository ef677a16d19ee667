#include "sim/report/candidates_csv.h"

#include <string.h>

#include "sim/report/say.h"

void candidates_csv_field(FILE *to, const char *text)
{
    if (!strpbrk(text, ",\"\r\n")) {
        fputs(text, to);
        return;
    }
    fputc('"', to);
    for (; *text; text++) {
        if (*text == '"')
            fputc('"', to);
        fputc(*text, to);
    }
    fputc('"', to);
}

static void number(FILE *to, double x)
{
    fprintf(to, ",%s", say_number(x).text);
}

/* A figure and its standard error. */
static void pair(FILE *to, double x, double se)
{
    number(to, x);
    number(to, se);
}

static void heading(FILE *to, const struct scenario *s)
{
    static const char *const fractions[] = {
        "mean",          "bias",   "sd",       "rmse",  "interval low",      "interval high", "shortest low",
        "shortest high", "within", "critical", "power", "plain false alarm", "no answer"};
    fputs("index", to);
    for (size_t k = 0; k < scenario_keys(s); k++)
        fprintf(to, ",%s", scenario_key(s, k));
    fputs(",status,why,studies [1]", to);
    for (size_t i = 0; i < sizeof fractions / sizeof *fractions; i++)
        fprintf(to, ",%s [1],%s se [1]", fractions[i], fractions[i]);
    fputs(",spare runs [1],spare runs se [1],bench time [h],bench time se [h],hours [h],hours se [h],money [", to);
    candidates_csv_field(to, scenario_cost(s)->currency);
    fputs("],money se [", to);
    candidates_csv_field(to, scenario_cost(s)->currency);
    fputs("],days [1],polymer [g],margin [se]\n", to);
}

static void figures(FILE *to, const struct outcome *o)
{
    const struct figures *a = &o->at, *e = &o->se;
    fprintf(to, ",%zu", o->studies);
    pair(to, a->mean, e->mean);
    pair(to, a->bias, e->bias);
    pair(to, a->sd, e->sd);
    pair(to, a->rmse, e->rmse);
    pair(to, a->interval.low, e->interval.low);
    pair(to, a->interval.high, e->interval.high);
    pair(to, a->shortest.low, e->shortest.low);
    pair(to, a->shortest.high, e->shortest.high);
    pair(to, a->within, e->within);
    pair(to, a->critical, e->critical);
    pair(to, a->power, e->power);
    pair(to, a->plain_false_alarm, e->plain_false_alarm);
    pair(to, a->no_answer, e->no_answer);
    pair(to, a->spare_runs, e->spare_runs);
    pair(to, say_hours(a->clock_s), say_hours(e->clock_s));
    pair(to, say_hours(a->hours_s), say_hours(e->hours_s));
    pair(to, a->money, e->money);
    fprintf(to, ",%zu", o->days);
    number(to, say_g(o->polymer_kg));
    number(to, o->margin_se);
}

static void line(FILE *to, const struct scenario *s, const struct search_result *r, size_t index)
{
    const struct outcome *o = &r->candidates[index].outcome;
    fprintf(to, "%zu", index);
    for (size_t k = 0; k < scenario_keys(s); k++) {
        fputc(',', to);
        candidates_csv_field(to, scenario_option(s, k, scenario_option_of(s, index, k)));
    }
    fprintf(to, ",%s,", outcome_status_text(o->status));
    candidates_csv_field(to, o->why);
    if (o->studies > 0) {
        figures(to, o);
    } else {
        enum { FIGURES = 38 }; /* columns behind why */
        for (int i = 0; i < FIGURES; i++)
            fputc(',', to);
    }
    fputc('\n', to);
}

void candidates_csv_print(FILE *to, const struct scenario *scenario, const struct search_result *search)
{
    heading(to, scenario);
    for (size_t i = 0; i < search->count; i++)
        line(to, scenario, search, i);
}
