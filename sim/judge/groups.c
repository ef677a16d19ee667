#include "sim/judge/groups.h"

#include <stdlib.h>
#include <string.h>

/* The keys that say how a notebook is reduced. */
static bool reduces(const char *key)
{
    static const char *const keys[] = {"extrapolation", "weighting", "density", "kinetic_energy", "chain_statistics"};
    for (size_t i = 0; i < sizeof keys / sizeof *keys; i++)
        if (strcmp(key, keys[i]) == 0) return true;
    return false;
}

/* A candidate and the number of its bench work. */
struct numbered {
    size_t bench, index;
};

static int by_bench(const void *a, const void *b)
{
    const struct numbered *const x = a, *const y = b;
    if (x->bench != y->bench) return x->bench < y->bench ? -1 : 1;
    return x->index < y->index ? -1 : x->index > y->index;
}

/* The first thermometer in the list that has the calibration_u of this one;
 * known[] remembers what each option's is (below 0: not yet seen). */
static size_t stand_in(const double *known, size_t options, double calibration_u_K)
{
    for (size_t i = 0; i < options; i++)
        if (known[i] == calibration_u_K) return i;
    return options;
}

static size_t bench_number(const struct scenario *s, size_t index, const double *known)
{
    struct plan plan;
    scenario_plan(s, index, &plan);
    size_t number = 0;
    for (size_t k = 0; k < scenario_keys(s); k++) {
        const char *const key = scenario_key(s, k);
        if (reduces(key)) continue;
        size_t option = scenario_option_of(s, index, k);
        if (!plan.temperature_record && strcmp(key, "thermometer") == 0) option = stand_in(known, scenario_options(s, k), plan.thermometer.calibration_u_K);
        number = number * scenario_options(s, k) + option;
    }
    return number;
}

/* calibration_u of each thermometer option, taken from the first candidate
 * that uses it. */
static double *calibrations(const struct scenario *s)
{
    size_t key = 0;
    while (key < scenario_keys(s) && strcmp(scenario_key(s, key), "thermometer") != 0) key++;
    const size_t options = key < scenario_keys(s) ? scenario_options(s, key) : 0;
    double *const known = malloc((options + 1) * sizeof *known);
    size_t left = options;
    if (!known) return NULL;
    for (size_t i = 0; i < options; i++) known[i] = -1.0;
    for (size_t i = 0; left > 0 && i < scenario_candidates(s); i++) {
        const size_t option = scenario_option_of(s, i, key);
        if (known[option] >= 0.0) continue;
        struct plan plan;
        scenario_plan(s, i, &plan);
        known[option] = plan.thermometer.calibration_u_K;
        left--;
    }
    return known;
}

static void cut(struct groups *out, const struct numbered *list, size_t n)
{
    for (size_t i = 0; i < n; i++) {
        if (i == 0 || list[i].bench != list[i - 1].bench) out->group[out->count++] = (struct group){i, 0};
        out->group[out->count - 1].count++;
        out->member[i] = list[i].index;
    }
}

bool groups_make(const struct scenario *s, struct groups *out)
{
    const size_t n = scenario_candidates(s);
    double *const known = calibrations(s);
    struct numbered *const list = malloc(n * sizeof *list);
    *out = (struct groups){0, malloc(n * sizeof *out->group), malloc(n * sizeof *out->member)};
    const bool ok = known && list && out->group && out->member;
    if (ok) {
        for (size_t i = 0; i < n; i++) list[i] = (struct numbered){bench_number(s, i, known), i};
        qsort(list, n, sizeof *list, by_bench);
        cut(out, list, n);
    } else
        groups_free(out);
    free(list);
    free(known);
    return ok;
}

void groups_free(struct groups *g)
{
    free(g->group);
    free(g->member);
    g->group = NULL;
    g->member = NULL;
}

bool groups_same(const struct scenario *s, size_t a, size_t b)
{
    struct plan x, y;
    scenario_plan(s, a, &x);
    scenario_plan(s, b, &y);
    const bool one_thermometer = !x.temperature_record && x.thermometer.calibration_u_K == y.thermometer.calibration_u_K;
    for (size_t k = 0; k < scenario_keys(s); k++) {
        const char *const key = scenario_key(s, k);
        if (reduces(key) || (one_thermometer && strcmp(key, "thermometer") == 0)) continue;
        if (scenario_option_of(s, a, k) != scenario_option_of(s, b, k)) return false;
    }
    return true;
}
