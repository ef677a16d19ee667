/* The wall between bench and reduction: what is true is zeroed in memory once
 * the notebook is written, and the estimates stay the same bytes. */
#include "bench/still.h"

/* Every source on, two days, a record or none. */
static const char *const every_source =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "plan: {grade: middle, bath: beaker-on-hot-plate, tube: constant-50, thermometer: glass, timer: first-time}\n"
    "bench: {bubble_chance: 5 %, working_day: 8 h, combine: median, carry_over: 1 %}\n"
    "polymer: {temperature_coefficient: -0.005 1/K}\n";

/* Draws of LANES studies as study_play takes them, but by the test's own
 * hand. */
static void work(const struct design *d, const struct draws_key *key, struct still_hand *h, double fraction)
{
    truth_draw(d, key, (struct truth_where){0, 0}, &h->draws);
    truth_of(d, &h->draws, fraction, &h->bench.truth);
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const filling = &d->filling[f];
        const struct streams_place place = {
            .solution = filling->water ? STREAMS_WATER : filling->series == INTACT ? STREAMS_INTACT : STREAMS_CLEAVED,
            .level = (unsigned)(filling->water ? filling->day : filling->level), .filling = (unsigned)filling->number};
        if (f == 0 || filling->day != filling[-1].day) {
            double day[DRAWS_DAY][LANES];
            draws_normals(key, STREAMS_DAY, (struct streams_place){.level = (unsigned)filling->day}, DRAWS_DAY, day);
            bench_open_day(&h->bench, day);
        }
        draws_open_filling(&h->filling, key, place, filling->runs);
        bench_fill(&h->bench, f, &h->filling, (const double[LANES]){0});
    }
}

static void the_truth_is_not_seen(struct plan *p, const struct scenario *s)
{
    struct still_bench b;
    still_open(&b, p, s, 0.015);
    for (size_t block = 0; block < 40; block++) {
        const struct draws_key key = draws_key(b.job.seed, (uint64_t)block * LANES, (struct draws_exchange){0});
        struct still_hand *const h = still_hand_open(&b.design);
        study_play(block, &b.job, b.slot, b.scratch);
        work(&b.design, &key, h, 0.015);
        memset(&h->bench.truth, 0, sizeof h->bench.truth);
        memset(&h->draws, 0, sizeof h->draws);
        memset(&h->filling, 0, sizeof h->filling);
        const struct reduction_result blind = still_hand_reduce(h);
        assert_memory_equal(&blind, study_result_of(&b.job, b.slot, 0, 0), sizeof blind);
        /* a different truth does give another notebook: the comparison is not empty */
        work(&b.design, &key, h, 0.012);
        const struct reduction_result other = still_hand_reduce(h);
        FOR_LANES(l) assert_true(other.delta[l] != blind.delta[l]);
        still_hand_close(h);
    }
    still_close(&b);
}

/* TEXT: exact bytes. */
static void zeroed_truth_same_bytes(void **state)
{
    (void)state;
    struct scenario *const s = still_read(every_source);
    struct plan p;
    scenario_plan(s, 0, &p);
    for (int record = 0; record < 2; record++)
        for (int line = 0; line < 5; line++)
            for (int statistics = 0; statistics < 2; statistics++) {
                p.temperature_record = record == 1;
                p.analysis.extrapolation = (enum extrapolation)line;
                p.analysis.chain_statistics = (enum chain_statistics)statistics;
                the_truth_is_not_seen(&p, s);
            }
    scenario_free(s);
}

/* What the analyst assumes follows from nominal values: no spread of the plan
 * changes a byte of it. */
static void assumed_are_nominal_values(void **state)
{
    (void)state;
    struct scenario *const s = still_read(every_source);
    struct plan loud, still;
    struct design a, b;
    scenario_plan(s, 0, &loud);
    still = loud;
    still_make(&still);
    still.material.hydrolysis = loud.material.hydrolysis; /* these are nominal */
    still.cleavage.conversion = loud.cleavage.conversion;
    still.cleavage.nonspecific = loud.cleavage.nonspecific;
    assert_true(design_make(&a, &loud, scenario_cost(s), scenario_question(s)) && design_make(&b, &still, scenario_cost(s), scenario_question(s)));
    a.assumed.sums = b.assumed.sums = NULL;
    assert_memory_equal(&a.assumed, &b.assumed, sizeof a.assumed);
    design_free(&a);
    design_free(&b);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(zeroed_truth_same_bytes), cmocka_unit_test(assumed_are_nominal_values)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
