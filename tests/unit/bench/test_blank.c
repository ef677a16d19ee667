/* The blank (spent reagent without polymer) as reference and as diluent: its
 * place in the day, what is left in it, and what it makes of the reduction.
 * Source: model.md, solution, bench and reduction. */
#include "studies.h"

/* Two levels, one filling of each, two of water and blank. */
static const char *const yaml =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "cleavage: {reference: blank, diluent: blank}\n"
    "bench: {clean_and_fill: 8 min, equilibrate: 10 min, reset: 60 s, spare_runs: 0, working_day: 24 h}\n"
    "plan: {grade: middle, levels: 2, fillings: 1, runs: 1, water_fillings: 2, water_runs: 1}\n";

/* Seconds of a filling of a liquid, by number. */
static double seconds(const struct design *d, size_t liquid)
{
    return 480.0 + 600.0 + d->liquid[liquid].nominal_s + 60.0;
}

enum { I0 = DESIGN_LEVELS, I1, C0, C1 };

/* Before the first cleaved filling of a day, with as many fillings as water; it
 * must end within the day together with that filling. */
static void place_in_the_day(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    studies_lay(&d, &p, s);
    const double water = 2.0 * seconds(&d, DESIGN_WATER), blank = 2.0 * seconds(&d, DESIGN_BLANK);
    const double i0 = seconds(&d, I0), i1 = seconds(&d, I1), c0 = seconds(&d, C0), c1 = seconds(&d, C1);
    design_free(&d);
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 c00 c10");
    p.habits.working_day_s = water + i0 + i1 + blank + c0 + c1;
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 c00 c10");
    p.habits.working_day_s -= 1.0;
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 c00 | W0 W1 B0 B1 c10");
    p.habits.working_day_s = water + i0 + i1 + blank + c0 - 1.0; /* the blank would fit, its filling would not */
    studies_has_order(&p, s, "W0 W1 i00 i10 | W0 W1 B0 B1 c00 c10");
    p.habits.working_day_s = water + blank + c1;
    studies_has_order(&p, s, "W0 W1 i00 i10 | W0 W1 B0 B1 c00 | W0 W1 B0 B1 c10");
    p.habits.working_day_s -= 1.0;
    studies_impossible(&p, s, "a day must hold its water, its blank and one filling");
    p.habits.working_day_s = 86400.0;
    p.cleavage.blank_reference = false; /* a diluent is not measured */
    studies_has_order(&p, s, "W0 W1 i00 i10 c00 c10");
    scenario_free(s);
}

/* Without water on every day the blank is measured once, in its place. */
static void once_without_water_every_day(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    p.habits.water_every_day = false;
    studies_lay(&d, &p, s);
    const double blank = 2.0 * seconds(&d, DESIGN_BLANK), c0 = seconds(&d, C0), i0 = seconds(&d, I0), i1 = seconds(&d, I1), c1 = seconds(&d, C1);
    const double water = 2.0 * seconds(&d, DESIGN_WATER);
    design_free(&d);
    p.habits.working_day_s = fmax(blank + c0, water + i0);
    assert_true(p.habits.working_day_s < c0 + c1 + blank && p.habits.working_day_s < water + i0 + i1 && p.habits.working_day_s < i1 + blank + c0);
    studies_has_order(&p, s, "W0 W1 i00 | i10 | B0 B1 c00 | c10");
    p.habits.working_day_s = fmax(i1 + blank + c0, water + i0);
    assert_true(p.habits.working_day_s < i1 + blank + c0 + c1);
    studies_has_order(&p, s, "W0 W1 i00 | i10 B0 B1 c00 | c10");
    scenario_free(s);
}

/* w: 1 for the blank and what is diluted with it, else the share of the stock
 * (the larger one when shared); 0 for water and the intact series. */
static void reagent_share(void **state)
{
    (void)state;
    for (int i = 0; i < 4; i++) {
        struct scenario *s;
        struct plan p = studies_plan(yaml, &s);
        struct design d;
        p.cleavage.blank_diluent = i % 2 == 1;
        p.solutions.shared_stock = i >= 2;
        studies_lay(&d, &p, s);
        const double stock = p.solutions.shared_stock ? fmax(d.liquid[I1].conc_kg_m3, d.liquid[C1].conc_kg_m3) : d.liquid[C1].conc_kg_m3;
        check_close(d.liquid[DESIGN_WATER].reagent, 0.0, 0.0, "TEXT none");
        check_close(d.liquid[DESIGN_BLANK].reagent, 1.0, 0.0, "TEXT all");
        for (size_t j = 0; j < 2; j++) {
            check_close(d.liquid[I0 + j].reagent, 0.0, 0.0, "TEXT none");
            check_round(d.liquid[C0 + j].reagent, p.cleavage.blank_diluent ? 1.0 : d.liquid[C0 + j].conc_kg_m3 / stock, 4.0);
        }
        design_free(&d);
        scenario_free(s);
    }
}

