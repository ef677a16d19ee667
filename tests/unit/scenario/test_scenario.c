/* From the document to the compiled plan. Tolerance of numbers: ROUND. */
#include "scenario/reading.h"

#include <math.h>

static void assert_near(double x, double expected)
{
    if (!(fabs(x - expected) <= 1e-14 * fabs(expected)))
        print_message("%.17g is not %.17g\n", x, expected);
    assert_true(fabs(x - expected) <= 1e-14 * fabs(expected));
}

static void the_smallest(void **state)
{
    (void)state;
    struct scenario *s = reading_good(READING_SMALL, NULL, NULL);
    const struct question *q = scenario_question(s);
    assert_near(q->expect, 0.015);
    assert_near(q->against, 0.012);
    assert_true(q->has_against && !q->has_within && isnan(q->within));
    assert_near(q->confidence, 0.95);
    assert_near(q->power, 0.9);
    assert_int_equal(q->sides, SIDES_ONE);
    assert_int_equal(scenario_candidates(s), 1);
    assert_int_equal(scenario_studies(s), 20000);
    assert_int_equal(scenario_seed(s), 1);
    assert_string_equal(scenario_title(s), "");
    assert_int_equal(scenario_zero_sources(s), 0);
    const struct cost_rules *c = scenario_cost(s);
    assert_int_equal(c->least, LEAST_HOURS);
    assert_string_equal(c->currency, "EUR");
    assert_true(isinf(c->at_most_hours) && isinf(c->at_most_days) && isinf(c->at_most_polymer_kg) &&
                isinf(c->at_most_money));
    assert_near(c->weigh_and_dissolve_s, 5400);
    assert_near(c->cleavage_wait_s, 43200);
    scenario_free(s);
}

static void compiles_polymer_and_solutions(void **state)
{
    (void)state;
    const struct plan p = reading_plan(READING_SMALL, NULL);
    assert_near(p.material.K_m3_kg, 2e-5);
    assert_near(p.material.a, 0.76);
    assert_near(p.material.valid_to_kg_mol, 200);
    assert_near(p.material.fitted_at_K, 298.15);
    assert_near(p.material.repeat_unit_kg_mol, 0.04405);
    assert_near(p.material.hydrolysis, 0.985);
    assert_near(p.material.specific_volume_m3_kg, 0.765e-3);
    assert_near(p.material.interaction[CLEAVED], 0.45);
    assert_int_equal(p.material.law, SOLUTION_MARTIN);
    assert_int_equal(p.cleavage.neighbours, NEIGHBOURS_EXCLUDED);
    assert_near(p.cleavage.nonspecific, 5e-5);
    assert_true(p.cleavage.correct_conversion);
    assert_false(p.solutions.shared_stock);
    assert_near(p.solutions.balance_u_kg, 3e-7);
    assert_true(fabs(p.solutions.stock_volume_m3) <= 0.0);
    assert_true(p.solutions.stock_tolerance_m3 < 0.0 && p.solutions.level_tolerance_m3 < 0.0);
    assert_near(p.solutions.delivery_tolerance_m3, 3e-8);
}

static void compiles_bench_and_plan(void **state)
{
    (void)state;
    const struct plan p = reading_plan(READING_SMALL, NULL);
    assert_near(p.habits.temperature_K, 298.15);
    assert_near(p.habits.lag_s, 60);
    assert_near(p.habits.tilt_u_rad, 0.5 * 3.14159265358979323846 / 180);
    assert_int_equal(p.habits.spare_runs, 2);
    assert_true(p.habits.water_every_day);
    assert_near(p.habits.working_day_s, 25200);
    assert_near(p.grade.molar_mass_kg_mol, 85);
    assert_near(p.tube.constant_m2_s2, 3e-9);
    assert_true(p.tube.suspended_level);
    assert_near(p.bath.drift_u_K_s, 0.01 / 3600);
    assert_near(p.timer.meniscus_u_m, 1e-4);
    assert_true(p.temperature_record);
    assert_near(p.top[INTACT], 1.8);
    assert_near(p.top[CLEAVED], 1.4);
    assert_int_equal(p.levels[INTACT], 4);
    assert_int_equal(p.levels[CLEAVED], 4);
    assert_int_equal(p.fillings[CLEAVED], 2);
    assert_int_equal(p.runs, 3);
    assert_int_equal(p.analysis.extrapolation, MARTIN);
    assert_true(p.analysis.density_corrected && p.analysis.kinetic_corrected);
    assert_int_equal(p.analysis.chain_statistics, CHAIN_DISCRETE);
}

static void the_cleaved_series_has_its_own(void **state)
{
    (void)state;
    const struct plan p = reading_plan(
        READING_QUESTION "plan: {grade: middle, levels: 5, levels_cleaved: 3, fillings_cleaved: 4}\n", NULL);
    assert_int_equal(p.levels[INTACT], 5);
    assert_int_equal(p.levels[CLEAVED], 3);
    assert_int_equal(p.fillings[INTACT], 2);
    assert_int_equal(p.fillings[CLEAVED], 4);
}

