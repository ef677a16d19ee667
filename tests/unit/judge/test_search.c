/* The search for the cheapest plan that resolves. Source: model.md section 4,
 * interface.md. Everything is compared with what each candidate says when it
 * is tried alone. */
#include "bench/still.h"

#include "sim/base/spread.h"
#include "sim/bench/cost.h"
#include "sim/judge/search.h"
#include "sim/judge/trial.h"

static struct search_result searched(const struct scenario *s, bool exhaustive)
{
    struct search_result r;
    assert_true(search_run(s, (struct search_options){.exhaustive = exhaustive}, &r));
    return r;
}

static double cost(const struct scenario *s, const struct outcome *o)
{
    return cost_rounded(scenario_cost(s), (struct cost){o->at.hours_s, o->at.money});
}

/* A grid in which plans fail, resolve, are impossible (one level with a line)
 * and too dear. */
static const char *const grid =
    "question: {expect: 1.5 %, against: 1.385 %, against_is: same-constants}\n"
    "plan:\n"
    "  grade: [middle, high]\n"
    "  bath: [beaker-on-hot-plate, circulator]\n"
    "  temperature_record: [none, each-run]\n"
    "  levels: [1, 2, 3]\n"
    "  fillings: [1, 3]\n"
    "  extrapolation: [martin, single-point]\n"
    "cost: {at_most: {hours: 16.5 h}}\n"
    "run: {studies: 1024, seed: 4}\n";

/* Counts add up, and each status is that of the plan tried alone; the
 * recommended plan is the cheapest that resolves, its figures those of studies
 * behind the cap (TEXT). */
static void exhaustive_by_definition(void **state)
{
    (void)state;
    struct scenario *const s = still_read(grid);
    struct search_result r = searched(s, true);
    size_t counts[STATUSES] = {0}, sum = 0;
    double least = (double)INFINITY;
    assert_int_equal(r.count, 96);
    for (size_t i = 0; i < r.count; i++) {
        struct plan p;
        struct outcome alone;
        const struct outcome *const o = &r.candidates[i].outcome;
        scenario_plan(s, i, &p);
        assert_true(trial_run(s, &p, (struct trial_options){0}, &alone, NULL));
        assert_int_equal(o->status, alone.status);
        assert_string_equal(o->why, alone.why);
        assert_true(o->studies == alone.studies && (o->studies == 0 || o->margin_se == alone.margin_se));
        counts[o->status]++;
        if (o->status == STATUS_RESOLVES) least = fmin(least, cost(s, o));
    }
    for (int k = 0; k < STATUSES; k++) {
        assert_int_equal(r.counts[k], counts[k]);
        sum += counts[k];
        print_message("%s %zu\n", outcome_status_text((enum status)k), counts[k]);
    }
    assert_int_equal(sum, 96);
    assert_true(counts[STATUS_RESOLVES] > 3 && counts[STATUS_FAILS] > 3 && counts[STATUS_TOO_DEAR] > 3);
    assert_int_equal(counts[STATUS_IMPOSSIBLE], 16); /* one level and a line; too dear is for those that can be done */
    assert_true(r.recommended >= 0 && r.nearest_miss == SEARCH_NONE);
    still_near("cheapest", cost(s, &r.candidates[r.recommended].outcome), least, 1e-9);
    struct plan p;
    struct outcome fresh;
    scenario_plan(s, (size_t)r.recommended, &p);
    assert_true(trial_run(s, &p, (struct trial_options){.first_study = 1024, .deep = true}, &fresh, NULL));
    assert_int_equal(search_fresh_study(s), 1024);
    assert_int_equal(r.fresh.status, STATUS_RESOLVES);
    assert_true(r.fresh.at.power == fresh.at.power && r.fresh.at.mean == fresh.at.mean && r.fresh.resolvable_against == fresh.resolvable_against);
    search_free(&r);
    scenario_free(s);
}

/* Studies: exhaustive is groups x cap x fractions; the exhaustive run spends
 * that and the fresh ones; the sequential one less. Groups: those of which
 * something is left. */
static void spent(void **state)
{
    (void)state;
    struct scenario *const s = still_read(grid);
    struct search_result all = searched(s, true), few = searched(s, false);
    const size_t fresh = 2 * 1024;
    assert_int_equal(all.exhaustive, all.groups * 1024 * 2);
    assert_int_equal(all.spent, all.exhaustive + fresh);
    assert_int_equal(few.exhaustive, all.exhaustive);
    assert_int_equal(few.groups, all.groups);
    assert_true(few.spent < all.spent && few.spent >= few.groups * 2 * 256 + fresh);
    size_t played = 0;
    for (size_t i = 0; i < few.count; i++) {
        const struct outcome *const o = &few.candidates[i].outcome;
        played += o->studies > 0;
        assert_true(o->studies == 0 || o->studies == 256 || o->studies == 512 || o->studies == 1024);
        assert_true((o->studies == 0) == (o->status == STATUS_IMPOSSIBLE || (o->status == STATUS_TOO_DEAR && o->studies == 0)));
        if (o->status == STATUS_UNDECIDED) assert_int_equal(o->studies, 1024);
    }
    assert_true(played > 20);
    assert_int_equal(few.recommended, all.recommended);
    search_free(&all);
    search_free(&few);
    scenario_free(s);
}