/* A fifth is left in the tube: the first blank receives intact polymer and has
 * its k; the second receives from a blank, nothing; nor does what follows. */
static void carry_over_into_the_blank(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    p.habits.carry_over = 0.2;
    p.material.interaction[CLEAVED] = 0.2;
    p.cleavage.reagent_viscosity = 0.004;
    p.cleavage.reagent_density = 0.003;
    struct studies_hand *const h = studies_hand_open(&p, s);
    studies_hand_work(h, 0.015);
    const struct design *const d = &h->design;
    const double y = 0.2 * d->chains.intrinsic_m3_kg[INTACT] * d->liquid[I1].conc_kg_m3, c = 0.2 * d->liquid[I1].conc_kg_m3;
    assert_true(d->filling[4].blank && d->filling[5].blank);
    check_round(h->filled[4].coil[0], y, 40.0);
    check_round(h->filled[4].polymer[0], c, 40.0);
    check_close(h->filled[5].coil[0], 0.0, 0.0, "TEXT nothing");
    check_round(h->filled[6].coil[0], 0.8 * h->filled[6].made_coil[0], 4.0);
    /* the time: nu = C t - E/t^2, by halving */
    const double rho = water_density(p.habits.temperature_K), eta = water_fit_viscosity(&d->water, p.habits.temperature_K);
    const double nu = eta * 1.004 * (1.0 + y * exp(0.45 * y)) / (rho * 1.003 + c * (1.0 - p.material.specific_volume_m3_kg * rho));
    double low = 10.0, high = 5000.0;
    for (int i = 0; i < 100; i++) {
        const double t = 0.5 * (low + high);
        *(p.tube.constant_m2_s2 * t - p.tube.kinetic / t / t < nu ? &low : &high) = t;
    }
    check_close(studies_hand_time(h, 4, 0), low, 1e-10 * low, "ROUND a dozen products of known numbers");
    studies_hand_close(h);
    scenario_free(s);
}

/* Blank in the flasks and blank as reference: the reagent's viscosity cancels
 * to rounding, and its density too where the polymer does not change that of
 * water; else what is left is of the order of g (1/rho_w - v)/[eta]'. */
static void cancels_exactly(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan usual = studies_plan(yaml, &s);
    struct plan p = usual;
    p.cleavage.reagent_viscosity = 0.0054;
    check_close(studies_still_delta(&p, s), 0.015, 1e-12, "ROUND the condition of the whole reduction is below 1e4");
    p.cleavage.reagent_density = 0.0035;
    p.material.specific_volume_m3_kg = 1.0 / water_density(p.habits.temperature_K);
    check_close(studies_still_delta(&p, s), 0.015, 1e-12, "ROUND the condition of the whole reduction is below 1e4");
    p.material.specific_volume_m3_kg = usual.material.specific_volume_m3_kg;
    const double off = studies_still_delta(&p, s) / 0.015 - 1.0;
    const double expected = 1.403 * 0.0035 * (1.0 / 997.047 - 0.765e-3) / 0.0133;
    check_close(fabs(off), expected, 0.3 * expected, "SERIES first order in g, for a top level that is no limit");
    scenario_free(s);
}

/* [eta]' found, by the bench. */
static double cleaved_found(const struct plan *p, const struct scenario *s)
{
    struct studies_hand *const h = studies_hand_open(p, s);
    studies_hand_work(h, 0.015);
    const double found = studies_reduce(&h->design, &h->bench.book).intrinsic_m3_kg[CLEAVED][0];
    studies_hand_close(h);
    return found;
}

/* The same from relative viscosities written down here: of a world diluted
 * with water or blank, against either. */
