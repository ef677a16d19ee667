/* The best runs of a filling, whether they agree, and the time they give; all
 * cases worked by hand. */
#include "reduce/book.h"

enum { LANE = 3 };

static const double set_K = 298.15;

/* One filling of `planned` runs, its times in one lane. */
struct case_of {
    size_t planned, made;
    double time_s[8];
};

static struct book *book_of(const struct case_of *c, const struct assumed *a)
{
    struct book *const b = book_open(1);
    book_add(b, (struct notebook_filling){.runs = c->planned});
    book_lay(b);
    for (int l = 0; l < LANES; l++) /* the other lanes hold something else, as many runs as planned */
        for (size_t i = 0; i < (l == LANE ? c->made : c->planned); i++)
            book_enter(b, 0, l, l == LANE ? c->time_s[i] : 77.0 + (double)i, set_K);
    book_bring(b, a);
    return b;
}

static struct assumed habits(double agreement, enum combine combine)
{
    return (struct assumed){.agreement = agreement, .combine = combine};
}

struct expected {
    struct case_of given;
    double best[4], span;
};

static void hold_best(const struct expected *e)
{
    const struct assumed a = habits(0.1, COMBINE_MEAN);
    struct book *const b = book_of(&e->given, &a);
    double best[NOTEBOOK_MAX_RUNS] = {0};
    check_close(notebook_best(&b->book, 0, LANE, best), e->span, 1e-13 * e->best[0], "ROUND of a difference");
    for (size_t i = 0; i < e->given.planned; i++)
        assert_true(best[i] == e->best[i]);
    free(b);
}

static void best_are_the_closest(void **state)
{
    (void)state;
    static const struct expected hand[] = {
        {{3, 3, {101.0, 100.0, 102.0}}, {100.0, 101.0, 102.0}, 2.0},               /* nothing to choose, rising */
        {{3, 4, {100.0, 103.0, 103.5, 102.0}}, {102.0, 103.0, 103.5}, 1.5},        /* the first run is left out */
        {{3, 4, {100.0, 100.5, 101.0, 103.0}}, {100.0, 100.5, 101.0}, 1.0},        /* the spare one is */
        {{3, 5, {100.0, 110.0, 100.4, 120.0, 100.1}}, {100.0, 100.1, 100.4}, 0.4}, /* two are, from the middle */
        {{2, 5, {90.0, 100.0, 105.0, 105.25, 120.0}}, {105.0, 105.25}, 0.25}, /* neither the fastest nor the slowest */
        {{1, 1, {100.0}}, {100.0}, 0.0},
    };
    for (size_t i = 0; i < sizeof hand / sizeof *hand; i++)
        hold_best(&hand[i]);
}

/* At a tie the fastest: also where rounding makes the later span the smaller
 * one (10.10 - 10.05 is 2e-15 below 10.05 - 10.00). */
static void fastest_at_a_tie(void **state)
{
    (void)state;
    static const struct expected hand[] = {
        {{2, 3, {102.0, 100.0, 101.0}}, {100.0, 101.0}, 1.0},
        {{2, 3, {10.10, 10.05, 10.00}}, {10.00, 10.05}, 0.05},
        {{2, 4, {300.30, 300.20, 300.10, 300.00}}, {300.00, 300.10}, 0.10},
        {{3, 5, {100.0, 100.5, 101.0, 101.5, 102.0}}, {100.0, 100.5, 101.0}, 1.0},
        {{2, 4, {100.0, 100.0, 101.0, 101.0}}, {100.0, 100.0}, 0.0},
        {{1, 2, {101.0, 100.0}}, {100.0}, 0.0},
    };
    assert_true(10.10 - 10.05 < 10.05 - 10.00);
    for (size_t i = 0; i < sizeof hand / sizeof *hand; i++)
        hold_best(&hand[i]);
}

/* A hundredth of a second is no tie. */
static void the_smaller_span_wins(void **state)
{
    (void)state;
    static const struct expected hand[] = {
        {{2, 3, {100.00, 101.00, 101.99}}, {101.00, 101.99}, 0.99},
        {{2, 3, {100.00, 101.000, 101.999}}, {101.000, 101.999}, 0.999},
    };
    for (size_t i = 0; i < sizeof hand / sizeof *hand; i++)
        hold_best(&hand[i]);
}

