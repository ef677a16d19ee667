/* Several preparations: each done from the balance on, the estimate their mean.
 * Source: model.md, preparations. */
#include "studies.h"

#include "sim/judge/trial.h"

static const char *const yaml =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "bench: {working_day: 4 h}\n"
    "plan: {grade: middle, preparations: 3, levels: 3, fillings: 1}\n"
    "cost: {weigh_and_dissolve: 1.5 h, dilution: 6 min, cleavage: 1 h, hour: 20}\n"
    "run: {studies: 64}\n";

/* Deltas of each preparation of a block, and the estimate of the whole. */
static void play_block(struct studies *b, size_t block, double delta[PLAN_MAX_PREPARATIONS][LANES], double whole[LANES])
{
    for (unsigned i = 0; i < b->design.plan->preparations; i++) {
        studies_show(b, block, i);
        memcpy(delta[i], studies_reduce(&b->design, &b->shown.book).delta, sizeof delta[i]);
    }
    memcpy(whole, studies_play(b, block, 0)->delta, sizeof(double[LANES]));
}

/* All sources on: the mean, and three different numbers. */
static void mean_of_the_deltas(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(yaml);
    struct plan p;
    struct studies b;
    scenario_plan(s, 0, &p);
    studies_open(&b, &p, s);
    for (size_t block = 0; block < 20; block++) {
        double delta[PLAN_MAX_PREPARATIONS][LANES], whole[LANES];
        play_block(&b, block, delta, whole);
        FOR_LANES(l)
        {
            check_round(whole[l], (delta[0][l] + delta[1][l] + delta[2][l]) / 3.0, 8.0);
            assert_true(delta[0][l] != delta[1][l] && delta[1][l] != delta[2][l] && delta[0][l] != delta[2][l]);
        }
    }
    studies_close(&b);
    scenario_free(s);
}

/* A stopwatch that shakes: some preparations have no
 * answer, and then the study has none. */
static void no_answer_if_one_has_none(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(yaml);
    struct plan p;
    struct studies b;
    size_t none = 0, some = 0;
    scenario_plan(s, 0, &p);
    p.timer.hand_u_s = 60.0;
    studies_open(&b, &p, s);
    for (size_t block = 0; block < 50; block++) {
        double delta[PLAN_MAX_PREPARATIONS][LANES], whole[LANES];
        play_block(&b, block, delta, whole);
        FOR_LANES(l)
        {
            const bool any = isnan(delta[0][l]) || isnan(delta[1][l]) || isnan(delta[2][l]);
            assert_true(isnan(whole[l]) == any);
            none += any;
            some += !any;
        }
    }
    assert_true(none > 20 && some > 20);
    studies_close(&b);
    scenario_free(s);
}

/* TEXT: the first of three is the one there would be alone; the second has
 * draws of its own, day by day from the first again. */
static void own_draws(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(yaml);
    struct plan three, one;
    struct studies a, b;
    scenario_plan(s, 0, &three);
    one = three;
    one.preparations = 1;
    studies_open(&a, &three, s);
    studies_open(&b, &one, s);
    assert_true(a.design.layout.days > 1 && a.design.layout.fillings == b.design.layout.fillings);
    assert_int_equal(a.design.filling[0].day, 0);
    for (unsigned i = 0; i < 3; i++) {
        size_t same = 0, count = 0;
        studies_show(&b, 5, 0);
        studies_show(&a, 5, i);
        for (size_t f = 0; f < a.design.layout.fillings; f++)
            for (size_t r = 0; r < a.design.filling[f].runs; r++) {
                const struct notebook_run *const x = &notebook_runs(&a.shown.book, f)[r], *const y = &notebook_runs(&b.shown.book, f)[r];
                FOR_LANES(l) same += x->time_s[l] == y->time_s[l];
                count += LANES;
            }
        assert_true(i == 0 ? same == count : same < count / 20); /* times to 0.01 s may coincide */
    }
    studies_close(&a);
    studies_close(&b);
    scenario_free(s);
}

/* One source at a time: what is drawn once for the study (dry content, pair,
 * pipette, hydrolysis, interaction, calibration) is common to all preparations,
 * stocks, cleavage, days and fillings are not. */
