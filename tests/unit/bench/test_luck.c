/* Whole studies: switching a source on or off, a spare run, the other fraction
 * or another shape of the plan leaves every other deviate as it was.
 * Source: model.md section 5. */
#include "bench/still.h"

#include "sim/bench/draws.h"

/* The default plan with every source of a run on and no day's end. */
static struct plan loud_plan(struct scenario **s)
{
    struct plan p;
    *s = still_read("question: {expect: 1.5 %, against: 1.2 %}\n"
                    "plan: {grade: middle, tube: constant-50, timer: first-time}\n"
                    "bench: {bubble_chance: 5 %, working_day: 24 h, spare_runs: 0}\n");
    scenario_plan(*s, 0, &p);
    return p;
}

static void steady_bath(struct plan *p)
{
    p->bath.fluctuation_K = p->bath.drift_u_K_s = 0.0;
}

static struct streams_place place_of(const struct notebook_filling *f)
{
    return (struct streams_place){.solution = f->water ? STREAMS_WATER : f->series == INTACT ? STREAMS_INTACT : STREAMS_CLEAVED,
                                  .level = (unsigned)(f->water ? f->day : f->level), .filling = (unsigned)f->number};
}

/* Which lanes of a block have a bubble in some run. */
static void bubbles(const struct still_bench *b, size_t block, double chance, bool any[LANES])
{
    static struct draws_filling d;
    const struct draws_key key = draws_key(b->job.seed, (uint64_t)block * LANES, (struct draws_exchange){0});
    FOR_LANES(l) any[l] = false;
    for (size_t f = 0; f < b->design.layout.fillings; f++) {
        const struct notebook_filling *const filling = &b->design.filling[f];
        draws_open_filling(&d, &key, place_of(filling), filling->runs);
        for (size_t r = 0; r < filling->runs; r++) FOR_LANES(l) any[l] = any[l] || d.run[r][DRAWS_BUBBLE][l] < chance;
    }
}

/* TEXT: studies without a bubble are the same to the bit, those with one are
 * not. */
static void bubbles_on_and_off(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan with = loud_plan(&s), without;
    with.habits.bubble_chance = 0.01;
    with.timer.resolution_s = 0.0; /* so that the smallest delay shows */
    without = with;
    without.habits.bubble_chance = 0.0;
    struct still_bench a, b;
    still_open(&a, &with, s, 0.015);
    still_open(&b, &without, s, 0.015);
    size_t same = 0, other = 0;
    for (size_t block = 0; block < 100; block++) {
        bool any[LANES];
        study_play(block, &a.job, a.slot, a.scratch);
        study_play(block, &b.job, b.slot, b.scratch);
        bubbles(&a, block, 0.01, any);
        const double *const x = study_result_of(&a.job, a.slot, 0, 0)->delta, *const y = study_result_of(&b.job, b.slot, 0, 0)->delta;
        FOR_LANES(l)
        {
            assert_true(any[l] ? x[l] != y[l] : x[l] == y[l]);
            same += !any[l];
            other += any[l];
        }
    }
    assert_true(same > 200 && other > 200); /* of 800, 0.99^54 = 0.58 of them without */
    still_close(&a);
    still_close(&b);
    scenario_free(s);
}

/* TEXT: with the bath steady, so that the clock changes nothing, every planned
 * run is the same to the bit whether there are spare runs or not. */
static void spare_runs_on_and_off(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan with = loud_plan(&s), without;
    steady_bath(&with);
    with.habits.agreement = 0.001;
    without = with;
    with.habits.spare_runs = 2;
    struct still_bench a, b;
    still_open(&a, &with, s, 0.015);
    still_open(&b, &without, s, 0.015);
    size_t spare = 0;
    for (size_t block = 0; block < 50; block++) {
        still_show(&a, block);
        still_show(&b, block);
        for (size_t f = 0; f < a.design.layout.fillings; f++) {
            FOR_LANES(l) spare += a.book.made[f][l] > b.book.made[f][l];
            for (size_t r = 0; r < a.design.filling[f].runs; r++) {
                const struct notebook_run *const x = still_run(&a, f, r), *const y = still_run(&b, f, r);
                assert_memory_equal(x->time_s, y->time_s, sizeof x->time_s);
                assert_memory_equal(x->read_K, y->read_K, sizeof x->read_K);
            }
        }
    }
    assert_true(spare > 1000);
    still_close(&a);
    still_close(&b);
    scenario_free(s);
}

