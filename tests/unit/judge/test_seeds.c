/* 200 seeds of one plan with every source on: the spread of each figure over
 * the mean of its printed error lies between 0.83 and 1.17. STAT: the spread
 * of 200 normal values is known to 1/sqrt(398) = 5.0 %, so this is 3.4 of its
 * standard errors and a false alarm 7e-4 for each of the figures below; the
 * seeds are fixed. At the ends of the interval the kernel that gives the density
 * smooths a curved tail: SERIES, h^2 f''/(10 f) = 8 % at 2.5 % and 1504 studies,
 * so the printed error is that much too small and the upper bound 1.28. */
#include "bench/sample.h"

#include "sim/base/spread.h"
#include "sim/judge/outcome.h"

enum { SEEDS = 200, STUDIES = 1504, FIGURES = 12 };

static const char *const scenario_text =
    "question: {expect: 1.5 %, against: 1.365 %, within: 0.082 %, against_is: same-constants}\n"
    "plan: {grade: middle, levels: 2, fillings: 1, runs: 2, water_fillings: 1, water_runs: 2, bath: insulated-beaker, timer: first-time}\n"
    "run: {studies: 1504}\n";

static const char *const name[FIGURES] = {"mean", "bias", "sd", "rmse", "interval, low", "interval, high", "within", "critical", "power",
                                          "plain false alarms", "spare runs", "hours"};

static void list(const struct figures *f, double out[FIGURES])
{
    const double all[FIGURES] = {f->mean, f->bias, f->sd, f->rmse, f->interval.low, f->interval.high, f->within, f->critical, f->power,
                                 f->plain_false_alarm, f->spare_runs, f->hours_s};
    memcpy(out, all, sizeof all);
}

static void one_seed(const struct scenario *s, const struct design *d, uint64_t seed, struct outcome *out)
{
    struct play play;
    play_start(&play, d, seed);
    outcome_fractions(scenario_question(s), &play);
    play.analyses = 1;
    play.analysis[0] = d->plan->analysis;
    play.active[0] = true;
    assert_true(play_until(&play, STUDIES));
    assert_true(outcome_of(s, d->plan, &play, 0, out));
    assert_int_equal(out->studies, STUDIES);
    play_free(&play);
}

static void spread_over_printed_error(void **state)
{
    (void)state;
    struct scenario *const s = still_read(scenario_text);
    struct plan p;
    struct design d;
    struct sample figure[FIGURES] = {{0}}, printed[FIGURES] = {{0}}, shortest = {0}, shortest_printed = {0};
    scenario_plan(s, 0, &p);
    assert_true(design_make(&d, &p, scenario_cost(s), scenario_question(s)));
    for (uint64_t seed = 1; seed <= SEEDS; seed++) {
        struct outcome o;
        double at[FIGURES], se[FIGURES];
        one_seed(s, &d, seed, &o);
        list(&o.at, at);
        list(&o.se, se);
        for (int i = 0; i < FIGURES; i++) {
            sample_add(&figure[i], at[i]);
            sample_add(&printed[i], se[i]);
        }
        sample_add(&shortest, o.at.shortest.high);
        sample_add(&shortest_printed, o.se.shortest.high);
    }
    bool good = true;
    for (int i = 0; i < FIGURES; i++) {
        const double ratio = sample_sd(&figure[i]) / printed[i].mean;
        print_message("%-18s %12.6g +- %-10.4g spread over printed error %.3f\n", name[i], figure[i].mean, printed[i].mean, ratio);
        good = good && ratio > 0.83 && ratio < (i == 4 || i == 5 ? 1.28 : 1.17);
    }
    const double ratio = sample_sd(&shortest) / shortest_printed.mean; /* from batches, a cube root's word: half as sure */
    print_message("%-18s %12.6g +- %-10.4g spread over printed error %.3f\n", "shortest, high", shortest.mean, shortest_printed.mean, ratio);
    assert_true(good && ratio > 0.7 && ratio < 1.4);
    /* the figures that matter lie where their errors do, away from 0 and 1 */
    assert_true(figure[6].mean > 0.8 && figure[6].mean < 0.95 && figure[8].mean > 0.8 && figure[8].mean < 0.97);
    design_free(&d);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(spread_over_printed_error)};
    spread_set_threads(1); /* tests run side by side */
    return cmocka_run_group_tests(tests, NULL, NULL);
}
