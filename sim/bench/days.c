#include "sim/bench/days.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>

/* The day being filled. */
struct day {
    struct design *d;
    double clock_s;
    bool opened; /* holds a filling of a solution */
};

static void put(struct day *day, struct notebook_filling filling)
{
    struct design *const d = day->d;
    filling.day = d->layout.days - 1;
    day->clock_s += design_filling_s(d, &filling);
    d->filling[d->layout.fillings++] = filling;
}

static void open_day(struct day *day)
{
    struct design *const d = day->d;
    const bool water = d->layout.days == 0 || d->plan->habits.water_every_day;
    d->nominal_clock_s += day->clock_s;
    d->layout.days++;
    day->clock_s = 0.0;
    day->opened = false;
    for (size_t i = 0; water && i < d->plan->water_fillings; i++)
        put(day, (struct notebook_filling){.water = true, .series = SERIES, .number = i, .runs = d->plan->water_runs});
}

/* False when even an empty day cannot hold the filling. */
static bool take(struct day *day, struct notebook_filling filling)
{
    struct design *const d = day->d;
    const double seconds = design_filling_s(d, &filling), limit = d->plan->habits.working_day_s * (1.0 + 1e-12);
    if (day->clock_s + seconds > limit && day->opened) open_day(day);
    if (day->clock_s + seconds > limit) {
        if (d->why[0] == '\0')
            snprintf(d->why, sizeof d->why, "a day must hold its water and one filling, %.2f h, but working_day is %.2f h: %.2f h are missing",
                     (day->clock_s + seconds) / 3600.0, limit / 3600.0, (day->clock_s + seconds - limit) / 3600.0);
        return false;
    }
    put(day, filling);
    day->opened = true;
    return true;
}

bool days_lay_out(struct design *d)
{
    const struct plan *const p = d->plan;
    size_t solutions = 0;
    for (size_t s = 0; s < SERIES; s++) solutions += p->levels[s] * p->fillings[s];
    /* at most one day per filling, each with its water */
    d->filling = calloc((solutions + 1) * (1 + p->water_fillings), sizeof *d->filling);
    if (!d->filling) return false;
    d->layout.filling = d->filling;
    d->layout.stride = (p->runs > p->water_runs ? p->runs : p->water_runs) + p->habits.spare_runs;
    struct day day = {.d = d};
    open_day(&day);
    for (size_t i = 1; i < d->liquids && d->why[0] == '\0'; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        for (size_t n = 0; n < p->fillings[q->series]; n++)
            if (!take(&day, (struct notebook_filling){.series = q->series, .level = q->level, .number = n, .runs = p->runs})) return true;
    }
    d->nominal_clock_s += day.clock_s;
    return true;
}
