/* Two polymers measured alongside: what they share cancels in the difference,
 * what is their own does not; both cost. Source: model.md, against_is:
 * measured. */
#include "studies.h"

#include "sim/judge/trial.h"

static const char *const measured =
    "question: {expect: 1.5 %, against: 1.45 %, against_is: measured}\n"
    "bench: {working_day: 6 h}\n"
    "plan: {grade: middle, levels: 3, fillings: 1}\n"
    "cost: {hour: 20}\nrun: {studies: 2048}\n";

/* The first alone, and the second alone, as stated questions. */
static const char *const single[2] = {"question: {expect: 1.5 %, against: 1.2 %}\nplan: {grade: middle}\n",
                                      "question: {expect: 1.45 %, against: 1.2 %}\nplan: {grade: middle}\n"};

/* One spread of a plan each, those that are drawn once for the study first. */
enum { SHARED = 7, KEYS = 15 };
static void spread_of(struct plan *p, int which)
{
    double *const key[KEYS] = {&p->material.eta_u, &p->material.a_u, &p->material.interaction_u, &p->solutions.delivery_tolerance_m3,
                               &p->material.hydrolysis_u, &p->habits.kinetic_u, &p->tube.solution_offset_u,
                               &p->solutions.dry_content_u, &p->cleavage.conversion_u, &p->solutions.balance_u_kg, &p->solutions.delivery_u_m3,
                               &p->bath.gradient_u_K, &p->habits.filling_u, &p->timer.hand_u_s, &p->solutions.level_tolerance_m3};
    static const double u[KEYS] = {0.05, 0.02, 0.05, 1e-7, 0.005, 0.3, 1e-3, 0.01, 0.01, 1e-6, 5e-8, 0.02, 1e-3, 0.2, 5e-8};
    *key[which] = u[which];
    if (which == 2) p->analysis.extrapolation = HUGGINS; /* martin's line takes any interaction */
    p->cleavage.conversion = p->material.hydrolysis = 0.95; /* away from the reflection at 1 */
}

/* STAT, 1024 studies. Shared: the estimates move together, the difference by
 * about what it is over the first, 1/30; a tenth is allowed. Own: variances add,
 * within 5 standard errors of either (5.7e-7 each of 8, for a fixed seed: 5e-6)
 * and 1 %, for the plans' concentrations differ by what the cut differs. */
static void what_cancels(void **state)
{
    (void)state;
    struct scenario *s, *one[2];
    const struct plan still = studies_plan(measured, &s);
    for (int i = 0; i < 2; i++) one[i] = studies_read(single[i]);
    for (int which = 0; which < KEYS; which++) {
        struct plan p = still;
        spread_of(&p, which);
        const struct studies_sample difference = studies_sample(&p, s, 1024);
        const struct studies_sample first = studies_sample(&p, one[0], 1024), second = studies_sample(&p, one[1], 1024);
        const double added = hypot(first.sd, second.sd), ratio = difference.sd / first.sd;
        print_message("source %2d: sd of the difference over that of the first %.3f, of both together %.3f\n", which, ratio, difference.sd / added);
        assert_true(first.sd > 1e-7);
        if (which < SHARED)
            assert_true(ratio < 0.1);
        else
            check_close(difference.sd, added, 5.0 * hypot(difference.sd_se, added / sqrt(2048.0)) + 0.01 * added, "STAT 5 standard errors");
    }
    for (int i = 0; i < 2; i++) scenario_free(one[i]);
    scenario_free(s);
}

/* The same fraction twice: with shared sources alone the difference is zero to
 * the bit, with one that is not it never is. */
static void the_same_polymer_twice(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan still = studies_plan(measured, &s);
    for (int own = 0; own < 2; own++) {
        struct plan p = still;
        struct studies b;
        for (int which = 0; which < SHARED + own; which++) spread_of(&p, which);
        p.thermometer.calibration_u_K = 0.2;
        studies_open(&b, &p, s);
        b.job.fraction[0] = b.job.fraction[1] = 0.015;
        const double *const delta = studies_play(&b, 2, 0)->delta;
        FOR_LANES(l) assert_true((delta[l] == 0.0) == (own == 0));
        studies_close(&b);
    }
    scenario_free(s);
}

/* The estimate is the first's less the second's, which is played at its own
 * place: the second slot is that of two polymers of the second fraction. The
 * figures of the solutions are the first polymer's. TEXT: bit by bit. */
