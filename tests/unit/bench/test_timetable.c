/* One study's clock, days, grams and money, worked by hand.
 *
 * Water takes 200 s; nothing kinetic, and a polymer that adds nothing to the
 * density (v = 1/rho_w), so that times go as relative viscosities; a Huggins
 * law with k = 0, so that eta_sp goes as c. Two levels, the lower at half.
 *
 *     relative viscosity    1     1.4   1.8   1.2   1.4
 *     time, s             200   280   360   240   280
 *     filling, s         1860  2100  2340  1980  2100   = 480 + 600 + 3 (t + 60)
 *
 * 2 water fillings 3720, intact 2 (2100 + 2340) = 8880, cleaved
 * 2 (1980 + 2100) = 8160: 20760 s.
 *
 * [eta] = 0.109702 and 0.0132712 m3/kg (xn = 1000, delta = 1.5 %, independent,
 * checks.md section 6): c_top = 0.8/0.109702 = 7.2925 and 0.4/0.0132712 =
 * 30.140 kg/m3. A level takes 2 (15 + 3) = 36 mL: 50 mL flasks. Each stock
 * gives 25 mL to its lower level and 36 mL undiluted, 61 mL: 100 mL flasks,
 * 0.72925 + 3.0140 = 3.7433 g. */
#include "bench/still.h"

#include "models/water.h"
#include "sim/bench/cost.h"
#include "sim/judge/trial.h"

static const char *const by_hand =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "polymer: {law: huggins, interaction: 0, interaction_cleaved: 0}\n"
    "cleavage: {neighbours: independent}\n"
    "kit:\n"
    "  grades: [{name: mine, molar_mass: 44.05 kg/mol, average: number, price_per_gram: 2}]\n"
    "  tubes: [{name: t, like: suspended-0c, price: 400}]\n"
    "  baths: [{name: b, like: circulator, price: 1000}]\n"
    "  thermometers: [{name: m, like: probe, price: 150}]\n"
    "  timers: [{name: w, like: by-hand, price: 20}]\n"
    "plan: {grade: mine, tube: t, bath: b, thermometer: m, timer: w, top: 1.8, top_cleaved: 1.4, levels: 2, lowest: 0.5, extrapolation: huggins}\n"
    "bench: {spare_runs: 2}\n"
    "cost: {hour: 30, owned: [b]}\n"
    "run: {studies: 16}\n";

static struct plan plan_by_hand(struct scenario **s)
{
    struct plan p;
    *s = still_read(by_hand);
    scenario_plan(*s, 0, &p);
    still_make(&p);
    const struct water_fit water = water_fit_make();
    p.tube.kinetic = 0.0;
    p.tube.constant_m2_s2 = water_fit_kinematic(&water, 298.15) / 200.0;
    p.material.specific_volume_m3_kg = 1.0 / water_density(298.15);
    return p;
}

/* ROUND: sums of seconds, 1e-12 of them; a level's c from an inverted law. */
static const double rounding = 1e-12;

static void nominal_times(void **state)
{
    (void)state;
    static const double expected_s[5] = {200.0, 280.0, 360.0, 240.0, 280.0};
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct still_bench b;
    still_open(&b, &p, s, 0.015);
    assert_int_equal(b.design.liquids, 5);
    for (size_t i = 0; i < 5; i++) still_close_to("time", b.design.liquid[i].nominal_s, expected_s[i], rounding);
    assert_int_equal(b.design.layout.days, 1);
    still_close_to("clock", b.design.nominal_clock_s, 20760.0, rounding);
    still_close(&b);
    scenario_free(s);
}

/* The forward law with a kinetic term and the polymer's density: C t - k(t) =
 * nu, root by bisection; water from checks.md section 4. */
