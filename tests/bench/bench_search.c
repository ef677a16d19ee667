/* How often the search names the plan of the exhaustive run, over 20 seeds of
 * the clear grid, ties in cost aside. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

#include "sim/base/complain.h"
#include "sim/bench/cost.h"
#include "sim/judge/search.h"

enum { SEEDS = 20 };

static double cost_at(const struct scenario *s, const struct search_result *r, long index)
{
    const struct figures *const f = &r->candidates[index].outcome.at;
    return cost_rounded(scenario_cost(s), (struct cost){f->hours_s, f->money});
}

/* 1 when both name one plan, or plans of one cost (by the exhaustive run). */
static int same(int seed, double *share)
{
    char set[32];
    const char *const sets[] = {set};
    const struct scenario_request request = {.path = "tests/bench/clear.yaml", .sets = sets, .sets_count = 1};
    struct complaints *const complaints = complain_new();
    struct search_result quick, whole;
    snprintf(set, sizeof set, "run.seed=%d", seed);
    struct scenario *const s = scenario_read(&request, complaints);
    complain_print(complaints, stderr);
    if (!s || !search_run(s, (struct search_options){0}, &quick) || !search_run(s, (struct search_options){.exhaustive = true}, &whole)) abort();
    const long a = quick.recommended, b = whole.recommended;
    const int one = a == b || (a != SEARCH_NONE && b != SEARCH_NONE && cost_at(s, &whole, a) == cost_at(s, &whole, b));
    *share = (double)quick.spent / (double)quick.exhaustive;
    search_free(&quick);
    search_free(&whole);
    scenario_free(s);
    complain_free(complaints);
    return one;
}

int main(void)
{
    int good = 0;
    double most = 0.0;
    for (int seed = 1; seed <= SEEDS; seed++) {
        double share;
        good += same(seed, &share);
        most = fmax(most, share);
    }
    printf("search names the exhaustive plan %8d of %d seeds (asked: at least 19), with at most %.1f %% of its studies\n", good, SEEDS, 100.0 * most);
    return good < 19;
}
