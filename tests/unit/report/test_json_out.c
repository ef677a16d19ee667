/* The shapes and units of the JSON answers. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>

#include "sim/report/json_out_plan.h"
#include "sim/report/json_out_print.h"
#include "tests/unit/report/fake.h"

static struct report_context context_of(const struct scenario *s)
{
    return (struct report_context){.scenario = s, .version = "0.1"};
}

static double at(json_t *object, const char *first, const char *second)
{
    json_t *value = json_object_get(object, first);
    if (second)
        value = json_object_get(value, second);
    assert_true(json_is_number(value));
    return json_number_value(value);
}

/* ROUND: one multiplication or division. */
static void assert_close(double got, double expected)
{
    assert_true(fabs(got - expected) <= 1e-14 * fabs(expected));
}

static void outcome_units(void **state)
{
    (void)state;
    const struct scenario s = fake_scenario();
    const struct outcome o = fake_outcome();
    json_t *j = json_out_outcome(&s.question, &o, true);
    assert_int_equal(json_integer_value(json_object_get(j, "studies")), 20000);
    assert_close(at(j, "truth", NULL), 0.015);
    assert_close(at(j, "interval", "high"), 0.01624);
    assert_close(at(j, "shortest", "low"), 0.01381);
    assert_close(at(j, "power", "critical"), 0.01391);
    assert_close(at(j, "power", "power"), 0.9321);
    assert_close(at(j, "resolvable", "against"), 0.01312);
    assert_close(at(json_object_get(j, "intrinsic_viscosity"), "cleaved", "true"), 0.013271);
    assert_close(at(json_object_get(j, "molar_mass"), "intact", "mean"), 83.3);
    assert_close(json_number_value(json_array_get(json_object_get(json_object_get(j, "concentrations"), "intact"), 3)),
                 5.6);
    assert_close(at(j, "flasks_mL", "level"), 100.0);
    assert_close(at(j, "bench_hours", NULL), 9.1);
    assert_close(at(j, "hours", NULL), 14.2);
    assert_close(at(j, "polymer_g", NULL), 3.16);
    assert_close(at(j, "se", "power"), 0.0027);
    assert_string_equal(json_string_value(json_object_get(j, "status")), "resolves");
    json_decref(j);
}

static void what_is_not_asked_is_absent(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    struct outcome o = fake_outcome();
    json_t *j = json_out_outcome(&s.question, &o, true);
    assert_null(json_object_get(j, "within"));
    assert_null(json_object_get(json_object_get(j, "resolvable"), "within"));
    assert_null(json_object_get(json_object_get(j, "se"), "within"));
    json_decref(j);
    s.question.has_against = false;
    s.question.has_within = true;
    o.resolvable_within = (double)NAN;
    j = json_out_outcome(&s.question, &o, true);
    assert_null(json_object_get(j, "power"));
    assert_true(json_is_null(json_object_get(json_object_get(j, "resolvable"), "within")));
    json_decref(j);
    j = json_out_outcome(&s.question, &o, false);
    assert_null(json_object_get(j, "resolvable"));
    json_decref(j);
}

static void head_and_order(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    s.zeros = 2;
    const struct report_context c = context_of(&s);
    const struct outcome o = fake_outcome();
    char *texts[] = {"one", "two"};
    const struct warnings w = {2, 2, texts};
    json_t *j = json_out_trial(&c, &o, &w);
    static const char *const order[] = {"program",  "version",  "verb",         "seed",
                                        "scenario", "warnings", "zero_sources", "outcome"};
    size_t n = 0;
    const char *key;
    json_t *value;
    json_object_foreach(j, key, value) assert_string_equal(key, order[n++]);
    assert_int_equal(n, 8);
    assert_string_equal(json_string_value(json_object_get(j, "verb")), "trial");
    assert_int_equal(json_integer_value(json_object_get(j, "seed")), 7);
    assert_string_equal(json_string_value(json_array_get(json_object_get(j, "warnings"), 1)), "two");
    assert_string_equal(json_string_value(json_array_get(json_object_get(j, "zero_sources"), 0)), "bench.tilt_u");
    json_decref(j);
}

