/* The listing of everything there is. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/report/kit_print.h"
#include "sim/scenario/keys.h"

struct fixture {
    struct scenario *scenario;
    char *text;
};

static int list(void **state)
{
    struct fixture *f = calloc(1, sizeof *f);
    struct complaints *out = complain_new();
    size_t size = 0;
    f->scenario = scenario_built_in(out);
    complain_free(out);
    FILE *to = open_memstream(&f->text, &size);
    *state = f;
    const int failed = kit_print_text(f->scenario, to);
    fclose(to);
    return failed;
}

static int clear(void **state)
{
    struct fixture *f = *state;
    scenario_free(f->scenario);
    free(f->text);
    free(f);
    return 0;
}

static void fits_the_terminal(void **state)
{
    const struct fixture *f = *state;
    for (const char *line = f->text, *end; (end = strchr(line, '\n')); line = end + 1) {
        assert_true(end - line <= 90);
        assert_true(end == line || end[-1] != ' ');
    }
}

static void names_every_key(void **state)
{
    const struct fixture *f = *state;
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *s = keys_section((enum keys_id)id);
        for (size_t i = 0; i < keys_count(s); i++) {
            char line[80];
            snprintf(line, sizeof line, "\n  %s ", keys_row(s, i)->key);
            assert_non_null(strstr(f->text, line));
        }
    }
}

static void hides_what_is_not_in_this_version(void **state)
{
    const struct fixture *f = *state;
    json_t *j = kit_print_json(f->scenario, "0");
    char *json = json_dumps(j, 0);
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *s = keys_section((enum keys_id)id);
        for (size_t i = 0; i < keys_count(s); i++)
            for (const struct keys_word *w = keys_row(s, i)->words; w && w->word; w++) {
                if (!w->later || strcmp(w->word, "blank") == 0 || strcmp(w->word, "uniform") == 0)
                    continue; /* words of other texts too */
                assert_null(strstr(f->text, w->word));
                assert_null(strstr(json, w->word));
            }
    }
    free(json);
    json_decref(j);
}

static void says_the_same_as_json(void **state)
{
    const struct fixture *f = *state;
    json_t *j = kit_print_json(f->scenario, "1.2.3");
    assert_string_equal(json_string_value(json_object_get(j, "program")), "vicinal");
    assert_string_equal(json_string_value(json_object_get(j, "version")), "1.2.3");
    assert_string_equal(json_string_value(json_object_get(j, "verb")), "kit");
    const json_t *tubes = json_object_get(json_object_get(j, "kit"), "tubes"),
                 *bore = json_object_get(json_array_get(tubes, 0), "bore");
    assert_int_equal(json_array_size(tubes), 7);
    assert_string_equal(json_string_value(json_object_get(bore, "value")), "0.36 mm");
    assert_string_equal(json_string_value(json_object_get(bore, "source")), "ISO 3105 (seen)");
    assert_int_equal(json_array_size(json_object_get(j, "flasks")), 8);
    const json_t *question = json_object_get(json_object_get(j, "keys"), "question"),
                 *confidence = json_array_get(question, 3);
    assert_true(json_is_null(json_object_get(json_array_get(question, 0), "default")));
    assert_string_equal(json_string_value(json_object_get(confidence, "key")), "confidence");
    assert_string_equal(json_string_value(json_object_get(confidence, "default")), "95 %");
    assert_string_equal(json_string_value(json_object_get(confidence, "range")), "50 to 99.9 %");
    json_decref(j);
}

static void a_full_disk_is_noticed(void **state)
{
    const struct fixture *f = *state;
    FILE *to = fopen("/dev/full", "w");
    assert_non_null(to);
    assert_int_equal(kit_print_text(f->scenario, to), 1);
    fclose(to);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(fits_the_terminal),
        cmocka_unit_test(names_every_key),
        cmocka_unit_test(hides_what_is_not_in_this_version),
        cmocka_unit_test(says_the_same_as_json),
        cmocka_unit_test(a_full_disk_is_noticed),
    };
    return cmocka_run_group_tests(tests, list, clear);
}
