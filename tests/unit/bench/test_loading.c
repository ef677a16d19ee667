/* Dilution in the tube, worked by hand: volumes, additions, clock, what is in
 * the tube, and its temperature. Source: model.md, dilution in the tube. */
#include "studies.h"

static const double rounding = 1e-12;

/* Charge 15 mL, rinse 3 mL; three levels at 1/2, 3/4 and 1 of the top, so 30,
 * 20 and 15 mL, by 5 and then 10 mL. */
static const char *const in_tube =
    "question: {expect: 1.5 %, against: 1.2 %}\n"
    "bench: {clean_and_fill: 8 min, equilibrate: 10 min, add_and_mix: 3 min, reset: 60 s, rinse: 3 mL, spare_runs: 2, working_day: 24 h}\n"
    "kit: {tubes: [{name: t, like: suspended-0c, charge: 15 mL, capacity: 60 mL}]}\n"
    "plan: {grade: middle, tube: t, dilution: in-tube, levels: 3, lowest: 0.5, fillings: 2, runs: 2, water_fillings: 1, water_runs: 1}\n"
    "cost: {weigh_and_dissolve: 1.5 h, dilution: 6 min, cleavage: 1 h}\n";

static const double volume_mL[3] = {30.0, 20.0, 15.0}, added_mL[2] = {10.0, 5.0};

static void volumes_and_flasks(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    struct design d;
    studies_lay(&d, &p, s);
    for (size_t i = 0; i < SERIES; i++)
        for (size_t j = 0; j < 3; j++) {
            const struct design_liquid *const q = &d.liquid[DESIGN_LEVELS + 3 * i + j];
            check_round(q->volume_m3, volume_mL[j] * 1e-6, 8.0);
            if (j < 2) check_close(q->added_m3, added_mL[j] * 1e-6, 1e-19, "ROUND a difference of volumes");
            check_close(q->conc_kg_m3 * volume_mL[j], d.flasks.stock_conc_kg_m3[i] * 15.0, 1e-12, "ROUND a few products");
        }
    /* 2 (15 + 3) mL of stock; no other flask; 2 x 1.5 + 1 h */
    check_close(d.flasks.level_m3, 0.0, 0.0, "TEXT none");
    check_round(d.flasks.stock_m3[INTACT], 50e-6, 2.0);
    check_round(d.flasks.stock_m3[CLEAVED], 50e-6, 2.0);
    check_close(d.polymer_kg, 50e-6 * (d.flasks.stock_conc_kg_m3[INTACT] + d.flasks.stock_conc_kg_m3[CLEAVED]), 1e-15, "ROUND a few products");
    check_close(d.preparation_s, 4.0 * 3600.0, 1e-9, "ROUND a sum");
    design_free(&d);
    scenario_free(s);
}

static void impossible_ones(void **state)
{
    (void)state;
    struct scenario *s;
    const struct plan usual = studies_plan(in_tube, &s);
    struct plan p = usual;
    struct design d;
    p.lowest = 0.25; /* to the brim */
    studies_lay(&d, &p, s);
    design_free(&d);
    p.lowest = 0.2;
    studies_impossible(&p, s, "t must hold 75.0 mL for the lowest level, but its capacity is 60.0 mL: 15.0 mL are missing");
    p = usual;
    p.solutions.stock_volume_m3 = 36e-6;
    studies_lay(&d, &p, s);
    design_free(&d);
    p.solutions.stock_volume_m3 = 35e-6;
    studies_impossible(&p, s, "the stock of the intact polymer must hold 36.0 mL, but the one asked for holds 35 mL: 1.0 mL are missing");
    p = usual;
    p.solutions.shared_stock = true;
    studies_impossible(&p, s, "shared");
    p = usual;
    p.tube.suspended_level = false;
    studies_impossible(&p, s, "suspended-level");
    scenario_free(s);
}

/* Order, and the clock of every filling: 480 + 600 + 2 (t + 60) s for a charge,
 * 180 + 600 + 2 (t + 60) s for an addition. */
