/* Units, averages of most-probable chains, moment sums, Mark-Houwink. */
#include "check.h"
#include "reference.h"

#include <float.h>
#include <math.h>

#include "models/polymer.h"

enum { ROOM = 16, EXPONENTS = 5 };

static const double exponent[EXPONENTS] = {0.4, 0.5, 0.76, 1.0, 1.1};

static void r_of_a(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("polymer.tsv", "r", row, ROOM);
    for (size_t i = 0; i < n; i++)
        check_row(polymer_r(reference_argument(&row[i], 0)), &row[i]);
}

static void unit_mass(void **state)
{
    (void)state;
    const struct reference_row row = reference_one("polymer.tsv", "unit.r");
    check_row(1e3 * polymer_unit_kg_mol(1.0, 0.04405, 0.08609) * polymer_r(reference_argument(&row, 0)), &row);
    check_round(polymer_unit_kg_mol(0.0, 0.04405, 0.08609), 0.08609, 2.0);
    check_printed(1e3 * polymer_unit_kg_mol(0.88, 0.04405, 0.08609), "49.0948"); /* 0.88 x 44.05 + 0.12 x 86.09 */
}

/* Phi(w) term by term with a carry (Kahan), long after terms stop to count;
 * `condition` is the sum of the sizes over the sum. */
static double brute_phi(double a, long double w, double *condition)
{
    long double sum = 0.0L, carry = 0.0L, factor = 1.0L, largest = 0.0L, sizes = 0.0L;
    for (long x = 1; x < 40000000; x++) {
        const long double term = powl((long double)x, 1.0L + (long double)a) * factor;
        const long double y = term - carry, next = sum + y;
        carry = next - sum - y;
        sum = next;
        sizes += fabsl(term);
        factor *= w;
        if (fabsl(term) > largest)
            largest = fabsl(term);
        if (fabsl(term) < 1e-22L * fabsl(sum) && fabsl(term) < largest)
            break;
    }
    *condition = (double)(sizes / fabsl(sum));
    return (double)sum;
}

/* Phi at w = 1 - d: 1e-13 as models/polymer.h says, and where the sum
 * alternates what its terms lose against each other. */
static void hold_phi(double d)
{
    for (int i = 0; i < EXPONENTS; i++) {
        struct polymer_sums sums;
        double condition;
        polymer_sums_make(&sums, exponent[i]);
        const double expected = brute_phi(exponent[i], 1.0L - (long double)d, &condition);
        check_close(polymer_phi(&sums, 1.0 - d, d) / expected, 1.0, 1e-13 + 4.0 * DBL_EPSILON * (condition - 1.0),
                    "SERIES what models/polymer.h says, and ROUND of an alternating sum");
    }
}

static void phi_of_short_chains(void **state)
{
    (void)state;
    for (int i = 0; i <= 60; i++)
        hold_phi(1.0 - 0.01 * i); /* both sides of w = 1/2 */
    hold_phi(0.5);
    hold_phi(nextafter(0.5, 0.0));
    hold_phi(nextafter(0.5, 1.0));
}

static void phi_of_long_chains(void **state)
{
    (void)state;
    const double d[] = {0.3,  0.25,   0.1813, 0.1812, 0.15, 0.1,  0.05,
                        0.03, 0.0296, 0.0295, 0.02,   0.01, 1e-3, 1e-4}; /* steps at mu = 0.2, 0.03 */
    for (size_t i = 0; i < sizeof d / sizeof *d; i++)
        hold_phi(d[i]);
}

/* Below w = 0 the sum alternates: it occurs where conversion is low. */
static void phi_of_negative_w(void **state)
{
    (void)state;
    for (int i = 1; i <= 88; i++)
        hold_phi(1.0 + 0.01 * i);
}

/* One whole number has a closed form: a = 1, sum x^2 w^(x-1) = (1+w)/(1-w)^3. */
static void phi_in_closed_form(void **state)
{
    (void)state;
    struct polymer_sums sums;
    polymer_sums_make(&sums, 1.0);
    for (double d = 1e-7; d < 1.9; d *= 1.3)
        check_close(polymer_phi(&sums, 1.0 - d, d) * d * d * d / (2.0 - d), 1.0, 1e-13,
                    "SERIES what models/polymer.h says");
}

/* Near 1 the binomial series to the fifth power, whose next term is given
 * here; farther off what pow loses, eps over ratio^b - 1. */
