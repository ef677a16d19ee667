/* candidates.csv, the synthetic notebook, progress and numbers as text. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>

#include "sim/report/candidates_csv.h"
#include "sim/report/notebook_csv.h"
#include "sim/report/page.h"
#include "sim/report/progress.h"
#include "sim/report/say.h"
#include "tests/unit/report/fake.h"

static char *field(const char *text)
{
    char *out = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&out, &size);
    candidates_csv_field(to, text);
    fclose(to);
    return out;
}

static void quoting(void **state)
{
    (void)state;
    static const char *const pairs[][2] = {
        {"plain", "plain"}, {"a,b", "\"a,b\""}, {"say \"x\"", "\"say \"\"x\"\"\""}, {"two\nlines", "\"two\nlines\""},
        {"", ""},           {"same", "same"}};
    for (size_t i = 0; i < sizeof pairs / sizeof *pairs; i++) {
        char *out = field(pairs[i][0]);
        assert_string_equal(out, pairs[i][1]);
        free(out);
    }
}

/* Fields of a line, quoted commas apart. */
static size_t fields(const char *line)
{
    size_t n = 1;
    bool quoted = false;
    for (; *line && *line != '\n'; line++) {
        if (*line == '"')
            quoted = !quoted;
        if (*line == ',' && !quoted)
            n++;
    }
    return n;
}

static void every_line_has_all_columns(void **state)
{
    (void)state;
    struct scenario s = fake_scenario();
    struct fake_search f;
    fake_search(&s, &f);
    char *text = NULL;
    size_t size = 0, lines = 0;
    FILE *to = open_memstream(&text, &size);
    candidates_csv_print(to, &s, &f.result);
    fclose(to);
    const size_t columns = fields(text);
    for (const char *line = text; *line; line = strchr(line, '\n') + 1, lines++)
        assert_int_equal(fields(line), columns);
    assert_int_equal(lines, FAKE_PLANS + 1);
    assert_int_equal(strncmp(text, "index,grade,tube,fillings,bath,extrapolation,status,why,studies [1],", 68), 0);
    assert_non_null(strstr(text, ",hours [h],hours se [h],money [EUR],"));
    assert_non_null(strstr(text, ",impossible,\"no flask holds 1,240 mL, \"\"1,000 mL\"\" is the largest\",,"));
    free(text);
}

static void notebook(void **state)
{
    (void)state;
    const struct notebook_row rows[] = {
        {1, 1, 1080.0, "water", 0, (double)NAN, 1, 1, 298.314, 298.153},
        {1, 1, 4000.0, "intact", 2, 3.36, 1, 4, 441.5, (double)NAN},
    };
    const struct notebook_csv n = {.title = "A made-up\nstudy",
                                   .plan = "",
                                   .timer_resolution_s = 0.01,
                                   .thermometer_resolution_K = 0.05,
                                   .rows = rows,
                                   .count = 2};
    char *text = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&text, &size);
    notebook_csv_print(to, &n);
    fclose(to);
    assert_string_equal(text, "# A made-up study\n# Invented times: a simulated study, nothing here was measured.\n"
                              "day,started,solution,level,concentration [g/dL],filling,run,time [s],"
                              "temperature [degC],note\n"
                              "1,0:18,water,,,1,1,298.31,25.00,\n1,1:06,intact,2,0.336,1,4,441.50,,\n");
    free(text);
}

static void numbers(void **state)
{
    (void)state;
    assert_string_equal(say_number(0.1).text, "0.1");
    assert_string_equal(say_number(1.0 / 3.0).text, "0.3333333333333333");
    assert_string_equal(say_number((double)NAN).text, "");
    assert_true(strtod(say_number(0.1 + 0.2).text, NULL) >= 0.1 + 0.2); /* 0.30000000000000004 */
    assert_string_equal(say_count(1234567).text, "1,234,567");
    assert_string_equal(say_count(999).text, "999");
    assert_string_equal(say_share(0.015).text, "1.5 %");
    assert_string_equal(say_share(0.0).text, "0 %");
    assert_string_equal(say_share(1.0).text, "100 %");
    assert_string_equal(say_points(0.0139123).text, "1.391 %");
    assert_string_equal(say_by_error(93.2145, 0.27).text, "93.21");
    assert_string_equal(say_by_error(93.2145, 3.0).text, "93.2");
    assert_string_equal(say_by_error(93.2145, 0.0).text, "93.21");
    assert_string_equal(say_short(85.0, 4).text, "85");
    assert_string_equal(say_plural(1, "day").text, "1 day");
    assert_string_equal(say_plural(2, "day").text, "2 days");
    assert_true(say_mL(2.5e-5) >= 25.0 && say_mL(2.5e-5) <= 25.0); /* whole, no rounding left */
}

static void time_left(void **state)
{
    (void)state;
    char text[64];
    progress_text(text, sizeof text, 0.005, 10.0);
    assert_string_equal(text, "0 %");
    progress_text(text, sizeof text, 0.5, 12.0);
    assert_string_equal(text, "50 %, about 12 s left");
    progress_text(text, sizeof text, 0.25, 60.0);
    assert_string_equal(text, "25 %, about 3 min 00 s left");
    progress_text(text, sizeof text, 2.0, 60.0);
    assert_string_equal(text, "100 %, about 0 s left");
}

/* Not on a terminal: not a byte. */
static void progress_keeps_quiet(void **state)
{
    (void)state;
    FILE *to = tmpfile();
    struct progress p;
    progress_start(&p, to, false);
    p.last_s -= 10.0;
    progress_update(&p, 0.5);
    progress_end(&p);
    assert_int_equal(ftell(to), 0);
    fclose(to);
}

static void page_breaks_lines(void **state)
{
    (void)state;
    char *text = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&text, &size);
    const struct page page = {.to = to, .colour = false};
    page_say(&page, PAGE_BOLD, "%s",
             "This line is just long enough that its number would end at the very edge, 1.391 % it is.");
    page_item(&page, "label", "%s", "\033[31mred");
    fclose(to);
    assert_string_equal(text, "This line is just long enough that its number would end at the very edge,\n"
                              "1.391 % it is.\n  label           ?[31mred\n");
    free(text);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(quoting),           cmocka_unit_test(every_line_has_all_columns),
        cmocka_unit_test(notebook),          cmocka_unit_test(numbers),
        cmocka_unit_test(time_left),         cmocka_unit_test(progress_keeps_quiet),
        cmocka_unit_test(page_breaks_lines),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