static double hydrolysis_of(const char *polymer, const char *grade, const char *material)
{
    char text[600];
    snprintf(text, sizeof text,
             "%spolymer: {material: mine%s}\nkit: {grades: [{name: ours%s}], materials: [{name: mine%s}]}\nplan: "
             "{grade: ours}\n",
             READING_QUESTION, polymer, grade, material);
    return reading_plan(text, NULL).material.hydrolysis;
}

static void hydrolysis_of_polymer_wins_over_grade_over_material(void **state)
{
    (void)state;
    const char *p = ", hydrolysis: 91 %", *g = ", hydrolysis: 92 %", *m = ", hydrolysis: 93 %";
    assert_near(hydrolysis_of(p, g, m), 0.91);
    assert_near(hydrolysis_of("", g, m), 0.92);
    assert_near(hydrolysis_of("", "", m), 0.93);
    assert_near(hydrolysis_of("", "", ""), 0.985);
    assert_near(hydrolysis_of(p, "", m), 0.91);
}

static void a_material_is_overridden_key_by_key(void **state)
{
    (void)state;
    struct plan p = reading_plan(READING_SMALL "polymer: {material: pvoh-water-30C-a64-weight, a: 0.65}\n", NULL);
    assert_near(p.material.K_m3_kg, 4.53e-5);
    assert_near(p.material.a, 0.65);
    assert_near(p.material.fitted_at_K, 303.15);
    assert_int_equal(p.material.calibrated_by, AVERAGE_WEIGHT);
    p = reading_plan(READING_QUESTION "plan: {grade: middle, material: pvoh-water-30C-a62}\n", NULL);
    assert_near(p.material.K_m3_kg, 7.93e-5);
}

static void a_bench_gives_what_is_left_out(void **state)
{
    (void)state;
    const struct plan p = reading_plan(READING_SMALL "bench: {like: mine, agreement: 0.5 %}\nkit: {benches: [{name: "
                                                     "mine, like: teaching, glass: A, room: 20 degC}]}\n",
                                       NULL);
    assert_near(p.habits.agreement, 0.005);
    assert_near(p.habits.room_K, 293.15);
    assert_near(p.habits.filling_u, 0.0015);
    assert_int_equal(p.solutions.glass, GLASS_A);
    assert_near(p.solutions.dry_content_u, 0.02);
    assert_near(p.habits.reset_s, 60);
}

static void same_constants_leave_the_pair_out(void **state)
{
    (void)state;
    const struct plan p =
        reading_plan("question: {expect: 1.5 %, against: 1.2 %, against_is: same-constants}\n" READING_PLAN, NULL);
    assert_true(fabs(p.material.eta_u) <= 0.0 && fabs(p.material.a_u) <= 0.0);
}

static void set_and_pick(void **state)
{
    (void)state;
    assert_near(reading_plan(READING_SMALL, "solutions.balance_u=1 mg").solutions.balance_u_kg, 1e-6);
    assert_int_equal(reading_plan(READING_SMALL, "plan.fillings=[3]").fillings[INTACT], 3);
    assert_near(reading_plan(READING_SMALL, "question={expect: 2 %, within: 1 %}").top[INTACT], 1.8);
    struct scenario *s =
        reading_good(READING_QUESTION "plan: {grade: [low, middle], top: [1.6, 1.80]}\n", NULL, "top=1.8");
    assert_int_equal(scenario_candidates(s), 2);
    scenario_free(s);
    s = reading_good(READING_SMALL, "run.seed=9007199254740992", "plan.grade=middle");
    assert_true(scenario_seed(s) == 9007199254740992u);
    scenario_free(s);
    reading_bad(READING_SMALL, NULL, "top=1.7", "--pick top: `1.7` is not among the options of top: 1.8");
    reading_bad(READING_SMALL, NULL, "tpo=1.7", "--pick tpo: unknown key `tpo` in plan; did you mean `top`?");
    reading_bad(READING_SMALL, "run.seed=-1", NULL, "--set run.seed: `seed` is -1; the range is 0 to 9007199254740992");
}

static void cost_and_owned(void **state)
{
    (void)state;
    struct scenario *s =
        reading_good(READING_SMALL "title: A first try\ncost: {owned: [probe, circulator], least: money, currency: "
                                   "CHF, hour: 40, at_most: {hours: 90 min, days: 2, polymer: 3 g, money: 500}}\n",
                     NULL, NULL);
    const struct cost_rules *c = scenario_cost(s);
    assert_true(scenario_owned(s, "probe") && scenario_owned(s, "circulator") && !scenario_owned(s, "glass"));
    assert_int_equal(c->least, LEAST_MONEY);
    assert_string_equal(c->currency, "CHF");
    assert_near(c->at_most_hours, 1.5);
    assert_near(c->at_most_days, 2);
    assert_near(c->at_most_polymer_kg, 0.003);
    assert_near(c->at_most_money, 500);
    assert_string_equal(scenario_title(s), "A first try");
    scenario_free(s);
    s = reading_good(READING_SMALL "cost: {owned: probe}\n", NULL, NULL);
    assert_true(scenario_owned(s, "probe"));
    scenario_free(s);
}

