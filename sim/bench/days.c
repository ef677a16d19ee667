#include "sim/bench/days.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/bench/draws.h"

/* The day being filled. */
struct day {
    struct design *d;
    double clock_s;
    double kept_s;      /* kept free for the water at its end */
    size_t waters;      /* fillings of water so far */
    bool opened;        /* holds a filling of a solution */
    bool blank;         /* a blank of this day, or one that holds for it, is there */
    bool full;          /* a day could not hold what it must; d->why says so */
};

/* What is taken as a whole: a filling of a level, or a loading of the tube. */
struct portion {
    size_t series, level, number;
};

static void put(struct day *day, struct notebook_filling filling)
{
    struct design *const d = day->d;
    filling.day = d->layout.days - 1;
    day->clock_s += design_filling_s(d, &filling);
    d->filling[d->layout.fillings++] = filling;
}

static struct notebook_filling of_water(const struct plan *p, size_t number)
{
    return (struct notebook_filling){.water = true, .series = SERIES, .number = number, .runs = p->water_runs};
}

static struct notebook_filling of_blank(const struct plan *p, size_t number)
{
    return (struct notebook_filling){.blank = true, .series = SERIES, .number = number, .runs = p->water_runs};
}

static void put_water(struct day *day, size_t count)
{
    for (size_t i = 0; i < count; i++) put(day, of_water(day->d->plan, day->waters++));
}

/* How many of a day's water fillings stand at its end. */
static size_t at_the_end(const struct plan *p)
{
    return p->order == ORDER_BRACKETED ? p->water_fillings / 2 : 0;
}

static void close_day(struct day *day)
{
    if (day->waters > 0) put_water(day, at_the_end(day->d->plan));
    day->d->nominal_clock_s += day->clock_s;
}

static void open_day(struct day *day)
{
    struct design *const d = day->d;
    const struct plan *const p = d->plan;
    const bool water = d->layout.days == 0 || p->habits.water_every_day;
    const struct notebook_filling last = of_water(p, 0);
    if (d->layout.days > 0) close_day(day);
    d->layout.days++;
    day->clock_s = 0.0;
    day->waters = 0;
    day->opened = false;
    if (p->habits.water_every_day) day->blank = false;
    day->kept_s = water ? (double)at_the_end(p) * design_filling_s(d, &last) : 0.0;
    if (water) put_water(day, p->water_fillings - at_the_end(p));
}

/* The fillings of a portion, in the order of the bench. */
static size_t fillings_of(const struct design *d, struct portion portion, struct notebook_filling out[PLAN_MAX_LEVELS])
{
    const struct plan *const p = d->plan;
    const struct notebook_filling one = {.series = portion.series, .level = portion.level, .number = portion.number, .runs = p->runs};
    size_t count = 0;
    out[count++] = one;
    if (p->dilution == DILUTION_FLASKS) return count;
    for (size_t level = portion.level; level-- > 0;) { /* from concentrated to dilute */
        out[count] = one;
        out[count].level = level;
        out[count++].added = true;
    }
    return count;
}

static bool needs_blank(const struct day *day, struct portion portion)
{
    return day->d->plan->cleavage.blank_reference && portion.series == CLEAVED && !day->blank;
}

static double seconds_of(const struct day *day, struct portion portion)
{
    struct notebook_filling filling[PLAN_MAX_LEVELS];
    const struct notebook_filling blank = of_blank(day->d->plan, 0);
    const size_t count = fillings_of(day->d, portion, filling);
    double seconds = needs_blank(day, portion) ? (double)day->d->plan->water_fillings * design_filling_s(day->d, &blank) : 0.0;
    for (size_t i = 0; i < count; i++) seconds += design_filling_s(day->d, &filling[i]);
    return seconds;
}

static bool fits(const struct day *day, struct portion portion)
{
    return day->clock_s + seconds_of(day, portion) + day->kept_s <= day->d->plan->habits.working_day_s * (1.0 + 1e-12);
}

static void refuse(struct day *day, struct portion portion)
{
    const double needed = (day->clock_s + seconds_of(day, portion) + day->kept_s) / 3600.0, hours = day->d->plan->habits.working_day_s / 3600.0;
    day->full = true;
    if (day->d->why[0] != '\0') return;
    snprintf(day->d->why, sizeof day->d->why, "a day must hold its water%s and one %s, %.2f h, but working_day is %.2f h: %.2f h are missing",
             needs_blank(day, portion) ? ", its blank" : "", day->d->plan->dilution == DILUTION_FLASKS ? "filling" : "loading", needed, hours,
             needed - hours);
}

static void take(struct day *day, struct portion portion)
{
    struct notebook_filling filling[PLAN_MAX_LEVELS];
    if (!fits(day, portion) && day->opened) open_day(day);
    if (!fits(day, portion)) {
        refuse(day, portion);
        return;
    }
    for (size_t i = 0; needs_blank(day, portion) && i < day->d->plan->water_fillings; i++) put(day, of_blank(day->d->plan, i));
    if (portion.series == CLEAVED) day->blank = true;
    const size_t count = fillings_of(day->d, portion, filling);
    for (size_t i = 0; i < count; i++) put(day, filling[i]);
    day->opened = true;
}

/* All portions in order: intact, then cleaved, each from dilute to
 * concentrated, all fillings of a level one after the other. Returns how many. */
static size_t list_portions(const struct plan *p, struct portion *out)
{
    size_t count = 0;
    for (size_t s = 0; s < SERIES; s++) {
        const size_t first = p->dilution == DILUTION_IN_TUBE ? p->levels[s] - 1 : 0;
        for (size_t level = first; level < p->levels[s]; level++)
            for (size_t n = 0; n < p->fillings[s]; n++) out[count++] = (struct portion){s, level, n};
    }
    return count;
}

static void check_order(struct design *d)
{
    const struct plan *const p = d->plan;
    if (p->order != ORDER_BRACKETED || d->why[0] != '\0') return;
    if (p->water_fillings < 2)
        snprintf(d->why, sizeof d->why, "a bracketed order needs two water fillings on each day: one is missing");
    else if (!p->habits.water_every_day)
        snprintf(d->why, sizeof d->why, "a bracketed order needs water on every day");
}

bool days_lay_out(struct design *d)
{
    const struct plan *const p = d->plan;
    struct portion portion[SERIES * PLAN_MAX_LEVELS * PLAN_MAX_FILLINGS];
    size_t order[SERIES * PLAN_MAX_LEVELS * PLAN_MAX_FILLINGS];
    const size_t count = list_portions(p, portion);
    for (size_t i = 0; i < count; i++) order[i] = i;
    if (p->order == ORDER_SHUFFLED) draws_deal(p->seed, count, order);
    /* at most one portion a day, each with its water and blank */
    d->filling = calloc(count * (PLAN_MAX_LEVELS + 2 * p->water_fillings), sizeof *d->filling);
    if (!d->filling) return false;
    d->layout.filling = d->filling;
    d->layout.stride = (p->runs > p->water_runs ? p->runs : p->water_runs) + p->habits.spare_runs;
    check_order(d);
    struct day day = {.d = d};
    open_day(&day);
    for (size_t i = 0; i < count && !day.full; i++) take(&day, portion[order[i]]);
    close_day(&day);
    return true;
}
