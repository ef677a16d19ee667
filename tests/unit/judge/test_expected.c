/* Times to be expected at the bench. */
#include "tests/unit/bench/still.h"

#include "sim/judge/expected.h"
#include "tests/unit/check.h"

/* The default plan, still, with a stated pair that is still too. */
static struct plan calm(struct scenario **s)
{
    struct plan p = still_plan(s);
    p.material.stated_eta_u = p.material.stated_a_u = 0.0;
    return p;
}

/* Nothing spreads: every time is the nominal one. */
static void nothing_spreads(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan p = calm(&s);
    struct design d;
    struct expected e;
    assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
    assert_true(expected_make(s, &d, 0.015, &e));
    for (size_t i = 0; i < d.liquids; i++) {
        if (i == DESIGN_BLANK) continue;
        check_round(e.time[i].mean_s, d.liquid[i].nominal_s, 1e4); /* the way from the level's strength to a time and back */
        assert_true(e.time[i].sd_s < 1e-9);
        assert_true(e.time[i].low_s <= e.time[i].mean_s && e.time[i].mean_s <= e.time[i].high_s);
    }
    assert_true(isnan(e.time[DESIGN_BLANK].mean_s)); /* no filling takes it */
    design_free(&d);
    scenario_free(s);
}

/* Start and stop scatter alone: sd = sqrt(2) hand_u, STAT: 2048 studies of 6
 * runs at least, 5 standard errors of a standard deviation (1/sqrt(2 n)), false
 * alarm 6e-7 each; bubbles take no part. The range is 3 sd on each side. */
static void hand_scatter_alone(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = calm(&s);
    struct design d;
    struct expected e;
    p.timer.hand_u_s = 0.07;
    p.habits.bubble_chance = 0.5;
    p.habits.bubble_delay = 0.05;
    assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
    assert_true(expected_make(s, &d, 0.015, &e));
    const double sd = 0.07 * sqrt(2.0), n = 6.0 * EXPECTED_STUDIES;
    for (size_t i = 0; i < d.liquids; i++) {
        if (i == DESIGN_BLANK) continue;
        check_close(e.time[i].mean_s, d.liquid[i].nominal_s, 5.0 * sd / sqrt(n), "STAT 5 standard errors, 6e-7");
        check_close(e.time[i].sd_s, sd, 5.0 * sd / sqrt(2.0 * n), "STAT 5 standard errors, 6e-7");
        check_round(e.time[i].high_s - e.time[i].low_s, 6.0 * e.time[i].sd_s, 1e5); /* a difference of hundreds */
    }
    design_free(&d);
    scenario_free(s);
}

/* Where the question leaves the pair's uncertainty out, the times do not:
 * [eta] off by eta_u, with Martin's law d ln t = eta_sp (1 + k y)/eta_r eta_u.
 * STAT: 6 runs of a study are off together, so n is the studies; the normal
 * deviate bends by less than 3 % (SERIES: second order, eta_u = 0.02). */
static void the_stated_pair_counts(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = calm(&s);
    struct design d;
    struct expected e;
    p.material.stated_eta_u = 0.02; /* eta_u itself stays zero */
    assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
    assert_true(expected_make(s, &d, 0.015, &e));
    const struct design_liquid *top = &d.liquid[DESIGN_LEVELS + p.levels[INTACT] - 1];
    const double y = top->conc_kg_m3 * d.chains.intrinsic_m3_kg[INTACT], k = p.material.interaction[INTACT];
    const double sd = top->nominal_s * (p.top[INTACT] - 1.0) * (1.0 + k * y) / p.top[INTACT] * 0.02;
    check_close(e.time[DESIGN_LEVELS + p.levels[INTACT] - 1].sd_s, sd, (0.03 + 5.0 / sqrt(2.0 * EXPECTED_STUDIES)) * sd,
                "STAT 5 standard errors, 6e-7, and 3 % for the second order");
    assert_true(e.time[DESIGN_WATER].sd_s < 1e-9);
    design_free(&d);
    scenario_free(s);
}

/* The second polymer holds less: its cleaved chains are longer, its times too. */
static void another_fraction(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan p = calm(&s);
    struct design d;
    struct expected first, second;
    assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
    assert_true(expected_make(s, &d, 0.015, &first));
    assert_true(expected_make(s, &d, 0.012, &second));
    for (size_t i = DESIGN_LEVELS; i < d.liquids; i++) {
        if (d.liquid[i].series == INTACT)
            check_close(second.time[i].mean_s, first.time[i].mean_s, 1e-9, "ROUND");
        else
            assert_true(second.time[i].mean_s > first.time[i].mean_s * 1.01);
    }
    design_free(&d);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(nothing_spreads), cmocka_unit_test(hand_scatter_alone),
                                       cmocka_unit_test(the_stated_pair_counts), cmocka_unit_test(another_fraction)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
