/* Candidates that share one and the same bench work. Source: interface.md,
 * "Candidates that differ only in ..."; model.md section 3 (single-point is
 * counted once over `weighting`). */
#include "bench/still.h"

#include "sim/judge/group_play.h"
#include "sim/judge/groups.h"
#include "sim/judge/trial.h"

static const char *const text =
    "question: {expect: 1.5 %, against: 1.3 %, against_is: same-constants}\n"
    "kit: {thermometers: [{name: twin, like: probe, resolution: 0.5 K, reading_u: 0.3 K, reads: ends, price: 7}]}\n"
    "plan:\n"
    "  grade: middle\n"
    "  levels: 2\n"
    "  fillings: 1\n"
    "  thermometer: [probe, pt100, twin]\n"
    "  temperature_record: [each-run, none]\n"
    "  extrapolation: [martin, single-point, huggins]\n"
    "  weighting: [equal, c-squared]\n"
    "  density: [partial-volume, neglected]\n"
    "  kinetic_energy: [corrected, neglected]\n"
    "  chain_statistics: [discrete, continuous]\n"
    "run: {studies: 64}\n";

/* (2 + 1 + 2) lines and weightings x 8 corrections = 40 ways of reducing; with
 * a record three thermometers, without one the twin is the probe: 5 groups of
 * 40, 40, 40, 80 and 40. */
enum { WAYS = 40, CANDIDATES = 6 * WAYS };

static void one_thermometer_without_a_record(void **state)
{
    (void)state;
    struct scenario *const s = still_read(text);
    struct groups g;
    bool seen[CANDIDATES] = {false};
    size_t large = 0;
    assert_int_equal(scenario_candidates(s), CANDIDATES);
    assert_true(groups_make(s, &g));
    assert_int_equal(g.count, 5);
    for (size_t i = 0; i < g.count; i++) {
        const size_t *const member = g.member + g.group[i].first;
        large += g.group[i].count == 2 * WAYS;
        assert_true(g.group[i].count == WAYS || g.group[i].count == 2 * WAYS);
        for (size_t j = 0; j < g.group[i].count; j++) {
            struct plan p, q;
            assert_true(member[j] < CANDIDATES && !seen[member[j]]);
            seen[member[j]] = true;
            if (j > 0) assert_true(member[j] > member[j - 1]);
            scenario_plan(s, member[0], &p);
            scenario_plan(s, member[j], &q);
            assert_true(p.temperature_record == q.temperature_record && p.thermometer.calibration_u_K == q.thermometer.calibration_u_K);
            if (p.temperature_record) assert_string_equal(p.thermometer.name, q.thermometer.name);
        }
    }
    assert_int_equal(large, 1);
    groups_free(&g);
    scenario_free(s);
}

/* groups_same says of any two what groups_make did with them. */
static void pair_by_pair(void **state)
{
    (void)state;
    struct scenario *const s = still_read(text);
    struct groups g;
    size_t of[CANDIDATES];
    assert_true(groups_make(s, &g));
    for (size_t i = 0; i < g.count; i++)
        for (size_t j = 0; j < g.group[i].count; j++) of[g.member[g.group[i].first + j]] = i;
    for (size_t a = 0; a < CANDIDATES; a++)
        for (size_t b = 0; b < CANDIDATES; b += 3) assert_true(groups_same(s, a, b) == (of[a] == of[b]));
    groups_free(&g);
    scenario_free(s);
}

/* What a candidate says does not depend on who shares its bench work: the same
 * bits as when it is tried alone. TEXT. */
static void shared_work_same_bits(void **state)
{
    (void)state;
    struct scenario *const s = still_read(text);
    struct groups g;
    struct candidate *const all = calloc(CANDIDATES, sizeof *all);
    size_t estimates = 0;
    assert_true(all && groups_make(s, &g));
    for (size_t i = 0; i < g.count; i++) {
        struct group_tally tally = {0};
        const struct group_job job = {s, g.member + g.group[i].first, g.group[i].count, true};
        assert_true(group_play(&job, all, &tally));
        assert_int_equal(tally.spent, 2 * 64);
        assert_int_equal(tally.exhaustive, 2 * 64);
    }
    for (size_t i = 0; i < CANDIDATES; i += 7) {
        struct plan p;
        struct outcome alone;
        scenario_plan(s, i, &p);
        assert_true(trial_run(s, &p, (struct trial_options){0}, &alone, NULL));
        const struct outcome *const o = &all[i].outcome;
        assert_true(o->at.mean == alone.at.mean && o->at.sd == alone.at.sd && o->at.critical == alone.at.critical && o->at.power == alone.at.power);
        assert_true(o->at.hours_s == alone.at.hours_s && o->at.money == alone.at.money && o->status == alone.status && o->margin_se == alone.margin_se);
        estimates += i > 0 && o->at.mean != all[i - 7].outcome.at.mean;
    }
    assert_true(estimates > 20); /* they are not all one */
    groups_free(&g);
    free(all);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(one_thermometer_without_a_record), cmocka_unit_test(pair_by_pair),
                                       cmocka_unit_test(shared_work_same_bits)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