static void order_and_clock(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    studies_has_order(&p, s, "W0 i20 +i10 +i00 i21 +i11 +i01 c20 +c10 +c00 c21 +c11 +c01");
    struct studies b;
    studies_open(&b, &p, s);
    studies_show(&b, 0, 0);
    double clock_s = 0.0;
    for (size_t f = 0; f < b.design.layout.fillings; f++) {
        const struct notebook_filling *const q = &b.design.filling[f];
        FOR_LANES(l) check_close(b.shown.trace.started_s[f][l], clock_s, 1e-8, "ROUND a sum of times");
        clock_s += (q->added ? 180.0 : 480.0) + 600.0 + (double)q->runs * (b.design.liquid[design_liquid_of(&b.design, q)].nominal_s + 60.0);
    }
    check_close(b.design.nominal_clock_s, clock_s, 1e-8, "ROUND a sum of times");
    study_play(0, &b.job, b.slot, b.scratch);
    FOR_LANES(l) check_close(study_bench_of(&b.job, b.slot, 0)->clock_s[l], clock_s, 1e-7, "ROUND a sum of times");
    studies_close(&b);
    scenario_free(s);
}

/* Seconds of a loading of a series, and of the day's water. */
static double loading_s(const struct design *d, size_t series)
{
    double sum = 480.0 + 600.0 + 2.0 * (180.0 + 600.0);
    for (size_t j = 0; j < 3; j++) sum += 2.0 * (d->liquid[DESIGN_LEVELS + 3 * series + j].nominal_s + 60.0);
    return sum;
}

/* A loading is never split: a day that lacks a second of the second loading
 * leaves it whole to the next; one that lacks a second of the first is none. */
static void never_split_over_days(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    struct design d;
    studies_lay(&d, &p, s);
    const double water = 480.0 + 600.0 + d.liquid[DESIGN_WATER].nominal_s + 60.0, one = loading_s(&d, INTACT);
    assert_true(loading_s(&d, CLEAVED) < one);
    design_free(&d);
    p.habits.working_day_s = water + 2.0 * one;
    studies_has_order(&p, s, "W0 i20 +i10 +i00 i21 +i11 +i01 | W0 c20 +c10 +c00 c21 +c11 +c01");
    p.habits.working_day_s = water + 2.0 * one - 1.0;
    studies_has_order(&p, s, "W0 i20 +i10 +i00 | W0 i21 +i11 +i01 c20 +c10 +c00 | W0 c21 +c11 +c01");
    p.habits.working_day_s = water + one;
    studies_has_order(&p, s, "W0 i20 +i10 +i00 | W0 i21 +i11 +i01 | W0 c20 +c10 +c00 | W0 c21 +c11 +c01");
    p.habits.working_day_s = water + one - 1.0;
    studies_impossible(&p, s, "one loading");
    scenario_free(s);
}

/* Deliveries: charge and additions each with their own, all with the one
 * pipette, 0.06 mL too much at two standard deviations of 0.03 mL. The stock
 * holds 1 % too much by dry content and 2 % by weighing. */
static void concentrations_after_deliveries(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    p.solutions.delivery_tolerance_m3 = sqrt(6.0) * 0.03e-6;
    p.solutions.delivery_u_m3 = 0.1e-6;
    p.solutions.dry_content_u = 0.01;
    struct studies_hand *const h = studies_hand_open(&p, s);
    FOR_LANES(l)
    {
        h->draws.study[DRAWS_PIPETTE][l] = 2.0;
        h->draws.polymer[DRAWS_DRY_CONTENT][l] = 1.0;
        h->draws.stock[CLEAVED][DRAWS_WEIGHING][l] = 1.0;
    }
    h->design.flasks.weighing_u[CLEAVED] = 0.02;
    for (size_t f = 0; f < h->design.layout.fillings; f++) h->delivery[f] = 0.3 * (double)f - 1.7;
    studies_hand_work(h, 0.015);
    double volume = 0.0, charge = 0.0, eta[SERIES] = {h->design.chains.intrinsic_m3_kg[INTACT], h->design.chains.intrinsic_m3_kg[CLEAVED]};
    for (size_t f = 1; f < h->design.layout.fillings; f++) {
        const struct notebook_filling *const q = &h->design.filling[f];
        const double top = h->design.flasks.stock_conc_kg_m3[q->series] * 1.01 * (q->series == CLEAVED ? 1.02 : 1.0);
        volume = (q->added ? volume + added_mL[q->level] : 15.0) + 0.06 + 0.1 * h->delivery[f];
        if (!q->added) charge = volume;
        check_close(h->filled[f].volume_m3[3] * 1e6, volume, 1e-12, "ROUND a sum of volumes");
        check_close(h->filled[f].polymer[3], top * charge / volume, rounding * top, "ROUND a few products");
        check_close(h->filled[f].coil[3], eta[q->series] * top * charge / volume, 1e-11, "ROUND a few products, and the cut of one fraction twice");
    }
    studies_hand_close(h);
    scenario_free(s);
}