static void nominal_times_by_the_forward_law(void **state)
{
    (void)state;
    for (int ends = 0; ends < 2; ends++) {
        struct scenario *s;
        struct plan p = still_plan(&s);
        struct still_bench b;
        p.tube.constant_m2_s2 = 1e-8;
        p.tube.ends = ends ? TUBE_SQUARE : TUBE_FLARED;
        p.tube.kinetic = ends ? 2e-6 : 9.74e-5;
        still_open(&b, &p, s, 0.015);
        const struct design_liquid *const top = &b.design.liquid[8];
        const double rho = 997.047022, c = top->conc_kg_m3;
        const double nu = 889.996774e-6 * p.top[CLEAVED] / (rho + c * (1.0 - 0.765e-3 * rho));
        double low = 1.0, high = 1000.0;
        while (high - low > 1e-12) {
            const double t = 0.5 * (low + high);
            *(1e-8 * t - (ends ? 2e-6 / t : 9.74e-5 / t / t) < nu ? &low : &high) = t;
        }
        still_close_to("top of the cleaved series", top->nominal_s, low, 2e-9); /* TABLE: nine digits of eta and rho at 25 degC */
        still_close(&b);
        scenario_free(s);
    }
}

/* When each filling begins, day by day. The fillings are water (W), intact
 * 2100 (a) and 2340 s (b), cleaved 1980 (c) and 2100 s (d), twice each.
 * 14400 s hold water and intact, 12600; one c more would end at 14580. Without
 * water every day and with 6060 s: WWa 5820, ab 4440, bc 4320, cd 4080, d. */
struct laid_out {
    double working_day_s;
    bool water_every_day;
    size_t fillings, days;
    double begins_s[14]; /* 0 opens a day */
    double clock_s;
};
static const struct laid_out rows[] = {
    {20760.0, true, 10, 1, {0, 1860, 3720, 5820, 7920, 10260, 12600, 14580, 16560, 18660}, 20760.0}, /* to the second */
    {20759.0, true, 12, 2, {0, 1860, 3720, 5820, 7920, 10260, 12600, 14580, 16560, 0, 1860, 3720}, 24480.0},
    {14400.0, true, 12, 2, {0, 1860, 3720, 5820, 7920, 10260, 0, 1860, 3720, 5700, 7680, 9780}, 24480.0},
    {14579.0, true, 12, 2, {0, 1860, 3720, 5820, 7920, 10260, 0, 1860, 3720, 5700, 7680, 9780}, 24480.0},
    {14580.0, true, 12, 2, {0, 1860, 3720, 5820, 7920, 10260, 12600, 0, 1860, 3720, 5700, 7800}, 24480.0},
    {14400.0, false, 10, 2, {0, 1860, 3720, 5820, 7920, 10260, 0, 1980, 3960, 6060}, 20760.0},
    {6060.0, false, 10, 5, {0, 1860, 3720, 0, 2100, 0, 2340, 0, 1980, 0}, 20760.0},
};

static void is_laid_out(const struct laid_out *row)
{
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct still_bench b;
    p.habits.working_day_s = row->working_day_s;
    p.habits.water_every_day = row->water_every_day;
    still_open(&b, &p, s, 0.015);
    assert_int_equal(b.design.layout.fillings, row->fillings);
    assert_int_equal(b.design.layout.days, row->days);
    still_close_to("clock", b.design.nominal_clock_s, row->clock_s, rounding);
    still_show(&b, 0);
    size_t day = 0;
    for (size_t f = 0; f < row->fillings; f++) {
        if (f > 0 && row->begins_s[f] == 0.0) day++;
        assert_int_equal(b.design.filling[f].day, day);
        FOR_LANES(l) still_near("begins", b.started_s[f][l], row->begins_s[f], 1e-8);
    }
    study_play(0, &b.job, b.slot, b.scratch);
    FOR_LANES(l) still_close_to("clock of a study", study_bench_of(&b.job, b.slot, 0)->clock_s[l], row->clock_s, rounding);
    still_close(&b);
    scenario_free(s);
}

static void days(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof rows / sizeof *rows; i++) is_laid_out(&rows[i]);
}

/* Order of the bench: water, intact, cleaved, from dilute to concentrated,
 * all fillings of a level one after the other; each day's water first. */
