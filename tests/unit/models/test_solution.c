/* The solution laws and their inverse. */
#include "check.h"

#include <gsl/gsl_sf_lambert.h>
#include <math.h>

#include "models/solution.h"

static void laws_by_hand(void **state)
{
    (void)state;
    check_printed(solution_specific(SOLUTION_MARTIN, 0.45, 0.5), "0.626161"); /* 0.5 exp(0.225) = 0.5 x 1.252323 */
    check_printed(solution_specific(SOLUTION_HUGGINS, 0.45, 0.5), "0.6125000000");
    assert_true(solution_specific(SOLUTION_MARTIN, 0.45, 0.0) == 0.0);
    assert_true(solution_specific(SOLUTION_HUGGINS, 0.45, 0.0) == 0.0);
}

/* Both laws are y + k y^2 to second order; they part at k^2 y^3/2 of Martin's
 * series, whose next term k^3 y^4/6 is left out here. */
static void laws_part_in_third_order(void **state)
{
    (void)state;
    for (double k = 0.1; k < 1.05; k += 0.1) {
        const double y = 0.01;
        const double apart = solution_specific(SOLUTION_MARTIN, k, y) - solution_specific(SOLUTION_HUGGINS, k, y);
        check_close(apart, k * k * y * y * y / 2.0, k * k * k * pow(y, 4) / 5.0, "SERIES the next term, k^3 y^4/6");
    }
}

static void inverse_goes_back(void **state)
{
    (void)state;
    const enum solution_law law[] = {SOLUTION_MARTIN, SOLUTION_HUGGINS};
    for (int l = 0; l < 2; l++)
        for (int i = 0; i <= 20; i++)
            for (double specific = 1e-6; specific < 100.0; specific *= 1.5) {
                const double k = 0.1 * i, y = solution_coil_volume(law[l], k, specific);
                assert_true(y > 0.0);
                /* the law's exponent carries the rounding of k y times k y */
                check_round(solution_specific(law[l], k, y), specific, 8.0 + 4.0 * k * y);
            }
}

/* y exp(k y) = s: k y = W(k s), Lambert's function; y + k y^2 = s: a quadratic. */
static void inverse_has_a_closed_form(void **state)
{
    (void)state;
    for (int i = 1; i <= 20; i++)
        for (double specific = 0.01; specific < 5.0; specific *= 1.3) {
            const double k = 0.1 * i;
            check_round(solution_coil_volume(SOLUTION_MARTIN, k, specific), gsl_sf_lambert_W0(k * specific) / k, 16.0);
            check_round(solution_coil_volume(SOLUTION_HUGGINS, k, specific),
                        2.0 * specific / (1.0 + sqrt(1.0 + 4.0 * k * specific)), 8.0);
        }
}

static void without_interaction_nothing_bends(void **state)
{
    (void)state;
    check_round(solution_coil_volume(SOLUTION_MARTIN, 0.0, 0.8), 0.8, 1.0);
    check_round(solution_coil_volume(SOLUTION_HUGGINS, 0.0, 0.8), 0.8, 1.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(laws_by_hand),
        cmocka_unit_test(laws_part_in_third_order),
        cmocka_unit_test(inverse_goes_back),
        cmocka_unit_test(inverse_has_a_closed_form),
        cmocka_unit_test(without_interaction_nothing_bends),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
