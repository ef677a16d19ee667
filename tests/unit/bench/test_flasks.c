/* Flasks that fit, how well a solution is known, and plans that cannot be
 * carried out, with what is missing. Worked by hand on the plan of
 * test_timetable.c: c_top 7.2925 and 30.140 kg/m3, 2 fillings of 15 + 3 mL of
 * each level, two levels, the lower at half. */
#include "bench/still.h"

#include "models/water.h"
#include "sim/judge/trial.h"

static struct plan plan_by_hand(struct scenario **s)
{
    struct plan p;
    *s = still_read("question: {expect: 1.5 %, against: 1.2 %}\n"
                    "polymer: {law: huggins, interaction: 0, interaction_cleaved: 0}\n"
                    "cleavage: {neighbours: independent}\n"
                    "kit: {grades: [{name: mine, molar_mass: 44.05 kg/mol, average: number}]}\n"
                    "plan: {grade: mine, top: 1.8, top_cleaved: 1.4, levels: 2, lowest: 0.5, extrapolation: huggins}\n");
    scenario_plan(*s, 0, &p);
    still_make(&p);
    p.material.specific_volume_m3_kg = 1.0 / water_density(298.15);
    return p;
}

static struct design designed(const struct plan *p, const struct scenario *s)
{
    struct design d;
    assert_true(design_make(&d, p, scenario_cost(s), scenario_question(s)));
    design_free(&d);
    return d;
}

static void is_impossible(const struct plan *p, const struct scenario *s, const char *why)
{
    struct design d;
    assert_true(design_make(&d, p, scenario_cost(s), scenario_question(s)));
    const char *const said = design_why(&d, &p->analysis);
    assert_non_null(said);
    assert_string_equal(said, why);
    design_free(&d);
}

/* The smallest flask of 10, 25, 50, 100, 200, 250, 500, 1000 mL that holds
 * what is needed. Level: fillings x 18 mL; stock: half a level's flask and
 * fillings x 18 mL. ROUND: 1e-12. */
static void smallest_that_fits(void **state)
{
    (void)state;
    static const struct {
        size_t fillings;
        double level_mL, stock_mL;
    } rows[] = {{1, 25, 50},    /* 18; 12.5 + 18 = 30.5 */
                {2, 50, 100},   /* 36; 25 + 36 = 61 */
                {3, 100, 200},  /* 54; 50 + 54 = 104 */
                {5, 100, 200},  /* 90; 140 */
                {6, 200, 250},  /* 108; 100 + 108 = 208 */
                {12, 250, 500}  /* 216; 125 + 216 = 341 */};
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    for (size_t i = 0; i < sizeof rows / sizeof *rows; i++) {
        p.fillings[INTACT] = p.fillings[CLEAVED] = rows[i].fillings;
        p.habits.working_day_s = 1e6;
        const struct design d = designed(&p, s);
        assert_string_equal(d.why, "");
        still_close_to("level", d.flasks.level_m3, rows[i].level_mL * 1e-6, 1e-12);
        for (size_t k = 0; k < SERIES; k++) still_close_to("stock", d.flasks.stock_m3[k], rows[i].stock_mL * 1e-6, 1e-12);
    }
    /* one size of level flask for both series, each stock by itself */
    p.fillings[INTACT] = 1;
    p.fillings[CLEAVED] = 6;
    const struct design d = designed(&p, s);
    still_close_to("level", d.flasks.level_m3, 200e-6, 1e-12);
    still_close_to("intact", d.flasks.stock_m3[INTACT], 200e-6, 1e-12); /* 100 + 18 */
    still_close_to("cleaved", d.flasks.stock_m3[CLEAVED], 250e-6, 1e-12);
    scenario_free(s);
}

/* One shared stock of 30.140 kg/m3: intact levels take 50 mL x 7.2925/30.140
 * = 12.098 and 6.049 mL, the cleaved 25 mL and 36 mL undiluted, 79.1 mL in all.
 * The reagent's strength goes with the share of the stock. TABLE: five digits. */