static bool agrees(const struct case_of *c, double agreement)
{
    const struct assumed a = habits(agreement, COMBINE_MEAN);
    struct book *const b = book_of(c, &a);
    const bool out = notebook_agrees(&a, &b->book, 0, LANE);
    bool all[LANES];
    if (c->made == c->planned) { /* the quick way must say the same */
        notebook_agree(&a, &b->book, 0, all);
        assert_true(all[LANE] == out);
    }
    free(b);
    return out;
}

/* (max - min)/mean of the best n, at most. */
static void agreement_by_hand(void **state)
{
    (void)state;
    const struct case_of wide = {3, 3, {100.0, 100.1, 100.21}}, edge = {2, 2, {5.0, 3.0}},
                         saved = {3, 4, {104.0, 100.0, 100.1, 100.19}};
    assert_true(agrees(&wide, 0.0021));
    assert_false(agrees(&wide, 0.00209)); /* 0.21/100.10333 = 0.0020978 */
    assert_true(agrees(&edge, 0.5));      /* 2/4, exactly at the limit */
    assert_false(agrees(&edge, 0.4999999));
    assert_true(agrees(&saved, 0.0019)); /* 0.19/100.09667 = 0.0018982 with a spare run, 4/101.37 without */
    assert_false(agrees(&(struct case_of){3, 3, {104.0, 100.0, 100.1}}, 0.0019));
    assert_false(agrees(&(struct case_of){3, 5, {100.0, 101.0, 102.0, 103.0, 104.0}}, 0.0019)); /* none agrees */
}

/* Of the mean of the best, not of all: 0.3/100.15 against 0.3/400.075. */
static void agreement_is_of_the_best(void **state)
{
    (void)state;
    assert_false(agrees(&(struct case_of){2, 3, {1000.0, 100.0, 100.3}}, 0.0029));
    assert_true(agrees(&(struct case_of){2, 3, {1000.0, 100.0, 100.3}}, 0.0030));
}

static void one_run_is_never_checked(void **state)
{
    (void)state;
    assert_true(agrees(&(struct case_of){1, 1, {100.0}}, 0.0));
    assert_true(agrees(&(struct case_of){1, 2, {100.0, 150.0}}, 0.0));
}

static double time_of(const struct case_of *c, enum combine combine)
{
    const struct assumed a = habits(0.002, combine);
    struct book *const b = book_of(c, &a);
    double out[LANES];
    notebook_filling_time(&a, &b->book, 0, out);
    free(b);
    return out[LANE];
}

static void mean_and_median(void **state)
{
    (void)state;
    const struct case_of odd = {3, 3, {104.0, 100.0, 101.0}}, even = {4, 4, {110.0, 100.0, 103.0, 101.0}};
    check_round(time_of(&odd, COMBINE_MEAN), 305.0 / 3.0, 2.0);
    assert_true(time_of(&odd, COMBINE_MEDIAN) == 101.0);
    check_round(time_of(&even, COMBINE_MEAN), 103.5, 2.0);
    assert_true(time_of(&even, COMBINE_MEDIAN) == 102.0);
    const struct case_of spare = {3, 5, {100.0, 110.0, 100.4, 120.0, 100.2}}; /* the best are 100.0, 100.2, 100.4 */
    check_round(time_of(&spare, COMBINE_MEAN), 300.6 / 3.0, 2.0);
    assert_true(time_of(&spare, COMBINE_MEDIAN) == 100.2);
    const struct case_of pair = {2, 3, {100.0, 108.0, 109.0}};
    assert_true(time_of(&pair, COMBINE_MEDIAN) == 108.5);
    assert_true(time_of(&(struct case_of){1, 1, {99.0}}, COMBINE_MEDIAN) == 99.0);
}

/* t nu_w(set)/nu_w(read): warmer water is quicker, so a time read too warm is
 * made longer; 0.225 % for 0.1 K. */
