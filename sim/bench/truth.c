#include "sim/bench/truth.h"

#include <math.h>
#include <string.h>

#include "models/solution.h"

/* A share cannot exceed one: what is drawn beyond is reflected. */
static double reflected(double share)
{
    return share > 1.0 ? 2.0 - share : share;
}

void truth_draw(const struct design *d, const struct draws_key *key, struct truth_where where, struct truth_draws *out)
{
    static const unsigned solution[SERIES] = {STREAMS_INTACT, STREAMS_CLEAVED};
    const size_t stocks = d->plan->solutions.shared_stock ? 1 : SERIES;
    const struct streams_place place = {.polymer = where.polymer, .preparation = where.preparation};
    draws_normals(key, STREAMS_STUDY, (struct streams_place){0}, DRAWS_STUDY, out->study);
    draws_normals(key, STREAMS_POLYMER, (struct streams_place){.polymer = where.polymer}, DRAWS_POLYMER, out->polymer);
    draws_normals(key, STREAMS_PREPARATION, place, DRAWS_PREPARATION, out->preparation);
    for (size_t s = 0; s < stocks; s++) {
        struct streams_place at = place;
        at.solution = solution[s];
        draws_normals(key, STREAMS_STOCK, at, DRAWS_STOCK, out->stock[s]);
    }
    if (stocks == 1) memcpy(out->stock[CLEAVED], out->stock[INTACT], sizeof out->stock[INTACT]);
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        struct streams_place at = place;
        if (!q->diluted || d->plan->dilution == DILUTION_IN_TUBE) continue;
        at.solution = solution[q->series];
        at.level = (unsigned)q->level;
        draws_normals(key, STREAMS_LEVEL, at, DRAWS_LEVEL, out->level[i]);
    }
}

/* Intrinsic viscosity [m3/kg] of the intact and the cleaved polymer of one
 * study. The pair is known to eta_u in the middle of its range and less well
 * away from it. */
static void intrinsic_of(const struct design *d, const struct truth_draws *draws, int lane, double fraction, double out[SERIES])
{
    const struct material *const m = &d->plan->material;
    const struct cleavage *const cut = &d->plan->cleavage;
    const double h = reflected(m->hydrolysis + m->hydrolysis_u * draws->study[DRAWS_HYDROLYSIS][lane]);
    const double X = reflected(cut->conversion + cut->conversion_u * draws->preparation[DRAWS_CONVERSION][lane]);
    const struct scission_roots roots = scission_roots(cut->neighbours, fraction, (struct scission_chance){X * h * h, cut->nonspecific});
    const double unit = polymer_unit_kg_mol(h, m->repeat_unit_kg_mol, m->ester_unit_kg_mol);
    const double Mv[SERIES] = {d->chains.Mv_kg_mol[INTACT], unit * scission_average(&d->lengths, &roots)};
    const double middle = sqrt(m->valid_from_kg_mol * m->valid_to_kg_mol);
    for (size_t s = 0; s < SERIES; s++) {
        double off = m->eta_u * draws->study[DRAWS_PAIR_MIDDLE][lane];
        if (m->a_u > 0.0) off += m->a_u * draws->study[DRAWS_PAIR_SLOPE][lane] * log(Mv[s] / middle);
        out[s] = polymer_intrinsic_viscosity(m->K_m3_kg, m->a, Mv[s]) * (off == 0.0 ? 1.0 : exp(off));
    }
}

static void truth_solutions(const struct design *d, const struct truth_draws *draws, const double intrinsic[SERIES][LANES], struct truth *out)
{
    const struct plan *const p = d->plan;
    const double dry_u = p->solutions.dry_content_u;
    for (size_t i = DESIGN_LEVELS; i < d->liquids; i++) {
        const struct design_liquid *const q = &d->liquid[i];
        const double weighing_u = d->flasks.weighing_u[q->series];
        const double *const weighing = draws->stock[q->series][DRAWS_WEIGHING], *const dry = draws->polymer[DRAWS_DRY_CONTENT];
        FOR_LANES(l)
        {
            double c = q->conc_kg_m3 * (1.0 + dry_u * dry[l]) * (1.0 + weighing_u * weighing[l]);
            if (q->diluted && p->dilution == DILUTION_FLASKS)
                c *= 1.0 + q->pipette_u * draws->study[DRAWS_PIPETTE][l] + q->delivery_u * draws->level[i][DRAWS_DELIVERY][l] +
                     q->flask_u * draws->level[i][DRAWS_FLASK][l];
            out->conc_kg_m3[i][l] = c;
            out->coil[i][l] = intrinsic[q->series][l] * c;
        }
    }
}

void truth_of(const struct design *d, const struct truth_draws *draws, double fraction, struct truth *out)
{
    const struct plan *const p = d->plan;
    double intrinsic[SERIES][LANES];
    memset(out, 0, sizeof *out); /* water holds no polymer */
    FOR_LANES(l)
    {
        double eta[SERIES];
        intrinsic_of(d, draws, l, fraction, eta);
        for (size_t s = 0; s < SERIES; s++) {
            intrinsic[s][l] = eta[s];
            out->interaction[s][l] = p->material.interaction[s] + p->material.interaction_u * draws->study[DRAWS_INTERACTION + s][l];
        }
        out->kinetic[l] = p->tube.kinetic * (1.0 + p->habits.kinetic_u * draws->study[DRAWS_KINETIC][l]);
        out->solution_slow[l] = 1.0 + p->tube.solution_offset + p->tube.solution_offset_u * draws->study[DRAWS_SOLUTION_OFFSET][l];
        out->pipette_m3[l] = glassware_standard_uncertainty(p->solutions.delivery_tolerance_m3) * draws->study[DRAWS_PIPETTE][l];
        out->calibration_K[l] = p->thermometer.calibration_u_K * draws->study[DRAWS_CALIBRATION][l];
    }
    truth_solutions(d, draws, (const double(*)[LANES])intrinsic, out);
}