/* Limits stand in units of their own; what is at a limit is taken. */
static void takes_the_limits_themselves(void **state)
{
    (void)state;
    static const char *const at[] = {"bench.temperature=38 degC",
                                     "bench.temperature=311.15 K",
                                     "bench.temperature=5 degC",
                                     "question.against=20 %",
                                     "question.expect=0.2",
                                     "question.confidence=99.9 %",
                                     "plan.lowest=0.001",
                                     "plan.top=10",
                                     "run.studies=16",
                                     "bench.spare_runs=0",
                                     "kit.baths.circulator.drift_u=120 K/d"};
    static const char *const beyond[] = {"bench.temperature=38.001 degC",
                                         "question.against=20.001 %",
                                         "question.expect=0 %",
                                         "plan.lowest=0",
                                         "plan.top=1",
                                         "run.studies=15",
                                         "bench.spare_runs=11",
                                         "kit.baths.circulator.drift_u=121 K/d",
                                         "question.against=-0.001 %"};
    for (size_t i = 0; i < sizeof at / sizeof *at; i++)
        scenario_free(reading_good(READING_SMALL, at[i], NULL));
    for (size_t i = 0; i < sizeof beyond / sizeof *beyond; i++)
        reading_bad(READING_SMALL, beyond[i], NULL, "the range is");
}

static void names_the_zero_sources(void **state)
{
    (void)state;
    static const char text[] =
        READING_QUESTION "plan: {grade: middle, bath: [circulator, mine], temperature_record: none}\n"
                         "polymer: {eta_u: 0 %, hydrolysis_u: 0 %}\n"
                         "bench: {charge_u: 0 mL, tilt_u: 0 degree, bubble_chance: 0}\n"
                         "solutions: {balance_u: 0 kg}\n"
                         "kit: {baths: [{name: mine, day_u: 0 K}, {name: unused, day_u: 0 K}], thermometers: [{name: "
                         "probe, reading_u: 0 K, resolution: 0 K}]}\n";
    static const char *const expected[] = {"polymer.eta_u", "polymer.hydrolysis_u", "solutions.balance_u",
                                           "bench.tilt_u",  "bench.bubble_chance",  "kit.baths.mine.day_u"};
    struct scenario *s = reading_good(text, NULL, NULL);
    for (size_t i = 0; i < scenario_zero_sources(s) && i < sizeof expected / sizeof *expected; i++)
        assert_string_equal(scenario_zero_source(s, i), expected[i]);
    assert_int_equal(scenario_zero_sources(s), sizeof expected / sizeof *expected);
    scenario_free(s);
    s = reading_good(text, "plan={grade: middle, tube: constant-50}", NULL); /* now the charge and the reading count */
    assert_int_equal(scenario_zero_sources(s), 7);
    assert_string_equal(scenario_zero_source(s, 3), "bench.charge_u");
    assert_string_equal(scenario_zero_source(s, 6), "kit.thermometers.probe.reading_u");
    scenario_free(s);
    s = reading_good(text, "question.against_is=same-constants", NULL); /* the pair is left out of everything */
    assert_string_equal(scenario_zero_source(s, 0), "polymer.hydrolysis_u");
    scenario_free(s);
}

static void is_named_after_its_file(void **state)
{
    (void)state;
    struct complaints *out = complain_new();
    const struct scenario_request request = {"scenarios/smallest.yaml", NULL, 0, NULL, 0};
    struct scenario *s = scenario_read(&request, out);
    complain_print(out, stdout);
    assert_non_null(s);
    assert_string_equal(scenario_name(s), "smallest");
    scenario_free(s);
    complain_free(out);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_smallest),
        cmocka_unit_test(compiles_polymer_and_solutions),
        cmocka_unit_test(compiles_bench_and_plan),
        cmocka_unit_test(the_cleaved_series_has_its_own),
        cmocka_unit_test(hydrolysis_of_polymer_wins_over_grade_over_material),
        cmocka_unit_test(a_material_is_overridden_key_by_key),
        cmocka_unit_test(a_bench_gives_what_is_left_out),
        cmocka_unit_test(same_constants_leave_the_pair_out),
        cmocka_unit_test(set_and_pick),
        cmocka_unit_test(cost_and_owned),
        cmocka_unit_test(takes_the_limits_themselves),
        cmocka_unit_test(names_the_zero_sources),
        cmocka_unit_test(is_named_after_its_file),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
