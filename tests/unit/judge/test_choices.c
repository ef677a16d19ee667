/* What each option costs, from the search, against the exhaustive run on a small
 * grid. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>

#include <cmocka.h>

#include <math.h>

#include "sim/bench/cost.h"
#include "sim/judge/search.h"
#include "studies.h"

static double cost_at(const struct scenario *s, const struct search_result *r, long index)
{
    const struct figures *const f = &r->candidates[index].outcome.at;
    return cost_rounded(scenario_cost(s), (struct cost){f->hours_s, f->money});
}

/* An option with which nothing resolves is one in both; else both name plans
 * whose cost, at the cap, is the same to the 0.1 h that a mean clock of a few
 * hundred studies may round to. */
static void against_exhaustive(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(
        "question: {expect: 1.5 %, against: 1.4 %, against_is: same-constants}\n"
        "run: {studies: 8192}\n"
        "plan: {grade: [low, middle], bath: [beaker-on-hot-plate, circulator], fillings: [1, 2], runs: [2, 4], extrapolation: [martin, single-point]}\n");
    struct search_result quick, whole;
    size_t none = 0, some = 0;
    assert_true(search_run(s, (struct search_options){0}, &quick));
    assert_true(search_run(s, (struct search_options){.exhaustive = true}, &whole));
    assert_true(quick.spent < whole.spent);
    for (size_t key = 0; key < scenario_keys(s); key++)
        for (size_t option = 0; option < scenario_options(s, key); option++) {
            const long a = search_choice(s, &quick, key, option), b = search_choice(s, &whole, key, option);
            assert_true((a == SEARCH_NONE) == (b == SEARCH_NONE));
            none += a == SEARCH_NONE;
            some += a != SEARCH_NONE;
            if (a != SEARCH_NONE) assert_true(fabs(cost_at(s, &whole, a) - cost_at(s, &whole, b)) < 0.15);
        }
    assert_true(none > 0 && some > 5);
    search_free(&quick);
    search_free(&whole);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(against_exhaustive)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
