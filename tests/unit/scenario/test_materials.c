/* Several materials as a choice of the plan: compiled each with its own chains,
 * resolved without loss, and never beside values given in `polymer`. */
#include "scenario/reading.h"

#include <math.h>

#include "models/polymer.h"
#include "sim/judge/trial.h"

static const char three[] = "question: {expect: 1.5 %, against: 1.3 %}\n"
                            "kit: {materials: [{name: mine, like: pvoh-water-25C, K: 3e-4 dL/g, a: 0.70, hydrolysis: 97 %}]}\n"
                            "plan:\n"
                            "  material: [pvoh-water-30C-a64, mine, pvoh-water-25C]\n"
                            "  grade: [middle, middle-88]\n"
                            "  fillings: [1, 2]\n"
                            "run: {studies: 64}\n";

/* Material varies slowest, for it stands first; each plan has the entry's
 * values, and the grade's own hydrolysis where it has one. */
static void compiled(void **state)
{
    (void)state;
    static const char *const name[] = {"pvoh-water-30C-a64", "mine", "pvoh-water-25C"};
    static const double K[] = {6.66e-5, 3e-5, 2e-5}, a[] = {0.64, 0.70, 0.76};
    struct scenario *s = reading_good(three, NULL, NULL);
    assert_int_equal(scenario_candidates(s), 12);
    assert_string_equal(scenario_key(s, 0), "material");
    assert_int_equal(scenario_options(s, 0), 3);
    for (size_t i = 0; i < 12; i++) {
        struct plan p;
        scenario_plan(s, i, &p);
        const size_t m = i / 4;
        assert_int_equal(scenario_option_of(s, i, 0), m);
        assert_string_equal(scenario_option(s, 0, m), name[m]);
        assert_string_equal(p.material.name, name[m]);
        assert_true(fabs(p.material.K_m3_kg / K[m] - 1.0) < 1e-12 && fabs(p.material.a - a[m]) < 1e-12); /* ROUND: units */
        const bool own = strcmp(p.grade.name, "middle-88") == 0;
        assert_true(fabs(p.material.hydrolysis - (own ? 0.88 : m == 1 ? 0.97 : 0.985)) < 1e-12);
    }
    scenario_free(s);
}

/* The chains are those of the plan's own exponent and mean unit: the stated
 * viscosity average is met with both. */
static void chains_of_each(void **state)
{
    (void)state;
    struct scenario *s = reading_good(three, NULL, NULL);
    for (size_t i = 0; i < 12; i++) {
        struct plan p;
        scenario_plan(s, i, &p);
        const double unit = polymer_unit_kg_mol(p.material.hydrolysis, p.material.repeat_unit_kg_mol, p.material.ester_unit_kg_mol);
        assert_true(p.chains->sums.a == p.material.a);
        assert_int_equal(p.grade.average, AVERAGE_VISCOSITY);
        assert_true(fabs(p.chains->xv * unit / p.grade.molar_mass_kg_mol - 1.0) < 1e-11); /* ROUND: found to 1e-13 */
    }
    scenario_free(s);
}

static struct plan nameless(const struct scenario *s, size_t index)
{
    struct plan p;
    scenario_plan(s, index, &p);
    p.index = 0;
    p.material.name = p.grade.name = p.tube.name = p.bath.name = p.thermometer.name = p.timer.name = NULL;
    p.chains = NULL;
    return p;
}

/* TEXT: resolved, it is resolved; the plans are the same bytes and give the
 * same studies to the bit. */
static void resolved(void **state)
{
    (void)state;
    struct scenario *s = reading_good(three, NULL, NULL);
    char *const yaml = scenario_resolved_yaml(s, SIZE_MAX);
    struct scenario *again = reading_good(yaml, NULL, NULL);
    char *const twice = scenario_resolved_yaml(again, SIZE_MAX);
    assert_string_equal(yaml, twice);
    assert_int_equal(scenario_candidates(again), 12);
    for (size_t i = 0; i < 12; i++) {
        const struct plan x = nameless(s, i), y = nameless(again, i);
        assert_memory_equal(&x, &y, sizeof x);
        struct plan p[2];
        struct outcome o[2];
        scenario_plan(s, i, &p[0]);
        scenario_plan(again, i, &p[1]);
        assert_true(trial_run(s, &p[0], (struct trial_options){0}, &o[0], NULL) && trial_run(again, &p[1], (struct trial_options){0}, &o[1], NULL));
        assert_int_equal(o[0].studies, 64);
        assert_memory_equal(&o[0].at, &o[1].at, sizeof o[0].at);
    }
    free(yaml);
    free(twice);
    scenario_free(s);
    scenario_free(again);
}

