/* The search against playing every plan to the end (issue: "The search"). With
 * the band 3.3 standard errors at the cap on either side of the bar:
 * tests/bench/clear.yaml has no figure inside the band, and the search names
 * the same plan with at most a tenth of the studies; tests/bench/edgy.yaml has
 * some, and it names a plan whose figure is not below the bar by more than the
 * band and which costs no more. */
#include "bench/still.h"

#include "sim/base/spread.h"
#include "sim/bench/cost.h"
#include "sim/judge/bar.h"
#include "sim/judge/search.h"

enum { ENOUGH = 200 };

struct both {
    struct scenario *s;
    struct search_result exhaustive, sequential;
    size_t inside; /* figures within the band */
};

static void run(struct both *b, const char *path)
{
    struct complaints *const complaints = complain_new();
    b->s = scenario_read(&(struct scenario_request){.path = path}, complaints);
    complain_print(complaints, stdout);
    complain_free(complaints);
    assert_non_null(b->s);
    assert_true(scenario_candidates(b->s) >= ENOUGH);
    assert_true(search_run(b->s, (struct search_options){.exhaustive = true}, &b->exhaustive));
    assert_true(search_run(b->s, (struct search_options){0}, &b->sequential));
    b->inside = 0;
    for (size_t i = 0; i < b->exhaustive.count; i++) {
        const struct outcome *const o = &b->exhaustive.candidates[i].outcome;
        assert_true(o->studies == scenario_studies(b->s)); /* none is struck out: all have their figure at the cap */
        b->inside += fabs(o->margin_se) <= BAR_BAND;
    }
    print_message("%s: %zu plans in %zu bench groups, %zu inside the band; %zu of %zu studies, %.1f %%; plans %ld and %ld\n", path, b->exhaustive.count,
                  b->exhaustive.groups, b->inside, b->sequential.spent, b->exhaustive.exhaustive,
                  100.0 * (double)b->sequential.spent / (double)b->exhaustive.exhaustive, b->exhaustive.recommended, b->sequential.recommended);
}

static void end(struct both *b)
{
    search_free(&b->exhaustive);
    search_free(&b->sequential);
    scenario_free(b->s);
}

static double cost(const struct both *b, long i)
{
    const struct outcome *const o = &b->exhaustive.candidates[i].outcome;
    return cost_rounded(scenario_cost(b->s), (struct cost){o->at.hours_s, o->at.money});
}

static void nothing_near_the_bar(void **state)
{
    (void)state;
    struct both b;
    run(&b, "tests/bench/clear.yaml");
    assert_int_equal(b.inside, 0);
    assert_true(b.exhaustive.counts[STATUS_RESOLVES] > 10 && b.exhaustive.counts[STATUS_FAILS] > 10 && b.exhaustive.groups > 10);
    assert_true(b.exhaustive.recommended != SEARCH_NONE);
    assert_int_equal(b.sequential.recommended, b.exhaustive.recommended);
    assert_int_equal(b.sequential.exhaustive, b.exhaustive.exhaustive);
    assert_true(b.sequential.spent <= b.exhaustive.exhaustive / 10);
    for (size_t i = 0; i < b.exhaustive.count; i++) /* and each plan is judged alike */
        assert_int_equal(b.sequential.candidates[i].outcome.status, b.exhaustive.candidates[i].outcome.status);
    end(&b);
}

static void some_near_the_bar(void **state)
{
    (void)state;
    struct both b;
    run(&b, "tests/bench/edgy.yaml");
    assert_true(b.inside > 10);
    assert_true(b.exhaustive.recommended != SEARCH_NONE && b.sequential.recommended != SEARCH_NONE);
    assert_true(b.exhaustive.candidates[b.sequential.recommended].outcome.margin_se >= -BAR_BAND);
    assert_true(cost(&b, b.sequential.recommended) <= cost(&b, b.exhaustive.recommended));
    assert_true(b.sequential.spent < b.exhaustive.exhaustive);
    end(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(nothing_near_the_bar), cmocka_unit_test(some_near_the_bar)};
    spread_set_threads(1);
    return cmocka_run_group_tests(tests, NULL, NULL);
}
