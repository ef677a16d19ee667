/* Budget and margins as JSON, as sentences, on the terminal, and as figures'
 * numbers. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>
#include <unistd.h>

#include "sim/report/figure_budget.h"
#include "sim/report/figure_claimed.h"
#include "sim/report/figure_margins.h"
#include "sim/report/json_out_budget.h"
#include "sim/report/json_out_margin.h"
#include "sim/report/reasons.h"
#include "sim/report/terminal_budget.h"
#include "sim/report/terminal_margins.h"
#include "tests/unit/report/fake.h"
#include "tests/unit/report/fake_why.h"

static const struct warnings silent = {0, 0, NULL};

static struct report_context context_of(const struct scenario *s)
{
    return (struct report_context){.scenario = s, .version = "0.1", .folder = "out/made-up"};
}

static void assert_said(const char *text, const char *part)
{
    if (strstr(text, part))
        return;
    print_error("not said: \"%s\"\nin:\n%s", part, text);
    fail();
}

static double real(const json_t *object, const char *key)
{
    const json_t *value = json_object_get(object, key);
    assert_true(json_is_number(value));
    return json_number_value(value);
}

static void same(double a, double b)
{
    assert_true(a >= b && a <= b); /* TEXT: copied, never computed */
}

static void budget_shape(void **state)
{
    (void)state;
    const struct scenario s = fake_scenario();
    const struct report_context context = context_of(&s);
    struct budget b = fake_budget();
    json_t *object = json_out_budget(&context, &b, &silent);
    assert_string_equal(json_string_value(json_object_get(object, "verb")), "budget");
    assert_non_null(json_object_get(json_object_get(object, "outcome"), "power"));
    assert_int_equal(json_integer_value(json_object_get(object, "pairs")), 20000);
    same(real(object, "left_out"), 0.0004);
    const json_t *groups = json_object_get(object, "groups"), *biases = json_object_get(object, "biases");
    assert_int_equal(json_array_size(groups), SOURCES);
    assert_int_equal(json_array_size(biases), BUDGET_BIASES);
    const json_t *filling = json_array_get(groups, DRAWS_GROUP_FILLING);
    assert_string_equal(json_string_value(json_object_get(filling, "name")), "filling scatter");
    same(real(filling, "total"), 0.40);
    same(real(filling, "first"), b.group[DRAWS_GROUP_FILLING].first);
    same(real(filling, "alone_sd"), b.group[DRAWS_GROUP_FILLING].alone_sd);
    same(real(json_object_get(filling, "se"), "total"), 0.004);
    same(real(json_object_get(filling, "se"), "first"), 0.006);
    same(real(json_object_get(filling, "se"), "alone_sd"), 1e-6);
    same(real(json_array_get(biases, BUDGET_DENSITY), "shift"), 3.1e-4);
    same(real(json_array_get(biases, BUDGET_DENSITY), "se"), 2e-6);
    same(real(json_object_get(object, "claimed"), "coverage"), 0.871);
    same(real(json_object_get(object, "claimed"), "se"), 0.0024);
    json_decref(object);
    b.coverage = (double)NAN;
    object = json_out_budget(&context, &b, &silent);
    assert_true(json_is_null(json_object_get(object, "claimed")));
    json_decref(object);
}

static void margin_shape(void **state)
{
    (void)state;
    const struct scenario s = fake_scenario();
    const struct report_context context = context_of(&s);
    struct margins m = fake_margins();
    json_t *object = json_out_margin(&context, &m, &silent);
    const json_t *first = json_array_get(json_object_get(object, "margins"), 1);
    assert_string_equal(json_string_value(json_object_get(first, "key")), "kit.baths.circulator.fluctuation");
    assert_string_equal(json_string_value(json_object_get(first, "direction")), "up");
    assert_string_equal(json_string_value(json_object_get(first, "verdict")), "margin");
    same(real(first, "nominal"), 0.02);
    same(real(first, "worst"), 0.05);
    same(real(first, "se"), 0.001);
    const json_t *exchange = json_array_get(json_object_get(object, "exchange"), 0);
    assert_string_equal(json_string_value(json_object_get(exchange, "replicates")), "fillings 4, runs 3");
    same(real(exchange, "hours"), 5.9 * 3600 / 3600);
    same(real(exchange, "money"), 275);
    json_decref(object);
    m.exchange.replicates[0] = '\0';
    object = json_out_margin(&context, &m, &silent);
    exchange = json_array_get(json_object_get(object, "exchange"), 0);
    assert_string_equal(json_string_value(json_object_get(exchange, "replicates")), "none");
    assert_true(json_is_null(json_object_get(exchange, "hours")));
    json_decref(object);
    m.has_exchange = false;
    object = json_out_margin(&context, &m, &silent);
    assert_int_equal(json_array_size(json_object_get(object, "exchange")), 0);
    json_decref(object);
}

