/* What an outcome makes of made-up estimates: counting, 'no answer', both
 * sides, plain false alarms, status. Source: model.md section 4. */
#include "bench/sample.h"

#include "sim/judge/outcome.h"

enum { N = 1000 };

/* A play of a still plan whose estimates are the test's own. */
struct stage {
    struct scenario *s;
    struct plan p;
    struct design d;
    struct play play;
};

static void enter(struct stage *g, const char *question)
{
    char yaml[512];
    snprintf(yaml, sizeof yaml, "question: {expect: 1.5 %%, %s}\nplan: {grade: middle}\nrun: {studies: 4000}\n", question);
    memset(g, 0, sizeof *g);
    g->s = still_read(yaml);
    scenario_plan(g->s, 0, &g->p);
    still_make(&g->p);
    assert_true(design_make(&g->d, &g->p, scenario_cost(g->s), scenario_question(g->s)));
    play_start(&g->play, &g->d, 1);
    outcome_fractions(scenario_question(g->s), &g->play);
    g->play.analyses = 1;
    g->play.analysis[0] = g->p.analysis;
    g->play.n = N;
    for (size_t f = 0; f < g->play.fractions; f++) {
        g->play.sample[0].delta[f] = calloc(N, sizeof(double));
        assert_non_null(g->play.sample[0].delta[f]);
    }
}

static void leave(struct stage *g)
{
    play_free(&g->play);
    design_free(&g->d);
    scenario_free(g->s);
}

/* A shuffled ladder: every value of (-1/2, 1/2) at distance 1/N, once. */
static double ladder(int i)
{
    return ((i * 379) % N + 0.5) / N - 0.5;
}

static struct outcome said(struct stage *g)
{
    struct outcome o;
    assert_true(outcome_of(g->s, &g->p, &g->play, 0, &o));
    return o;
}

/* Fractions asked for are those played, expect first. */
static void fractions(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "within: 0.1 %");
    assert_int_equal(g.play.fractions, 1);
    leave(&g);
    enter(&g, "against: 1.2 %");
    assert_int_equal(g.play.fractions, 2);
    still_near("expect", g.play.fraction[0], 0.015, 1e-15);
    still_near("against", g.play.fraction[1], 0.012, 1e-15);
    leave(&g);
}

/* Estimates 1.5 % + 0.02 + ladder x 0.3 points: mean 1.52, spread that of a
 * ladder, 0.3 sqrt((N^2 - 1)/12/N^2 x N/(N - 1)); within 0.1 points: errors
 * from -0.13 to 0.17, so 200 of 300. The interval holds 950 rungs, from the
 * 25th to the 975th. ROUND: 1e-9. */
static void figures_by_hand(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "within: 0.1 %");
    for (int i = 0; i < N; i++) g.play.sample[0].delta[0][i] = 0.0152 + 0.003 * ladder(i);
    struct outcome o = said(&g);
    const double n = N, sd = 0.003 * sqrt((n * n - 1.0) / 12.0 / n / n * n / (n - 1.0));
    assert_int_equal(o.studies, N);
    still_close_to("truth", o.truth, 0.015, 1e-12);
    still_close_to("mean", o.at.mean, 0.0152, 1e-9);
    still_near("bias", o.at.bias, 0.0002, 1e-11);
    still_close_to("sd", o.at.sd, sd, 1e-9);
    still_close_to("its error", o.se.mean, sd / sqrt(n), 1e-9);
    still_close_to("error of sd", o.se.sd, sd * sqrt((1.8 - 1.0) / 4.0 / n), 2e-3); /* SERIES: kurtosis of a ladder, 1/N */
    still_close_to("rmse", o.at.rmse, sqrt(sd * sd * (n - 1.0) / n + 4e-8), 1e-9);
    still_near("low", o.at.interval.low, 0.0152 + 0.003 * (24.5 / n - 0.5), 1e-12);
    still_near("high", o.at.interval.high, 0.0152 + 0.003 * (974.5 / n - 0.5), 1e-12);
    still_near("within", o.at.within, 2.0 / 3.0, 1.1 / n);
    still_close_to("its error", o.se.within, sqrt(o.at.within * (1.0 - o.at.within) / n), 1e-3); /* SERIES: taken at (k + 1)/(n + 2) */
    assert_true(isnan(o.at.power) && isnan(o.at.critical) && isnan(o.at.plain_false_alarm) && o.at.no_answer == 0.0);
    assert_int_equal(o.status, STATUS_FAILS);
    leave(&g);
}

