/* A text put into a file, and read back. */
#ifndef VICINAL_TESTS_UNIT_REPORT_KEPT_H
#define VICINAL_TESTS_UNIT_REPORT_KEPT_H

#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>
#include <stdio.h>
#include <stdlib.h>

static inline void kept_write(const char *path, const char *text)
{
    FILE *to = fopen(path, "w");
    assert_non_null(to);
    fputs(text, to);
    fclose(to);
}

/* For free(). */
static inline char *kept_read(const char *path)
{
    char *text = calloc(1, 100000);
    FILE *from = fopen(path, "r");
    assert_non_null(from);
    text[fread(text, 1, 99999, from)] = '\0';
    fclose(from);
    return text;
}

#endif
