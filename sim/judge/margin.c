#include "sim/judge/margin.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "sim/judge/bar.h"
#include "sim/judge/exchange.h"
#include "sim/judge/trial.h"

/* Studies behind each look. */
enum { MARGIN_STUDIES = 4096 };

enum directions { UP = 1, DOWN = 2 };

/* The conditions that can be bought or controlled, and which way is bad. The
 * part of a plan that a section is compiled into starts at `part`. */
static const struct condition {
    const char *section, *key, *name;
    int directions;
    size_t part;
} conditions[] = {
    {"kit.baths", "fluctuation", "bath fluctuation", UP, offsetof(struct plan, bath)},
    {"kit.baths", "drift_u", "bath drift", UP, offsetof(struct plan, bath)},
    {"kit.baths", "gradient_u", "gradient in the bath", UP, offsetof(struct plan, bath)},
    {"kit.thermometers", "reading_u", "thermometer reading", UP, offsetof(struct plan, thermometer)},
    {"kit.timers", "hand_u", "hand scatter", UP, offsetof(struct plan, timer)},
    {"kit.timers", "meniscus_u", "reading of the marks", UP, offsetof(struct plan, timer)},
    {"bench", "filling_u", "filling scatter", UP, offsetof(struct plan, habits)},
    {"bench", "tilt_u", "tilt", UP, offsetof(struct plan, habits)},
    {"bench", "charge_u", "charge", UP, offsetof(struct plan, habits)},
    {"solutions", "dry_content_u", "dry content", UP, offsetof(struct plan, solutions)},
    {"solutions", "balance_u", "balance", UP, offsetof(struct plan, solutions)},
    {"solutions", "delivery_tolerance", "delivery tolerance", UP, offsetof(struct plan, solutions)},
    {"bench", "bubble_chance", "bubble chance", UP, offsetof(struct plan, habits)},
    {"cleavage", "conversion", "conversion", DOWN, offsetof(struct plan, cleavage)},
    {"polymer", "hydrolysis", "hydrolysis", DOWN, offsetof(struct plan, material)},
    {"bench", "carry_over", "carry-over", UP, offsetof(struct plan, habits)},
    {"polymer", "eta_u", "uncertainty of K", UP, offsetof(struct plan, material)},
    {"polymer", "a_u", "uncertainty of a", UP, offsetof(struct plan, material)},
    {"kit.grades", "molar_mass", "molar mass of the grade", UP | DOWN, offsetof(struct plan, grade)},
    {"plan", "top", "top relative viscosity, intact", UP | DOWN, 0},
    {"plan", "top_cleaved", "top relative viscosity, cleaved", UP | DOWN, 0},
};

const char *margin_verdict_text(enum margin_verdict verdict)
{
    static const char *const text[] = {"margin", "whole range", "fails already"};
    return text[verdict];
}

/* One condition of one plan being followed. */
struct following {
    const struct scenario *s;
    const struct plan *plan;
    const struct condition *c;
    struct scenario_quantity quantity;
    struct margin *out;
};

/* A condition that plays no part in this plan, or in this question. */
static bool idle(const struct scenario *s, const struct plan *p, const struct condition *c)
{
    if (strcmp(c->key, "charge_u") == 0) return p->tube.suspended_level;
    if (strcmp(c->key, "reading_u") == 0) return !p->temperature_record;
    if (strcmp(c->section, "polymer") == 0 && strstr(c->key, "_u")) return scenario_question(s)->against_is == AGAINST_SAME_CONSTANTS;
    return false;
}

static double *value_in(struct plan *plan, const struct following *f)
{
    return (double *)(void *)((unsigned char *)plan + f->c->part + f->quantity.offset);
}

/* Chain lengths again, where the molar mass or the mean unit changed. */
static bool remake_chains(struct plan *p, struct chains *chains)
{
    const double unit = polymer_unit_kg_mol(p->material.hydrolysis, p->material.repeat_unit_kg_mol, p->material.ester_unit_kg_mol);
    const struct chains_shape shape = {p->grade.distribution, p->grade.dispersity, p->grade.average, p->grade.molar_mass_kg_mol / unit};
    p->chains = chains;
    return chains_make(chains, shape, p->material.a);
}

static void note(struct margin *m, double at, double figure)
{
    if (m->points == MARGIN_POINTS) return;
    m->at[m->points] = at;
    m->figure[m->points++] = figure;
}

/* The margin over the bar in standard errors with the condition at `at` (in its
 * unit); below zero it fails, far below when it is impossible. */
static bool look(const struct following *f, double at, double *margin)
{
    struct plan plan = *f->plan;
    struct chains chains;
    *value_in(&plan, f) = at * f->quantity.si;
    const bool lengths = strcmp(f->c->key, "molar_mass") == 0 || strcmp(f->c->key, "hydrolysis") == 0;
    if (lengths && !remake_chains(&plan, &chains)) return false;
    struct exchange_look found;
    if (!exchange_margin(f->s, &plan, MARGIN_STUDIES, &found)) return false;
    note(f->out, at, found.figure);
    *margin = found.margin;
    return true;
}