/* A tenth without an answer: left out of mean and spread, counted against the
 * share and the power, and said. */
static void no_answer(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "within: 0.2 %, against: 1.2 %");
    for (int i = 0; i < N; i++) {
        const double x = 0.003 * ladder(i);
        g.play.sample[0].delta[0][i] = i % 10 == 3 ? (double)NAN : 0.015 + x;
        g.play.sample[0].delta[1][i] = i % 10 == 7 ? (double)NAN : 0.005 + x; /* never beyond the other's reach */
    }
    const struct outcome o = said(&g);
    still_near("share without", o.at.no_answer, 0.1, 1e-12);
    still_close_to("its error", o.se.no_answer, sqrt(0.09 / N), 5e-3);
    assert_true(o.at.within == 0.9 && o.at.power == 0.9);
    assert_true(isfinite(o.at.mean) && fabs(o.at.mean - 0.015) < 1e-4 && isfinite(o.at.sd) && isfinite(o.at.interval.low));
    /* 949.05 of all, a tenth below: the 849th of the 900 that answer */
    size_t below = 0, answered = 0;
    for (int i = 0; i < N; i++) {
        answered += isnan(g.play.sample[0].delta[1][i]) ? 0 : 1;
        below += g.play.sample[0].delta[1][i] < o.at.critical;
    }
    assert_int_equal(answered, 900);
    assert_int_equal(below, 850);
    leave(&g);
}

/* No study answers, or all but one: nothing to take a mean of, nothing
 * resolved, and no crash. */
static void none_answers(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "within: 0.2 %, against: 1.2 %");
    for (int few = 0; few < 2; few++) {
        for (int i = 0; i < N; i++) g.play.sample[0].delta[0][i] = g.play.sample[0].delta[1][i] = few && i == 5 ? 0.015 : (double)NAN;
        const struct outcome o = said(&g);
        still_near("share without", o.at.no_answer, few ? 0.999 : 1.0, 1e-12);
        assert_true(o.at.power == 0.0 && o.at.within == (few ? 0.001 : 0.0));
        assert_true(isnan(o.at.mean) && isnan(o.at.sd));
        assert_int_equal(o.status, STATUS_FAILS);
    }
    leave(&g);
}

/* Against what is below and against what is above expect: the mirror image has
 * the mirrored critical value and the same power and plain false alarms. */
static void both_sides(void **state)
{
    (void)state;
    static const char *const questions[4] = {"against: 1.2 %", "against: 1.8 %", "against: 1.2 %, sides: two", "against: 1.8 %, sides: two"};
    static const double z[4] = {1.6448536, 1.6448536, 1.9599640, 1.9599640};
    struct outcome o[4];
    for (int k = 0; k < 4; k++) {
        struct stage g;
        enter(&g, questions[k]);
        const double sign = k % 2 ? -1.0 : 1.0, against = 0.015 - sign * 0.003;
        for (int i = 0; i < N; i++) {
            const double x = ladder(i), y = ladder((i * 7 + 3) % N);
            g.play.sample[0].delta[0][i] = 0.015 + sign * (0.0005 + 0.004 * x);
            g.play.sample[0].delta[1][i] = against + sign * (0.0008 + 0.003 * y + (y > 0.4 ? 0.002 : 0.0));
        }
        o[k] = said(&g);
        /* by the definition: beyond against + z sd, out of all */
        struct sample spread = {0};
        double alarms = 0.0;
        for (int i = 0; i < N; i++) sample_add(&spread, g.play.sample[0].delta[1][i]);
        for (int i = 0; i < N; i++) alarms += sign * (g.play.sample[0].delta[1][i] - against) > z[k] * sample_sd(&spread);
        still_near("plain false alarms", o[k].at.plain_false_alarm, alarms / N, 1e-12);
        assert_true(alarms / N > 0.05);
        leave(&g);
    }
    for (int k = 0; k < 4; k += 2) {
        still_near("mirrored", o[k].at.critical - 0.015, 0.015 - o[k + 1].at.critical, 1e-12);
        assert_true(o[k].at.power == o[k + 1].at.power && o[k].at.plain_false_alarm == o[k + 1].at.plain_false_alarm);
        still_close_to("error of power", o[k].se.power, o[k + 1].se.power, 1e-6);
    }
    assert_true(o[2].at.critical > o[0].at.critical && o[2].at.power <= o[0].at.power);
}

