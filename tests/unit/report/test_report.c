/* The answer on the terminal, and the files of a run. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <ctype.h>
#include <stdio.h>
#include <sys/stat.h>
#include <unistd.h>

#include "sim/report/page.h"
#include "sim/report/report.h"
#include "tests/unit/report/fake.h"

static const char *const files[] = {
    "candidates.csv", "cost.csv", "cost.pdf", "cost.svg", "estimates.csv", "estimates.pdf", "estimates.svg",
    "extrapolation.csv", "extrapolation.pdf", "extrapolation.svg", "plan.json", "recommended.yaml",
    "report.html", "report.md", "run.log", "scenario.resolved.yaml", "trial.json", "share.csv", "share.svg",
    "share.pdf"};
enum { FILES = sizeof files / sizeof *files };

/* One run of a report and what it said. */
struct run {
    char top[64], folder[80];
    struct scenario scenario;
    struct fake_search search;
    double expect[500], against[500];
    struct estimates estimates;
    struct example example;
    struct report_context context;
    char *out, *err;
    size_t out_size, err_size;
    int status;
};

static int make(void **state)
{
    struct run *r = calloc(1, sizeof *r);
    strcpy(r->top, "/tmp/vicinal-report-XXXXXX");
    if (!mkdtemp(r->top))
        return -1;
    snprintf(r->folder, sizeof r->folder, "%s/out", r->top);
    r->scenario = fake_scenario();
    fake_search(&r->scenario, &r->search);
    for (int i = 0; i < 500; i++) { /* a triangle of answers, and one without */
        r->expect[i] = 0.015 + 1e-6 * (double)((i * 37) % 500 + (i * 91) % 500 - 500);
        r->against[i] = r->expect[i] - 0.002;
    }
    r->expect[3] = (double)NAN;
    r->estimates = (struct estimates){500, r->expect, r->against};
    r->example = (struct example){.levels = {4, 4}, .estimate = 0.0151};
    for (int s = 0; s < SERIES; s++) {
        const double eta = s == INTACT ? 0.1097 : 0.01327;
        r->example.intrinsic_m3_kg[s] = eta;
        r->example.intercept[s][0] = log(eta);
        r->example.slope[s][0] = 0.45 * eta;
        for (int j = 0; j < 4; j++) {
            const double c = r->search.result.fresh.concentration_kg_m3[s][j], y = eta * c;
            r->example.level[s][j] = (struct example_level){c, 1.0 + y * exp(0.45 * y)};
        }
    }
    *state = r;
    return 0;
}

static int clear(void **state)
{
    struct run *r = *state;
    for (int i = 0; i < FILES; i++) {
        char path[160];
        snprintf(path, sizeof path, "%s/%s", r->folder, files[i]);
        unlink(path);
    }
    const bool clean = rmdir(r->folder) == 0 || access(r->folder, F_OK) != 0; /* no temporary file is left */
    rmdir(r->top);
    free(r->out);
    free(r->err);
    free(r);
    return clean ? 0 : -1;
}

static void begin(struct run *r)
{
    static const char *const arguments[] = {"vicinal", "plan", "a study.yaml"};
    free(r->out);
    free(r->err);
    r->out = r->err = NULL;
    r->context.scenario = &r->scenario;
    r->context.version = "0.1";
    r->context.folder = r->folder;
    r->context.out = open_memstream(&r->out, &r->out_size);
    r->context.err = open_memstream(&r->err, &r->err_size);
    r->context.arguments = arguments;
    r->context.arguments_count = 3;
    r->context.threads = 2;
    r->context.started_s = report_clock();
}

static void end(struct run *r)
{
    fclose(r->context.out);
    fclose(r->context.err);
}

static void plan(struct run *r)
{
    begin(r);
    const struct report_planned planned = {.search = &r->search.result, .estimates = &r->estimates};
    r->status = report_plan(&r->context, &planned);
    end(r);
}

static void trial(struct run *r, const struct outcome *o)
{
    begin(r);
    const bool played = o->studies > 0;
    const struct report_tried tried = {.index = 4, .outcome = o, .estimates = played ? &r->estimates : NULL, .example = played ? &r->example : NULL, .within_too_narrow = false};
    r->status = report_trial(&r->context, &tried);
    end(r);
}

static void assert_said(const char *text, const char *part)
{
    if (strstr(text, part))
        return;
    print_error("not said: \"%s\"\nin:\n%s", part, text);
    fail();
}

/* The trade's words: none of the program's own stands as a word. */
static void assert_plain_words(const char *text)
{
    static const char *const ours[] = {"candidate", "candidates", "world", "luck", "nan", "inf", "null"};
    for (size_t i = 0; i < sizeof ours / sizeof *ours; i++)
        for (const char *p = text; (p = strstr(p, ours[i])); p++) {
            const char before = p == text ? ' ' : p[-1], after = p[strlen(ours[i])];
            if (isalpha((unsigned char)before) || isalpha((unsigned char)after))
                continue;
            if (strncmp(p, "candidates.csv", 14) == 0)
                continue; /* a file's name */
            print_error("our own word \"%s\" in:\n%s", ours[i], text);
            fail();
        }
}

