#include "sim/bench/flasks.h"

#include <math.h>
#include <stdio.h>

static double per_filling_m3(const struct plan *p)
{
    return p->tube.charge_m3 + p->habits.rinse_m3;
}

/* The volume asked for, or the smallest flask that holds `needed`; 0 when that
 * is not to be had. */
static double choose(double asked_m3, double needed_m3)
{
    if (asked_m3 == 0.0) return glassware_fit(needed_m3);
    return asked_m3 >= needed_m3 * (1.0 - 1e-12) ? asked_m3 : 0.0;
}

static double flask_u(double asked_tolerance_m3, double volume_m3, enum glass_class glass)
{
    double tolerance = asked_tolerance_m3;
    if (tolerance < 0.0 && !glassware_tolerance_of(volume_m3, glass, &tolerance)) tolerance = 0.0;
    return glassware_standard_uncertainty(tolerance);
}

static void missing(struct design *d, const char *what, double needed_m3, double asked_m3)
{
    if (d->why[0] != '\0') return;
    const double largest = asked_m3 > 0.0 ? asked_m3 : glassware_flask_volume(GLASSWARE_FLASKS - 1);
    snprintf(d->why, sizeof d->why, "%s must hold %.1f mL, but %s holds %.0f mL: %.1f mL are missing", what, needed_m3 * 1e6,
             asked_m3 > 0.0 ? "the one asked for" : "the largest flask", largest * 1e6, (needed_m3 - largest) * 1e6);
}

/* What dilution in the tube cannot do. */
static void check_in_tube(struct design *d)
{
    const struct plan *const p = d->plan;
    double most = 0.0;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) most = fmax(most, d->liquid[i].volume_m3);
    if (!p->tube.suspended_level)
        snprintf(d->why, sizeof d->why, "dilution in the tube needs a suspended-level tube, which %s is not", p->tube.name);
    else if (p->solutions.shared_stock)
        snprintf(d->why, sizeof d->why, "dilution in the tube needs a stock for each series, not a shared one");
    else if (most > p->tube.capacity_m3 * (1.0 + 1e-12))
        snprintf(d->why, sizeof d->why, "%s must hold %.1f mL for the lowest level, but its capacity is %.1f mL: %.1f mL are missing", p->tube.name,
                 most * 1e6, p->tube.capacity_m3 * 1e6, (most - p->tube.capacity_m3) * 1e6);
}

static void choose_level_flask(struct design *d)
{
    const struct solutions *const so = &d->plan->solutions;
    double needed = 0.0;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++)
        if (d->liquid[i].diluted) needed = fmax(needed, (double)d->plan->fillings[d->liquid[i].series] * per_filling_m3(d->plan));
    if (needed == 0.0) return;
    d->flasks.level_m3 = choose(so->level_volume_m3, needed);
    if (d->flasks.level_m3 == 0.0) missing(d, "a level's flask", needed, so->level_volume_m3);
}

/* What the stock that serves series first..last must hold. */
static double stock_needed(const struct design *d, size_t first, size_t last)
{
    double needed = 0.0;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        if (q->series < first || q->series > last) continue;
        if (d->plan->dilution == DILUTION_IN_TUBE && q->diluted) continue;
        needed += q->diluted ? d->flasks.level_m3 * q->conc_kg_m3 / d->flasks.stock_conc_kg_m3[q->series]
                             : (double)d->plan->fillings[q->series] * per_filling_m3(d->plan);
    }
    return needed;
}

static void choose_stock(struct design *d, size_t first, size_t last)
{
    static const char *const name[SERIES] = {"the stock of the intact polymer", "the stock of the cleaved polymer"};
    const struct solutions *const so = &d->plan->solutions;
    const double needed = stock_needed(d, first, last), V = choose(so->stock_volume_m3, needed);
    if (V == 0.0) missing(d, first == last ? name[first] : "the shared stock", needed, so->stock_volume_m3);
    const double mass = d->flasks.stock_conc_kg_m3[first] * V;
    for (size_t s = first; s <= last; s++) {
        d->flasks.stock_m3[s] = V;
        d->flasks.weighing_u[s] = V > 0.0 ? hypot(so->balance_u_kg / mass, flask_u(so->stock_tolerance_m3, V, so->glass) / V) : 0.0;
    }
    d->polymer_kg += mass;
}

static void dilution_uncertainty(struct design *d, struct design_liquid *q)
{
    const struct solutions *const so = &d->plan->solutions;
    const double Vf = d->flasks.level_m3;
    if (!q->diluted || Vf == 0.0) return;
    const double taken = Vf * q->conc_kg_m3 / d->flasks.stock_conc_kg_m3[q->series];
    q->pipette_u = glassware_standard_uncertainty(so->delivery_tolerance_m3) / taken;
    q->delivery_u = so->delivery_u_m3 / taken;
    q->flask_u = flask_u(so->level_tolerance_m3, Vf, so->glass) / Vf;
}

void flasks_choose(struct design *d)
{
    const bool shared = d->plan->solutions.shared_stock, in_tube = d->plan->dilution == DILUTION_IN_TUBE;
    double top[SERIES] = {0};
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) top[d->liquid[i].series] = d->liquid[i].conc_kg_m3; /* rising */
    for (size_t s = 0; s < SERIES; s++) d->flasks.stock_conc_kg_m3[s] = shared ? fmax(top[INTACT], top[CLEAVED]) : top[s];
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        struct design_liquid *const q = &d->liquid[i];
        const double share = q->conc_kg_m3 / d->flasks.stock_conc_kg_m3[q->series];
        q->diluted = share < 1.0 - 1e-12;
        q->reagent = q->series != CLEAVED ? 0.0 : d->plan->cleavage.blank_diluent ? 1.0 : share;
    }
    if (in_tube)
        check_in_tube(d);
    else
        choose_level_flask(d);
    if (shared)
        choose_stock(d, INTACT, CLEAVED);
    else
        for (size_t s = 0; s < SERIES; s++) choose_stock(d, s, s);
    for (size_t i = DESIGN_LEVELS; !in_tube && i < d->liquids; i++) dilution_uncertainty(d, &d->liquid[i]);
}

double flasks_preparation_s(const struct design *d, const struct cost_rules *cost)
{
    const double stocks = d->plan->solutions.shared_stock ? 1.0 : 2.0;
    double seconds = stocks * cost->weigh_and_dissolve_s + cost->cleavage_s;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++)
        if (d->liquid[i].diluted && d->plan->dilution == DILUTION_FLASKS) seconds += cost->dilution_s;
    return seconds;
}