static void impossible_shapes(void **state)
{
    (void)state;
    const struct scenario s = fake_scenario();
    const struct report_context context = context_of(&s);
    const struct outcome none = {.status = STATUS_IMPOSSIBLE, .why = "no flask holds it"};
    const struct budget b = {.outcome = none};
    const struct margins m = {.outcome = none};
    json_t *both[] = {json_out_budget(&context, &b, &silent), json_out_margin(&context, &m, &silent)};
    for (int i = 0; i < 2; i++) {
        assert_string_equal(json_string_value(json_object_get(both[i], "status")), "impossible");
        assert_string_equal(json_string_value(json_object_get(both[i], "why")), "no flask holds it");
        assert_null(json_object_get(both[i], i == 0 ? "groups" : "margins"));
        json_decref(both[i]);
    }
}

static void sentences_of_a_budget(void **state)
{
    (void)state;
    struct budget b = fake_budget();
    struct reasons why = {0};
    char names[REASONS_NAMES];
    reasons_budget(&why, &b);
    assert_int_equal(why.count, 6);
    assert_said(why.text[0], "What to improve first: filling scatter, behind 40.0 % of the variance");
    assert_said(why.text[0], "Then come hydrolysis (25.0 %), hand timing (20.0 %).");
    assert_said(why.text[1], "What no number of replicates can buy: hydrolysis (25.0 % of the variance)");
    assert_said(why.text[2], "What only further preparations average out: weighing (8.0 % of the variance)");
    /* ROUND: 0.061 sqrt(0.25 + 0.08) = 0.0350 */
    assert_said(why.text[3], "would fall from 0.061 points to about 0.035, no further");
    assert_said(why.text[4], "kinetic energy neglected -0.040 points, density neglected +0.031 points.");
    assert_said(why.text[5],
                "holds the truth in 87.10 % of studies (Monte Carlo error 0.24): the usual error bar is too short");
    /* ROUND: sums of a few shares */
    assert_true(fabs(reasons_share(&b, REASONS_RUN, names) - 0.20) < 1e-12);
    assert_string_equal(names, "hand timing");
    assert_true(fabs(reasons_temperature_share(&b) - 0.05) < 1e-12);
    why.count = 0;
    b.coverage = 0.952;
    reasons_budget(&why, &b);
    assert_said(why.text[5], "as long as it should be");
    why.count = 0;
    b.coverage = 0.99;
    reasons_budget(&why, &b);
    assert_said(why.text[5], "longer than it need be");
    why.count = 0;
    b.coverage = (double)NAN;
    reasons_budget(&why, &b);
    assert_int_equal(why.count, 5);
}