/* A still study gives the truth: what is in the tube is what is assumed. */
static void a_still_one_gives_the_truth(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    check_close(studies_still_delta(&p, s), 0.015, 1e-12, "ROUND the condition of the whole reduction is below 1e4");
    scenario_free(s);
}

/* Carry-over of a twentieth. The first loading receives from water; each next
 * one from the lowest level of the last, as that was made; what was received is
 * diluted with the rest. The blank at the turn receives too. */
static void carry_over_in_the_tube(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    const double r = 0.05;
    p.habits.carry_over = r;
    p.cleavage.blank_reference = p.cleavage.blank_diluent = true;
    p.material.interaction[CLEAVED] = 0.3; /* of its own */
    struct studies_hand *const h = studies_hand_open(&p, s);
    studies_hand_work(h, 0.015);
    const struct design *const d = &h->design;
    double rest = 0.0, rest_c = 0.0, poured = 0.0, poured_c = 0.0;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const q = &d->filling[f];
        const struct bench_filled *const in = &h->filled[f];
        const bool polymer = !q->water && !q->blank;
        const double share = polymer ? 15.0 / volume_mL[q->level] : 1.0;
        const double made_c = polymer ? d->flasks.stock_conc_kg_m3[q->series] * share : 0.0, made = polymer ? d->chains.intrinsic_m3_kg[q->series] * made_c : 0.0;
        if (!q->added) {
            poured = f == 0 ? made : (1.0 - r) * made + r * rest;
            poured_c = f == 0 ? made_c : (1.0 - r) * made_c + r * rest_c;
        }
        check_close(in->coil[0], poured * share, 1e-11, "ROUND a few products");
        check_close(in->polymer[0], poured_c * share, 1e-11 * 30.0, "ROUND a few products");
        check_close(in->thick[0], 1.0 + in->coil[0] * exp((q->series == CLEAVED ? 0.3 : 0.45) * in->coil[0]), 1e-13, "ROUND one exponential");
        rest = made;
        rest_c = made_c;
    }
    assert_true(d->filling[7].blank && h->filled[7].coil[0] > 0.0 && d->filling[8].blank == false);
    studies_hand_close(h);
    scenario_free(s);
}

/* The liquid in a bath without fluctuation, one stretch after the other. */
struct liquid {
    double clock_s, K;
};

/* Goes on for s seconds in a bath D = bath_K + drift times clock; the mean. */
static double goes_on(struct liquid *l, double seconds, double bath_K, double drift_K_s, double lag_s)
{
    const double D = bath_K + drift_K_s * l->clock_s, before = l->K;
    l->K = D + drift_K_s * (seconds - lag_s) + (before - D + drift_K_s * lag_s) * exp(-seconds / lag_s);
    l->clock_s += seconds;
    return D + 0.5 * drift_K_s * seconds - lag_s * (l->K - before) / seconds;
}

/* Room 15 K below, 5 min of lag and short waits, so that every step shows; a
 * bath that drifts, with offset, gradient and calibration. Deviates of a
 * filling belong to the loading: those of an addition count for nothing. */
