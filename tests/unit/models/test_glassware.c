/* Flasks, their limits, and what a limit means. */
#include "check.h"
#include "reference.h"

#include <math.h>

#include "models/glassware.h"

enum { ROOM = 16 };

static const double mL = 1e-6;

static void flasks_have_their_limits(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("glassware.tsv", "flask.A", row, ROOM);
    assert_int_equal(n, GLASSWARE_FLASKS);
    for (size_t i = 0; i < n; i++) {
        const double volume = reference_argument(&row[i], 0) * mL;
        double limit = 0.0;
        check_round(glassware_flask_volume(i), volume, 4.0);
        check_round(glassware_flask_tolerance(i, GLASS_A) / mL, row[i].number, 4.0);
        check_round(glassware_flask_tolerance(i, GLASS_B) / mL, 2.0 * row[i].number, 4.0);
        assert_true(glassware_tolerance_of(volume, GLASS_A, &limit));
        check_round(limit / mL, row[i].number, 4.0);
        assert_true(glassware_tolerance_of(volume, GLASS_B, &limit));
        check_round(limit / mL, 2.0 * row[i].number, 4.0);
    }
}

static void other_volumes_have_none(void **state)
{
    (void)state;
    const double other[] = {0.0, 5.0, 20.0, 99.9, 100.1, 300.0, 2000.0};
    for (size_t i = 0; i < sizeof other / sizeof *other; i++) {
        double limit = -7.0;
        assert_false(glassware_tolerance_of(other[i] * mL, GLASS_A, &limit));
        assert_true(limit == -7.0);
    }
    double limit = 0.0; /* a volume that took a way through other units is the flask's still */
    assert_true(glassware_tolerance_of(0.1 * 1e-3, GLASS_A, &limit));
    check_round(limit, 0.10 * mL, 4.0);
}

static void smallest_that_holds(void **state)
{
    (void)state;
    static const struct {
        double needed_mL, flask_mL;
    } pair[] = {{0.0, 10.0},    {9.9, 10.0},     {10.0, 10.0},   {10.01, 25.0},  {25.1, 50.0},    {51.0, 100.0},
                {100.0, 100.0}, {100.01, 200.0}, {201.0, 250.0}, {251.0, 500.0}, {500.1, 1000.0}, {1000.0, 1000.0}};
    for (size_t i = 0; i < sizeof pair / sizeof *pair; i++)
        check_round(glassware_fit(pair[i].needed_mL * mL), pair[i].flask_mL * mL, 4.0);
    assert_true(glassware_fit(1000.1 * mL) == 0.0);
    assert_true(glassware_fit((double)INFINITY) == 0.0);
    /* three charges of 30.1 mL and a rest that adds up to 100 mL but for rounding */
    check_round(glassware_fit(30.1 * mL + 30.1 * mL + 30.1 * mL + 9.7 * mL), 100.0 * mL, 4.0);
}

static void standard_uncertainty(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("glassware.tsv", "flask.A.u", row, ROOM);
    for (size_t i = 0; i < n; i++)
        check_row(glassware_standard_uncertainty(reference_argument(&row[i], 0)), &row[i]);
    check_round(glassware_standard_uncertainty(0.06), 0.06 / sqrt(6.0), 2.0);
}

/* QUAM example A2: c = 1000 m P/(M V) and its uncertainty. The burette's limit
 * of 0.03 mL is the larger part of u(V) = 0.013 mL; what is left of that is
 * temperature (0.0044 mL, the difference of squares). */
static void quam_a2(void **state)
{
    (void)state;
    const double m = 0.3888, P = 1.0, M = 204.2212, V = 18.64, c = 1000.0 * m * P / (M * V);
    const double glass = glassware_standard_uncertainty(0.03), u_V = hypot(glass, 0.0044);
    const double share =
        sqrt(pow(0.00013 / m, 2) + pow(0.00029 / P, 2) + pow(0.0038 / M, 2) + pow(u_V / V, 2) + pow(0.0005, 2));
    const struct reference_row conc = reference_one("glassware.tsv", "quam.A2"),
                               u = reference_one("glassware.tsv", "quam.A2.u");
    check_printed(u_V, "0.013");
    check_row(c, &conc);
    check_row(c * share, &u);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(flasks_have_their_limits),
        cmocka_unit_test(other_volumes_have_none),
        cmocka_unit_test(smallest_that_holds),
        cmocka_unit_test(standard_uncertainty),
        cmocka_unit_test(quam_a2),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