static void shared_stock(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    p.solutions.shared_stock = true;
    struct design d = designed(&p, s);
    still_close_to("stock", d.flasks.stock_m3[INTACT], 100e-6, 1e-12);
    still_near("strength", d.flasks.stock_conc_kg_m3[INTACT], 30.140, 5e-4);
    assert_true(d.liquid[1].diluted && d.liquid[2].diluted && d.liquid[3].diluted && !d.liquid[4].diluted);
    assert_true(d.liquid[1].reagent == 0.0 && d.liquid[2].reagent == 0.0);
    still_near("reagent", d.liquid[3].reagent, 0.5, 1e-12);
    still_near("reagent", d.liquid[4].reagent, 1.0, 1e-12);
    p.solutions.delivery_u_m3 = 1e-8; /* 0.01 mL of 6.049 mL */
    d = designed(&p, s);
    still_near("delivery", d.liquid[1].delivery_u, 0.01 / 6.049, 5e-7);
    p.solutions.stock_volume_m3 = 79.2e-6;
    assert_string_equal(designed(&p, s).why, "");
    p.solutions.stock_volume_m3 = 79.1e-6;
    assert_string_not_equal(designed(&p, s).why, "");
    /* the cleaved series may be the weaker one: then all of it is diluted */
    p.top[CLEAVED] = 1.05;
    p.solutions.stock_volume_m3 = 0.0;
    d = designed(&p, s);
    assert_true(d.liquid[1].diluted && !d.liquid[2].diluted && d.liquid[3].diluted && d.liquid[4].diluted);
    still_near("reagent", d.liquid[4].reagent, d.liquid[4].conc_kg_m3 / d.liquid[2].conc_kg_m3, 1e-12);
    scenario_free(s);
}

/* Uncertainties, tolerances over the root of 6. Intact stock 0.72925 g in
 * 100 mL: sqrt((0.3 mg/0.72925 g)^2 + (0.1/(2.4495 x 100))^2) = 5.7957e-4;
 * cleaved, 3.0140 g: 4.2021e-4. Half of a 50 mL flask by a pipette of 0.03 mL,
 * 25 mL: 4.8990e-4; each delivery 0.01 mL: 4e-4; the flask 0.06 mL: 4.8990e-4.
 * Class B doubles the flasks; a tolerance that is given replaces them. TABLE:
 * five digits. */
static void how_well_known(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct solutions *const so = &p.solutions;
    so->balance_u_kg = 0.3e-6;
    so->delivery_tolerance_m3 = 0.03e-6;
    so->delivery_u_m3 = 0.01e-6;
    so->stock_tolerance_m3 = so->level_tolerance_m3 = -1.0; /* by class */
    struct design d = designed(&p, s);
    still_near("weighing", d.flasks.weighing_u[INTACT], 5.7957e-4, 5e-9);
    still_near("weighing, cleaved", d.flasks.weighing_u[CLEAVED], 4.2021e-4, 5e-9);
    for (size_t i = 1; i <= 3; i += 2) {
        still_near("pipette", d.liquid[i].pipette_u, 4.8990e-4, 5e-9);
        still_near("delivery", d.liquid[i].delivery_u, 4e-4, 5e-9);
        still_near("flask", d.liquid[i].flask_u, 4.8990e-4, 5e-9);
        assert_true(d.liquid[i + 1].pipette_u == 0.0 && d.liquid[i + 1].delivery_u == 0.0 && d.liquid[i + 1].flask_u == 0.0);
    }
    so->balance_u_kg = 0.0;
    so->glass = GLASS_B;
    d = designed(&p, s);
    still_near("class B", d.flasks.weighing_u[INTACT], 2.0 * 4.0825e-4, 1e-8);
    still_near("class B", d.liquid[1].flask_u, 2.0 * 4.8990e-4, 1e-8);
    still_near("pipette", d.liquid[1].pipette_u, 4.8990e-4, 5e-9); /* not a matter of class */
    so->stock_tolerance_m3 = 0.3e-6;
    so->level_tolerance_m3 = 0.02e-6;
    d = designed(&p, s);
    still_near("given", d.flasks.weighing_u[INTACT], 3.0 * 4.0825e-4, 1.5e-8);
    still_near("given", d.liquid[1].flask_u, 4.8990e-4 / 3.0, 5e-9);
    scenario_free(s);
}