static void temperature_of_the_mixture(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    struct habits *const h = &p.habits;
    h->room_K = h->temperature_K - 15.0;
    h->lag_s = 300.0;
    h->equilibrate_s = 120.0;
    h->spare_runs = 0;
    p.bath.drift_u_K_s = 0.2 / 3600.0;
    p.bath.day_u_K = p.bath.gradient_u_K = p.thermometer.calibration_u_K = 0.1;
    h->tilt_u_rad = 0.02;
    h->filling_u = 0.002;
    struct studies_hand *const hand = studies_hand_open(&p, s);
    hand->day[DRAWS_DAY_OFFSET] = 0.7;
    hand->day[DRAWS_DRIFT] = 1.3;
    FOR_LANES(l) hand->draws.study[DRAWS_CALIBRATION][l] = -0.4;
    for (size_t f = 0; f < hand->design.layout.fillings; f++) {
        hand->once[f][DRAWS_GRADIENT] = 0.2 * (double)f - 1.0;
        hand->once[f][DRAWS_TILT] = 0.3 * (double)f - 1.0;
        hand->once[f][DRAWS_FILLING_TIME] = 1.0 - 0.17 * (double)f;
    }
    studies_hand_work(hand, 0.015);
    struct liquid now = {0.0, h->room_K};
    size_t poured = 0;
    const double drift = 1.3 * 0.2 / 3600.0;
    for (size_t f = 0; f < hand->design.layout.fillings; f++) {
        const struct notebook_filling *const q = &hand->design.filling[f];
        const struct design_liquid *const liquid = &hand->design.liquid[design_liquid_of(&hand->design, q)];
        const double kept = q->added ? 1.0 - added_mL[q->level] / volume_mL[q->level] : 0.0;
        if (!q->added) poured = f;
        const double bath_K = h->temperature_K + 0.04 + 0.07 + 0.1 * hand->once[poured][DRAWS_GRADIENT];
        goes_on(&now, q->added ? h->add_and_mix_s : h->clean_and_fill_s, bath_K, drift, h->lag_s);
        now.K = kept * now.K + (1.0 - kept) * h->room_K;
        goes_on(&now, h->equilibrate_s, bath_K, drift, h->lag_s);
        for (size_t r = 0; r < q->runs; r++) {
            const double mean = goes_on(&now, liquid->nominal_s, bath_K, drift, h->lag_s);
            check_close(hand->trace.run[f * hand->design.layout.stride + r].liquid_K[0], mean, 1e-9, "ROUND kelvins of the order of 300, a few hundred steps");
            goes_on(&now, h->reset_s, bath_K, drift, h->lag_s);
        }
        check_round(hand->filled[f].constant[0], p.tube.constant_m2_s2 * tube_head_factor(0.02 * hand->once[poured][DRAWS_TILT], p.tube.offset_m / p.tube.head_m, 0.0), 4.0);
        check_round(hand->filled[f].slow[0], 1.0 + 0.002 * hand->once[poured][DRAWS_FILLING_TIME], 4.0);
    }
    studies_hand_close(hand);
    scenario_free(s);
}

/* Agreement and spare runs are of each level: no two runs agree to 0. */
static void spare_runs_of_each_level(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan(in_tube, &s);
    p.timer.hand_u_s = 0.01;
    p.habits.agreement = 0.0;
    struct studies b;
    studies_open(&b, &p, s);
    studies_show(&b, 3, 0);
    for (size_t f = 0; f < b.design.layout.fillings; f++) FOR_LANES(l) assert_int_equal(b.shown.book.made[f][l], b.design.filling[f].water ? 1 : 4);
    studies_close(&b);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(volumes_and_flasks),          cmocka_unit_test(impossible_ones),        cmocka_unit_test(order_and_clock),
        cmocka_unit_test(never_split_over_days),       cmocka_unit_test(carry_over_in_the_tube), cmocka_unit_test(concentrations_after_deliveries),
        cmocka_unit_test(a_still_one_gives_the_truth), cmocka_unit_test(temperature_of_the_mixture), cmocka_unit_test(spare_runs_of_each_level),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