static void assert_narrow(const char *text)
{
    for (const char *line = text; line && *line; line = strchr(line, '\n') ? strchr(line, '\n') + 1 : NULL) {
        const size_t length = strcspn(line, "\n");
        char one[400] = "";
        memcpy(one, line, length < 399 ? length : 399);
        if (strstr(one, "/tmp/"))
            continue; /* a path is never broken */
        assert_true(page_width(one) <= 80);
    }
}

static char *read_file(const struct run *r, const char *name)
{
    char path[160];
    snprintf(path, sizeof path, "%s/%s", r->folder, name);
    FILE *from = fopen(path, "r");
    if (!from)
        return NULL;
    char *text = calloc(1, 1 << 20);
    fread(text, 1, (1 << 20) - 1, from);
    fclose(from);
    return text;
}

static void plan_answer(void **state)
{
    struct run *r = *state;
    plan(r);
    assert_int_equal(r->status, 0);
    assert_string_equal(r->err, "");
    assert_said(r->out, "It resolves: the plan below tells 1.5 % head-to-head apart from 1.3 %");
    assert_said(r->out, "Power 93.21 % (Monte Carlo error 0.27), 90 % asked.");
    assert_said(r->out, "Decide at 1.391 %");
    assert_said(r->out, "0.188 points");
    assert_said(r->out, "0.224, 0.336, 0.448, 0.560 g/dL");
    assert_said(r->out, "stock in a 100 mL flask, diluted levels in a 100 mL flask");
    assert_said(r->out, "2 days, 14.2 h");
    assert_said(r->out, "\nTemperature control\n  bath\n    beaker        nothing resolves with it\n");
    assert_said(r->out, "    circulator    17.2 h  2 days   recommended\n");
    assert_said(r->out, "24 plans weighed: 2 resolve");
    assert_null(strstr(r->out, "EUR")); /* no prices, no money */
    assert_null(strstr(r->out, "\033"));
    const char *last = strstr(r->out, "Next: vicinal trial ");
    assert_non_null(last);
    assert_string_equal(strchr(last, '\n'), "\n");
    assert_said(last, "/out/recommended.yaml\n");
    assert_plain_words(r->out);
    assert_narrow(r->out);
}

static void money_is_shown_when_it_means_something(void **state)
{
    struct run *r = *state;
    r->scenario.cost.least = LEAST_MONEY;
    r->search.result.fresh.at.money = 412.0;
    for (size_t i = 0; i < FAKE_PLANS; i++)
        r->search.candidate[i].outcome.at.money = 400.0 + 10.0 * (double)i;
    plan(r);
    assert_said(r->out, "  costs           412 EUR\n");
    assert_said(r->out, "    huggins       17.2 h  2 days     510 EUR   +10 EUR\n");
    assert_narrow(r->out);
}

static void nothing_resolves(void **state)
{
    struct run *r = *state;
    fake_missed(&r->scenario, &r->search);
    plan(r);
    assert_int_equal(r->status, 0);
    assert_said(r->out, "Nothing resolves: no plan of the 24 offered");
    assert_said(r->out, "Power 71.20 %");
    assert_said(r->out, "The constants are the limit, not the bench");
    assert_said(r->out, "question.against_is: same-constants");
    assert_said(r->out, "question.against: 1.26 %");
    assert_null(strstr(r->out, "Next:"));
    assert_null(read_file(r, "recommended.yaml"));
    assert_plain_words(r->out);
    assert_narrow(r->out);
    r->search.result.constants_are_limit = false;
    plan(r);
    assert_said(r->out, "The bench is the limit");
    assert_said(r->out, "more replicates");
    assert_null(strstr(r->out, "same-constants"));
    r->scenario.question.has_within = true;
    r->scenario.question.within = 0.0002;
    r->search.result.within_too_narrow = true;
    r->search.result.nearest.resolvable_within = 0.00281;
    plan(r);
    assert_said(r->out, "Both are the limit");
    assert_said(r->out, "same-constants");
    assert_said(r->out, "more replicates");
    assert_said(r->out, "question.within: 0.29 %");
}

static void nothing_is_possible(void **state)
{
    struct run *r = *state;
    fake_missed(&r->scenario, &r->search);
    for (size_t i = 0; i < FAKE_PLANS; i++) {
        r->search.candidate[i].outcome = (struct outcome){.status = STATUS_IMPOSSIBLE};
        strcpy(r->search.candidate[i].outcome.why, i < 20 ? "the day is too short" : "no flask holds it");
    }
    r->search.result.nearest_miss = SEARCH_NONE;
    begin(r);
    const struct report_planned planned = {.search = &r->search.result, .estimates = NULL};
    r->status = report_plan(&r->context, &planned);
    end(r);
    assert_int_equal(r->status, 0);
    assert_string_equal(r->err, "");
    assert_said(r->out, "20 plans        impossible: the day is too short\n");
    assert_said(r->out, "4 plans         impossible: no flask holds it\n");
    assert_plain_words(r->out);
}