/* TEXT: under the other fraction water and the intact series read the same to
 * the bit; only the cleaved series differs. */
static void both_fractions(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan p = loud_plan(&s);
    struct still_bench a, b;
    still_open(&a, &p, s, 0.015);
    still_open(&b, &p, s, 0.012);
    for (size_t block = 0; block < 20; block++) {
        still_show(&a, block);
        still_show(&b, block);
        for (size_t f = 0; f < a.design.layout.fillings; f++)
            for (size_t r = 0; r < a.design.filling[f].runs; r++) {
                const struct notebook_run *const x = still_run(&a, f, r), *const y = still_run(&b, f, r);
                assert_memory_equal(x->read_K, y->read_K, sizeof x->read_K);
                FOR_LANES(l) assert_true(a.design.filling[f].series == CLEAVED ? x->time_s[l] < y->time_s[l] : x->time_s[l] == y->time_s[l]);
            }
    }
    still_close(&a);
    still_close(&b);
    scenario_free(s);
}

/* The number of the filling of a design at the place of another's. */
static size_t same_place(const struct design *d, const struct notebook_filling *like)
{
    for (size_t f = 0; f < d->layout.fillings; f++)
        if (d->filling[f].water == like->water &&
            d->filling[f].series == like->series && d->filling[f].level == like->level && d->filling[f].number == like->number &&
            d->filling[f].day == like->day)
            return f;
    return d->layout.fillings;
}

/* The larger plan reads at the smaller one's places what that reads, within
 * `tolerance` of the departure from nominal time. */
static void shares_luck(const struct plan *small, const struct plan *large, const struct scenario *s, double tolerance)
{
    struct still_bench a, b;
    still_open(&a, small, s, 0.015);
    still_open(&b, large, s, 0.015);
    assert_true(b.design.layout.fillings * b.design.layout.stride > a.design.layout.fillings * a.design.layout.stride);
    for (size_t block = 0; block < 10; block++) {
        still_show(&a, block);
        still_show(&b, block);
        for (size_t f = 0; f < a.design.layout.fillings; f++) {
            const struct notebook_filling *const filling = &a.design.filling[f];
            const size_t g = same_place(&b.design, filling);
            assert_true(g < b.design.layout.fillings);
            const double ta = a.design.liquid[design_liquid_of(&a.design, filling)].nominal_s;
            const double tb = b.design.liquid[design_liquid_of(&b.design, &b.design.filling[g])].nominal_s;
            for (size_t r = 0; r < filling->runs; r++)
                FOR_LANES(l) still_near("departure", still_run(&a, f, r)->time_s[l] - ta, still_run(&b, g, r)->time_s[l] - tb, tolerance);
        }
    }
    still_close(&a);
    still_close(&b);
}

/* More fillings, runs, water: TEXT, the same bits. More levels: hand timing
 * alone, whose departure does not know the concentration; ROUND: 1e-11 s. */
static void other_shapes(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan small = loud_plan(&s);
    steady_bath(&small);
    struct plan large = small;
    small.fillings[INTACT] = small.fillings[CLEAVED] = 1;
    small.runs = small.water_runs = 2;
    small.water_fillings = 1;
    small.habits.carry_over = large.habits.carry_over = 0.0; /* another filling before it, another rest */
    large.solutions.level_volume_m3 = small.solutions.level_volume_m3 = 100e-6; /* the same flasks */
    large.solutions.stock_volume_m3 = small.solutions.stock_volume_m3 = 500e-6;
    shares_luck(&small, &large, s, 0.0);
    still_make(&small);
    small.timer.hand_u_s = 0.3;
    large = small;
    large.levels[INTACT] = 5;
    large.levels[CLEAVED] = 7;
    large.runs = 4;
    shares_luck(&small, &large, s, 1e-11);
    scenario_free(s);
}

