/* `vicinal sheet` as a command: what is written, and what never is. */
#include "tests/unit/bench/still.h"

#include "sim/report/sheet.h"
#include "sim/report/sheet_notebook.h"
#include "tests/unit/report/kept.h"

static const char heading[] =
    "# a comment, 12.5\nday,started,solution,level,concentration [g/dL],filling,run,time [s],temperature [degC],note\n";

static void what_counts_as_written(void **state)
{
    (void)state;
    static const struct {
        const char *rows;
        enum sheet_notebook_found found;
    } rows[] = {
        {"1,0:18,water,,,1,1,,,\n", SHEET_NOTEBOOK_FREE},
        {"1,0:18,water,,,1,1,,,\r\n\r\n1,0:23,water,,,1,2,\"\", ,\n", SHEET_NOTEBOOK_FREE},
        {"1,0:18,water,,,1,1\n", SHEET_NOTEBOOK_FREE},
        {"1,0:18,water,,,1,1,298.3,,\n", SHEET_NOTEBOOK_TAKEN},
        {"1,0:18,water,,,1,1,,,\n1,0:23,water,,,1,2,\"298.3\",,\n", SHEET_NOTEBOOK_TAKEN},
        {"1,0:18,water,,,1,1,,25.01,\n", SHEET_NOTEBOOK_TAKEN},
        {"1,0:18,water,,,1,1,,,spilt\n", SHEET_NOTEBOOK_TAKEN},
        {",,intact-stock,,0.5461,,,,,\n", SHEET_NOTEBOOK_TAKEN},
    };
    char path[] = "/tmp/vicinal-notebook-XXXXXX", text[600];
    struct files_failure failure = {""};
    close(mkstemp(path));
    for (size_t i = 0; i < sizeof rows / sizeof *rows; i++) {
        snprintf(text, sizeof text, "%s%s", heading, rows[i].rows);
        kept_write(path, text);
        assert_int_equal(sheet_notebook_look(path, &failure), rows[i].found);
    }
    kept_write(path, "day;started;solution;time\n1;0:18;water;298.3\n"); /* a spreadsheet's own way */
    assert_int_equal(sheet_notebook_look(path, &failure), SHEET_NOTEBOOK_TAKEN);
    kept_write(path, "something else\n");
    assert_int_equal(sheet_notebook_look(path, &failure), SHEET_NOTEBOOK_TAKEN);
    unlink(path);
    assert_int_equal(sheet_notebook_look(path, &failure), SHEET_NOTEBOOK_FREE);
    assert_int_equal(sheet_notebook_look("/tmp", &failure), SHEET_NOTEBOOK_UNREADABLE);
    assert_non_null(strstr(failure.text, "/tmp: "));
}

static int sheet(const struct scenario *s, const char *folder, char **out, char **err)
{
    static const char *const words[] = {"vicinal", "sheet", "a.yaml"};
    size_t sizes[2];
    struct report_context context = {
        .scenario = s, .version = "0.1", .folder = folder, .arguments = words, .arguments_count = 3, .threads = 1};
    context.out = open_memstream(out, &sizes[0]);
    context.err = open_memstream(err, &sizes[1]);
    const int status = sheet_write(&context, 0);
    fclose(context.out);
    fclose(context.err);
    return status;
}

static void remove_all(const char *folder)
{
    static const char *const files[] = {"sheet.html", "notebook.csv", "notebook-second.csv", "scenario.resolved.yaml",
                                        "run.log"};
    for (size_t i = 0; i < sizeof files / sizeof *files; i++) {
        char *path = files_path(folder, files[i]);
        unlink(path);
        free(path);
    }
    assert_int_equal(rmdir(folder), 0); /* nothing else is left */
}

/* Statuses 0, again 0, 2 with a time in the notebook and nothing touched. */
static void a_notebook_with_times_stays(void **state)
{
    (void)state;
    char top[] = "/tmp/vicinal-sheet-XXXXXX", *out, *err;
    assert_non_null(mkdtemp(top));
    struct scenario *s =
        still_read("question: {expect: 1.5 %, against: 1.3 %, against_is: measured}\nplan: {grade: middle}\n");
    for (int i = 0; i < 2; i++) {
        assert_int_equal(sheet(s, top, &out, &err), 0);
        assert_string_equal(err, "");
        assert_non_null(strstr(out, "notebook-second.csv"));
        free(out);
        free(err);
    }
    char *second = files_path(top, "notebook-second.csv"), *page = files_path(top, "sheet.html"), written[700];
    snprintf(written, sizeof written, "%s1,0:18,water,,,1,1,298.31,25.00,\n", heading);
    kept_write(second, written);
    unlink(page);
    assert_int_equal(sheet(s, top, &out, &err), 2);
    assert_string_equal(out, "");
    assert_non_null(strstr(err, "notebook-second.csv: holds what was measured"));
    assert_int_equal(access(page, F_OK), -1);
    char *now = kept_read(second);
    assert_string_equal(now, written); /* TEXT */
    free(now);
    free(out);
    free(err);
    free(page);
    free(second);
    remove_all(top);
    scenario_free(s);
}

static void impossible_writes_nothing(void **state)
{
    (void)state;
    char top[] = "/tmp/vicinal-sheet-XXXXXX", folder[64], *out, *err;
    assert_non_null(mkdtemp(top));
    snprintf(folder, sizeof folder, "%s/out", top);
    struct scenario *s = still_read("question: {expect: 1.5 %, against: 1.3 %}\nplan: {grade: middle, levels: 1}\n");
    assert_int_equal(sheet(s, folder, &out, &err), 3);
    assert_non_null(strstr(out, "This plan is impossible: one level gives no line"));
    assert_string_equal(err, "");
    assert_int_equal(access(folder, F_OK), -1);
    free(out);
    free(err);
    rmdir(top);
    scenario_free(s);
}

static void unwritable(void **state)
{
    (void)state;
    char path[] = "/tmp/vicinal-sheet-XXXXXX", folder[64], *out, *err;
    close(mkstemp(path));
    snprintf(folder, sizeof folder, "%s/out", path); /* below a file */
    struct scenario *s = still_read("question: {expect: 1.5 %, against: 1.3 %}\nplan: {grade: middle}\n");
    assert_int_equal(sheet(s, folder, &out, &err), 1);
    assert_string_equal(out, "");
    assert_int_equal(strncmp(err, "vicinal: /tmp/", 14), 0);
    free(out);
    free(err);
    unlink(path);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(what_counts_as_written),
        cmocka_unit_test(a_notebook_with_times_stays),
        cmocka_unit_test(impossible_writes_nothing),
        cmocka_unit_test(unwritable),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
