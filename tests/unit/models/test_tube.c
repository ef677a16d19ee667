/* Tubes: kinetic terms, Poiseuille's constant, tilt, and the forward problem. */
#include "check.h"
#include "reference.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

#include "models/tube.h"
#include "models/water.h"
#include "sim/base/complain.h"
#include "sim/scenario/parts.h"
#include "sim/scenario/record.h"
#include "sim/scenario/scenario.h"

enum { ROOM = 16 };

static const double pi = 3.14159265358979323846, mm = 1e-3, mL = 1e-6, mm2 = 1e-6;

static double argument(const struct reference_row *row, size_t i, double unit)
{
    return reference_argument(row, i) * unit;
}

static void kinetic_of_flared_ends(void **state)
{
    (void)state;
    const struct reference_row row = reference_one("tube.tsv", "kinetic.flared");
    const double E = tube_kinetic_flared(argument(&row, 0, mL), argument(&row, 1, mm), argument(&row, 2, mm),
                                         argument(&row, 3, mm2));
    check_row(E / mm2, &row);
}

/* The formula's coefficient, for unit V, L, d and C: 52.5 (1.66 with L and d
 * in cm), the one that m = 0.037 sqrt(Re) gives. */
static void kinetic_coefficient(void **state)
{
    (void)state;
    const struct reference_row row = reference_one("tube.tsv", "kinetic.coefficient");
    check_row(tube_kinetic_flared(mL, mm, mm, mm2) / mm2, &row);
    check_printed(tube_kinetic_flared(mL, 10.0 * mm, 10.0 * mm, mm2) / mm2, "1.66");
    /* V^(3/2), 1/L, d^(-1/2), C^(-1/2) */
    const double one = tube_kinetic_flared(mL, mm, mm, mm2);
    check_round(tube_kinetic_flared(4.0 * mL, mm, mm, mm2), 8.0 * one, 8.0);
    check_round(tube_kinetic_flared(mL, 4.0 * mm, mm, mm2), one / 4.0, 8.0);
    check_round(tube_kinetic_flared(mL, mm, 4.0 * mm, mm2), one / 2.0, 8.0);
    check_round(tube_kinetic_flared(mL, mm, mm, 4.0 * mm2), one / 2.0, 8.0);
}

static void kinetic_of_square_ends(void **state)
{
    (void)state;
    const struct reference_row row = reference_one("tube.tsv", "kinetic.square");
    check_row(tube_kinetic_square(argument(&row, 0, mL), argument(&row, 1, mm)) / mm2, &row);
    /* k = B/t and E/t^2 */
    check_round(tube_kinetic(TUBE_SQUARE, 3.0, 4.0), 0.75, 1.0);
    check_round(tube_kinetic(TUBE_FLARED, 3.0, 4.0), 0.1875, 1.0);
}

static void constant_by_poiseuille(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("tube.tsv", "poiseuille", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double C = tube_constant_poiseuille(argument(&row[i], 0, mm), argument(&row[i], 1, mm),
                                                  argument(&row[i], 2, mL), argument(&row[i], 3, mm));
        check_row(C / mm2, &row[i]);
    }
}

/* Every tube of the built-in kit: its constant is what its geometry gives, but
 * for the bore, which is printed to 0.01 mm and counts in the fourth power. */
static void constants_of_the_kit(void **state)
{
    (void)state;
    struct complaints *const complaints = complain_new();
    struct scenario *const built_in = scenario_built_in(complaints);
    assert_non_null(built_in);
    size_t tubes = 0;
    for (const struct record *tube = scenario_kit(built_in)->first[KEYS_TUBES]; tube; tube = tube->next, tubes++) {
        const double bore_m = record_number(tube, "bore");
        const double C = tube_constant_poiseuille(bore_m, record_number(tube, "head"),
                                                  record_number(tube, "bulb_volume"), record_number(tube, "length"));
        check_close(C / record_number(tube, "constant"), 1.0, 4.0 * 0.005 * mm / bore_m,
                    "TABLE half a unit of the bore's last digit, times 4");
    }
    assert_int_equal(tubes, 7);
    scenario_free(built_in);
    complain_free(complaints);
}

static double water_time(const struct reference_row *row, double *kinetic_share)
{
    const double C = argument(row, 0, mm2), nu = water_viscosity(298.15) / water_density(298.15);
    const double E = tube_kinetic_flared(argument(row, 2, mL), argument(row, 3, mm), argument(row, 1, mm), C);
    const double t_s = tube_efflux(C, TUBE_FLARED, E, nu);
    *kinetic_share = tube_kinetic(TUBE_FLARED, E, t_s) / nu;
    return t_s;
}

