/* The liquid in the tube: carry-over, reagent, the coil's answer to warmth.
 * Times against the laws of model.md section 1 written out here. ROUND: 1e-12
 * of a time, Newton's last step. */
#include "bench/still.h"

#include "models/water.h"

static const double rounding = 1e-12;

static struct plan plan_without_kinetic(struct scenario **s)
{
    struct plan p = still_plan(s);
    p.tube.kinetic = 0.0;
    return p;
}

/* eta_w (1 + e w)(1 + y exp(k y))/(rho_w (1 + g w) + c (1 - v rho_w(set))) over
 * C, at a temperature of the liquid. */
struct liquid {
    double y, c, w, temperature_K;
};

static double time_of(const struct plan *p, struct liquid q)
{
    const double rho = water_density(q.temperature_K), adds = q.c * (1.0 - p->material.specific_volume_m3_kg * water_density(p->habits.temperature_K));
    const double eta = water_viscosity(q.temperature_K) * (1.0 + p->cleavage.reagent_viscosity * q.w) * (1.0 + q.y * exp(0.45 * q.y));
    return eta / (rho * (1.0 + p->cleavage.reagent_density * q.w) + adds) / p->tube.constant_m2_s2;
}

/* Nominal coil volume of a liquid. */
static double coil(const struct design *d, size_t liquid)
{
    const struct design_liquid *const q = &d->liquid[liquid];
    return liquid == 0 ? 0.0 : d->chains.intrinsic_m3_kg[q->series] * q->conc_kg_m3;
}

/* A tenth of what was in the tube before stays there; the first filling of a
 * day receives nothing, be it water or, when water is measured once, a
 * solution. */
static void carry_over(void **state)
{
    (void)state;
    for (int every_day = 0; every_day < 2; every_day++) {
        struct scenario *s;
        struct plan p = plan_without_kinetic(&s);
        struct still_bench b;
        const double r = 0.1;
        size_t opened = 0;
        p.habits.carry_over = r;
        p.habits.water_every_day = every_day == 1;
        still_open(&b, &p, s, 0.015);
        assert_int_equal(b.design.layout.days, every_day ? 3 : 2);
        still_show(&b, 0);
        for (size_t f = 0; f < b.design.layout.fillings; f++) {
            const bool first = f == 0 || b.design.filling[f].day != b.design.filling[f - 1].day;
            const size_t now = design_liquid_of(&b.design, &b.design.filling[f]), before = first ? now : design_liquid_of(&b.design, &b.design.filling[f - 1]);
            const struct liquid q = {(1.0 - r) * coil(&b.design, now) + r * coil(&b.design, before),
                                     (1.0 - r) * b.design.liquid[now].conc_kg_m3 + r * b.design.liquid[before].conc_kg_m3, 0.0, 298.15};
            for (size_t run = 0; run < 3; run++) FOR_LANES(l) still_close_to("time", still_run(&b, f, run)->time_s[l], time_of(&p, q), rounding);
            opened += first && !b.design.filling[f].water;
        }
        assert_int_equal(opened, every_day ? 0 : 1);
        still_close(&b);
        scenario_free(s);
    }
}

/* Carry-over is of what was made, not of what was meant: the coil volume of
 * the filling before, with its own error of dilution. */
static void carry_over_as_made(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_without_kinetic(&s);
    struct still_bench b;
    p.habits.carry_over = 0.1;
    p.solutions.delivery_u_m3 = 1e-6; /* 1 mL of 20 mL: 5 % of the lowest level */
    still_open(&b, &p, s, 0.015);
    struct still_hand *const h = still_hand_open(&b.design);
    h->draws.level[1][DRAWS_DELIVERY][3] = 2.0;
    still_hand_work(h, 0.015);
    const double c = b.design.liquid[2].conc_kg_m3, c1 = 1.1 * b.design.liquid[1].conc_kg_m3, eta = b.design.chains.intrinsic_m3_kg[INTACT];
    /* filling 4 is the first of level 2, behind the second of level 1 */
    const struct liquid q = {eta * (0.9 * c + 0.1 * c1), 0.9 * c + 0.1 * c1, 0.0, 298.15};
    still_close_to("time", notebook_runs(&h->bench.book, 4)[0].time_s[3], time_of(&p, q), rounding);
    still_hand_close(h);
    still_close(&b);
    scenario_free(s);
}

/* Spent reagent thickens and weighs down the cleaved series alone, in
 * proportion to the share of its stock; nominal times know it. */
static void reagent(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_without_kinetic(&s);
    struct still_bench b;
    p.cleavage.reagent_viscosity = 0.0054;
    p.cleavage.reagent_density = 0.0035;
    still_open(&b, &p, s, 0.015);
    still_show(&b, 0);
    for (size_t f = 0; f < b.design.layout.fillings; f++) {
        static const double share[4] = {0.4, 0.6, 0.8, 1.0};
        const size_t i = design_liquid_of(&b.design, &b.design.filling[f]);
        const struct liquid q = {coil(&b.design, i), b.design.liquid[i].conc_kg_m3, i > 4 ? share[i - 5] : 0.0, 298.15};
        still_close_to("time", still_run(&b, f, 0)->time_s[0], time_of(&p, q), rounding);
        still_close_to("nominal", b.design.liquid[i].nominal_s, time_of(&p, q), rounding);
    }
    still_close(&b);
    scenario_free(s);
}

/* [eta](T) = [eta] exp(b (T - T_set)), T that of the liquid: here warmer by a
 * thermometer's error. Water and density follow the temperature as well; what
 * the polymer adds to the density is that at T_set. */
static void warmth(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = plan_without_kinetic(&s);
    struct still_bench b;
    p.material.temperature_coefficient_1_K = -0.02;
    p.thermometer.calibration_u_K = 0.5;
    p.habits.equilibrate_s = 3600.0; /* 60 of the lag's minutes: nothing is left of the room */
    p.habits.working_day_s = 1e6;
    still_open(&b, &p, s, 0.015);
    struct still_hand *const h = still_hand_open(&b.design);
    FOR_LANES(l) h->draws.study[DRAWS_CALIBRATION][l] = l - 3.0;
    still_hand_work(h, 0.015);
    for (size_t f = 0; f < b.design.layout.fillings; f++) {
        const size_t i = design_liquid_of(&b.design, &b.design.filling[f]);
        FOR_LANES(l)
        {
            const double warmer_K = -0.5 * (l - 3.0); /* a thermometer that shows too much keeps the bath too cold */
            const struct liquid q = {coil(&b.design, i) * exp(-0.02 * warmer_K), b.design.liquid[i].conc_kg_m3, 0.0, 298.15 + warmer_K};
            for (size_t run = 0; run < 3; run++)
                still_close_to("time", notebook_runs(&h->bench.book, f)[run].time_s[l], time_of(&p, q), rounding);
        }
    }
    still_hand_close(h);
    still_close(&b);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(carry_over), cmocka_unit_test(carry_over_as_made), cmocka_unit_test(reagent), cmocka_unit_test(warmth)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
