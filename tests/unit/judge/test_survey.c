/* What the figures draw, against trials of the same plan at the same point. */
#include "studies.h"

#include "sim/judge/bar.h"
#include "sim/judge/survey.h"
#include "sim/judge/trial.h"

/* As many studies as a survey plays, so that its points are a trial's to the
 * bit; a bath that is the map's first. */
static const char *const same_luck =
    "question: {expect: 1.5 %, against: 1.36 %, against_is: same-constants}\n"
    "kit: {baths: [{name: b, like: circulator, fluctuation: 0.005 K}]}\n"
    "plan: {grade: middle, bath: b, levels: 3, fillings: 2, top_cleaved: 1.45}\n"
    "run: {studies: 2048}\n";

static struct outcome trial_of(const struct scenario *s, const struct plan *p)
{
    struct outcome o;
    assert_true(trial_run(s, p, (struct trial_options){0}, &o, NULL));
    return o;
}

/* The grid, and at the plan's own point and two others the trial's power; NaN
 * where the plan is impossible (six fillings do not go into a day's flask). */
static void map(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(same_luck);
    struct survey_map m;
    struct plan p;
    scenario_plan(s, 0, &p);
    p.solutions.level_volume_m3 = 100e-6; /* five fillings of 18 mL */
    assert_true(survey_map_make(s, &p, &m));
    assert_int_equal(m.fillings_now, 2);
    check_close(m.fluctuation_now_K, 0.005, 1e-15, "ROUND a unit");
    for (size_t i = 0; i < SURVEY_BATHS; i++) {
        check_close(m.fluctuation_K[i], 0.005 * pow(10.0, 2.0 * (double)i / 11.0), 1e-12, "ROUND a power");
        for (size_t j = 0; j < SURVEY_FILLINGS; j++) assert_true(isnan(m.figure[i][j]) == (j == 5));
    }
    check_close(m.figure[0][1], trial_of(s, &p).at.power, 0.0, "TEXT the same studies");
    struct plan other = p;
    other.bath.fluctuation_K = m.fluctuation_K[9];
    other.fillings[INTACT] = other.fillings[CLEAVED] = 4;
    check_close(m.figure[9][3], trial_of(s, &other).at.power, 0.0, "TEXT the same studies");
    assert_true(m.figure[11][0] < m.figure[0][0] && m.figure[11][0] < m.figure[11][4]);
    scenario_free(s);
}

/* With `within` alone the map shows the share. */
static void map_of_within(void **state)
{
    (void)state;
    struct scenario *const s = studies_read("question: {expect: 1.5 %, within: 0.08 %, against_is: same-constants}\n"
                                            "kit: {baths: [{name: b, like: circulator, fluctuation: 0.005 K}]}\n"
                                            "plan: {grade: middle, bath: b, levels: 3, fillings: 1}\nrun: {studies: 512}\n");
    struct survey_map m;
    struct plan p;
    scenario_plan(s, 0, &p);
    assert_true(survey_map_make(s, &p, &m));
    check_close(m.figure[0][0], trial_of(s, &p).at.within, 0.0, "TEXT the same studies");
    assert_true(m.figure[0][0] > 0.1 && m.figure[0][0] < 1.0);
    scenario_free(s);
}

/* The curve goes through the trial's power at `expect` and what the confidence
 * leaves at `against`, and rises; from half a step before to half beyond. */
static void curve(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(same_luck);
    struct survey_curve c;
    struct plan p;
    scenario_plan(s, 0, &p);
    const struct outcome o = trial_of(s, &p);
    assert_true(survey_curve_make(s, &p, o.at.critical, &c));
    enum { AGAINST = 6, EXPECT = 18 };
    for (size_t i = 0; i < SURVEY_FRACTIONS; i++) {
        check_close(c.fraction[i], 0.0136 + 0.0014 * ((double)i - AGAINST) / (EXPECT - AGAINST), 1e-15, "ROUND a sum");
        if (i > 0) assert_true(c.power[i] >= c.power[i - 1]); /* the same luck */
        const double at = (c.power[i] * 2048.0 + 1.0) / 2050.0;
        check_close(c.se[i], sqrt(at * (1.0 - at) / 2048.0), 1e-15, "ROUND a root");
    }
    check_close(c.power[EXPECT], o.at.power, 0.0, "TEXT the same studies");
    check_close(c.power[AGAINST], 0.05, 1.0 / 2048.0, "ROUND the quantile itself falls between two studies");
    assert_true(c.power[0] < 0.01 && c.power[SURVEY_FRACTIONS - 1] > c.power[EXPECT]);
    scenario_free(s);
}