/* One source each, switched by its key in the plan; effects of about 1e-3. */
enum { SOURCES = 20 };
static void switch_on(struct plan *p, int source)
{
    double *const key[SOURCES] = {
        &p->material.eta_u, &p->material.a_u, &p->material.hydrolysis_u, &p->material.interaction_u, &p->cleavage.conversion_u,
        &p->solutions.dry_content_u, &p->solutions.balance_u_kg, &p->solutions.delivery_tolerance_m3, &p->solutions.delivery_u_m3,
        &p->habits.filling_u, &p->habits.charge_u_m3, &p->habits.tilt_u_rad, &p->habits.kinetic_u, &p->tube.solution_offset_u,
        &p->bath.fluctuation_K, &p->bath.drift_u_K_s, &p->bath.day_u_K, &p->bath.gradient_u_K, &p->thermometer.calibration_u_K, &p->timer.hand_u_s};
    static const double u[SOURCES] = {3e-3, 3e-3, 3e-3, 3e-2, 3e-3, 3e-3, 2e-6, 5e-8, 2e-8, 1e-3, 1e-7, 1e-2, 0.2, 1e-3, 0.05, 1e-5, 0.05, 0.05, 0.05, 0.3};
    *key[source] = u[source];
}

static void times_of(const struct plan *p, const struct scenario *s, size_t n, double *out)
{
    struct still_bench b;
    size_t k = 0;
    still_open(&b, p, s, 0.015);
    still_show(&b, 3);
    for (size_t f = 0; f < b.design.layout.fillings; f++)
        for (size_t r = 0; r < b.design.filling[f].runs; r++)
            FOR_LANES(l) if (k < n) out[k++] = still_run(&b, f, r)->time_s[l];
    assert_int_equal(k, n);
    still_close(&b);
}

/* What a source does to every time is the same with all the others on as
 * alone. SERIES: but for products of two effects, up to about 1e-2 each; other
 * draws would make it wrong by whole effects. Measured in units of the
 * source's own largest effect plus 1e-2 s: a tenth. */
static void each_source_by_itself(void **state)
{
    (void)state;
    enum { TIMES = 18 * 3 * LANES };
    static double none[TIMES], all[TIMES], alone[TIMES], without[TIMES];
    struct scenario *s;
    struct plan still = loud_plan(&s), loud;
    still_make(&still);
    still.tube.offset_m = 0.01; /* so that a tilt counts to first order */
    still.cleavage.conversion = still.material.hydrolysis = 0.9; /* away from the reflection at 1 */
    loud = still;
    for (int i = 0; i < SOURCES; i++) switch_on(&loud, i);
    times_of(&still, s, TIMES, none);
    times_of(&loud, s, TIMES, all);
    for (int i = 0; i < SOURCES; i++) {
        struct plan p = still, q = still;
        double effect = 0.0, worst = 0.0;
        switch_on(&p, i);
        for (int j = 0; j < SOURCES; j++)
            if (j != i) switch_on(&q, j);
        times_of(&p, s, TIMES, alone);
        times_of(&q, s, TIMES, without);
        for (size_t k = 0; k < TIMES; k++) {
            effect = fmax(effect, fabs(alone[k] - none[k]));
            worst = fmax(worst, fabs((all[k] - without[k]) - (alone[k] - none[k])));
        }
        if (!(effect > 0.02 && worst <= 0.1 * effect + 0.01)) print_message("source %d: effect %g s, worst %g s\n", i, effect, worst);
        assert_true(effect > 0.02 && worst <= 0.1 * effect + 0.01);
    }
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(bubbles_on_and_off), cmocka_unit_test(spare_runs_on_and_off), cmocka_unit_test(both_fractions),
                                       cmocka_unit_test(other_shapes), cmocka_unit_test(each_source_by_itself)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
