/* How a search ends: a plan that passes by luck is set aside, and when nothing
 * resolves the nearest miss is named, with what limits it. Source: model.md
 * section 4. */
#include "bench/still.h"

#include "sim/base/spread.h"
#include "sim/judge/search.h"
#include "sim/judge/trial.h"

static struct search_result searched(const struct scenario *s, bool exhaustive)
{
    struct search_result r;
    assert_true(search_run(s, (struct search_options){.exhaustive = exhaustive}, &r));
    return r;
}

enum { CAP = 2048 };

static void lucky_text(char *yaml, size_t size, const char *fillings, uint64_t seed, double within)
{
    snprintf(yaml, size,
             "question: {expect: 1.5 %%, within: %.10f %%, against: 1.2 %%, against_is: same-constants, confidence: 90 %%, power: 50 %%}\n"
             "plan: {grade: middle, levels: 2, runs: 1, water_runs: 2, fillings: %s}\nrun: {studies: %d, seed: %llu}\n",
             100.0 * within, fillings, CAP, (unsigned long long)seed);
}

static int rising(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;
    return x < y ? -1 : x > y;
}

/* The half-width at which the share of CAP studies from `first` just passes:
 * more than 0.9 + 3.3 sqrt(0.09/2048) = 0.921875 of them, 1889. */
static double just_passes(uint64_t seed, size_t first)
{
    char yaml[1024];
    struct plan p;
    struct outcome o;
    struct estimates e;
    lucky_text(yaml, sizeof yaml, "1", seed, 0.001);
    struct scenario *const s = still_read(yaml);
    scenario_plan(s, 0, &p);
    assert_true(trial_run(s, &p, (struct trial_options){.first_study = first}, &o, &e));
    for (size_t i = 0; i < CAP; i++) e.expect[i] = fabs(e.expect[i] - 0.015);
    qsort(e.expect, CAP, sizeof *e.expect, rising);
    const double at = e.expect[1888];
    trial_free_estimates(&e);
    scenario_free(s);
    return at;
}

/* A seed and a half-width with which the plan of one filling passes on the
 * studies of the search and not on fresh ones. */
static double by_luck(uint64_t *seed)
{
    for (*seed = 1; *seed < 100; (*seed)++) {
        const double first = just_passes(*seed, 0), fresh = just_passes(*seed, CAP);
        if (first < 0.985 * fresh) return 0.5 * (first + fresh);
    }
    fail();
    return 0.0;
}

/* Passed by luck, it does not pass on fresh studies: set aside, and the next
 * cheapest is named. */
static void set_aside(void **state)
{
    (void)state;
    char yaml[1024];
    uint64_t seed;
    const double within = by_luck(&seed);
    lucky_text(yaml, sizeof yaml, "[1, 4]", seed, within);
    struct scenario *const s = still_read(yaml);
    for (int exhaustive = 0; exhaustive < 2; exhaustive++) {
        struct search_result r = searched(s, exhaustive == 1);
        assert_int_equal(r.recommended, 1);
        assert_int_equal(r.candidates[0].outcome.status, STATUS_UNDECIDED);
        assert_int_equal(r.candidates[1].outcome.status, STATUS_RESOLVES);
        assert_int_equal(r.fresh.status, STATUS_RESOLVES);
        assert_int_equal(r.counts[STATUS_RESOLVES], 1);
        assert_int_equal(r.counts[STATUS_UNDECIDED], 1);
        for (size_t key = 0; key < scenario_keys(s); key++)
            if (scenario_options(s, key) == 2) {
                assert_int_equal(search_choice(s, &r, key, 0), SEARCH_NONE);
                assert_int_equal(search_choice(s, &r, key, 1), 1);
            }
        search_free(&r);
    }
    scenario_free(s);
}

/* The only plan that passes does so by luck: then nothing resolves, and
 * nowhere does it say otherwise. */
static void all_set_aside(void **state)
{
    (void)state;
    char yaml[1024];
    uint64_t seed;
    const double within = by_luck(&seed);
    lucky_text(yaml, sizeof yaml, "1", seed, within);
    struct scenario *const s = still_read(yaml);
    for (int exhaustive = 0; exhaustive < 2; exhaustive++) {
        struct search_result r = searched(s, exhaustive == 1);
        assert_int_equal(r.recommended, SEARCH_NONE);
        assert_int_equal(r.nearest_miss, 0);
        assert_int_equal(r.counts[STATUS_RESOLVES], 0);
        assert_int_equal(r.candidates[0].outcome.status, STATUS_UNDECIDED);
        assert_true(r.nearest.status != STATUS_RESOLVES);
        search_free(&r);
    }
    scenario_free(s);
}

/* Nothing resolves: the nearest miss is the smallest shortfall at the cap of
 * all, in depth (TEXT: as tried alone). */