static void sentences_of_margins(void **state)
{
    (void)state;
    struct margins m = fake_margins();
    struct reasons why = {0};
    size_t order[MARGIN_MOST];
    figure_margins_sorted(&m, order);
    assert_int_equal(order[0], 2); /* 1.4/1.3, then 1.9/1.4, then 0.05/0.02 */
    assert_int_equal(order[1], 3);
    assert_int_equal(order[2], 1);
    assert_int_equal(order[3], 0);
    reasons_margins(&why, &m, "EUR");
    assert_int_equal(why.count, 3);
    assert_said(why.text[0], "It stops resolving first with top relative viscosity, cleaved below 1.3 (planned: 1.4), "
                             "top relative viscosity, cleaved above 1.9 (planned: 1.4), bath fluctuation above 0.05 K "
                             "(planned: 0.02 K).");
    assert_said(why.text[1], "1 of 4 conditions");
    assert_said(why.text[2], "On a bath twice as bad it takes fillings 4, runs 3 to resolve: +5.9 h and +275 EUR for "
                             "each study. The steadier bath has paid for itself after 7 studies.");
    why.count = 0;
    m.exchange = (struct margin_exchange){.studies_to_pay = (double)NAN, .replicates = "fillings 2, runs 3"};
    reasons_margins(&why, &m, "EUR");
    assert_said(why.text[2], "still resolves as it is");
    why.count = 0;
    m.exchange.replicates[0] = '\0';
    reasons_margins(&why, &m, "EUR");
    assert_said(why.text[2], "no number of replicates");
    for (size_t i = 0; i < m.count; i++)
        m.margin[i].verdict = MARGIN_FAILS_ALREADY;
    m.has_exchange = false;
    why.count = 0;
    reasons_margins(&why, &m, "EUR");
    assert_int_equal(why.count, 1);
    assert_said(why.text[0], "no condition has a margin");
}

static void on_the_terminal(void **state)
{
    (void)state;
    const struct scenario s = fake_scenario();
    const struct report_context context = context_of(&s);
    const struct budget b = fake_budget();
    const struct margins m = fake_margins();
    char *text = NULL;
    size_t size = 0;
    struct page page = {.to = open_memstream(&text, &size)};
    terminal_budget(&page, &context, 4, &b, &silent);
    fclose(page.to);
    assert_said(text, "It resolves: this plan tells 1.5 % head-to-head apart from 1.3 %");
    assert_said(text, "Shares of the variance, from 20,000 pairs of studies");
    assert_said(text, "  filling scatter         36.00 +- 0.60     40.00 +- 0.40             0.0386\n");
    assert_said(text, "  density neglected                    +0.0310 +- 0.0002\n");
    assert_null(strstr(text, "gradient")); /* no such source here */
    assert_said(text, "out/made-up/budget.json");
    free(text);
    page.to = open_memstream(&text, &size);
    terminal_margins(&page, &context, 4, &m, &silent);
    fclose(page.to);
    assert_said(text, "  bath fluctuation                           0.02 K  up to   0.0500 +- 0.0010 K\n");
    assert_said(text, "  tilt                                   0.5 degree  up:     whole range\n");
    assert_said(text, "out/made-up/margin.json");
    free(text);
}

/* Without gnuplot the numbers are there all the same. */
static void numbers_of_the_figures(void **state)
{
    static const char *const file[] = {"budget.csv", "claimed.csv", "margins.csv"};
    static const char *const part[] = {
        "filling scatter,36.000,0.60000,40.000,0.40000,", "found,87.1000,0.240",
        "1,plan.top_cleaved,down,1.2,60.0000\n1,plan.top_cleaved,down,1.4,93.0000\n1,plan.top_cleaved,last,1.3,\n"};
    (void)state;
    char folder[] = "/tmp/vicinal-why-XXXXXX";
    assert_non_null(mkdtemp(folder));
    struct figures_pen pen = {.folder = folder, .drawn = GNUPLOT_MISSING};
    const struct scenario s = fake_scenario();
    const struct budget b = fake_budget();
    const struct margins m = fake_margins();
    assert_true(figure_budget(&pen, &b) && figure_claimed(&pen, &b) && figure_margins(&pen, scenario_question(&s), &m));
    assert_false(figures_drawn(&pen, "budget"));
    for (int i = 0; i < 3; i++) {
        char *path = files_path(folder, file[i]), text[4096] = "";
        FILE *from = fopen(path, "r");
        assert_non_null(from);
        assert_true(fread(text, 1, sizeof text - 1, from) > 0);
        fclose(from);
        unlink(path);
        free(path);
        assert_said(text, part[i]);
    }
    assert_int_equal(rmdir(folder), 0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(budget_shape),           cmocka_unit_test(margin_shape),
        cmocka_unit_test(impossible_shapes),      cmocka_unit_test(sentences_of_a_budget),
        cmocka_unit_test(sentences_of_margins),   cmocka_unit_test(on_the_terminal),
        cmocka_unit_test(numbers_of_the_figures),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
