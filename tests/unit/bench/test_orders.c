/* The orders of the bench beside the plain one: shuffled, dealt once for all
 * studies, and bracketed, with water at both ends of a day. Source: model.md,
 * the bench. */
#include "studies.h"

static const char *const yaml =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "bench: {clean_and_fill: 8 min, equilibrate: 10 min, reset: 60 s, spare_runs: 0, working_day: 24 h}\n"
    "plan: {grade: middle, levels: 3, fillings: 2, runs: 1, water_fillings: 3, water_runs: 1, order: shuffled}\n";

/* Every portion once, and nothing else. */
static void each_filling_once(const struct design *d, size_t water)
{
    size_t seen[SERIES][3][2] = {{{0}}}, waters = 0;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const q = &d->filling[f];
        waters += q->water;
        if (!q->water && !q->blank) seen[q->series][q->level][q->number]++;
    }
    for (size_t i = 0; i < SERIES; i++)
        for (size_t j = 0; j < 3; j++)
            for (size_t n = 0; n < 2; n++) assert_int_equal(seen[i][j][n], 1);
    assert_int_equal(waters, water * d->layout.days);
}

static void order_of(const struct plan *p, const struct scenario *s, char *text, size_t size)
{
    struct design d;
    studies_lay(&d, p, s);
    each_filling_once(&d, p->water_fillings);
    studies_order(&d, text, size);
    design_free(&d);
}

/* The same whenever it is laid out, and for every study; another seed of the
 * scenario deals otherwise; the exchange of a budget's seeds does not. */
static void dealt_from_the_seed(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s), plain = p;
    char text[5][600];
    assert_true(p.order == ORDER_SHUFFLED && p.seed == scenario_seed(s));
    order_of(&p, s, text[0], sizeof text[0]);
    order_of(&p, s, text[1], sizeof text[1]);
    assert_string_equal(text[0], text[1]);
    plain.order = ORDER_SEQUENTIAL;
    order_of(&plain, s, text[2], sizeof text[2]);
    assert_string_equal(text[2], "W0 W1 W2 i00 i01 i10 i11 i20 i21 c00 c01 c10 c11 c20 c21");
    assert_string_not_equal(text[0], text[2]);
    for (uint64_t seed = 2; seed < 4; seed++) {
        p.seed = seed;
        order_of(&p, s, text[seed + 1], sizeof text[0]);
        assert_string_not_equal(text[seed + 1], text[0]);
    }
    assert_string_not_equal(text[3], text[4]);
    scenario_free(s);
}

/* STAT: over 6000 seeds each of six fillings stands at each place in a sixth,
 * within 5 standard errors; 36 shares at 5.7e-7 (they are not independent):
 * chance of a false alarm below 3e-5. */
static void every_place_alike(void **state)
{
    (void)state;
    enum { DEALS = 6000, COUNT = 6 };
    double at[COUNT][COUNT] = {{0}};
    for (uint64_t seed = 0; seed < DEALS; seed++) {
        size_t order[COUNT];
        for (size_t i = 0; i < COUNT; i++) order[i] = i;
        draws_deal(seed, COUNT, order);
        for (size_t i = 0; i < COUNT; i++) at[i][order[i]] += 1.0 / DEALS;
    }
    for (size_t i = 0; i < COUNT; i++)
        for (size_t j = 0; j < COUNT; j++) check_close(at[i][j], 1.0 / COUNT, 5.0 * sqrt(5.0 / 36.0 / DEALS), "STAT 5 standard errors");
}

/* Over several days: water first on each, a blank before the first cleaved
 * filling of each; nothing is longer than the day. */
static void days_of_a_shuffled_order(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    p.habits.working_day_s = 5.0 * 3600.0;
    p.cleavage.blank_reference = true;
    studies_lay(&d, &p, s);
    each_filling_once(&d, 3);
    assert_true(d.layout.days > 2);
    double clock_s = 0.0;
    size_t blanks = 0;
    for (size_t f = 0; f < d.layout.fillings; f++) {
        const struct notebook_filling *const q = &d.filling[f];
        const bool first = f == 0 || q->day != q[-1].day;
        if (first) blanks = 0;
        if (first) assert_true(q[0].water && q[1].water && q[2].water && !q[3].water);
        if (q->blank) assert_int_equal(q->number, blanks++);
        if (!q->water && !q->blank && q->series == CLEAVED) assert_int_equal(blanks, 3);
        clock_s = (first ? 0.0 : clock_s) + design_filling_s(&d, q);
        assert_true(clock_s <= p.habits.working_day_s);
    }
    design_free(&d);
    scenario_free(s);
}

/* A filling keeps its deviates wherever it stands: in a steady bath each run
 * reads the same to the bit as in the plain order. */
static void luck_goes_with_the_filling(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan shuffled = studies_plan(yaml, &s), plain;
    struct studies a, b;
    shuffled.timer.hand_u_s = 0.1;
    shuffled.habits.filling_u = 1e-3;
    shuffled.bath.gradient_u_K = 0.02;
    plain = shuffled;
    plain.order = ORDER_SEQUENTIAL;
    studies_open(&a, &shuffled, s);
    studies_open(&b, &plain, s);
    for (size_t block = 0; block < 3; block++) {
        studies_show(&a, block, 0);
        studies_show(&b, block, 0);
        for (size_t f = 0; f < a.design.layout.fillings; f++)
            for (size_t g = 0; g < b.design.layout.fillings; g++) {
                const struct notebook_filling *const x = &a.design.filling[f], *const y = &b.design.filling[g];
                if (x->water != y->water || x->series != y->series || x->level != y->level || x->number != y->number) continue;
                assert_memory_equal(notebook_runs(&a.shown.book, f)->time_s, notebook_runs(&b.shown.book, g)->time_s, sizeof(double[LANES]));
            }
    }
    studies_close(&a);
    studies_close(&b);
    scenario_free(s);
}

