/* A study is a function of its number alone: not of the lane, block or play in
 * which it is done, nor of what was in memory before, nor of how many threads
 * there are. TEXT throughout: exact bytes. */
#include "bench/still.h"

#include "sim/base/spread.h"
#include "sim/judge/play.h"

static const char *const every_source =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "plan: {grade: middle, bath: beaker-on-hot-plate, tube: constant-50, timer: first-time, levels: 3}\n"
    "bench: {bubble_chance: 5 %}\n";

enum { STUDIES = 1003 }; /* no multiple of LANES */

static void start(struct play *p, const struct design *d, size_t first_block)
{
    play_start(p, d, 7);
    p->first_block = first_block;
    p->fractions = 2;
    p->fraction[0] = 0.015;
    p->fraction[1] = 0.012;
    p->analyses = 2;
    p->analysis[0] = p->analysis[1] = d->plan->analysis;
    p->analysis[1].extrapolation = HUGGINS;
    p->active[0] = p->active[1] = true;
}

static void same_studies(const struct play *a, size_t from_a, const struct play *b, size_t from_b, size_t n)
{
    for (size_t how = 0; how < 2; how++)
        for (size_t f = 0; f < 2; f++)
            assert_memory_equal(a->sample[how].delta[f] + from_a, b->sample[how].delta[f] + from_b, n * sizeof(double));
}

struct stage {
    struct scenario *s;
    struct plan plan;
    struct design design;
    struct play whole; /* 0 ... STUDIES - 1 in one go, one thread */
};

static int set_up(void **state)
{
    struct stage *const g = calloc(1, sizeof *g);
    assert_non_null(g);
    g->s = still_read(every_source);
    scenario_plan(g->s, 0, &g->plan);
    assert_true(design_make(&g->design, &g->plan, scenario_cost(g->s), scenario_question(g->s)));
    assert_string_equal(g->design.why, "");
    spread_set_threads(1);
    start(&g->whole, &g->design, 0);
    assert_true(play_until(&g->whole, STUDIES));
    *state = g;
    return 0;
}

static int tear_down(void **state)
{
    struct stage *const g = *state;
    play_free(&g->whole);
    design_free(&g->design);
    scenario_free(g->s);
    free(g);
    return 0;
}

static void play_in_looks(void **state)
{
    const struct stage *const g = *state;
    struct play p;
    start(&p, &g->design, 0);
    for (size_t n = 64; n < STUDIES; n *= 2) assert_true(play_until(&p, n));
    assert_true(play_until(&p, STUDIES));
    same_studies(&p, 0, &g->whole, 0, STUDIES);
    assert_memory_equal(&p.clock_s, &g->whole.clock_s, sizeof p.clock_s);
    assert_memory_equal(&p.spare_runs, &g->whole.spare_runs, sizeof p.spare_runs);
    assert_memory_equal(p.sample[0].intrinsic, g->whole.sample[0].intrinsic, sizeof p.sample[0].intrinsic);
    play_free(&p);
}

static void play_from_a_later_block(void **state)
{
    const struct stage *const g = *state;
    struct play p;
    start(&p, &g->design, 17);
    assert_true(play_until(&p, 500));
    same_studies(&p, 0, &g->whole, (size_t)17 * LANES, 500);
    play_free(&p);
}

/* Both fractions and both analyses side by side, or each alone. */
static void played_alone(void **state)
{
    const struct stage *const g = *state;
    for (size_t f = 0; f < 2; f++)
        for (size_t how = 0; how < 2; how++) {
            struct play p;
            start(&p, &g->design, 0);
            p.fractions = 1;
            p.fraction[0] = g->whole.fraction[f];
            p.active[1 - how] = false;
            assert_true(play_until(&p, 200));
            assert_memory_equal(p.sample[how].delta[0], g->whole.sample[how].delta[f], 200 * sizeof(double));
            play_free(&p);
        }
}

