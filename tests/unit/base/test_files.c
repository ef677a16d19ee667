/* Whole files or none. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <dirent.h>
#include <signal.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <unistd.h>

#include "sim/base/files.h"

struct place {
    char folder[64], path[96];
};

static int make(void **state)
{
    struct place *p = calloc(1, sizeof *p);
    strcpy(p->folder, "/tmp/vicinal-files-XXXXXX");
    if (!mkdtemp(p->folder))
        return -1;
    snprintf(p->path, sizeof p->path, "%s/answer.txt", p->folder);
    *state = p;
    return 0;
}

static void empty(const char *folder)
{
    DIR *in = opendir(folder);
    struct dirent *entry;
    while (in && (entry = readdir(in))) {
        char path[400];
        if (strcmp(entry->d_name, ".") == 0 || strcmp(entry->d_name, "..") == 0)
            continue;
        snprintf(path, sizeof path, "%s/%s", folder, entry->d_name);
        if (unlink(path) != 0) {
            empty(path);
            rmdir(path);
        }
    }
    if (in)
        closedir(in);
}

static int clear(void **state)
{
    struct place *p = *state;
    empty(p->folder);
    rmdir(p->folder);
    free(p);
    return 0;
}

static size_t entries(const char *folder)
{
    size_t n = 0;
    DIR *in = opendir(folder);
    while (in && readdir(in))
        n++;
    if (in)
        closedir(in);
    return n - 2;
}

static void assert_holds(const char *path, const char *expected)
{
    char got[64] = "";
    FILE *from = fopen(path, "r");
    assert_non_null(from);
    got[fread(got, 1, sizeof got - 1, from)] = '\0';
    fclose(from);
    assert_string_equal(got, expected);
}

static void writes_and_replaces(void **state)
{
    struct place *p = *state;
    struct files_failure why;
    assert_true(files_write(p->path, "first", 5, &why));
    assert_true(files_write(p->path, "second", 6, &why));
    assert_holds(p->path, "second");
    assert_int_equal(entries(p->folder), 1);
}

/* A file system that takes no more than 1000 bytes of a file: the old file
 * stays, nothing half stands there, the text of the system is said. */
static void keeps_the_old_file_when_full(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    struct rlimit before, small;
    char *much = calloc(1, 5000);
    assert_true(files_write(p->path, "old", 3, &why));
    assert_int_equal(getrlimit(RLIMIT_FSIZE, &before), 0);
    small = before;
    small.rlim_cur = 1000;
    void (*old)(int) = signal(SIGXFSZ, SIG_IGN);
    setrlimit(RLIMIT_FSIZE, &small);
    const bool written = files_write(p->path, much, 5000, &why);
    setrlimit(RLIMIT_FSIZE, &before);
    signal(SIGXFSZ, old);
    free(much);
    assert_false(written);
    assert_non_null(strstr(why.text, "answer.txt: File too large"));
    assert_holds(p->path, "old");
    assert_int_equal(entries(p->folder), 1);
}

static void keeps_what_cannot_be_replaced(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    char inside[128];
    assert_int_equal(mkdir(p->path, 0777), 0); /* a folder where the file should be */
    snprintf(inside, sizeof inside, "%s/kept", p->path);
    assert_true(files_write(inside, "kept", 4, &why));
    assert_false(files_write(p->path, "new", 3, &why));
    assert_non_null(strstr(why.text, "Is a directory"));
    assert_holds(inside, "kept");
    assert_int_equal(entries(p->folder), 1);
}

static void makes_folders(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    char deep[128], file[160];
    snprintf(deep, sizeof deep, "%s/a/b/c/", p->folder);
    assert_true(files_folder(deep, &why));
    snprintf(file, sizeof file, "%skept", deep);
    assert_true(files_write(file, "kept", 4, &why));
    assert_true(files_folder(deep, &why)); /* again: updated, never emptied */
    assert_holds(file, "kept");
}

static void refuses_a_folder_under_a_file(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    char under[128];
    assert_true(files_write(p->path, "file", 4, &why));
    snprintf(under, sizeof under, "%s/below", p->path);
    assert_false(files_folder(under, &why));
    assert_non_null(strstr(why.text, "Not a directory"));
}

static void missing_folder_is_said(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    char path[128];
    snprintf(path, sizeof path, "%s/none/answer.txt", p->folder);
    assert_false(files_write(path, "x", 1, &why));
    assert_non_null(strstr(why.text, "none/answer.txt: No such file or directory"));
}

static void adopts_only_what_is_filled(void **state)
{
    struct place *p = *state;
    struct files_failure why = {""};
    char *temporary = files_temporary(p->path);
    assert_false(files_adopt(temporary, p->path, &why));
    FILE *to = fopen(temporary, "w");
    fclose(to);
    assert_false(files_adopt(temporary, p->path, &why));
    assert_int_equal(entries(p->folder), 0);
    to = fopen(temporary, "w");
    fputs("full", to);
    fclose(to);
    assert_true(files_adopt(temporary, p->path, &why));
    assert_holds(p->path, "full");
    free(temporary);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test_setup_teardown(writes_and_replaces, make, clear),
        cmocka_unit_test_setup_teardown(keeps_the_old_file_when_full, make, clear),
        cmocka_unit_test_setup_teardown(keeps_what_cannot_be_replaced, make, clear),
        cmocka_unit_test_setup_teardown(makes_folders, make, clear),
        cmocka_unit_test_setup_teardown(refuses_a_folder_under_a_file, make, clear),
        cmocka_unit_test_setup_teardown(missing_folder_is_said, make, clear),
        cmocka_unit_test_setup_teardown(adopts_only_what_is_filled, make, clear),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