static void what_is_common(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan still = studies_plan(yaml, &s);
    for (int source = 0; source < 14; source++) {
        struct plan p = still;
        struct studies b;
        double *const key[] = {&p.solutions.dry_content_u, &p.material.eta_u, &p.solutions.delivery_tolerance_m3, &p.material.hydrolysis_u,
                               &p.material.interaction_u, &p.thermometer.calibration_u_K, &p.habits.kinetic_u, &p.tube.solution_offset_u,
                               &p.cleavage.conversion_u, &p.solutions.balance_u_kg, &p.bath.day_u_K, &p.bath.fluctuation_K, &p.habits.filling_u,
                               &p.solutions.delivery_u_m3};
        static const double u[] = {0.01, 0.05, 1e-7, 0.01, 0.05, 0.3, 0.2, 1e-3, 0.01, 1e-6, 0.1, 0.1, 1e-3, 1e-7};
        double delta[PLAN_MAX_PREPARATIONS][LANES], whole[LANES];
        *key[source] = u[source];
        p.temperature_record = source == 5; /* days and fluctuation show without a record */
        studies_open(&b, &p, s);
        play_block(&b, 1, delta, whole);
        FOR_LANES(l) assert_true(source < 8 ? delta[0][l] == delta[1][l] && delta[1][l] == delta[2][l] : delta[0][l] != delta[1][l] && delta[1][l] != delta[2][l]);
        assert_true(delta[0][0] != delta[0][1]); /* the source is on */
        studies_close(&b);
    }
    scenario_free(s);
}

/* Totals: three times the days, hours, grams; the equipment once. */
static void totals(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan three = studies_plan(yaml, &s), one = three;
    struct design a, b;
    struct outcome x, y;
    one.preparations = 1;
    three.tube.price = one.tube.price = 500.0;
    three.grade.price_per_kg = one.grade.price_per_kg = 2000.0;
    studies_lay(&a, &three, s);
    studies_lay(&b, &one, s);
    assert_int_equal(a.days, 3 * b.days);
    assert_int_equal(a.layout.days, b.layout.days);
    check_round(a.nominal_clock_s, 3.0 * b.nominal_clock_s, 4.0);
    check_round(a.preparation_s, 3.0 * b.preparation_s, 4.0);
    check_close(b.preparation_s, (2.0 * 1.5 + 4.0 * 0.1 + 1.0) * 3600.0, 1e-8, "ROUND a sum");
    check_round(a.polymer_kg, 3.0 * b.polymer_kg, 4.0);
    assert_true(trial_run(s, &three, (struct trial_options){0}, &x, NULL) && trial_run(s, &one, (struct trial_options){0}, &y, NULL));
    check_close(x.at.clock_s, 3.0 * b.nominal_clock_s, 1e-6, "ROUND a still study takes its nominal time");
    check_close(x.at.hours_s, 3.0 * y.at.hours_s, 1e-6, "ROUND a sum");
    check_close(x.at.money, 3.0 * (y.at.money - 500.0) + 500.0, 1e-6, "ROUND a sum");
    check_round(x.polymer_kg, 3.0 * y.polymer_kg, 4.0);
    assert_int_equal(x.days, 3 * y.days);
    design_free(&a);
    design_free(&b);
    scenario_free(s);
}

/* STAT: only the conversion spreads, about 90 %, where nothing is reflected.
 * The estimate is in proportion to it (to 1 % by the chains' statistics); the
 * mean of three has a third of the variance. 5 standard errors of 4096 studies,
 * three numbers: chance of a false alarm 2e-6 for one seed, which is fixed. */
static void variance_of_the_mean(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    p.cleavage.conversion = 0.9;
    p.cleavage.conversion_u = 0.01;
    const struct studies_sample three = studies_sample(&p, s, 4096);
    p.preparations = 1;
    const struct studies_sample one = studies_sample(&p, s, 4096);
    check_close(one.sd, 0.015 * 0.01 / 0.9, 5.0 * one.sd_se + 0.01 * one.sd, "STAT 5 standard errors");
    check_close(three.sd * sqrt(3.0), one.sd, 5.0 * hypot(one.sd_se, three.sd_se * sqrt(3.0)), "STAT 5 standard errors");
    check_close(three.mean, 0.015, 5.0 * three.sd / 64.0 + 0.015 * 1e-4, "STAT 5 standard errors, curvature (0.01/0.9)^2");
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(mean_of_the_deltas), cmocka_unit_test(no_answer_if_one_has_none), cmocka_unit_test(own_draws),
                                       cmocka_unit_test(what_is_common),     cmocka_unit_test(totals),                    cmocka_unit_test(variance_of_the_mean)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