static void other_threads(void **state)
{
    const struct stage *const g = *state;
    static const int threads[3] = {2, 3, 8};
    for (size_t i = 0; i < 3; i++) {
        struct play p;
        spread_set_threads(threads[i]);
        start(&p, &g->design, 0);
        assert_true(play_until(&p, STUDIES));
        same_studies(&p, 0, &g->whole, 0, STUDIES);
        assert_memory_equal(&p.clock_s, &g->whole.clock_s, sizeof p.clock_s);
        play_free(&p);
    }
    spread_set_threads(1);
}

/* Studies 3 ... 3 + LANES - 1 side by side: each in another lane than usual. */
static void other_lanes(void **state)
{
    const struct stage *const g = *state;
    const struct draws_key shifted = draws_key(7, 3, (struct draws_exchange){0}), usual[2] = {draws_key(7, 0, (struct draws_exchange){0}), draws_key(7, LANES, (struct draws_exchange){0})};
    static struct draws_filling a, b[2];
    struct truth_draws once, before;
    memset(&once, 0, sizeof once);
    memset(&before, 0, sizeof before);
    truth_draw(&g->design, &shifted, (struct truth_where){0, 0}, &once);
    truth_draw(&g->design, &usual[0], (struct truth_where){0, 0}, &before);
    const struct streams_place place = {.solution = STREAMS_CLEAVED, .level = 2, .filling = 1};
    draws_open_filling(&a, &shifted, place, 3);
    for (int i = 0; i < 2; i++) draws_open_filling(&b[i], &usual[i], place, 3);
    FOR_LANES(l)
    {
        const int there = (l + 3) % LANES, block = (l + 3) / LANES;
        for (int i = 0; i < DRAWS_FILLING; i++) assert_true(a.once[i][l] == b[block].once[i][there]);
        for (int r = 0; r < 3; r++)
            for (int i = 0; i < DRAWS_RUN; i++) assert_true(a.run[r][i][l] == b[block].run[r][i][there]);
        if (block == 0) assert_true(once.study[DRAWS_CALIBRATION][l] == before.study[DRAWS_CALIBRATION][there]);
    }
    struct still_hand *const h = still_hand_open(&g->design), *const j = still_hand_open(&g->design);
    h->draws = once;
    j->draws = before;
    memcpy(&h->filling, &a, sizeof a);
    memcpy(&j->filling, &b[0], sizeof a);
    memset(h->filling.drawn, NOTEBOOK_MAX_RUNS, LANES); /* the same spare draws, none, in both */
    memset(j->filling.drawn, NOTEBOOK_MAX_RUNS, LANES);
    still_hand_work(h, 0.015);
    still_hand_work(j, 0.015);
    const struct reduction_result x = still_hand_reduce(h), y = still_hand_reduce(j);
    for (int l = 0; l + 3 < LANES; l++) assert_true(x.delta[l] == y.delta[l + 3] && isfinite(x.delta[l]));
    still_hand_close(h);
    still_hand_close(j);
}

/* Whatever the scratch memory held before. */
static void memory_before(void **state)
{
    const struct stage *const g = *state;
    static const int fill[3] = {0x00, 0x7f, 0xff}; /* 0xff: every number is not a number */
    struct study_job job = {.design = &g->design, .seed = 7, .fractions = 2, .fraction = {0.015, 0.012}, .analyses = 1, .analysis = &g->plan.analysis};
    const size_t slot_size = study_slot_size(&job), scratch_size = study_scratch_size(&job);
    unsigned char *const slot = calloc(3, slot_size), *const scratch = aligned_alloc(64, (scratch_size + 63) / 64 * 64);
    assert_true(slot && scratch);
    for (size_t block = 0; block < 100; block++) {
        for (size_t i = 0; i < 3; i++) {
            memset(scratch, fill[i], scratch_size);
            study_play(block, &job, slot + i * slot_size, scratch);
        }
        assert_memory_equal(slot, slot + slot_size, slot_size);
        assert_memory_equal(slot, slot + 2 * slot_size, slot_size);
    }
    free(slot);
    free(scratch);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(play_in_looks), cmocka_unit_test(play_from_a_later_block), cmocka_unit_test(played_alone),
        cmocka_unit_test(other_threads), cmocka_unit_test(other_lanes),             cmocka_unit_test(memory_before),
    };
    return cmocka_run_group_tests(tests, set_up, tear_down);
}