static void differences(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(measured);
    struct plan p;
    struct studies b, alone;
    scenario_plan(s, 0, &p);
    studies_open(&b, &p, s);
    studies_open(&alone, &p, s);
    alone.job.measured = false;
    for (size_t block = 0; block < 4; block++) {
        study_play(block, &b.job, b.slot, b.scratch);
        study_play(block, &alone.job, alone.slot, alone.scratch);
        const struct reduction_result *const at[2] = {study_result_of(&b.job, b.slot, 0, 0), study_result_of(&b.job, b.slot, 1, 0)};
        const struct reduction_result *const first[2] = {study_result_of(&alone.job, alone.slot, 0, 0), study_result_of(&alone.job, alone.slot, 1, 0)};
        FOR_LANES(l)
        {
            const double second = first[0]->delta[l] - at[0]->delta[l];
            check_close(first[1]->delta[l] - at[1]->delta[l], second, 1e-16, "ROUND the second polymer is one and the same");
            assert_true(second != first[1]->delta[l] && second > 0.005 && second < 0.03);
        }
        assert_memory_equal(at[0]->intrinsic_m3_kg, first[0]->intrinsic_m3_kg, sizeof at[0]->intrinsic_m3_kg);
        assert_memory_equal(at[0]->molar_mass_kg_mol, first[0]->molar_mass_kg_mol, sizeof at[0]->molar_mass_kg_mol);
    }
    studies_close(&b);
    studies_close(&alone);
    scenario_free(s);
}

/* Twice the days, bench work, preparation and grams; the equipment once. */
static void both_cost(void **state)
{
    (void)state;
    struct scenario *s, *one = studies_read("question: {expect: 1.5 %, against: 1.45 %}\nplan: {grade: middle}\ncost: {hour: 20}\nrun: {studies: 64}\n");
    struct plan p = studies_plan(measured, &s);
    struct outcome both, first;
    p.tube.price = 300.0;
    p.bath.price = 1000.0;
    p.grade.price_per_kg = 4000.0;
    struct design d, half;
    studies_lay(&d, &p, s);
    studies_lay(&half, &p, one);
    assert_int_equal(d.days, 2 * half.days);
    check_round(d.nominal_clock_s, 2.0 * half.nominal_clock_s, 4.0);
    check_round(d.preparation_s, 2.0 * half.preparation_s, 4.0);
    check_round(d.polymer_kg, 2.0 * half.polymer_kg, 4.0);
    assert_true(trial_run(s, &p, (struct trial_options){0}, &both, NULL) && trial_run(one, &p, (struct trial_options){0}, &first, NULL));
    check_close(both.at.clock_s, 2.0 * half.nominal_clock_s, 1e-6, "ROUND a sum");
    check_close(both.at.hours_s, 2.0 * first.at.hours_s, 1e-6, "ROUND a sum");
    check_close(both.at.money, 2.0 * (first.at.money - 1300.0) + 1300.0, 1e-6, "ROUND a sum");
    assert_int_equal(both.days, 2 * first.days);
    design_free(&d);
    design_free(&half);
    scenario_free(one);
    scenario_free(s);
}

/* Truth: expect - against; without scatter that is what comes out, and under
 * `against` zero. ROUND: the reduction's condition. */
static void truth_is_the_difference(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(measured, &s);
    struct outcome o;
    struct estimates e;
    p.habits.filling_u = 1e-9;
    assert_true(trial_run(s, &p, (struct trial_options){0}, &o, &e));
    check_close(o.truth, 0.0005, 1e-18, "ROUND a difference");
    check_close(o.at.mean, 0.0005, 1e-8, "ROUND times to 1e-9, the condition of a delta");
    check_close(o.at.bias, 0.0, 1e-8, "ROUND times to 1e-9, the condition of a delta");
    for (size_t i = 0; i < e.n; i++) check_close(e.against[i], 0.0, 1e-8, "ROUND times to 1e-9, the condition of a delta");
    check_close(o.at.power, 1.0, 0.0, "TEXT all of them");
    trial_free_estimates(&e);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(what_cancels), cmocka_unit_test(the_same_polymer_twice), cmocka_unit_test(differences),
                                       cmocka_unit_test(both_cost),    cmocka_unit_test(truth_is_the_difference)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