/* An unbiased normal source gives the plain false alarms that the level leaves,
 * and a bias towards expect more. STAT: 4.5 times the printed error. */
static void plain_false_alarms(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "against: 1.2 %");
    for (int biased = 0; biased < 2; biased++) {
        for (uint64_t study = 0; study < N; study += LANES) {
            const struct draws_key key = draws_key(5, study, (struct draws_exchange){0});
            double x[1][LANES];
            draws_normals(&key, STREAMS_STUDY, (struct streams_place){0}, 1, x);
            FOR_LANES(l)
            {
                g.play.sample[0].delta[0][study + (uint64_t)l] = 0.015 + 0.0005 * x[0][l];
                g.play.sample[0].delta[1][study + (uint64_t)l] = 0.012 + 0.0005 * (x[0][l] + biased);
            }
        }
        const struct outcome o = said(&g);
        const double expected = biased ? 0.5 * erfc(0.6448536 / sqrt(2.0)) : 0.05;
        still_near("plain false alarms", o.at.plain_false_alarm, expected, 4.5 * o.se.plain_false_alarm);
        assert_true(o.se.plain_false_alarm > 0.002 && o.se.plain_false_alarm < 0.03);
        still_near("critical value knows the bias", o.at.critical, 0.012 + 0.0005 * (1.6448536 + biased), 4.5 * o.se.critical);
    }
    leave(&g);
}

/* All of the studies, or none, do not pass for certain: the error is that of
 * one more study of the other kind, 1/n to first order. */
static void all_or_none(void **state)
{
    (void)state;
    struct stage g;
    enter(&g, "within: 0.1 %, against: 1.2 %");
    for (int all = 0; all < 2; all++) {
        for (int i = 0; i < N; i++) {
            g.play.sample[0].delta[0][i] = (all ? 0.015 : 0.011) + 1e-7 * i;
            g.play.sample[0].delta[1][i] = 0.012 + 1e-7 * i;
        }
        const struct outcome o = said(&g);
        assert_true(o.at.within == all && o.at.power == all);
        still_close_to("error", o.se.within, 1.0 / N, 5e-3);
        assert_true(o.se.power >= 0.99 / N && o.se.no_answer >= 0.99 / N);
    }
    leave(&g);
}

/* One look at 1000 of 4000 studies, bar 95 %: 3.3 errors are 0.02274. */
static void status(void **state)
{
    (void)state;
    static const int good[4] = {973, 972, 928, 927};
    static const enum status expected[4] = {STATUS_RESOLVES, STATUS_UNDECIDED, STATUS_UNDECIDED, STATUS_FAILS};
    struct stage g;
    enter(&g, "within: 0.1 %");
    for (int k = 0; k < 4; k++) {
        for (int i = 0; i < N; i++) g.play.sample[0].delta[0][i] = i < good[k] ? 0.0150 + 1e-7 * i : 0.017;
        const struct outcome o = said(&g);
        assert_int_equal(o.status, expected[k]);
        still_near("margin", o.margin_se, (good[k] / 1000.0 - 0.95) / sqrt(0.0475 / 4000.0), 1e-6);
    }
    assert_string_equal(outcome_status_text(STATUS_RESOLVES), "resolves");
    assert_string_equal(outcome_status_text(STATUS_TOO_DEAR), "too dear");
    leave(&g);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(fractions), cmocka_unit_test(figures_by_hand), cmocka_unit_test(no_answer), cmocka_unit_test(none_answers),
        cmocka_unit_test(both_sides), cmocka_unit_test(plain_false_alarms), cmocka_unit_test(all_or_none), cmocka_unit_test(status),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