static void nearest_miss(void **state)
{
    (void)state;
    struct scenario *const s = still_read("question: {expect: 1.5 %, against: 1.47 %, against_is: same-constants}\n"
                                          "plan: {grade: [middle, low], levels: 2, fillings: [1, 2, 4], bath: [beaker-on-hot-plate, circulator]}\n"
                                          "run: {studies: 2048}\n");
    for (int exhaustive = 0; exhaustive < 2; exhaustive++) {
        struct search_result r = searched(s, exhaustive == 1);
        double best = -(double)INFINITY;
        long which = SEARCH_NONE;
        for (size_t i = 0; i < r.count; i++) {
            struct plan p;
            struct outcome o;
            scenario_plan(s, i, &p);
            assert_true(trial_run(s, &p, (struct trial_options){0}, &o, NULL));
            assert_int_equal(r.candidates[i].outcome.status, STATUS_FAILS);
            if (o.margin_se > best) {
                best = o.margin_se;
                which = (long)i;
            }
        }
        struct plan p;
        struct outcome deep;
        scenario_plan(s, (size_t)which, &p);
        assert_true(trial_run(s, &p, (struct trial_options){.deep = true}, &deep, NULL));
        assert_int_equal(r.nearest_miss, which);
        assert_int_equal(r.recommended, SEARCH_NONE);
        assert_true(r.nearest.margin_se == best && r.nearest.resolvable_against == deep.resolvable_against && deep.resolvable_against < 0.0147);
        assert_int_equal(r.counts[STATUS_FAILS], 12);
        assert_false(r.constants_are_limit);
        search_free(&r);
    }
    scenario_free(s);
}

static struct search_result lone(const char *question, const char *polymer, const char *bath)
{
    char yaml[1024];
    snprintf(yaml, sizeof yaml,
             "question: {expect: 1.5 %%, %s}\npolymer: {%s}\n"
             "plan: {grade: middle, levels: 3, fillings: 2, bath: %s}\nrun: {studies: 2048}\n",
             question, polymer, bath);
    struct scenario *const s = still_read(yaml);
    struct search_result r = searched(s, false);
    scenario_free(s);
    return r;
}

/* The constants are the limit when it would resolve with eta_u = a_u = 0, the
 * bench when it would not. With eta_u 5 % alone 95 % lie within 0.193 points
 * (test_trial.c); the bench at hand comes within 0.09, a hot plate within
 * more. */
static void what_is_the_limit(void **state)
{
    (void)state;
    struct search_result r = lone("within: 0.15 %", "eta_u: 5 %, a_u: 0", "circulator");
    assert_int_equal(r.nearest_miss, 0);
    assert_true(r.constants_are_limit && r.within_too_narrow);
    search_free(&r);
    r = lone("within: 0.02 %", "eta_u: 5 %, a_u: 0", "circulator"); /* both are too wide */
    assert_true(r.nearest_miss == 0 && !r.constants_are_limit && r.within_too_narrow);
    search_free(&r);
    r = lone("within: 0.05 %", "eta_u: 0.1 %, a_u: 0", "circulator"); /* the bench */
    assert_true(r.nearest_miss == 0 && !r.constants_are_limit && !r.within_too_narrow);
    search_free(&r);
    r = lone("against: 1.2 %", "eta_u: 10 %, a_u: 0", "circulator"); /* a value found elsewhere */
    assert_true(r.nearest_miss == 0 && r.constants_are_limit && !r.within_too_narrow);
    search_free(&r);
    r = lone("against: 1.2 %, against_is: same-constants", "eta_u: 10 %, a_u: 0", "circulator");
    assert_true(r.recommended == 0 && r.nearest_miss == SEARCH_NONE);
    search_free(&r);
}

/* Nothing is possible: no miss either, no studies. All too dear: the same. */
static void nothing_possible(void **state)
{
    (void)state;
    static const char *const texts[2] = {"plan: {grade: middle, levels: 1, fillings: [1, 2]}\n", "plan: {grade: middle, fillings: [1, 2]}\ncost: {at_most: {hours: 1 h}}\n"};
    for (int i = 0; i < 2; i++) {
        char yaml[512];
        snprintf(yaml, sizeof yaml, "question: {expect: 1.5 %%, against: 1.2 %%}\n%srun: {studies: 512}\n", texts[i]);
        struct scenario *const s = still_read(yaml);
        struct search_result r = searched(s, false);
        assert_true(r.recommended == SEARCH_NONE && r.nearest_miss == SEARCH_NONE && r.spent == 0 && r.exhaustive == 0 && r.groups == 0);
        assert_int_equal(r.counts[i ? STATUS_TOO_DEAR : STATUS_IMPOSSIBLE], 2);
        search_free(&r);
        scenario_free(s);
    }
}

struct told {
    double last;
    size_t times;
};
static void tell(void *context, double done)
{
    struct told *const t = context;
    assert_true(done >= t->last && done <= 1.0);
    t->last = done;
    t->times++;
}

static void progress(void **state)
{
    (void)state;
    struct scenario *const s = still_read("question: {expect: 1.5 %, against: 1.2 %}\nplan: {grade: middle, levels: 2, fillings: [1, 2, 3]}\nrun: {studies: 512}\n");
    struct search_result r;
    struct told told = {0};
    assert_true(search_run(s, (struct search_options){.progress = tell, .context = &told}, &r));
    assert_true(told.times >= 5 && told.last == 1.0);
    search_free(&r);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(set_aside), cmocka_unit_test(all_set_aside), cmocka_unit_test(nearest_miss),
                                       cmocka_unit_test(what_is_the_limit), cmocka_unit_test(nothing_possible), cmocka_unit_test(progress)};
    spread_set_threads(1);
    return cmocka_run_group_tests(tests, NULL, NULL);
}
