#include "sim/report/sheet_work.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static double tolerance(double asked_m3, double volume_m3, enum glass_class glass)
{
    double by_class = 0.0;
    if (asked_m3 >= 0.0)
        return asked_m3;
    return glassware_tolerance_of(volume_m3, glass, &by_class) ? by_class : 0.0;
}

static void list_stocks(struct sheet_work *w)
{
    static const char *const name[SERIES] = {"intact", "cleaved"};
    const struct solutions *so = &w->plan->solutions;
    const struct design_flasks *f = &w->design.flasks;
    w->stocks = so->shared_stock ? 1 : SERIES;
    for (size_t s = 0; s < w->stocks; s++)
        w->stock[s] = (struct sheet_work_stock){
            so->shared_stock ? "shared" : name[s], f->stock_m3[s] * f->stock_conc_kg_m3[s], f->stock_conc_kg_m3[s],
            f->stock_m3[s], tolerance(so->stock_tolerance_m3, f->stock_m3[s], so->glass)};
}

static double per_filling_m3(const struct plan *p)
{
    return p->tube.charge_m3 + p->habits.rinse_m3;
}

static struct sheet_work_level level_of(const struct sheet_work *w, const struct design_liquid *q)
{
    const struct design *d = &w->design;
    const struct plan *p = w->plan;
    const double fillings = (double)p->fillings[q->series];
    struct sheet_work_level l = {
        .series = q->series, .level = q->level, .conc_kg_m3 = q->conc_kg_m3, .diluted = q->diluted};
    if (p->dilution == DILUTION_IN_TUBE) {
        l.taken_m3 = q->added_m3;
        l.tube_m3 = q->volume_m3;
        l.used_m3 = q->diluted ? 0.0 : fillings * per_filling_m3(p);
        return l;
    }
    l.used_m3 = fillings * per_filling_m3(p);
    if (!q->diluted)
        return l;
    l.flask_m3 = d->flasks.level_m3;
    l.tolerance_m3 = tolerance(p->solutions.level_tolerance_m3, l.flask_m3, p->solutions.glass);
    l.taken_m3 = l.flask_m3 * q->conc_kg_m3 / d->flasks.stock_conc_kg_m3[q->series];
    return l;
}

static void list_levels(struct sheet_work *w)
{
    const struct plan *p = w->plan;
    const bool in_tube = p->dilution == DILUTION_IN_TUBE;
    for (size_t i = DESIGN_LEVELS; i < w->design.liquids; i++) {
        const struct sheet_work_level l = w->level[w->levels++] = level_of(w, &w->design.liquid[i]);
        if (l.series != CLEAVED)
            continue;
        if (p->solutions.shared_stock)
            w->aliquot_m3 += l.diluted ? l.taken_m3 : l.used_m3;
        if (p->cleavage.blank_diluent && l.diluted)
            w->blank_m3 += in_tube ? (double)p->fillings[CLEAVED] * l.taken_m3 : l.flask_m3 - l.taken_m3;
    }
}

static void list_rows(struct sheet_work *w)
{
    const struct design *d = &w->design;
    const struct habits *h = &w->plan->habits;
    double clock_s = 0.0;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *filling = &d->filling[f];
        if (f > 0 && filling[-1].day != filling->day)
            clock_s = 0.0;
        const double before_s = (filling->added ? h->add_and_mix_s : h->clean_and_fill_s) + h->equilibrate_s;
        const double ends_s = clock_s + design_filling_s(d, filling);
        w->row[w->rows++] =
            (struct sheet_work_row){filling, design_liquid_of(d, filling), clock_s, clock_s + before_s, ends_s};
        clock_s = ends_s;
        if (filling->blank)
            w->blank_m3 += per_filling_m3(w->plan);
    }
}

bool sheet_work_make(const struct scenario *s, const struct plan *plan, struct sheet_work *out)
{
    const struct question *q = scenario_question(s);
    memset(out, 0, sizeof *out);
    out->scenario = s;
    out->plan = plan;
    out->polymers = q->against_is == AGAINST_MEASURED ? 2 : 1;
    if (!design_make(&out->design, plan, scenario_cost(s), q))
        return false;
    if (sheet_work_why(out))
        return true;
    out->row = calloc(out->design.layout.fillings, sizeof *out->row);
    if (!out->row)
        return false;
    list_stocks(out);
    list_levels(out);
    list_rows(out);
    return expected_make(s, &out->design, q->expect, &out->expected[0]) &&
           (out->polymers == 1 || expected_make(s, &out->design, q->against, &out->expected[1]));
}

const char *sheet_work_why(const struct sheet_work *w)
{
    return design_why(&w->design, &w->plan->analysis);
}

void sheet_work_free(struct sheet_work *w)
{
    free(w->row);
    w->row = NULL;
    design_free(&w->design);
}

const char *sheet_work_solution(const struct notebook_filling *filling)
{
    if (filling->water)
        return "water";
    if (filling->blank)
        return "blank";
    return filling->series == INTACT ? "intact" : "cleaved";
}

double sheet_work_run_s(const struct sheet_work *w, const struct sheet_work_row *row, size_t run)
{
    return row->first_run_s + (double)run * (w->design.liquid[row->liquid].nominal_s + w->plan->habits.reset_s);
}