/* The cheapest with each option, by going through all. */
static void by_choice(void **state)
{
    (void)state;
    struct scenario *const s = still_read(grid);
    struct search_result r = searched(s, true);
    size_t none = 0;
    for (size_t key = 0; key < scenario_keys(s); key++)
        for (size_t option = 0; option < scenario_options(s, key); option++) {
            long best = SEARCH_NONE;
            for (size_t i = 0; i < r.count; i++) {
                const struct outcome *const o = &r.candidates[i].outcome;
                if (o->status != STATUS_RESOLVES || scenario_option_of(s, i, key) != option) continue;
                const double other = best < 0 ? (double)INFINITY : cost(s, &r.candidates[best].outcome);
                if (cost(s, o) < other || (cost(s, o) == other && (long)i == r.recommended)) best = (long)i;
            }
            assert_int_equal(search_choice(s, &r, key, option), best);
            none += best == SEARCH_NONE;
        }
    for (size_t key = 0; key < scenario_keys(s); key++)
        assert_int_equal(search_choice(s, &r, key, scenario_option_of(s, (size_t)r.recommended, key)), r.recommended);
    assert_true(none > 0);
    search_free(&r);
    scenario_free(s);
}

/* At equal cost the greater margin wins, wherever it is listed; with the same
 * margin too (a twin under another name) the one listed first. */
static void ties(void **state)
{
    (void)state;
    static const char *const lists[3] = {"[circulator, viscometry-bath]", "[viscometry-bath, circulator]", "[second, viscometry-bath, first]"};
    static const char *const best[3] = {"viscometry-bath", "viscometry-bath", "second"};
    for (int i = 0; i < 3; i++)
        for (int exhaustive = 0; exhaustive < 2; exhaustive++) {
            char yaml[1024];
            struct plan p;
            snprintf(yaml, sizeof yaml,
                     "question: {expect: 1.5 %%, against: 1.39 %%, against_is: same-constants}\n"
                     "kit: {baths: [{name: first, like: viscometry-bath, fluctuation: 0 K, gradient_u: 0 K}, {name: second, like: first}]}\n"
                     "plan: {grade: middle, levels: 3, fillings: 2, bath: %s}\n"
                     "bench: {spare_runs: 0}\ncost: {hour: 1}\nrun: {studies: 4096}\n", lists[i]);
            struct scenario *const s = still_read(yaml);
            struct search_result r = searched(s, exhaustive == 1);
            assert_true(r.recommended >= 0);
            scenario_plan(s, (size_t)r.recommended, &p);
            assert_string_equal(p.bath.name, best[i]);
            assert_int_equal(r.counts[STATUS_RESOLVES], i == 2 ? 3 : 2);
            search_free(&r);
            scenario_free(s);
        }
}

/* The cheapest in hours, or in money when that is asked: a light gate resolves
 * with one run of each filling, a slow hand takes twelve. */
static void least_of_what(void **state)
{
    (void)state;
    static const char *const least[2] = {"hours", "money"}, *const timers[2] = {"gate", "hand"};
    for (int i = 0; i < 2; i++) {
        char yaml[1024];
        struct plan p;
        snprintf(yaml, sizeof yaml,
                 "question: {expect: 1.5 %%, against: 1.36 %%, against_is: same-constants}\n"
                 "kit: {timers: [{name: gate, like: light-gate, price: 900}, {name: hand, like: first-time, hand_u: 0.4 s}]}\n"
                 "bench: {filling_u: 0.01 %%, spare_runs: 0, bubble_chance: 0 %%}\n"
                 "plan: {grade: middle, levels: 2, fillings: 1, water_fillings: 1, water_runs: 6, runs: [1, 12], timer: [hand, gate]}\n"
                 "cost: {least: %s, hour: 30}\nrun: {studies: 2048}\n", least[i]);
        struct scenario *const s = still_read(yaml);
        struct search_result r = searched(s, false);
        assert_true(r.recommended >= 0);
        scenario_plan(s, (size_t)r.recommended, &p);
        assert_string_equal(p.timer.name, timers[i]);
        assert_int_equal(p.runs, i == 0 ? 1 : 12);
        assert_int_equal(r.counts[STATUS_RESOLVES], 3); /* all but the hand with one run */
        search_free(&r);
        scenario_free(s);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(exhaustive_by_definition), cmocka_unit_test(spent), cmocka_unit_test(by_choice), cmocka_unit_test(ties),
                                       cmocka_unit_test(least_of_what)};
    spread_set_threads(1); /* tests run side by side */
    return cmocka_run_group_tests(tests, NULL, NULL);
}