/* Cut to one candidate: that material alone and the same plan. With one
 * material its values stand in `polymer` when that is resolved again; from then
 * on the text stays. */
static void cut_to_one(void **state)
{
    (void)state;
    struct scenario *s = reading_good(three, NULL, NULL);
    for (size_t i = 0; i < 12; i++) {
        char *const yaml = scenario_resolved_yaml(s, i);
        struct scenario *one = reading_good(yaml, NULL, NULL);
        char *const twice = scenario_resolved_yaml(one, 0);
        struct scenario *again = reading_good(twice, NULL, NULL);
        char *const thrice = scenario_resolved_yaml(again, 0);
        const struct plan x = nameless(s, i), y = nameless(one, 0), z = nameless(again, 0);
        assert_int_equal(scenario_candidates(one), 1);
        assert_memory_equal(&x, &y, sizeof x);
        assert_memory_equal(&x, &z, sizeof x);
        assert_string_equal(twice, thrice);
        free(yaml);
        free(twice);
        free(thrice);
        scenario_free(one);
        scenario_free(again);
    }
    scenario_free(s);
}

/* One that is picked, wherever it stands in the list, is what the resolved
 * scenario says, in `polymer` as in `plan`. */
static void picked_and_resolved(void **state)
{
    (void)state;
    static const char *const pick[] = {"material=pvoh-water-30C-a64", "material=mine", "material=pvoh-water-25C"};
    for (size_t i = 0; i < 3; i++) {
        struct scenario *s = reading_good(three, NULL, pick[i]);
        char *const yaml = scenario_resolved_yaml(s, SIZE_MAX);
        struct scenario *again = reading_good(yaml, NULL, NULL);
        for (size_t k = 0; k < 4; k++) {
            const struct plan x = nameless(s, k), y = nameless(again, k);
            assert_memory_equal(&x, &y, sizeof x);
        }
        free(yaml);
        scenario_free(s);
        scenario_free(again);
    }
}

/* One is picked, or changed by its name in the kit. */
static void picked_and_set(void **state)
{
    (void)state;
    struct scenario *s = reading_good(three, "kit.materials.mine.a_u=0.03", "material=mine");
    assert_int_equal(scenario_candidates(s), 4);
    for (size_t i = 0; i < 4; i++) {
        struct plan p;
        scenario_plan(s, i, &p);
        assert_string_equal(p.material.name, "mine");
        assert_true(p.material.a_u == 0.03);
    }
    scenario_free(s);
}

/* Any value in `polymer` would win over all entries, so it is refused where
 * there are several, each by its name; with one in the list it wins. */
static void values_in_polymer(void **state)
{
    (void)state;
    static const char *const values[][2] = {{"K", "2e-4 dL/g"}, {"a", "0.7"}, {"eta_u", "3 %"}, {"hydrolysis", "99 %"}, {"specific_volume", "0.77 mL/g"}};
    for (size_t i = 0; i < sizeof values / sizeof *values; i++) {
        char set[80], message[80];
        snprintf(set, sizeof set, "polymer.%s=%s", values[i][0], values[i][1]);
        snprintf(message, sizeof message, "`%s` is given here, but plan.material has more than one", values[i][0]);
        reading_bad(three, set, NULL, message);
    }
    struct scenario *s = reading_good("question: {expect: 1.5 %, against: 1.3 %}\npolymer: {a: 0.7}\nplan: {grade: middle, material: pvoh-water-30C-a64}\n", NULL, NULL);
    struct plan p;
    scenario_plan(s, 0, &p);
    assert_true(p.material.a == 0.7 && fabs(p.material.K_m3_kg / 6.66e-5 - 1.0) < 1e-12);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(compiled),   cmocka_unit_test(chains_of_each), cmocka_unit_test(resolved),
                                       cmocka_unit_test(cut_to_one), cmocka_unit_test(picked_and_set), cmocka_unit_test(values_in_polymer),
                                       cmocka_unit_test(picked_and_resolved)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
