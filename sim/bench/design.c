#include "sim/bench/design.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "models/solution.h"
#include "sim/bench/days.h"
#include "sim/bench/flasks.h"

size_t design_liquid_of(const struct design *d, const struct notebook_filling *filling)
{
    if (filling->water) return DESIGN_WATER;
    if (filling->blank) return DESIGN_BLANK;
    return DESIGN_LEVELS + filling->level + (filling->series == CLEAVED ? d->plan->levels[INTACT] : 0);
}

double design_filling_s(const struct design *d, const struct notebook_filling *filling)
{
    const struct habits *const h = &d->plan->habits;
    const double run_s = d->liquid[design_liquid_of(d, filling)].nominal_s + h->reset_s;
    return (filling->added ? h->add_and_mix_s : h->clean_and_fill_s) + h->equilibrate_s + (double)filling->runs * run_s;
}

/* Most-probable lengths take no time to work out; others come with the plan. */
static bool lay_lengths(struct design *d)
{
    const struct material *const m = &d->plan->material;
    const struct grade *const g = &d->plan->grade;
    const double unit = polymer_unit_kg_mol(m->hydrolysis, m->repeat_unit_kg_mol, m->ester_unit_kg_mol);
    if (g->distribution == CHAINS_MOST_PROBABLE)
        return chains_make(&d->lengths, (struct chains_shape){g->distribution, g->dispersity, g->average, g->molar_mass_kg_mol / unit}, m->a);
    d->lengths = *d->plan->chains;
    return true;
}

static void lay_chains(struct design *d)
{
    const struct material *const m = &d->plan->material;
    const struct cleavage *const cut = &d->plan->cleavage;
    const struct scission_chance chance = {cut->conversion * m->hydrolysis * m->hydrolysis, cut->nonspecific};
    const struct scission_roots roots = scission_roots(cut->neighbours, d->expect, chance);
    struct design_chains *const c = &d->chains;
    c->unit_kg_mol = polymer_unit_kg_mol(m->hydrolysis, m->repeat_unit_kg_mol, m->ester_unit_kg_mol);
    c->Mv_kg_mol[INTACT] = c->unit_kg_mol * d->lengths.xv;
    c->Mv_kg_mol[CLEAVED] = c->unit_kg_mol * scission_average(&d->lengths, &roots);
    for (size_t s = 0; s < SERIES; s++) c->intrinsic_m3_kg[s] = polymer_intrinsic_viscosity(m->K_m3_kg, m->a, c->Mv_kg_mol[s]);
}

/* Nominal kinematic viscosity [m2/s] of a liquid at the set temperature. */
static double nominal_viscosity(const struct design *d, const struct design_liquid *liquid)
{
    const struct plan *const p = d->plan;
    const double T = p->habits.temperature_K, rho_w = water_density(T), c = liquid->conc_kg_m3;
    double thick = 1.0 + p->cleavage.reagent_viscosity * liquid->reagent;
    if (c > 0.0)
        thick *= 1.0 + solution_specific(p->material.law, p->material.interaction[liquid->series], d->chains.intrinsic_m3_kg[liquid->series] * c);
    const double rho = rho_w * (1.0 + p->cleavage.reagent_density * liquid->reagent) + c * (1.0 - p->material.specific_volume_m3_kg * rho_w);
    return water_fit_viscosity(&d->water, T) * thick / rho;
}

static void lay_series(struct design *d)
{
    const struct plan *const p = d->plan;
    d->liquid[DESIGN_WATER] = (struct design_liquid){.series = SERIES};
    d->liquid[DESIGN_BLANK] = (struct design_liquid){.series = SERIES, .reagent = 1.0};
    d->liquids = DESIGN_LEVELS;
    for (size_t s = 0; s < SERIES; s++) {
        const double top = solution_coil_volume(p->material.law, p->material.interaction[s], p->top[s] - 1.0) / d->chains.intrinsic_m3_kg[s];
        const size_t L = p->levels[s];
        for (size_t j = 0; j < L; j++) {
            const double share = L == 1 ? 1.0 : p->lowest + (1.0 - p->lowest) * (double)j / (double)(L - 1);
            d->liquid[d->liquids++] = (struct design_liquid){
                .series = s, .level = j, .conc_kg_m3 = top * share, .volume_m3 = p->tube.charge_m3 / share,
                .added_m3 = p->tube.charge_m3 / share};
            /* what is added is the difference to the level above, which is the liquid behind */
            if (j > 0) d->liquid[d->liquids - 2].added_m3 -= p->tube.charge_m3 / share;
        }
    }
}

