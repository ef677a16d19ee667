/* The resolved scenario: the same plans, and the same when resolved again. */
#include "scenario/reading.h"

static const char busy[] = "title: \"A \\\"first\\\" try: \\\\ # %\"\n"
                           "question: {expect: 1.5 %, within: 0.0015, against_is: same-constants}\n"
                           "polymer: {material: mine, a: 0.70, a_u: 0.020}\n"
                           "solutions: {stock_volume: 60 mL, stock_tolerance: 0.1 mL}\n"
                           "bench: {like: teaching, water_every_day: no}\n"
                           "cost: {owned: probe, at_most: {hours: 14 h}}\n"
                           "kit:\n"
                           "  materials: [{name: mine, K: 3e-4 dL/g, hydrolysis: 97 %}]\n"
                           "  tubes: [{name: square, like: constant-50, ends: square, B: 1 mm2}, {name: unused}]\n"
                           "plan:\n"
                           "  grade: [middle, middle-88]\n"
                           "  tube: [suspended-0c, square]\n"
                           "  top: [1.60, 2]\n"
                           "  levels_cleaved: [same, 3]\n"
                           "  extrapolation: [single-point, martin]\n"
                           "  weighting: [equal, c-squared]\n";

static struct plan plan_of(const struct scenario *s, size_t index)
{
    struct plan p;
    scenario_plan(s, index, &p);
    p.index = 0;
    p.material.name = p.grade.name = p.tube.name = p.bath.name = p.thermometer.name = p.timer.name = NULL;
    return p;
}

static void the_same_plans(void **state)
{
    (void)state;
    struct scenario *s = reading_good(busy, NULL, NULL);
    char *yaml = scenario_resolved_yaml(s, SIZE_MAX);
    struct scenario *again = reading_good(yaml, NULL, NULL);
    char *twice = scenario_resolved_yaml(again, SIZE_MAX);
    assert_string_equal(yaml, twice);
    assert_int_equal(scenario_candidates(s), scenario_candidates(again));
    assert_string_equal(scenario_title(again), "A \"first\" try: \\ # %");
    for (size_t i = 0; i < scenario_candidates(s); i++) {
        struct plan x = plan_of(s, i), y = plan_of(again, i);
        assert_true(x.chains->xn == y.chains->xn && x.chains->xv == y.chains->xv);
        x.chains = y.chains = NULL; /* each scenario has its own */
        assert_memory_equal(&x, &y, sizeof x);
    }
    assert_int_equal(scenario_zero_sources(s), scenario_zero_sources(again));
    free(yaml);
    free(twice);
    scenario_free(s);
    scenario_free(again);
}

/* Cut to one candidate it is that plan; the grade's own hydrolysis (88 %),
 * the material's (97 %) where the grade has none. */
static void cut_to_one_plan(void **state)
{
    (void)state;
    struct scenario *s = reading_good(busy, NULL, NULL);
    for (size_t i = 0; i < scenario_candidates(s); i++) {
        char *yaml = scenario_resolved_yaml(s, i);
        struct scenario *one = reading_good(yaml, NULL, NULL);
        assert_int_equal(scenario_candidates(one), 1);
        struct plan x = plan_of(s, i), y = plan_of(one, 0);
        assert_true(x.chains->xn == y.chains->xn && x.chains->xv == y.chains->xv);
        x.chains = y.chains = NULL; /* each scenario has its own */
        assert_memory_equal(&x, &y, sizeof x);
        assert_null(strstr(yaml, "unused"));
        scenario_free(one);
        free(yaml);
    }
    scenario_free(s);
}

static void as_json(void **state)
{
    (void)state;
    struct scenario *s = reading_good(busy, NULL, NULL);
    json_t *j = scenario_resolved_json(s, SIZE_MAX);
    assert_non_null(j);
    assert_string_equal(json_string_value(json_object_get(json_object_get(j, "question"), "expect")), "1.5 %");
    assert_true(json_is_real(json_object_get(json_object_get(j, "question"), "within")));
    const json_t *polymer = json_object_get(j, "polymer"), *bench = json_object_get(j, "bench"),
                 *plan = json_object_get(j, "plan"), *kit = json_object_get(j, "kit");
    assert_true(json_number_value(json_object_get(polymer, "a")) > 0.699);
    assert_null(json_object_get(polymer, "hydrolysis")); /* it would win over the grade's */
    assert_string_equal(json_string_value(json_object_get(bench, "water_every_day")), "no");
    assert_true(json_is_integer(json_object_get(bench, "spare_runs")));
    assert_null(json_object_get(bench, "like"));
    assert_int_equal(json_array_size(json_object_get(plan, "top")), 2);
    assert_true(json_is_array(json_object_get(plan, "runs")));
    assert_string_equal(json_string_value(json_array_get(json_object_get(plan, "levels_cleaved"), 0)), "same");
    assert_int_equal(json_integer_value(json_array_get(json_object_get(plan, "levels_cleaved"), 1)), 3);
    assert_int_equal(json_array_size(json_object_get(kit, "tubes")), 2);
    const json_t *tube = json_array_get(json_object_get(kit, "tubes"), 1);
    assert_string_equal(json_string_value(json_object_get(tube, "name")), "square");
    assert_string_equal(json_string_value(json_object_get(tube, "B")), "1 mm2");
    assert_string_equal(json_string_value(json_object_get(tube, "bore")), "0.44 mm");
    const json_t *cost = json_object_get(j, "cost");
    assert_int_equal(json_array_size(json_object_get(cost, "owned")), 1);
    assert_string_equal(json_string_value(json_object_get(json_object_get(cost, "at_most"), "hours")), "14 h");
    json_decref(j);
    j = scenario_resolved_json(s, 0);
    assert_int_equal(json_array_size(json_object_get(json_object_get(j, "plan"), "top")), 1);
    json_decref(j);
    scenario_free(s);
}

/* The texts are the user's: 1.60 stays 1.60, 0.0015 stays a plain number. */
static void keeps_the_texts(void **state)
{
    (void)state;
    struct scenario *s = reading_good(busy, NULL, NULL);
    char *yaml = scenario_resolved_yaml(s, SIZE_MAX);
    static const char *const lines[] = {"\n  within: 0.0015\n",     "\n  top: [1.60, 2]\n",
                                        "\n  a_u: 0.020\n",         "\n  a: 0.70\n",
                                        "\n  tilt_u: 1.5 degree\n", "\n      solution_offset: -0.07 %\n",
                                        "\n  owned: [probe]\n",     "\n  levels_cleaved: [same, 3]\n"};
    for (size_t i = 0; i < sizeof lines / sizeof *lines; i++)
        assert_non_null(strstr(yaml, lines[i]));
    free(yaml);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_same_plans),
        cmocka_unit_test(cut_to_one_plan),
        cmocka_unit_test(as_json),
        cmocka_unit_test(keeps_the_texts),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