static void trial_answer(void **state)
{
    struct run *r = *state;
    struct outcome o = fake_outcome();
    trial(r, &o);
    assert_int_equal(r->status, 0);
    assert_said(r->out, "It resolves: this plan tells");
    assert_said(r->out, "Figures of 20,000 simulated studies");
    assert_said(r->out, "bias, points                            0.00200      0.00043\n");
    assert_said(r->out, "intrinsic viscosity, cleaved, dL/g         0.1327       0.1327       0.0020\n");
    assert_said(r->out, "4                   0.560      536.9             2.60      417.6\n");
    assert_plain_words(r->out);
    assert_narrow(r->out);
    o.status = STATUS_FAILS;
    trial(r, &o);
    assert_said(r->out, "It does not resolve what is asked");
    o.status = STATUS_UNDECIDED;
    trial(r, &o);
    assert_said(r->out, "Too close to call");
    o = (struct outcome){.status = STATUS_IMPOSSIBLE, .why = "no flask holds 1,240 mL"};
    trial(r, &o);
    assert_said(r->out, "This plan is impossible: no flask holds 1,240 mL.");
}

static void json_and_nothing_else(void **state)
{
    struct run *r = *state;
    r->context.json = true;
    plan(r);
    char *file = read_file(r, "plan.json");
    assert_string_equal(r->out, file);
    json_t *object = json_loads(r->out, 0, NULL);
    assert_non_null(object);
    json_decref(object);
    free(file);
}

static void check_answer(void **state)
{
    struct run *r = *state;
    r->scenario.zeros = 1;
    begin(r);
    assert_int_equal(report_check(&r->context, 12.0), 0);
    end(r);
    assert_said(r->out, "24 plans to weigh, about 12 s of computing.");
    assert_said(r->out, "bench.tilt_u");
    assert_int_equal(access(r->folder, F_OK), -1); /* no folder */
}

static void same_bytes_again(void **state)
{
    static const char *const same[] = {"plan.json", "candidates.csv", "cost.csv",        "estimates.csv",
                                       "cost.svg",  "estimates.svg",  "recommended.yaml"};
    struct run *r = *state;
    char *first[7];
    plan(r);
    for (int i = 0; i < 7; i++)
        first[i] = read_file(r, same[i]);
    plan(r);
    for (int i = 0; i < 7; i++) {
        char *second = read_file(r, same[i]);
        if (first[i] && second)
            assert_string_equal(first[i], second);
        else
            assert_true(!first[i] && !second); /* without gnuplot neither */
        free(first[i]);
        free(second);
    }
}

static void numbers_without_gnuplot(void **state)
{
    struct run *r = *state;
    char *path = strdup(getenv("PATH"));
    setenv("PATH", "/nonexistent", 1);
    plan(r);
    setenv("PATH", path, 1);
    free(path);
    assert_int_equal(r->status, 0);
    char line[200];
    snprintf(line, sizeof line, "vicinal: no gnuplot, so no figures; their numbers are in %s\n", r->folder);
    assert_string_equal(r->err, line);
    char *csv = read_file(r, "estimates.csv");
    assert_non_null(csv);
    free(csv);
    assert_null(read_file(r, "cost.svg"));
    assert_said(r->out, "It resolves");
}

static void unwritable_output(void **state)
{
    struct run *r = *state;
    FILE *blocker = fopen(r->folder, "w"); /* a file where the folder should be */
    fclose(blocker);
    plan(r);
    assert_int_equal(r->status, 1);
    assert_said(r->err, "/out: Not a directory\n");
    assert_string_equal(r->out, "");
    unlink(r->folder);
}

/* A currency that tries to be a command of gnuplot stays a text. */
static void names_are_never_commands(void **state)
{
    struct run *r = *state;
    char mark[96], currency[200];
    snprintf(mark, sizeof mark, "%s/mark", r->top);
    snprintf(currency, sizeof currency, "'; system('touch %s'); x='", mark);
    r->scenario.cost.least = LEAST_MONEY;
    r->scenario.cost.currency = currency;
    plan(r);
    assert_int_equal(r->status, 0);
    assert_string_equal(r->err, "");
    assert_int_equal(access(mark, F_OK), -1);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test_setup_teardown(plan_answer, make, clear),
        cmocka_unit_test_setup_teardown(money_is_shown_when_it_means_something, make, clear),
        cmocka_unit_test_setup_teardown(nothing_resolves, make, clear),
        cmocka_unit_test_setup_teardown(nothing_is_possible, make, clear),
        cmocka_unit_test_setup_teardown(trial_answer, make, clear),
        cmocka_unit_test_setup_teardown(json_and_nothing_else, make, clear),
        cmocka_unit_test_setup_teardown(check_answer, make, clear),
        cmocka_unit_test_setup_teardown(same_bytes_again, make, clear),
        cmocka_unit_test_setup_teardown(numbers_without_gnuplot, make, clear),
        cmocka_unit_test_setup_teardown(unwritable_output, make, clear),
        cmocka_unit_test_setup_teardown(names_are_never_commands, make, clear),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