static void order_of_the_bench(void **state)
{
    (void)state;
    static const char *const expected = "W0 W1 i00 i01 i10 i11 W0 W1 c00 c01 c10 c11 ";
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct still_bench b;
    char text[128] = "";
    p.habits.working_day_s = 14400.0;
    still_open(&b, &p, s, 0.015);
    for (size_t f = 0; f < b.design.layout.fillings; f++) {
        const struct notebook_filling *const q = &b.design.filling[f];
        const size_t used = strlen(text);
        assert_int_equal(q->runs, 3);
        if (q->water)
            snprintf(text + used, sizeof text - used, "W%zu ", q->number);
        else
            snprintf(text + used, sizeof text - used, "%c%zu%zu ", q->series == INTACT ? 'i' : 'c', q->level, q->number);
    }
    assert_string_equal(text, expected);
    still_close(&b);
    scenario_free(s);
}

/* Spare runs: no two runs agree to 0, so every filling takes both of its spare
 * runs; the clock runs on, 2 (t + 60) for each filling, the days stay. */
static void spare_runs_take_time(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct still_bench b;
    p.timer.hand_u_s = 1e-3;
    p.habits.agreement = 0.0;
    p.habits.working_day_s = 14400.0;
    still_open(&b, &p, s, 0.015);
    study_play(0, &b.job, b.slot, b.scratch);
    /* 4 waters at 260; intact 2 (340 + 420), cleaved 2 (300 + 340) */
    FOR_LANES(l)
    {
        still_close_to("clock", study_bench_of(&b.job, b.slot, 0)->clock_s[l], 24480.0 + 2.0 * (4.0 * 260.0 + 2.0 * 760.0 + 2.0 * 640.0), rounding);
        assert_true(study_bench_of(&b.job, b.slot, 0)->spare_runs[l] == 24.0);
    }
    still_show(&b, 0);
    still_near("second filling", b.started_s[1][0], 1860.0 + 520.0, 1e-8);
    still_near("next day", b.started_s[6][0], 0.0, 0.0);
    still_close_to("nominal", b.design.nominal_clock_s, 24480.0, rounding);
    still_close(&b);
    scenario_free(s);
}

/* Preparation: two stocks 1.5 h each, two dilutions of 6 min, one cleavage of
 * 1 h, 4.2 h; a shared stock, 1.5 + 3 x 0.1 + 1 = 2.8 h. Grams as above; the
 * shared stock is the stronger one alone, 3.0140 g. TABLE: five digits. */
static void preparation_and_grams(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct still_bench b;
    still_open(&b, &p, s, 0.015);
    still_close_to("preparation", b.design.preparation_s, 15120.0, rounding);
    still_near("grams", b.design.polymer_kg * 1e3, 3.7433, 5e-5);
    still_close(&b);
    p.solutions.shared_stock = true;
    still_open(&b, &p, s, 0.015);
    still_close_to("preparation", b.design.preparation_s, 10080.0, rounding);
    still_near("grams", b.design.polymer_kg * 1e3, 3.0140, 5e-5);
    still_close(&b);
    scenario_free(s);
}

/* Hours (20760 + 15120)/3600 = 9.9667; money 30 x that = 299.00, 2 x 3.7433 =
 * 7.49, tube, thermometer and timer 570, the bath is owned: 876.49. Played, a
 * still study costs just that. */
static void hours_and_money(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_by_hand(&s);
    struct outcome o;
    struct trial_options options = {0};
    assert_true(trial_run(s, &p, options, &o, NULL));
    assert_int_equal(o.studies, 16);
    still_close_to("clock", o.at.clock_s, 20760.0, rounding);
    still_close_to("hours", o.at.hours_s, 35880.0, rounding);
    still_near("money", o.at.money, 876.49, 5e-3);
    assert_true(o.se.hours_s < 1e-6 && o.at.spare_runs == 0.0);
    assert_int_equal(o.days, 1);
    still_near("grams", o.polymer_kg * 1e3, 3.7433, 5e-5);
    scenario_free(s);
}

