/* Straight lines against published fits and against what makes a fit the best. */
#include "check.h"
#include "reference.h"

#include <math.h>

#include "sim/base/streams.h"
#include "sim/reduce/line.h"

enum { ROOM = 40 };

struct points {
    size_t n;
    double x[ROOM], y[ROOM];
};

static struct points read(const char *quantity, double origin)
{
    struct reference_row row[ROOM];
    struct points p = {.n = reference_read("line.tsv", quantity, row, ROOM)};
    for (size_t i = 0; i < p.n; i++) {
        p.x[i] = reference_argument(&row[i], 0) - origin;
        p.y[i] = row[i].number;
    }
    return p;
}

static void hold(const char *quantity, double value)
{
    const struct reference_row row = reference_one("line.tsv", quantity);
    check_row(value, &row);
}

static void gum_h3(void **state)
{
    (void)state;
    const struct points p = read("h3.point", 20.0);
    assert_int_equal(p.n, 11);
    const struct line line = line_fit(p.n, p.x, p.y, NULL);
    const struct line_errors u = line_errors(p.n, p.x, p.y, line);
    hold("h3.intercept", line.intercept);
    hold("h3.slope", line.slope);
    hold("h3.intercept.u", u.intercept_u);
    hold("h3.slope.u", u.slope_u);
    hold("h3.correlation", u.correlation);
    hold("h3.s", u.residual_sd);
    const double forgotten = hypot(u.intercept_u, 10.0 * u.slope_u);
    hold("h3.at30", line.intercept + 10.0 * line.slope);
    hold("h3.at30.forgotten", forgotten);
    hold("h3.at30.u", sqrt(forgotten * forgotten + 20.0 * u.correlation * u.intercept_u * u.slope_u));
}

/* NIST StRD gives 15 digits; the slope has them all, of the rest rounding
 * leaves what the table says (the intercept is 2e-4 of what cancels to it). */
static void nist_norris(void **state)
{
    (void)state;
    const struct points p = read("norris.point", 0.0);
    assert_int_equal(p.n, 36);
    const struct line line = line_fit(p.n, p.x, p.y, NULL);
    const struct line_errors u = line_errors(p.n, p.x, p.y, line);
    hold("norris.intercept", line.intercept);
    hold("norris.slope", line.slope);
    hold("norris.intercept.u", u.intercept_u);
    hold("norris.slope.u", u.slope_u);
    hold("norris.s", u.residual_sd);
}

static void two_points(void **state)
{
    (void)state;
    const double x[] = {1.0, 3.0}, y[] = {5.0, 1.0}, weight[] = {7.0, 0.01};
    for (int i = 0; i < 2; i++) {
        const struct line line = line_fit(2, x, y, i ? weight : NULL);
        check_close(line.intercept, 7.0, 1e-14, "ROUND a few operations");
        check_close(line.slope, -2.0, 1e-14, "ROUND a few operations");
    }
}

static void no_line_is_no_number(void **state)
{
    (void)state;
    const double same[] = {2.0, 2.0, 2.0}, y[] = {1.0, 2.0, 4.0};
    assert_true(isnan(line_fit(3, same, y, NULL).intercept) && isnan(line_fit(3, same, y, NULL).slope));
    assert_true(isnan(line_fit(1, same, y, NULL).intercept));
}

/* Points about no line at all, with weights. */
static void scatter(struct points *p, double weight[ROOM], uint64_t key)
{
    struct streams_state s = streams_open(streams_study_key(5, key), STREAMS_STUDY, (struct streams_place){0});
    p->n = 3 + key % 9;
    for (size_t i = 0; i < p->n; i++) {
        p->x[i] = 0.1 + streams_uniform(&s);
        p->y[i] = streams_uniform(&s);
        weight[i] = 0.05 + streams_uniform(&s);
    }
}

/* The residuals of a best line are at right angles to 1 and x, by weight. */
static void residuals_are_balanced(void **state)
{
    (void)state;
    for (uint64_t key = 0; key < 200; key++) {
        struct points p;
        double weight[ROOM], flat = 0.0, tilted = 0.0;
        scatter(&p, weight, key);
        const struct line line = line_fit(p.n, p.x, p.y, weight);
        for (size_t i = 0; i < p.n; i++) {
            const double rest = weight[i] * (p.y[i] - line.intercept - line.slope * p.x[i]);
            flat += rest;
            tilted += rest * p.x[i];
        }
        const double size = 1e-14 * (1.0 + fabs(line.slope));
        check_close(flat, 0.0, size, "ROUND sums of a dozen terms");
        check_close(tilted, 0.0, size, "ROUND sums of a dozen terms");
    }
}

/* Weight 3 is the same as the point three times. */
static void weights_count_points(void **state)
{
    (void)state;
    const double x[] = {1.0, 2.0, 4.0}, y[] = {2.0, 1.0, 5.0}, weight[] = {1.0, 3.0, 2.0};
    const double xx[] = {1.0, 2.0, 2.0, 2.0, 4.0, 4.0}, yy[] = {2.0, 1.0, 1.0, 1.0, 5.0, 5.0};
    const struct line a = line_fit(3, x, y, weight), b = line_fit(6, xx, yy, NULL);
    check_round(a.intercept, b.intercept, 16.0);
    check_round(a.slope, b.slope, 16.0);
}

/* Two lines with one intercept: both slopes and the intercept are best. */
static void common_intercept_is_balanced(void **state)
{
    (void)state;
    for (uint64_t key = 0; key < 200; key++) {
        struct points p, other;
        double weight[ROOM], unused[ROOM], flat = 0.0;
        scatter(&p, weight, key);
        scatter(&other, unused, key + 9000);
        for (size_t i = 0; i < p.n; i++)
            other.y[i] = p.y[i] + 0.3 * p.x[i] + 0.1 * weight[i];
        struct line line[2];
        line_fit_common(p.n, p.x, (const double *const[2]){p.y, other.y}, key % 2 ? weight : NULL, line);
        assert_true(line[0].intercept == line[1].intercept);
        const double *const y[2] = {p.y, other.y};
        const double size = 1e-13 * (1.0 + fabs(line[0].slope));
        for (int k = 0; k < 2; k++) {
            double tilted = 0.0;
            for (size_t i = 0; i < p.n; i++) {
                const double rest =
                    (key % 2 ? weight[i] : 1.0) * (y[k][i] - line[k].intercept - line[k].slope * p.x[i]);
                flat += rest;
                tilted += rest * p.x[i];
            }
            check_close(tilted, 0.0, size, "ROUND sums of a dozen terms");
        }
        check_close(flat, 0.0, size, "ROUND sums of a dozen terms");
    }
}

/* Two lines that have one intercept are found as they are. */
static void common_intercept_of_two_lines(void **state)
{
    (void)state;
    const double x[] = {1.0, 2.0, 5.0}, up[] = {5.0, 7.0, 13.0}, down[] = {2.5, 2.0, 0.5};
    struct line line[2];
    line_fit_common(3, x, (const double *const[2]){up, down}, NULL, line);
    check_round(line[0].intercept, 3.0, 32.0);
    check_round(line[0].slope, 2.0, 32.0);
    check_round(line[1].slope, -0.5, 64.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(gum_h3),
        cmocka_unit_test(nist_norris),
        cmocka_unit_test(two_points),
        cmocka_unit_test(no_line_is_no_number),
        cmocka_unit_test(residuals_are_balanced),
        cmocka_unit_test(weights_count_points),
        cmocka_unit_test(common_intercept_is_balanced),
        cmocka_unit_test(common_intercept_of_two_lines),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