static void times_at_the_set_temperature(void **state)
{
    (void)state;
    const struct assumed a = {.record = true,
                              .set_K = set_K,
                              .water = water_fit_make(),
                              .water_m2_s = water_viscosity(set_K) / water_density(set_K)};
    const double off_K[] = {0.0, 0.02, 0.05, 0.1, -0.1, 3.0}, longer[] = {0.0, 0.045, 0.113, 0.225, -0.225};
    for (size_t i = 0; i < 5; i++)
        check_close(assumed_at_set(&a, 200.0, set_K + off_K[i]), 200.0 * (1.0 + 0.01 * longer[i]), 200.0 * 0.5e-5,
                    "TABLE 0.001 % of t");
    for (size_t i = 0; i < 6; i++) {
        const double T = set_K + off_K[i], ratio = a.water_m2_s / (water_viscosity(T) / water_density(T));
        check_close(assumed_at_set(&a, 200.0, T), 200.0 * ratio, 200.0 * 2e-12, "SERIES of water_fit");
    }
}

static void only_with_a_record(void **state)
{
    (void)state;
    struct assumed a = {.record = true,
                        .set_K = set_K,
                        .water = water_fit_make(),
                        .water_m2_s = water_viscosity(set_K) / water_density(set_K)};
    struct notebook_run run;
    for (int l = 0; l < LANES; l++) {
        run.time_s[l] = 200.0 + l;
        run.read_K[l] = set_K + 0.1 * l;
    }
    notebook_bring_to_set(&a, &run);
    for (int l = 0; l < LANES; l++)
        assert_true(run.at_set_s[l] == assumed_at_set(&a, run.time_s[l], run.read_K[l]));
    assert_true(run.at_set_s[1] > 1.002 * 201.0);
    a.record = false;
    for (int l = 0; l < LANES; l++)
        run.read_K[l] = (double)NAN; /* nothing was read */
    notebook_bring_to_set(&a, &run);
    assert_memory_equal(run.at_set_s, run.time_s, sizeof run.time_s);
}

/* With a record runs agree that a wandering bath had driven apart. */
static void agreement_is_at_the_set_temperature(void **state)
{
    (void)state;
    struct assumed a = {.record = true,
                        .set_K = set_K,
                        .agreement = 0.0001,
                        .water = water_fit_make(),
                        .water_m2_s = water_viscosity(set_K) / water_density(set_K)};
    struct book *const b = book_open(1);
    book_add(b, (struct notebook_filling){.runs = 2});
    book_lay(b);
    for (int l = 0; l < LANES; l++) {
        book_enter(b, 0, l, 200.0, set_K);
        book_enter(b, 0, l, 200.0 / 1.00225364, set_K + 0.1);
    }
    book_bring(b, &a);
    assert_true(notebook_agrees(&a, &b->book, 0, LANE));
    a.record = false;
    book_bring(b, &a);
    assert_false(notebook_agrees(&a, &b->book, 0, LANE));
    free(b);
}

/* A filling's time depends on its own lane only: not on whether another lane
 * took a spare run. TEXT: exact bytes. */
static void lanes_never_mix(void **state)
{
    (void)state;
    const struct assumed a = habits(0.002, COMBINE_MEAN);
    for (int spare = 0; spare < 2; spare++)
        for (int k = 0; k < 200; k++) {
            const double t[3] = {300.0 + 0.01 * (k * 37 % 100), 300.0 + 0.01 * (k * 59 % 100),
                                 300.0 + 0.01 * (k * 83 % 100)};
            const struct case_of alone = {3, 3, {t[0], t[1], t[2]}};
            struct book *const b = book_of(&alone, &a);
            double with[LANES], without[LANES];
            notebook_filling_time(&a, &b->book, 0, without);
            if (spare)
                book_enter(b, 0, LANE + 1, 79.0, set_K);
            book_bring(b, &a);
            notebook_filling_time(&a, &b->book, 0, with);
            assert_memory_equal(&with[LANE], &without[LANE], sizeof(double));
            free(b);
        }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(best_are_the_closest),     cmocka_unit_test(fastest_at_a_tie),
        cmocka_unit_test(the_smaller_span_wins),    cmocka_unit_test(agreement_by_hand),
        cmocka_unit_test(agreement_is_of_the_best), cmocka_unit_test(one_run_is_never_checked),
        cmocka_unit_test(mean_and_median),          cmocka_unit_test(times_at_the_set_temperature),
        cmocka_unit_test(only_with_a_record),       cmocka_unit_test(agreement_is_at_the_set_temperature),
        cmocka_unit_test(lanes_never_mix),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
