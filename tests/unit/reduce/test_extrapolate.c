/* Extrapolations: worked reductions, the bias of each line, single points. */
#include "check.h"
#include "reference.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "models/solution.h"
#include "sim/reduce/reduction.h"

enum { ROOM = 12 };

static const char *const name[] = {[HUGGINS] = "huggins",
                                   [KRAEMER] = "kraemer",
                                   [MARTIN] = "martin",
                                   [COMMON_INTERCEPT] = "common-intercept",
                                   [SINGLE_POINT] = "single-point"};

static enum extrapolation named(const char *word)
{
    for (int i = 0; i < 5; i++)
        if (strcmp(name[i], word) == 0)
            return (enum extrapolation)i;
    fail_msg("no extrapolation is called %s", word);
    return HUGGINS;
}

struct series {
    size_t n;
    double conc[ROOM], relative[ROOM];
};

/* The points of a worked reduction: t/t0, times over t0, or eta_sp/c. */
static struct series worked(const char *which)
{
    char quantity[32];
    struct reference_row row[ROOM];
    snprintf(quantity, sizeof quantity, "%s.point", which);
    struct series s = {.n = reference_read("reduction.tsv", quantity, row, ROOM)};
    for (size_t i = 0; i < s.n; i++) {
        s.conc[i] = reference_argument(&row[i], 0);
        s.relative[i] = strcmp(which, "pmma") == 0      ? row[i].number
                        : strcmp(which, "styrene") == 0 ? row[i].number / 65.8
                                                        : 1.0 + row[i].number * s.conc[i];
    }
    return s;
}

static void hold(const char *which, const char *rest, double value)
{
    char quantity[48];
    snprintf(quantity, sizeof quantity, "%s.%s", which, rest);
    const struct reference_row row = reference_one("reduction.tsv", quantity);
    check_row(value, &row);
}

static double extrapolate(const struct series *s, enum extrapolation e, enum weighting w, struct line lines[2])
{
    return reduction_extrapolate(&(struct analysis){.extrapolation = e, .weighting = w}, s->n, s->conc, s->relative,
                                 lines);
}

/* Huggins and Kraemer with their constants, slope over [eta]^2. */
static void hold_lines(const char *which, const struct series *s)
{
    struct line line[2];
    hold(which, "huggins", extrapolate(s, HUGGINS, WEIGHT_EQUAL, line));
    hold(which, "huggins.k", line[0].slope / (line[0].intercept * line[0].intercept));
    hold(which, "kraemer", extrapolate(s, KRAEMER, WEIGHT_EQUAL, line));
    hold(which, "kraemer.k", line[0].slope / (line[0].intercept * line[0].intercept));
}

static void worked_reductions(void **state)
{
    (void)state;
    const char *const which[] = {"pmma", "styrene"};
    for (int i = 0; i < 2; i++) {
        const struct series s = worked(which[i]);
        assert_int_equal(s.n, 4);
        hold_lines(which[i], &s);
        hold(which[i], "martin", extrapolate(&s, MARTIN, WEIGHT_EQUAL, NULL));
        hold(which[i], "common-intercept", extrapolate(&s, COMMON_INTERCEPT, WEIGHT_EQUAL, NULL));
        hold(which[i], "single-point", extrapolate(&s, SINGLE_POINT, WEIGHT_EQUAL, NULL));
        /* the concentration's square as weight; single points know none */
        hold(which[i], "huggins.c2", extrapolate(&s, HUGGINS, WEIGHT_C_SQUARED, NULL));
        hold(which[i], "kraemer.c2", extrapolate(&s, KRAEMER, WEIGHT_C_SQUARED, NULL));
        hold(which[i], "martin.c2", extrapolate(&s, MARTIN, WEIGHT_C_SQUARED, NULL));
        hold(which[i], "common-intercept.c2", extrapolate(&s, COMMON_INTERCEPT, WEIGHT_C_SQUARED, NULL));
        hold(which[i], "single-point", extrapolate(&s, SINGLE_POINT, WEIGHT_C_SQUARED, NULL));
    }
    const struct series benzene = worked("benzene");
    hold_lines("benzene", &benzene);
}

/* The second line of a common intercept is Kraemer's. */
static void common_intercept_has_both_lines(void **state)
{
    (void)state;
    const struct series s = worked("pmma");
    struct line line[2];
    const double intrinsic = extrapolate(&s, COMMON_INTERCEPT, WEIGHT_EQUAL, line);
    assert_true(line[0].intercept == intrinsic && line[1].intercept == intrinsic);
    assert_true(line[0].slope > 0.0 && line[1].slope < 0.0);
    /* the slopes that numpy.linalg.lstsq gives with it */
    check_printed(line[0].slope, "0.69675692");
    check_printed(line[1].slope, "-0.1932296");
}