/* Between a value that resolves and one that fails: bisection with secants. */
static bool close_in(const struct following *f, double good, double bad, const double margins[2])
{
    double at_good = margins[0], at_bad = margins[1];
    const double tolerance = 0.01, origin = strcmp(f->c->section, "plan") == 0 ? 1.0 : 0.0; /* a relative viscosity counts from 1 */
    for (int i = 0; i < 14 && fabs(bad - good) > tolerance * fmax(fabs(good - origin), fabs(bad - origin)); i++) {
        /* a straight line says nothing of where it fails altogether */
        double part = at_bad < -30.0 ? 0.5 : at_good / (at_good - at_bad), margin;
        part = fmin(fmax(part, 0.15), 0.85);
        const double middle = good + part * (bad - good);
        if (!look(f, middle, &margin)) return false;
        if (margin >= 0.0) {
            good = middle;
            at_good = margin;
        } else {
            bad = middle;
            at_bad = margin;
        }
    }
    f->out->worst = good;
    f->out->se = fabs(bad - good) / fmax(at_good - at_bad, 1e-9); /* one standard error of the figure, along the slope */
    return true;
}

/* From nominal outwards, the distance doubling, to the first failure or the
 * end of the range. */
static bool follow(const struct following *f)
{
    struct margin *const m = f->out;
    const double end = m->up ? f->quantity.max : f->quantity.min, sign = m->up ? 1.0 : -1.0;
    double distance = fmax(0.25 * fabs(m->nominal), 1e-3 * (f->quantity.max - f->quantity.min)), good = m->nominal, at_good;
    if (strncmp(f->c->section, "plan", 4) == 0) distance = 0.1;
    if (!look(f, good, &at_good)) return false;
    m->worst = good;
    m->verdict = MARGIN_FAILS_ALREADY;
    if (at_good < 0.0) return true;
    for (;;) {
        double at = m->nominal + sign * distance, margin;
        const bool last = m->up ? at >= end : at <= end;
        /* the end itself may not be taken (a relative viscosity of 1) */
        if (last) at = end + (good - end) * 1e-3;
        if (!look(f, at, &margin)) return false;
        if (margin < 0.0) {
            m->verdict = MARGIN_FOUND;
            return close_in(f, good, at, (const double[2]){at_good, margin});
        }
        good = at;
        at_good = margin;
        if (last) break;
        distance *= 2.0;
    }
    m->worst = end;
    m->verdict = MARGIN_WHOLE_RANGE;
    return true;
}

/* The path in the scenario; an entry of the kit by its name. */
static void name_path(char *out, size_t size, const struct plan *p, const struct condition *c)
{
    const char *entry = NULL;
    if (strcmp(c->section, "kit.baths") == 0) entry = p->bath.name;
    if (strcmp(c->section, "kit.thermometers") == 0) entry = p->thermometer.name;
    if (strcmp(c->section, "kit.timers") == 0) entry = p->timer.name;
    if (strcmp(c->section, "kit.grades") == 0) entry = p->grade.name;
    snprintf(out, size, "%s%s%s.%s", c->section, entry ? "." : "", entry ? entry : "", c->key);
}

static bool follow_all(const struct scenario *s, const struct plan *plan, struct margin_options options, struct margins *out)
{
    const size_t count = sizeof conditions / sizeof *conditions;
    for (size_t i = 0; i < count; i++) {
        struct following f = {.s = s, .plan = plan, .c = &conditions[i]};
        if (idle(s, plan, f.c) || !scenario_quantity(s, f.c->section, f.c->key, &f.quantity)) continue;
        for (int direction = UP; direction <= DOWN; direction *= 2) {
            if (!(f.c->directions & direction)) continue;
            struct plan copy = *plan;
            f.out = &out->margin[out->count++];
            *f.out = (struct margin){.name = f.c->name, .unit = f.quantity.unit, .up = direction == UP, .nominal = *value_in(&copy, &f) / f.quantity.si};
            name_path(f.out->key, sizeof f.out->key, plan, f.c);
            if (!follow(&f)) return false;
        }
        if (options.progress) options.progress(options.context, (double)(i + 1) / (double)(count + 1));
    }
    return true;
}

bool margin_run(const struct scenario *s, const struct plan *plan, struct margin_options options, struct margins *out)
{
    memset(out, 0, sizeof *out);
    if (!trial_run(s, plan, (struct trial_options){0}, &out->outcome, NULL)) return false;
    if (out->outcome.studies == 0) return true;
    return follow_all(s, plan, options, out) && exchange_find(s, plan, &out->exchange, &out->has_exchange);
}