static double cleaved_by_hand(const struct plan *p, const struct scenario *s)
{
    struct design d;
    double conc[2], relative[2];
    studies_lay(&d, p, s);
    const double e = p->cleavage.reagent_viscosity, g = p->cleavage.reagent_density, rho = water_density(p->habits.temperature_K);
    for (size_t j = 0; j < 2; j++) {
        const double c = conc[j] = d.liquid[C0 + j].conc_kg_m3, y = d.chains.intrinsic_m3_kg[CLEAVED] * c, k = p->material.interaction[CLEAVED];
        const double w = p->cleavage.blank_diluent ? 1.0 : c / d.liquid[C1].conc_kg_m3, more = c * (1.0 - p->material.specific_volume_m3_kg * rho);
        relative[j] = (1.0 + e * w) * (1.0 + y * exp(k * y)) * (rho + more) / (rho * (1.0 + g * w) + more);
        if (p->cleavage.blank_reference) relative[j] *= (1.0 + g) / (1.0 + e);
    }
    const double found = reduction_extrapolate(&p->analysis, 2, conc, relative, NULL);
    design_free(&d);
    return found;
}

/* Diluted with water and held against water, the reagent goes straight into
 * [eta]': (e - g)/c_top to first order, half as much more by curvature. Held
 * against the blank it over-corrects: the sign turns. */
static void effect_of_the_reagent(void **state)
{
    (void)state;
    for (int i = 0; i < 4; i++) {
        struct scenario *s;
        struct plan p = studies_plan(yaml, &s);
        struct design d;
        p.cleavage.blank_diluent = i % 2 == 1;
        p.cleavage.blank_reference = i >= 2;
        p.cleavage.reagent_viscosity = 0.0054;
        p.cleavage.reagent_density = 0.0035;
        const double found = cleaved_found(&p, s);
        check_close(found, cleaved_by_hand(&p, s), 1e-11 * found, "ROUND the condition of an intercept");
        studies_lay(&d, &p, s);
        const double straight = (0.0054 - 0.0035) / d.liquid[C1].conc_kg_m3, shift = found - d.chains.intrinsic_m3_kg[CLEAVED];
        if (i == 0) assert_true(shift > 0.5 * straight && shift < 1.5 * straight);
        if (i == 1) assert_true(shift > 1.5 * straight); /* all of it at every level: grows as 1/c */
        if (i == 2) assert_true(shift < -0.5 * straight);
        design_free(&d);
        scenario_free(s);
    }
}

/* The blank of the same day counts: what slows that of the second day changes
 * the cleaved level of that day only, and nothing of the intact series. */
static void blank_of_the_same_day(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    struct reduction_levels levels[2];
    p.habits.filling_u = 0.01;
    p.analysis.kinetic_corrected = false; /* so that a time counts in proportion */
    studies_lay(&d, &p, s);
    p.habits.working_day_s = 2.0 * seconds(&d, DESIGN_WATER) + seconds(&d, I0) + seconds(&d, I1) + 2.0 * seconds(&d, DESIGN_BLANK) + seconds(&d, C0);
    design_free(&d);
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 c00 | W0 W1 B0 B1 c10");
    for (int i = 0; i < 2; i++) {
        struct studies_hand *const h = studies_hand_open(&p, s);
        void *const memory = calloc(reduction_size(&h->design.layout), 1);
        struct reduction_times times = reduction_place(&h->design.layout, memory);
        h->once[9][DRAWS_FILLING_TIME] = 2.0 * i; /* B0 of the second day, 2 % */
        studies_hand_work(h, 0.015);
        reduction_combine(&h->design.assumed, &h->bench.book, &times);
        reduction_relative(&h->design.assumed, &p.analysis, &h->bench.book, &times, &levels[i]);
        free(memory);
        studies_hand_close(h);
    }
    for (size_t j = 0; j < 2; j++) check_close(levels[1].relative[INTACT][j][0], levels[0].relative[INTACT][j][0], 0.0, "TEXT the same");
    check_close(levels[1].relative[CLEAVED][0][0], levels[0].relative[CLEAVED][0][0], 0.0, "TEXT the same");
    check_round(levels[1].relative[CLEAVED][1][0] * 1.01, levels[0].relative[CLEAVED][1][0], 40.0); /* the mean of 1.02 and 1 */
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(place_in_the_day), cmocka_unit_test(once_without_water_every_day), cmocka_unit_test(reagent_share),
        cmocka_unit_test(cancels_exactly),  cmocka_unit_test(carry_over_into_the_blank),    cmocka_unit_test(effect_of_the_reagent),
        cmocka_unit_test(blank_of_the_same_day),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
