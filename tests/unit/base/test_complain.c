/* Mistakes with their place. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/complain.h"

static const struct place nowhere;

static void says_the_place(void **state)
{
    (void)state;
    struct complaints *c = complain_new();
    complain_at(c, (struct place){.file = "a.yaml", .line = 3, .column = 7}, "%d %s", 2, "mistakes");
    complain_at(c, (struct place){.file = "a.yaml", .line = 3}, "no column");
    complain_at(c, (struct place){.file = "a.yaml"}, "no line");
    complain_at(c, (struct place){.option = "--set solutions.stok"}, "no such key");
    complain_at(c, nowhere, "nowhere");
    assert_int_equal(complain_count(c), 5);
    assert_string_equal(complain_text(c, 0), "a.yaml:3:7: 2 mistakes");
    assert_string_equal(complain_text(c, 1), "a.yaml:3: no column");
    assert_string_equal(complain_text(c, 2), "a.yaml: no line");
    assert_string_equal(complain_text(c, 3), "--set solutions.stok: no such key");
    assert_string_equal(complain_text(c, 4), "nowhere");
    complain_free(c);
}

static void keeps_to_one_line(void **state)
{
    (void)state;
    struct complaints *c = complain_new();
    complain_at(c, (struct place){.file = "a\nb"}, "%s",
                "x\ny\x1b[31m\x7f \xff \xc3\xa4 \xc2\x9b \xe2\x80\xae \xe2\x82\xac");
    assert_string_equal(complain_text(c, 0),
                        "a\\x0ab: x\\x0ay\\x1b[31m\\x7f \\xff \xc3\xa4 \\xc2\\x9b \\xe2\\x80\\xae \xe2\x82\xac");
    complain_free(c);
}

static void assert_prints(const struct complaints *c, const char *expected)
{
    char *text = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&text, &size);
    complain_print(c, to);
    fclose(to);
    assert_string_equal(text, expected);
    free(text);
}

/* By place; the command line first, files as they were first named; what
 * stands at one place in the order in which it was said. */
static void prints_in_order(void **state)
{
    (void)state;
    struct complaints *c = complain_new();
    complain_at(c, (struct place){.file = "b", .line = 10, .column = 1}, "5");
    complain_at(c, (struct place){.file = "b", .line = 9, .column = 20}, "4");
    complain_at(c, (struct place){.file = "b", .line = 9, .column = 3}, "2");
    complain_at(c, (struct place){.file = "b", .line = 9, .column = 3}, "3");
    complain_at(c, (struct place){.file = "a", .line = 1, .column = 1}, "6");
    complain_at(c, (struct place){.option = "--set x"}, "1");
    assert_prints(c, "vicinal: --set x: 1\nvicinal: b:9:3: 2\nvicinal: b:9:3: 3\nvicinal: b:9:20: 4\nvicinal: b:10:1: "
                     "5\nvicinal: a:1:1: 6\n");
    complain_free(c);
}

static void counts_what_memory_lost(void **state)
{
    (void)state;
    struct complaints *c = complain_new();
    complain_memory(c);
    complain_memory(c);
    assert_int_equal(complain_count(c), 1);
    assert_string_equal(complain_text(c, 0), "out of memory");
    assert_prints(c, "vicinal: out of memory\n");
    complain_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(says_the_place),
        cmocka_unit_test(keeps_to_one_line),
        cmocka_unit_test(prints_in_order),
        cmocka_unit_test(counts_what_memory_lost),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
