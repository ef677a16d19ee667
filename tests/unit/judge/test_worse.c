/* More work that makes a plan worse, and the source that is named for it. */
#include "studies.h"

#include "sim/judge/bar.h"
#include "sim/judge/trial.h"
#include "sim/judge/worse.h"

enum { ROOM = 16 };

/* The figure of a candidate with one source switched off. */
static struct figures figure_of(const struct scenario *s, size_t index, enum worse_cause off, struct figures *se)
{
    struct plan p;
    struct outcome o;
    scenario_plan(s, index, &p);
    if (off == WORSE_DRIFT) p.bath.drift_u_K_s = 0.0;
    if (off == WORSE_SPARE_RUNS) p.habits.spare_runs = 0;
    assert_true(trial_run(s, &p, (struct trial_options){0}, &o, NULL));
    *se = o.se;
    return o.at;
}

/* A bath that drifts and nobody who reads it: more runs make a longer day. All
 * pairs found are pairs indeed, and with the drift off none of the dearer ones
 * is worse any more: the drift is named for each. */
static void drift_is_named(void **state)
{
    (void)state;
    struct scenario *const s = studies_read_file("scenarios/more-is-worse.yaml", NULL, NULL);
    struct worse pair[ROOM];
    size_t count = 0;
    bool named = true;
    assert_true(worse_find(s, 5, ROOM, pair, &count)); /* 2 fillings of 3 runs, which resolve */
    assert_true(count >= 4);
    for (size_t i = 0; i < count; i++) {
        struct figures se[2];
        const struct figures cheaper = figure_of(s, pair[i].cheaper, WORSE_UNKNOWN, &se[0]), dearer = figure_of(s, pair[i].dearer, WORSE_UNKNOWN, &se[1]);
        assert_true(cheaper.hours_s < dearer.hours_s);
        check_close(pair[i].figure[0], cheaper.power, 0.0, "TEXT the same studies");
        check_close(pair[i].figure[1], dearer.power, 0.0, "TEXT the same studies");
        assert_true(cheaper.power - dearer.power > BAR_BAND * hypot(se[0].power, se[1].power));
        const struct figures still_cheap = figure_of(s, pair[i].cheaper, WORSE_DRIFT, &se[0]), still_dear = figure_of(s, pair[i].dearer, WORSE_DRIFT, &se[1]);
        assert_true(still_cheap.power - still_dear.power <= BAR_BAND * hypot(se[0].power, se[1].power));
        print_message("%zu and %zu: %.4f %.4f, without drift %.5f %.5f, cause %d\n", pair[i].cheaper, pair[i].dearer, cheaper.power, dearer.power,
                      still_cheap.power, still_dear.power, (int)pair[i].cause);
        named = named && pair[i].cause == WORSE_DRIFT;
    }
    assert_true(named);
    scenario_free(s);
}

/* No pair where every plan resolves with all studies; and no more than there is
 * room for. */
static void none_and_no_room(void **state)
{
    (void)state;
    struct scenario *s = studies_read_file("scenarios/more-is-worse.yaml", "run.studies=1024", "kit.baths.tank.drift_u=0 K/h");
    struct worse pair[ROOM];
    size_t count = 99;
    assert_true(worse_find(s, 0, ROOM, pair, &count));
    assert_int_equal(count, 0);
    scenario_free(s);
    s = studies_read_file("scenarios/more-is-worse.yaml", "run.studies=2048", NULL);
    assert_true(worse_find(s, 0, 2, pair, &count));
    assert_int_equal(count, 2);
    scenario_free(s);
}

/* A shaky hand, runs that must agree to 0.02 %, ten spare ones, and a bath that
 * takes ten hours to forget: one run is never checked, two are repeated until
 * they agree, and the day grows away from its water. There is no drift; without
 * spare runs the two of them are better than the one. */
static void spare_runs_are_named(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(
        "question: {expect: 1.5 %, against: 1.31 %, against_is: same-constants}\n"
        "bench: {agreement: 0.02 %, spare_runs: 10, working_day: 24 h}\n"
        "kit:\n"
        "  baths: [{name: slow, fluctuation: 0.15 K, correlation_time: 10 h, drift_u: 0 K/h, day_u: 0 K, gradient_u: 0 K}]\n"
        "  timers: [{name: by-hand, hand_u: 0.4 s}]\n"
        "plan: {grade: middle, bath: slow, temperature_record: none, water_fillings: 1, water_runs: 1, levels: 3, fillings: 1, runs: [1, 2]}\n"
        "run: {studies: 20000}\n");
    struct worse pair[ROOM];
    struct figures se[2];
    size_t count = 0;
    assert_true(worse_find(s, 0, ROOM, pair, &count));
    assert_int_equal(count, 1);
    assert_int_equal(pair[0].cheaper, 0);
    assert_int_equal(pair[0].dearer, 1);
    assert_true(figure_of(s, 1, WORSE_SPARE_RUNS, &se[1]).power > figure_of(s, 0, WORSE_SPARE_RUNS, &se[0]).power);
    assert_int_equal(pair[0].cause, WORSE_SPARE_RUNS);
    scenario_free(s);
}

/* Plans that differ in more than fillings and runs are not compared. */
static void replicates_only(void **state)
{
    (void)state;
    struct scenario *const s = studies_read("question: {expect: 1.5 %, against: 1.31 %, against_is: same-constants}\n"
                                            "kit: {baths: [{name: bad, fluctuation: 0.5 K}]}\n"
                                            "plan: {grade: middle, tube: [suspended-0c, suspended-0], bath: [circulator, bad], temperature_record: none, fillings: 1}\n"
                                            "run: {studies: 1024}\n");
    struct worse pair[ROOM];
    struct figures se[2];
    size_t count = 99;
    /* candidate 0 is the cheaper and much the better of it and the last one */
    const struct figures first = figure_of(s, 0, WORSE_UNKNOWN, &se[0]), last = figure_of(s, 3, WORSE_UNKNOWN, &se[1]);
    assert_true(first.hours_s < last.hours_s && first.power - last.power > BAR_BAND * hypot(se[0].power, se[1].power));
    assert_true(worse_find(s, 0, ROOM, pair, &count));
    assert_int_equal(count, 0);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(drift_is_named), cmocka_unit_test(none_and_no_room), cmocka_unit_test(spare_runs_are_named), cmocka_unit_test(replicates_only)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