/* In the tube loadings are dealt, and each stays whole. */
static void loadings_stay_whole(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    p.dilution = DILUTION_IN_TUBE;
    p.habits.working_day_s = 12.0 * 3600.0;
    studies_lay(&d, &p, s);
    each_filling_once(&d, 3);
    for (size_t f = 1; f < d.layout.fillings; f++) {
        const struct notebook_filling *const q = &d.filling[f];
        if (q->water) continue;
        assert_int_equal(q->added, q->level < 2);
        if (q->added) assert_true(q[-1].series == q->series && q[-1].number == q->number && q[-1].level == q->level + 1 && q[-1].day == q->day);
    }
    design_free(&d);
    scenario_free(s);
}

/* Half of the water, rounded down, at the end of each day; its time is kept
 * free when fillings are taken. The blank stays where it is. */
static void bracketed_days(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    struct design d;
    p.order = ORDER_BRACKETED;
    p.levels[INTACT] = p.levels[CLEAVED] = 2;
    p.fillings[INTACT] = p.fillings[CLEAVED] = 1;
    p.cleavage.blank_reference = true;
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 B2 c00 c10 W2");
    studies_lay(&d, &p, s);
    const double water = 3.0 * (480.0 + 600.0 + d.liquid[DESIGN_WATER].nominal_s + 60.0), all = d.nominal_clock_s;
    design_free(&d);
    p.habits.working_day_s = all;
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 B2 c00 c10 W2");
    p.habits.working_day_s = all - 1.0;
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 B2 c00 W2 | W0 W1 B0 B1 B2 c10 W2");
    p.water_fillings = 4;
    p.habits.working_day_s = all + 2.0 / 3.0 * water; /* one filling more of water and of blank, and less than another */
    studies_has_order(&p, s, "W0 W1 i00 i10 B0 B1 B2 B3 c00 c10 W2 W3");
    p.water_fillings = 2;
    p.cleavage.blank_reference = false;
    studies_has_order(&p, s, "W0 i00 i10 c00 c10 W1");
    p.water_fillings = 1;
    studies_impossible(&p, s, "bracketed");
    p.water_fillings = 2;
    p.habits.water_every_day = false;
    studies_impossible(&p, s, "bracketed");
    scenario_free(s);
}

/* t_0 is the mean over both ends, in a bath that drifts and that nobody reads;
 * of a straight drift that takes away what the day's middle sees. */
static void mean_over_both_ends(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    double off[2];
    p.temperature_record = false;
    p.water_fillings = 2;
    p.bath.drift_u_K_s = 0.05 / 3600.0;
    for (int i = 0; i < 2; i++) {
        p.order = i == 0 ? ORDER_SEQUENTIAL : ORDER_BRACKETED;
        struct studies_hand *const h = studies_hand_open(&p, s);
        void *const memory = calloc(reduction_size(&h->design.layout), 1);
        struct reduction_times times = reduction_place(&h->design.layout, memory);
        h->day[DRAWS_DRIFT] = 1.0;
        studies_hand_work(h, 0.015);
        reduction_combine(&h->design.assumed, &h->bench.book, &times);
        const size_t other = i == 0 ? 1 : h->design.layout.fillings - 1;
        assert_true(h->design.filling[other].water);
        check_round(times.water_s[0][0], 0.5 * (studies_hand_time(h, 0, 0) + studies_hand_time(h, other, 0)), 4.0);
        off[i] = studies_hand_delta(h) - 0.015;
        free(memory);
        studies_hand_close(h);
    }
    assert_true(fabs(off[1]) < 0.6 * fabs(off[0])); /* the cleaved series, which counts most, lies in the day's second half */
    scenario_free(s);
}

/* Water at the end receives what was in the tube, with its k. */
static void water_at_the_end_receives(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(yaml, &s);
    p.order = ORDER_BRACKETED;
    p.habits.carry_over = 0.1;
    p.material.interaction[CLEAVED] = 0.2;
    struct studies_hand *const h = studies_hand_open(&p, s);
    studies_hand_work(h, 0.015);
    const size_t last = h->design.layout.fillings - 1;
    const double y = 0.1 * h->filled[last - 1].made_coil[0];
    assert_true(h->design.filling[last].water && y > 0.0);
    check_round(h->filled[last].coil[0], y, 4.0);
    check_round(h->filled[last].thick[0], 1.0 + y * exp(0.2 * y), 8.0);
    studies_hand_close(h);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(dealt_from_the_seed), cmocka_unit_test(every_place_alike), cmocka_unit_test(days_of_a_shuffled_order),
        cmocka_unit_test(luck_goes_with_the_filling), cmocka_unit_test(loadings_stay_whole), cmocka_unit_test(bracketed_days),
        cmocka_unit_test(mean_over_both_ends), cmocka_unit_test(water_at_the_end_receives),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