static void times_of_water(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    double share;
    size_t n = reference_read("tube.tsv", "water.time", row, ROOM);
    for (size_t i = 0; i < n; i++)
        check_row(water_time(&row[i], &share), &row[i]);
    n = reference_read("tube.tsv", "water.kinetic", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        water_time(&row[i], &share);
        check_row(100.0 * share, &row[i]);
    }
}

static void tilt(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("tube.tsv", "tilt", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double theta = argument(&row[i], 0, pi / 180.0), offset = reference_argument(&row[i], 1);
        check_row(100.0 * (tube_head_factor(theta, offset, 0.0) - 1.0), &row[i]);
        check_row(100.0 * (tube_head_factor(-theta, offset, 0.0) - 1.0), &row[i]);
    }
    const struct reference_row aside = reference_one("tube.tsv", "tilt.offset");
    const double theta = argument(&aside, 0, pi / 180.0), offset = reference_argument(&aside, 1);
    check_row(100.0 * (tube_head_factor(theta, offset, 0.0) - tube_head_factor(theta, 0.0, 0.0)), &aside);
    check_row(-100.0 * (tube_head_factor(-theta, offset, 0.0) - tube_head_factor(-theta, 0.0, 0.0)), &aside);
}

/* Series against cosine and sine up to 0.3 rad: the terms left out are
 * theta^12/12! = 1.1e-15 and theta^11/11! = 4.4e-14 at most. */
static void head_factor_is_its_series(void **state)
{
    (void)state;
    assert_true(tube_head_factor(0.0, 0.2, 0.0) == 1.0); /* nothing wrong: exactly 1 */
    for (int i = -300; i <= 300; i++) {
        const double theta = 0.001 * i;
        for (int j = 0; j < 3; j++) {
            const double offset = 0.1 * j, share = 0.001 * j;
            check_close(tube_head_factor(theta, offset, share), (cos(theta) + offset * sin(theta)) * (1.0 - share),
                        1e-14, "SERIES and rounding");
        }
    }
}

/* A charge that is too large by dV lowers the head by dV/A_r: 0.1 mL in a
 * reservoir of 25 mm over 100 mm is 0.2037 %. */
static void head_factor_of_a_charge(void **state)
{
    (void)state;
    const double share = 0.1 * mL / (pi * 12.5 * mm * 12.5 * mm * 100.0 * mm);
    check_printed(100.0 * (tube_head_factor(0.0, 0.0, share) - 1.0), "-0.2037");
    check_round(tube_head_factor(0.0, 0.0, -share), 1.0 + share, 2.0);
}

/* t is given and k(t) is a share of nu, so C and the coefficient follow: the
 * way back must find t. The condition of t is 1/(1 + (power + 1) share). */
static void efflux_goes_back(enum tube_ends ends)
{
    const double power = ends == TUBE_FLARED ? 2.0 : 1.0;
    for (int i = 0; i <= 40; i++)
        for (int j = 0; j <= 40; j++) {
            const double t = 30.0 * pow(2000.0 / 30.0, i / 40.0), share = 0.1 * j / 40.0;
            for (double nu = 0.3 * mm2; nu < 20.0 * mm2; nu *= 1.7) {
                const double C = nu * (1.0 + share) / t, coefficient = share * nu * pow(t, power);
                check_round(tube_efflux(C, ends, coefficient, nu), t, 8.0);
                check_round(tube_viscosity(C, ends, coefficient, t), nu, 8.0);
            }
        }
}

static void efflux_of_flared_ends(void **state)
{
    (void)state;
    efflux_goes_back(TUBE_FLARED);
}

static void efflux_of_square_ends(void **state)
{
    (void)state;
    efflux_goes_back(TUBE_SQUARE);
    /* square ends have a closed form: C t^2 - nu t - B = 0 */
    const double C = 0.008 * mm2, B = 1.858625 * mm2, nu = 0.8926 * mm2;
    check_round(tube_efflux(C, TUBE_SQUARE, B, nu), (nu + sqrt(nu * nu + 4.0 * C * B)) / (2.0 * C), 8.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(kinetic_of_flared_ends),
        cmocka_unit_test(kinetic_coefficient),
        cmocka_unit_test(kinetic_of_square_ends),
        cmocka_unit_test(constant_by_poiseuille),
        cmocka_unit_test(constants_of_the_kit),
        cmocka_unit_test(times_of_water),
        cmocka_unit_test(tilt),
        cmocka_unit_test(head_factor_is_its_series),
        cmocka_unit_test(head_factor_of_a_charge),
        cmocka_unit_test(efflux_of_flared_ends),
        cmocka_unit_test(efflux_of_square_ends),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