static struct series world(enum solution_law law, double k, double top, double intrinsic)
{
    struct series s = {.n = 5};
    for (size_t i = 0; i < s.n; i++) {
        const double y = top * (double)(i + 1) / 5.0;
        s.conc[i] = y / intrinsic;
        s.relative[i] = 1.0 + solution_specific(law, k, y);
    }
    return s;
}

/* A line that is not the world's law bends; percent of [eta]. */
static void bias_of_a_line(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("reduction.tsv", "bias", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        char law[32], line[32];
        reference_word(&row[i], 0, law);
        reference_word(&row[i], 3, line);
        const struct series s = world(strcmp(law, "martin") == 0 ? SOLUTION_MARTIN : SOLUTION_HUGGINS,
                                      reference_argument(&row[i], 1), reference_argument(&row[i], 2), 1.0);
        check_row(100.0 * (extrapolate(&s, named(line), WEIGHT_EQUAL, NULL) - 1.0), &row[i]);
    }
}

/* The world's own line finds [eta], and k [eta]^2 or k [eta] as its slope,
 * whatever the weights. */
static void own_line_is_exact(void **state)
{
    (void)state;
    const enum weighting weighting[] = {WEIGHT_EQUAL, WEIGHT_C_SQUARED};
    for (int w = 0; w < 2; w++)
        for (double k = 0.0; k < 0.85; k += 0.1)
            for (double intrinsic = 0.01; intrinsic < 1.0; intrinsic *= 3.0) {
                struct line line[2];
                const struct series martin = world(SOLUTION_MARTIN, k, 0.6, intrinsic),
                                    huggins = world(SOLUTION_HUGGINS, k, 0.6, intrinsic);
                const char *const why = "ROUND eta_r - 1 loses a digit at the lowest level";
                check_close(extrapolate(&martin, MARTIN, weighting[w], line) / intrinsic, 1.0, 1e-13, why);
                check_close(line[0].slope / intrinsic, k, 1e-12, why);
                check_close(extrapolate(&huggins, HUGGINS, weighting[w], line) / intrinsic, 1.0, 1e-13, why);
                check_close(line[0].slope / (intrinsic * intrinsic), k, 1e-12, why);
            }
}

/* sqrt(2 (eta_sp - ln eta_r))/c = [eta] (1 + (k - 1/3) y + ...): the next
 * term is below y^2. */
static void single_point_is_exact_at_a_third(void **state)
{
    (void)state;
    const enum solution_law law[] = {SOLUTION_MARTIN, SOLUTION_HUGGINS};
    const double y = 1e-4;
    for (int l = 0; l < 2; l++)
        for (double k = 0.0; k < 0.95; k += 0.1) {
            struct series s = {.n = 1, .conc = {y}, .relative = {1.0 + solution_specific(law[l], k, y)}};
            check_close((extrapolate(&s, SINGLE_POINT, WEIGHT_EQUAL, NULL) - 1.0) / y, k - 1.0 / 3.0, y,
                        "SERIES the next term");
            /* at a third nothing of first order is left */
            s.relative[0] = 1.0 + solution_specific(law[l], 1.0 / 3.0, 0.01);
            s.conc[0] = 0.01;
            check_close(extrapolate(&s, SINGLE_POINT, WEIGHT_EQUAL, NULL), 1.0, 1e-4, "SERIES y^2");
        }
}

static void single_point_is_a_plain_mean(void **state)
{
    (void)state;
    const struct series both = {.n = 2, .conc = {0.2, 0.8}, .relative = {1.3, 2.5}};
    const struct series one = {.n = 1, .conc = {0.2}, .relative = {1.3}},
                        two = {.n = 1, .conc = {0.8}, .relative = {2.5}};
    const double mean = 0.5 * (extrapolate(&one, SINGLE_POINT, WEIGHT_EQUAL, NULL) +
                               extrapolate(&two, SINGLE_POINT, WEIGHT_EQUAL, NULL));
    check_round(extrapolate(&both, SINGLE_POINT, WEIGHT_EQUAL, NULL), mean, 4.0);
    check_printed(extrapolate(&one, SINGLE_POINT, WEIGHT_EQUAL, NULL), "1.37178"); /* sqrt(2 (0.3 - 0.262364264))/0.2 */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(worked_reductions),
        cmocka_unit_test(common_intercept_has_both_lines),
        cmocka_unit_test(bias_of_a_line),
        cmocka_unit_test(own_line_is_exact),
        cmocka_unit_test(single_point_is_exact_at_a_third),
        cmocka_unit_test(single_point_is_a_plain_mean),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