static void impossible_trial(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    const struct report_context c = context_of(&s);
    const struct outcome o = {.status = STATUS_IMPOSSIBLE, .why = "no flask"};
    const struct warnings w = {0};
    json_t *j = json_out_trial(&c, &o, &w);
    assert_null(json_object_get(j, "outcome"));
    assert_string_equal(json_string_value(json_object_get(j, "why")), "no flask");
    assert_string_equal(json_string_value(json_object_get(j, "status")), "impossible");
    json_decref(j);
}

static void plan_shape(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    struct fake_search f;
    fake_search(&s, &f);
    const struct report_context c = context_of(&s);
    const struct warnings w = {0};
    json_t *j = json_out_plan(&c, &f.result, &w);
    json_t *first = json_array_get(json_object_get(j, "candidates"), 0);
    assert_int_equal(json_array_size(json_object_get(j, "candidates")), 2); /* martin and huggins */
    assert_string_equal(json_string_value(json_object_get(json_object_get(first, "options"), "fillings")), "3");
    assert_non_null(json_object_get(first, "outcome"));
    assert_null(json_object_get(first, "why"));
    assert_int_equal(json_integer_value(json_object_get(json_object_get(j, "recommended"), "index")),
                     f.result.recommended);
    assert_null(json_object_get(j, "nearest_miss"));
    json_t *bath = json_object_get(json_object_get(j, "cheapest_by_choice"), "bath");
    assert_true(json_is_null(json_object_get(bath, "beaker")));
    assert_int_equal(json_integer_value(json_object_get(bath, "circulator")), f.result.recommended);
    assert_int_equal(json_integer_value(json_object_get(json_object_get(j, "spent"), "studies")), 123456);
    assert_int_equal(json_integer_value(json_object_get(json_object_get(j, "counts"), "impossible")), 4);
    json_decref(j);
}

static void nothing_resolves(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    struct fake_search f;
    fake_missed(&s, &f);
    const struct report_context c = context_of(&s);
    const struct warnings w = {0};
    json_t *j = json_out_plan(&c, &f.result, &w);
    assert_true(json_is_null(json_object_get(j, "recommended")));
    json_t *miss = json_object_get(j, "nearest_miss");
    assert_int_equal(json_integer_value(json_object_get(miss, "index")), f.result.nearest_miss);
    assert_string_equal(json_string_value(json_object_get(miss, "limit")), "constants");
    assert_int_equal(json_array_size(json_object_get(j, "candidates")), 1); /* the nearest miss is named */
    json_decref(j);
    f.result.nearest_miss = SEARCH_NONE;
    j = json_out_plan(&c, &f.result, &w);
    assert_true(json_is_null(json_object_get(j, "nearest_miss")));
    json_decref(j);
}

static void check_shape(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    const struct report_context c = context_of(&s);
    const struct warnings w = {0};
    json_t *j = json_out_check(&c, 1.5, &w);
    assert_int_equal(json_integer_value(json_object_get(j, "candidates")), FAKE_PLANS);
    assert_close(at(j, "seconds", NULL), 1.5);
    json_decref(j);
}

static char *printed(json_t *value)
{
    char *text = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&text, &size);
    json_out_print(to, value);
    fclose(to);
    return text;
}

/* TEXT; the numbers read back as the same doubles (jansson reads them). */
static void prints(void **state)
{
    (void)state;
    json_t *j = json_pack("{s:f, s:[f, f, i], s:{s:n, s:b, s:s}, s:[s], s:{}}", "x", 0.1, "list", 25.0, 1.0 / 3.0, 4,
                          "in", "none", "yes", 1, "text", "a \"b\"\n", "texts", "t", "empty");
    char *text = printed(j);
    assert_string_equal(text, "{\n  \"x\": 0.1,\n  \"list\": [25.0, 0.3333333333333333, 4],\n  \"in\": {\n"
                              "    \"none\": null,\n    \"yes\": true,\n    \"text\": \"a \\\"b\\\"\\n\"\n  },\n"
                              "  \"texts\": [\n    \"t\"\n  ],\n  \"empty\": {}\n}\n");
    json_t *again = json_loads(text, 0, NULL);
    assert_true(json_equal(j, again));
    json_decref(again);
    json_decref(j);
    free(text);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(outcome_units),  cmocka_unit_test(what_is_not_asked_is_absent),
        cmocka_unit_test(head_and_order), cmocka_unit_test(impossible_trial),
        cmocka_unit_test(plan_shape),     cmocka_unit_test(nothing_resolves),
        cmocka_unit_test(check_shape),    cmocka_unit_test(prints),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