static void power_less_one(void **state)
{
    (void)state;
    const double power[] = {-2.5, -1.0 / 0.76, -1.0, -0.5, 0.76, 1.0, 2.0};
    for (size_t i = 0; i < sizeof power / sizeof *power; i++)
        for (double size = 1e-15; size < 0.9; size *= 1.21)
            for (int sign = -1; sign <= 1; sign += 2) {
                const double ratio = 1.0 + sign * size, x = ratio - 1.0, b = power[i], expected = expm1(b * log1p(x));
                const double next = fabs((b - 1.0) * (b - 2.0) * (b - 3.0) * (b - 4.0) * (b - 5.0) * pow(x, 5) / 720.0);
                const double bound = fabs(x) > 1e-3 ? 8.0 * DBL_EPSILON * (1.0 + fabs(expected))
                                                    : (1.01 * next + 8.0 * DBL_EPSILON) * fabs(expected);
                check_close(polymer_power_less_one(ratio, b), expected, bound, "SERIES the next term, and ROUND");
            }
    assert_true(polymer_power_less_one(1.0, -1.3) == 0.0);
}

static void xv_goes_back(void **state)
{
    (void)state;
    for (int i = 0; i < EXPONENTS; i++) {
        struct polymer_sums sums;
        polymer_sums_make(&sums, exponent[i]);
        check_round(polymer_xv_of_xn(&sums, 1.0), 1.0, 4.0); /* units only */
        check_close(polymer_xn_of_xv(&sums, 1.0), 1.0, 1e-13, "ROUND phi to 1e-13, the root's condition about 1");
        for (double xn = 1.01; xn < 1e6; xn *= 1.37) {
            const double xv = polymer_xv_of_xn(&sums, xn);
            assert_true(xv > xn && xv < 2.2 * xn);
            check_close(polymer_xn_of_xv(&sums, xv) / xn, 1.0, 1e-13,
                        "ROUND phi to 1e-13, the root's condition about 1");
        }
        check_close(polymer_xv_of_xn(&sums, 1e6) / 1e6, polymer_r(exponent[i]), 1e-5, "SERIES xv = r xn - O(1)");
    }
}

/* The averages of a short distribution, summed by hand: P(x) = 2^-x. */
static void xv_by_sums(void **state)
{
    (void)state;
    for (int i = 0; i < EXPONENTS; i++) {
        struct polymer_sums sums;
        polymer_sums_make(&sums, exponent[i]);
        double mass = 0.0, moment = 0.0;
        for (int x = 1; x < 200; x++) {
            mass += x * pow(0.5, x);
            moment += pow(x, 1.0 + exponent[i]) * pow(0.5, x);
        }
        check_round(polymer_xv_of_xn(&sums, 2.0), pow(moment / mass, 1.0 / exponent[i]), 200.0);
    }
}

static void mark_houwink(void **state)
{
    (void)state;
    struct polymer_sums sums;
    polymer_sums_make(&sums, 0.76);
    const struct reference_row Mv = reference_one("polymer.tsv", "base.Mv"),
                               eta = reference_one("polymer.tsv", "base.eta");
    const double Mv_kg_mol = 0.04405 * polymer_xv_of_xn(&sums, 1000.0), K = 2.0e-5; /* 2.0e-4 dL/g is 2.0e-5 m3/kg */
    check_row(1e3 * Mv_kg_mol, &Mv);
    check_row(10.0 * polymer_intrinsic_viscosity(K, 0.76, Mv_kg_mol), &eta);
    for (double M = 0.1; M < 1e4; M *= 3.0)
        check_round(polymer_viscosity_average(K, 0.76, polymer_intrinsic_viscosity(K, 0.76, M)), M, 32.0);
}

/* 0.10 g in 100 mL, 110 and 140 s, K in mL/g. */
static void mark_houwink_of_a_textbook(void **state)
{
    (void)state;
    const struct reference_row row = reference_one("reduction.tsv", "sperling");
    const double specific = reference_argument(&row, 1) / reference_argument(&row, 0) - 1.0,
                 conc_kg_m3 = 10.0 * reference_argument(&row, 2);
    check_row(1e3 * polymer_viscosity_average(1e-3 * reference_argument(&row, 3), reference_argument(&row, 4),
                                              specific / conc_kg_m3),
              &row);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(r_of_a),
        cmocka_unit_test(unit_mass),
        cmocka_unit_test(phi_of_short_chains),
        cmocka_unit_test(phi_of_long_chains),
        cmocka_unit_test(phi_of_negative_w),
        cmocka_unit_test(phi_in_closed_form),
        cmocka_unit_test(power_less_one),
        cmocka_unit_test(xv_goes_back),
        cmocka_unit_test(xv_by_sums),
        cmocka_unit_test(mark_houwink),
        cmocka_unit_test(mark_houwink_of_a_textbook),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