/* With a second polymer alongside the first one's fraction changes; and from
 * above `against` lies on the other side. */
static void curves_of_other_questions(void **state)
{
    (void)state;
    static const char *const yaml[] = {
        "question: {expect: 1.5 %, against: 1.35 %, against_is: measured}\nplan: {grade: middle, levels: 3, fillings: 1}\nrun: {studies: 2048}\n",
        "question: {expect: 1.5 %, against: 1.65 %, against_is: same-constants}\nplan: {grade: middle, levels: 3, fillings: 1}\nrun: {studies: 2048}\n"};
    for (int i = 0; i < 2; i++) {
        struct scenario *const s = studies_read(yaml[i]);
        struct survey_curve c;
        struct plan p;
        scenario_plan(s, 0, &p);
        const struct outcome o = trial_of(s, &p);
        assert_true(survey_curve_make(s, &p, o.at.critical, &c));
        check_close(c.power[18], o.at.power, 0.0, "TEXT the same studies");
        check_close(c.power[6], 0.05, 1.0 / 2048.0, "ROUND the quantile itself falls between two studies");
        assert_true((c.fraction[24] > c.fraction[0]) == (i == 0) && c.power[24] > c.power[0]);
        scenario_free(s);
    }
}

/* At the plan's own top (1.45, the third of nine) and line: the trial's standard
 * deviation and bias; single points need no second level, lines do. */
static void tops(void **state)
{
    (void)state;
    struct scenario *const s = studies_read(same_luck);
    struct survey_tops t;
    struct plan p;
    scenario_plan(s, 0, &p);
    assert_true(survey_tops_make(s, &p, &t));
    for (size_t i = 0; i < SURVEY_TOPS; i++) check_close(t.top[i], 1.15 + 0.15 * (double)i, 1e-15, "ROUND a sum");
    for (int e = HUGGINS; e <= SINGLE_POINT; e++) {
        struct plan q = p;
        q.analysis.extrapolation = (enum extrapolation)e;
        q.top[CLEAVED] = t.top[2];
        const struct outcome o = trial_of(s, &q);
        check_close(t.sd[2][e], o.at.sd, 1e-15, "ROUND the same studies");
        check_close(t.bias[2][e], o.at.bias, 1e-15, "ROUND the same studies");
    }
    /* huggins' line bends in martin's world: it finds too little [eta]', so too much; the more the higher the top */
    assert_true(t.bias[8][HUGGINS] > 10.0 * fabs(t.bias[8][MARTIN]) && t.bias[8][HUGGINS] > 2.0 * t.bias[3][HUGGINS]);
    p.levels[INTACT] = p.levels[CLEAVED] = 1;
    assert_true(survey_tops_make(s, &p, &t));
    for (int e = HUGGINS; e <= SINGLE_POINT; e++) assert_true(isnan(t.sd[4][e]) == (e != SINGLE_POINT));
    scenario_free(s);
}

/* STAT: with a larger cap the survey plays its 2048 studies, a trial 9999 of
 * which they are the first; their powers differ by less than 5 standard errors
 * of both, 6e-7. */
static void fewer_studies_than_the_cap(void **state)
{
    (void)state;
    struct scenario *const few = studies_read(same_luck);
    char yaml[600];
    struct survey_map m;
    struct plan p;
    snprintf(yaml, sizeof yaml, "%s", same_luck);
    char *const cap = strstr(yaml, "2048");
    assert_non_null(cap);
    memcpy(cap, "9999", 4);
    struct scenario *const many = studies_read(yaml);
    scenario_plan(many, 0, &p);
    const struct outcome a = trial_of(few, &p), b = trial_of(many, &p);
    assert_int_equal(b.studies, 9999);
    assert_true(survey_map_make(many, &p, &m));
    check_close(m.figure[0][1], a.at.power, 0.0, "TEXT the same studies");
    check_close(m.figure[0][1], b.at.power, 5.0 * hypot(a.se.power, b.se.power), "STAT 5 standard errors");
    scenario_free(few);
    scenario_free(many);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(map),  cmocka_unit_test(map_of_within), cmocka_unit_test(curve), cmocka_unit_test(curves_of_other_questions),
                                       cmocka_unit_test(tops), cmocka_unit_test(fewer_studies_than_the_cap)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