/* TEXT: what is missing, and how much. */
static void what_is_missing(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan possible = plan_by_hand(&s);
    struct plan p = possible;
    p.solutions.level_volume_m3 = 30e-6;
    is_impossible(&p, s, "a level's flask must hold 36.0 mL, but the one asked for holds 30 mL: 6.0 mL are missing");
    p.solutions.level_volume_m3 = 36e-6; /* to the drop */
    assert_string_equal(designed(&p, s).why, "");
    p = possible;
    p.solutions.stock_volume_m3 = 50e-6;
    is_impossible(&p, s, "the stock of the intact polymer must hold 61.0 mL, but the one asked for holds 50 mL: 11.0 mL are missing");
    p.fillings[INTACT] = 1; /* level flasks of 50 mL for the other series: 25 + 18 = 43 mL */
    is_impossible(&p, s, "the stock of the cleaved polymer must hold 61.0 mL, but the one asked for holds 50 mL: 11.0 mL are missing");
    p = possible;
    p.tube.charge_m3 = 90e-6;
    p.fillings[CLEAVED] = 12;
    is_impossible(&p, s, "a level's flask must hold 1116.0 mL, but the largest flask holds 1000 mL: 116.0 mL are missing");
    p = possible;
    p.solutions.shared_stock = true;
    p.solutions.stock_volume_m3 = 50e-6;
    is_impossible(&p, s, "the shared stock must hold 79.1 mL, but the one asked for holds 50 mL: 29.1 mL are missing");
    scenario_free(s);
}

/* A day must hold its water and one filling. Water takes 298.34 s in the
 * tube 0c: a filling 1080 + 3 x 358.3 = 2155.0 s, two 4310 s; the lowest
 * level, eta_r 1.4, 416.9 s: 2510.8 s. In all 1.8947 h. */
static void a_day_too_short(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    p.habits.working_day_s = 1.8 * 3600.0;
    is_impossible(&p, s, "a day must hold its water and one filling, 1.89 h, but working_day is 1.80 h: 0.09 h are missing");
    p.habits.working_day_s = 1.89 * 3600.0;
    assert_string_not_equal(designed(&p, s).why, "");
    p.habits.working_day_s = 1.90 * 3600.0; /* but the top level takes 2866 s: 1.9934 h */
    assert_string_not_equal(designed(&p, s).why, "");
    p.habits.working_day_s = 2.0 * 3600.0;
    assert_string_equal(designed(&p, s).why, "");
    p.habits.working_day_s = 1.90 * 3600.0;
    p.habits.water_every_day = false; /* the second day needs no water */
    assert_string_equal(designed(&p, s).why, "");
    p.habits.working_day_s = 1.8 * 3600.0; /* but the first day must hold more than its water */
    assert_string_not_equal(designed(&p, s).why, "");
    scenario_free(s);
}

/* A kinetic term of over a tenth of nu is refused, of just under it not. For
 * water in a tube of constant C, k = nu/10 at t = 1.1 nu/C: E = 0.1 nu t^2. */
static void too_fast(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    const struct water_fit water = water_fit_make();
    const double nu = water_fit_kinematic(&water, 298.15), t = 1.1 * nu / p.tube.constant_m2_s2;
    p.tube.kinetic = 0.0999 * nu * t * t;
    assert_string_equal(designed(&p, s).why, "");
    p.tube.kinetic = 0.1001 * nu * t * t;
    is_impossible(&p, s, "suspended-0c is too fast for this law: its kinetic-energy term is over a tenth of the viscosity");
    p.tube.ends = TUBE_SQUARE;
    p.tube.kinetic = 0.0999 * nu * t;
    assert_string_equal(designed(&p, s).why, "");
    p.tube.kinetic = 0.1001 * nu * t;
    assert_string_not_equal(designed(&p, s).why, "");
    scenario_free(s);
}

/* One level gives no line; a single point does with one. */
static void one_level(void **state)
{
    (void)state;
    struct scenario *s;
    for (size_t k = 0; k < SERIES; k++)
        for (int line = HUGGINS; line <= SINGLE_POINT; line++) {
            struct plan p = plan_by_hand(&s);
            struct design d;
            struct outcome o;
            p.levels[k] = 1;
            p.analysis.extrapolation = (enum extrapolation)line;
            assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
            assert_int_equal(design_why(&d, &p.analysis) == NULL, line == SINGLE_POINT);
            still_close_to("the one level is the top", d.liquid[k == INTACT ? 1 : 3].conc_kg_m3, k == INTACT ? 7.2925 : 30.140, 2e-5);
            assert_true(!d.liquid[k == INTACT ? 1 : 3].diluted);
            outcome_nominal(s, &p, &d, &o);
            design_free(&d);
            assert_int_equal(o.status, line == SINGLE_POINT ? STATUS_UNDECIDED : STATUS_IMPOSSIBLE);
            assert_int_equal(o.why[0] == '\0', line == SINGLE_POINT);
            scenario_free(s);
        }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(smallest_that_fits), cmocka_unit_test(shared_stock),    cmocka_unit_test(how_well_known), cmocka_unit_test(what_is_missing),
        cmocka_unit_test(a_day_too_short),    cmocka_unit_test(too_fast), cmocka_unit_test(one_level),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