/* Times and steps of one liquid. */
static void lay_time(struct design *d, struct design_liquid *q, struct bath_times times)
{
    const struct plan *const p = d->plan;
    const struct habits *const h = &p->habits;
    const double nu = nominal_viscosity(d, q);
    q->nominal_s = tube_efflux(p->tube.constant_m2_s2, p->tube.ends, p->tube.kinetic, nu);
    const double k = tube_kinetic(p->tube.ends, p->tube.kinetic, q->nominal_s);
    if (!(k <= 0.1 * nu) && d->why[0] == '\0')
        snprintf(d->why, sizeof d->why, "%s is too fast for this law: its kinetic-energy term is over a tenth of the viscosity", p->tube.name);
    if (p->dilution == DILUTION_IN_TUBE && q->volume_m3 > 0.0)
        q->addition = bath_addition(times, p->bath.fluctuation_K, h->add_and_mix_s, h->equilibrate_s, 1.0 - q->added_m3 / q->volume_m3);
    q->step = bath_run(times, p->bath.fluctuation_K, q->nominal_s, h->reset_s, p->thermometer.reads);
    q->lag_mean = h->lag_s / q->nominal_s * -expm1(-q->nominal_s / h->lag_s);
    q->lag_left = exp(-(q->nominal_s + h->reset_s) / h->lag_s);
}

static void lay_times(struct design *d)
{
    const struct habits *const h = &d->plan->habits;
    const struct bath_times times = {d->plan->bath.correlation_time_s, h->lag_s};
    d->idle = bath_idle(times, d->plan->bath.fluctuation_K, h->clean_and_fill_s, h->equilibrate_s);
    d->lag_wait = exp(-h->equilibrate_s / h->lag_s);
    d->lag_mix = exp(-h->add_and_mix_s / h->lag_s);
    for (size_t i = 0; i < d->liquids; i++) lay_time(d, &d->liquid[i], times);
    lay_time(d, &d->liquid[DESIGN_BLANK], times);
}

static void lay_assumed(struct design *d)
{
    const struct plan *const p = d->plan;
    const struct material *const m = &p->material;
    const double T = p->habits.temperature_K, rho = water_density(T);
    struct assumed *const a = &d->assumed;
    *a = (struct assumed){
        .record = p->temperature_record, .set_K = T, .water = d->water, .water_m2_s = water_fit_kinematic(&d->water, T),
        .agreement = p->habits.agreement, .combine = p->habits.combine, .ends = p->tube.ends, .kinetic = p->tube.kinetic,
        .K_m3_kg = m->K_m3_kg, .a = m->a, .unit_kg_mol = d->chains.unit_kg_mol, .r = polymer_r(m->a),
        .neighbours = p->cleavage.neighbours, .head_to_head_chance = 1.0, .sums = &d->lengths.sums,
        .blank_reference = p->cleavage.blank_reference};
    if (p->cleavage.correct_conversion) a->head_to_head_chance = p->cleavage.conversion * m->hydrolysis * m->hydrolysis;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        a->levels[q->series]++;
        a->conc_kg_m3[q->series][q->level] = q->conc_kg_m3;
        a->density_ratio[q->series][q->level] = 1.0 + q->conc_kg_m3 * (1.0 - m->specific_volume_m3_kg * rho) / rho;
    }
}

bool design_make(struct design *d, const struct plan *plan, const struct cost_rules *cost, const struct question *question)
{
    memset(d, 0, sizeof *d);
    d->plan = plan;
    d->expect = question->expect;
    d->repeats = (double)plan->preparations * (question->against_is == AGAINST_MEASURED ? 2.0 : 1.0);
    d->water = water_fit_make();
    if (!lay_lengths(d)) return false;
    lay_chains(d);
    lay_series(d);
    flasks_choose(d);
    lay_assumed(d);
    lay_times(d);
    if (!days_lay_out(d)) return false;
    d->days = d->layout.days * (size_t)d->repeats;
    d->nominal_clock_s *= d->repeats;
    d->polymer_kg *= d->repeats;
    d->preparation_s = flasks_preparation_s(d, cost) * d->repeats;
    return true;
}

const char *design_why(const struct design *d, const struct analysis *how)
{
    const bool short_line = d->plan->levels[INTACT] < 2 || d->plan->levels[CLEAVED] < 2;
    if (d->why[0] != '\0') return d->why;
    if (how->extrapolation != SINGLE_POINT && short_line) return "one level gives no line: a second one is missing (a single-point extrapolation does without)";
    return NULL;
}

void design_free(struct design *d)
{
    free(d->filling);
    d->filling = NULL;
}
