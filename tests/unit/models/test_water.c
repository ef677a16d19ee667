/* Water: the release's table, the iapws library, the CIPM density, the fit. */
#include "check.h"
#include "reference.h"

#include <math.h>

#include "models/water.h"

enum { ROOM = 16 };

static const double zero_C = 273.15;

/* A quantity of water.tsv against a function of its one argument. */
static void hold(const char *quantity, double (*law)(double))
{
    struct reference_row row[ROOM];
    const size_t n = reference_read("water.tsv", quantity, row, ROOM);
    for (size_t i = 0; i < n; i++)
        check_row(law(reference_argument(&row[i], 0)), &row[i]);
}

static double viscosity_uPa_s(double T_K)
{
    return 1e6 * water_viscosity(T_K);
}

static double viscosity_mPa_s(double t_C)
{
    return 1e3 * water_viscosity(t_C + zero_C);
}

static double density_C(double t_C)
{
    return water_density(t_C + zero_C);
}

/* The central difference over 2 mK: its own error is below 1e-10. */
static double log_slope(double t_C)
{
    const double h = 1e-3;
    return (log(water_viscosity(t_C + zero_C + h)) - log(water_viscosity(t_C + zero_C - h))) / (2.0 * h);
}

static void viscosity_is_the_release(void **state)
{
    (void)state;
    hold("viscosity.release", viscosity_uPa_s);
    hold("viscosity.sr6", viscosity_mPa_s);
}

static void viscosity_is_that_of_the_library(void **state)
{
    (void)state;
    hold("viscosity.iapws", viscosity_uPa_s);
}

/* ISO/TR 3666 fixes 1.0016 mPa s at 20 degC. */
static void viscosity_is_the_standard(void **state)
{
    (void)state;
    hold("viscosity.iso3666", viscosity_mPa_s);
}

/* The short formula against the full one, which knows pressure: 2.9e-5 is the
 * most they differ at these temperatures (computed with iapws 1.5.2). */
static void viscosity_is_near_the_full_formula(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("water.tsv", "viscosity.full", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double t_C = reference_argument(&row[i], 0);
        check_close(viscosity_mPa_s(t_C) / row[i].number, 1.0, 3.0e-5,
                    "SERIES the short formula stands for the full one");
    }
}

static void slope_of_viscosity(void **state)
{
    (void)state;
    hold("viscosity.slope", log_slope);
}

static void density_is_cipm(void **state)
{
    (void)state;
    hold("density", density_C);
    check_round(water_density(zero_C + 3.983035), 999.974950, 4.0); /* the maximum, a5 of the formula */
}

/* 1e-12 of the law is what models/water.h says, over all of the range it names. */
static void fit_follows_the_law(void **state)
{
    (void)state;
    const struct water_fit fit = water_fit_make();
    enum { STEPS = 20000 };
    for (int i = 0; i <= STEPS; i++) {
        const double T_K = 268.15 + 52.0 * i / STEPS;
        check_close(water_fit_viscosity(&fit, T_K) / water_viscosity(T_K), 1.0, 1e-12, "SERIES Chebyshev, 18 terms");
    }
}

static void kinematic_is_the_ratio(void **state)
{
    (void)state;
    const struct water_fit fit = water_fit_make();
    for (double T_K = WATER_MIN_K; T_K <= WATER_MAX_K; T_K += 2.5)
        check_close(water_fit_kinematic(&fit, T_K) * water_density(T_K) / water_viscosity(T_K), 1.0, 1e-12,
                    "SERIES Chebyshev, 18 terms");
    check_printed(1e6 * water_fit_kinematic(&fit, 298.15), "0.89263"); /* 0.889997/0.997047022, by hand */
}

/* What a warmer bath does to the time of water, percent. */
static void time_per_kelvin(void **state)
{
    (void)state;
    const struct water_fit fit = water_fit_make();
    struct reference_row row[ROOM];
    const size_t n = reference_read("water.tsv", "time.kelvin", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const double warmer = water_fit_kinematic(&fit, 298.15 + reference_argument(&row[i], 0));
        check_row(100.0 * (water_fit_kinematic(&fit, 298.15) / warmer - 1.0), &row[i]);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(viscosity_is_the_release),  cmocka_unit_test(viscosity_is_that_of_the_library),
        cmocka_unit_test(viscosity_is_the_standard), cmocka_unit_test(viscosity_is_near_the_full_formula),
        cmocka_unit_test(slope_of_viscosity),        cmocka_unit_test(density_is_cipm),
        cmocka_unit_test(fit_follows_the_law),       cmocka_unit_test(kinematic_is_the_ratio),
        cmocka_unit_test(time_per_kelvin),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
