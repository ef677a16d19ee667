/* Every combination, each once. */
#include "scenario/reading.h"

#include <math.h>

static const char text[] = READING_QUESTION "plan:\n"
                                            "  chain_statistics: [discrete, continuous]\n"
                                            "  weighting: [equal, c-squared]\n"
                                            "  extrapolation: [martin, single-point, huggins]\n"
                                            "  top: [1.6, 1.8]\n"
                                            "  grade: [low, middle, high]\n";

static size_t key_of(const struct scenario *s, const char *name)
{
    size_t key = 0;
    while (strcmp(scenario_key(s, key), name) != 0)
        key++;
    return key;
}

/* 3 grades, 2 tops, 5 pairs of line and weighting, 2 statistics. */
static void counts_single_point_once(void **state)
{
    (void)state;
    struct scenario *s = reading_good(text, NULL, NULL);
    assert_int_equal(scenario_candidates(s), 60);
    scenario_free(s);
}

/* The order of the table, not of the file; the first key slowest. */
static void varies_the_first_key_slowest(void **state)
{
    (void)state;
    struct scenario *s = reading_good(text, NULL, NULL);
    const size_t keys[] = {key_of(s, "grade"), key_of(s, "top"), key_of(s, "extrapolation"), key_of(s, "weighting"),
                           key_of(s, "chain_statistics")};
    static const size_t pairs[5][2] = {{0, 0}, {0, 1}, {1, 0}, {2, 0}, {2, 1}};
    for (size_t i = 0; i < 60; i++) {
        assert_int_equal(scenario_option_of(s, i, keys[0]), i / 20);
        assert_int_equal(scenario_option_of(s, i, keys[1]), i / 10 % 2);
        assert_int_equal(scenario_option_of(s, i, keys[2]), pairs[i / 2 % 5][0]);
        assert_int_equal(scenario_option_of(s, i, keys[3]), pairs[i / 2 % 5][1]);
        assert_int_equal(scenario_option_of(s, i, keys[4]), i % 2);
    }
    scenario_free(s);
}

static void compiles_what_the_options_say(void **state)
{
    (void)state;
    struct scenario *s = reading_good(text, NULL, NULL);
    static const enum extrapolation lines[] = {MARTIN, SINGLE_POINT, HUGGINS};
    for (size_t i = 0; i < 60; i++) {
        struct plan p;
        scenario_plan(s, i, &p);
        assert_int_equal(p.index, i);
        assert_string_equal(p.grade.name, scenario_option(s, key_of(s, "grade"), i / 20));
        assert_true(fabs(p.top[INTACT] - (i / 10 % 2 ? 1.8 : 1.6)) < 1e-15);
        assert_int_equal(p.analysis.extrapolation, lines[scenario_option_of(s, i, key_of(s, "extrapolation"))]);
        assert_int_equal(p.analysis.weighting, scenario_option_of(s, i, key_of(s, "weighting")));
        assert_int_equal(p.analysis.chain_statistics, i % 2);
    }
    scenario_free(s);
}

static void knows_its_keys(void **state)
{
    (void)state;
    struct scenario *s = reading_good(text, NULL, NULL);
    assert_int_equal(scenario_keys(s), 25);
    assert_string_equal(scenario_key(s, 0), "material");
    assert_string_equal(scenario_key(s, 1), "grade");
    assert_int_equal(scenario_options(s, 1), 3);
    assert_string_equal(scenario_option(s, 1, 2), "high");
    assert_string_equal(scenario_option(s, 0, 0), "pvoh-water-25C");
    assert_int_equal(scenario_options(s, key_of(s, "runs")), 1);
    scenario_free(s);
}

/* 3 * 12^7 is below the limit of 1e9, ten times that is not. */
static void refuses_what_no_number_counts(void **state)
{
    (void)state;
    char big[2000] = READING_QUESTION "plan:\n  grade: [low, middle, high]\n";
    static const char *const keys[] = {"levels", "levels_cleaved", "fillings",  "fillings_cleaved",
                                       "runs",   "water_fillings", "water_runs"};
    for (size_t i = 0; i < sizeof keys / sizeof *keys; i++) {
        strcat(strcat(strcat(big, "  "), keys[i]), ": [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12]\n");
    }
    struct scenario *s = reading_good(big, NULL, NULL);
    assert_int_equal(scenario_candidates(s), 107495424);
    struct plan p;
    scenario_plan(s, 107495423, &p);
    assert_int_equal(p.levels[INTACT], 12);
    assert_int_equal(p.water_runs, 12);
    scenario_free(s);
    strcat(big, "  top: [1.1, 1.2, 1.3, 1.4, 1.5, 1.6, 1.7, 1.8, 1.9, 2]\n");
    reading_bad(big, NULL, NULL, "plan has more than 1000000000 combinations");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(counts_single_point_once),      cmocka_unit_test(varies_the_first_key_slowest),
        cmocka_unit_test(compiles_what_the_options_say), cmocka_unit_test(knows_its_keys),
        cmocka_unit_test(refuses_what_no_number_counts),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