/* What a plan is least in: to 0.1 h or 1 of the currency. */
static void rounded_cost(void **state)
{
    (void)state;
    struct cost_rules rules = {.least = LEAST_HOURS};
    still_near("hours", cost_rounded(&rules, (struct cost){35880.0, 876.49}), 10.0, 1e-12);
    still_near("hours", cost_rounded(&rules, (struct cost){35819.0, 876.49}), 9.9, 1e-12);
    rules.least = LEAST_MONEY;
    still_near("money", cost_rounded(&rules, (struct cost){35880.0, 876.49}), 876.0, 0.0);
    still_near("money", cost_rounded(&rules, (struct cost){35880.0, 876.51}), 877.0, 0.0);
}

/* Each limit alone, just above and just below what the plan takes. */
static void at_most(void **state)
{
    (void)state;
    static const struct {
        const char *rules, *why;
    } limits[] = {
        {"{hours: 9.97 h}", NULL}, {"{hours: 9.96 h}", " h, over"},
        {"{days: 1}", NULL},       {"{polymer: 3.7434 g}", NULL},
        {"{polymer: 3.7432 g}", " g of polymer, over"},
        {"{money: 877}", NULL},    {"{money: 876}", "costs 876 EUR, over the 876 allowed"},
    };
    for (size_t i = 0; i < sizeof limits / sizeof *limits; i++) {
        char yaml[2048], *end;
        struct scenario *hand, *s;
        struct plan p = plan_by_hand(&hand);
        struct outcome o;
        snprintf(yaml, sizeof yaml, "%s", by_hand);
        end = strstr(yaml, "owned: [b]}");
        assert_non_null(end);
        snprintf(end, sizeof yaml - (size_t)(end - yaml), "owned: [b], at_most: %s}\nrun: {studies: 16}\n", limits[i].rules);
        s = still_read(yaml);
        assert_true(trial_run(s, &p, (struct trial_options){0}, &o, NULL));
        assert_int_equal(o.status == STATUS_TOO_DEAR, limits[i].why != NULL);
        assert_int_equal(o.studies, limits[i].why ? 0 : 16); /* struck out before it is simulated */
        if (limits[i].why) assert_non_null(strstr(o.why, limits[i].why));
        scenario_free(s);
        scenario_free(hand);
    }
}

/* At most one day, where there are two. And hours that only spare runs push
 * over the limit: known when it has been played. */
static void too_dear_in_the_end(void **state)
{
    (void)state;
    struct scenario *hand, *s;
    struct plan p = plan_by_hand(&hand);
    struct outcome o;
    s = still_read("question: {expect: 1.5 %, against: 1.2 %}\nplan: {grade: middle}\n"
                   "cost: {at_most: {hours: 10 h, days: 1}}\nrun: {studies: 16}\n");
    p.habits.working_day_s = 14400.0;
    assert_true(trial_run(s, &p, (struct trial_options){0}, &o, NULL));
    assert_int_equal(o.status, STATUS_TOO_DEAR);
    assert_string_equal(o.why, "takes 2 days, over the 1 allowed");
    p.habits.working_day_s = 86400.0;
    p.timer.hand_u_s = 1e-3;
    p.habits.agreement = 0.0;
    assert_true(trial_run(s, &p, (struct trial_options){0}, &o, NULL));
    assert_int_equal(o.status, STATUS_TOO_DEAR);
    assert_int_equal(o.studies, 16);
    scenario_free(s);
    scenario_free(hand);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(nominal_times), cmocka_unit_test(nominal_times_by_the_forward_law), cmocka_unit_test(days),
        cmocka_unit_test(order_of_the_bench), cmocka_unit_test(spare_runs_take_time), cmocka_unit_test(preparation_and_grams),
        cmocka_unit_test(hours_and_money), cmocka_unit_test(rounded_cost), cmocka_unit_test(at_most), cmocka_unit_test(too_dear_in_the_end),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
