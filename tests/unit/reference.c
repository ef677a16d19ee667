#include "reference.h"

#include <float.h>
#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { FIELDS = 6 };

/* Cut a line at its tabs; how many fields it has. */
static size_t cut(char *line, char *field[FIELDS])
{
    size_t n = 0;
    line[strcspn(line, "\n")] = '\0';
    for (char *at = line; at; n++) {
        char *const tab = strchr(at, '\t');
        if (tab)
            *tab = '\0';
        if (n < FIELDS)
            field[n] = at;
        at = tab ? tab + 1 : NULL;
    }
    return n;
}

static struct reference_row row_of(char *const field[FIELDS])
{
    struct reference_row row;
    assert_true(strlen(field[1]) < sizeof row.arguments && strlen(field[2]) < sizeof row.value &&
                strlen(field[4]) < sizeof row.reason);
    strcpy(row.arguments, field[1]);
    strcpy(row.value, field[2]);
    strcpy(row.reason, field[4]);
    row.number = strtod(row.value, NULL);
    row.tolerance =
        *field[3] ? strtod(field[3], NULL) : check_half_unit(row.value) + 4.0 * DBL_EPSILON * fabs(row.number);
    return row;
}

size_t reference_read(const char *file, const char *quantity, struct reference_row *rows, size_t room)
{
    char path[128], line[800], *field[FIELDS];
    snprintf(path, sizeof path, "tests/reference/%s", file);
    FILE *const from = fopen(path, "r");
    if (!from)
        fail_msg("%s cannot be opened", path);
    size_t n = 0;
    bool fits = true;
    while (fits && fgets(line, sizeof line, from)) {
        if (*line == '#')
            continue;
        fits = strchr(line, '\n') && cut(line, field) == FIELDS;
        if (!fits || strcmp(field[0], quantity) != 0)
            continue;
        fits = n < room;
        if (fits)
            rows[n++] = row_of(field);
    }
    fclose(from);
    if (!fits || n == 0)
        fail_msg("%s: %s: %s", path, quantity, fits ? "no such quantity" : "a line that is none, or too many");
    return n;
}

struct reference_row reference_one(const char *file, const char *quantity)
{
    struct reference_row row;
    reference_read(file, quantity, &row, 1);
    return row;
}

const char *reference_word(const struct reference_row *row, size_t i, char word[32])
{
    const char *at = row->arguments;
    for (; i > 0 && *at; i--) {
        at += strcspn(at, " ");
        at += *at == ' ';
    }
    const size_t length = strcspn(at, " ");
    if (length == 0 || length >= 32)
        fail_msg("'%s' has too few arguments", row->arguments);
    memcpy(word, at, length);
    word[length] = '\0';
    return word;
}

double reference_argument(const struct reference_row *row, size_t i)
{
    char word[32], *end;
    const double number = strtod(reference_word(row, i, word), &end);
    if (*end)
        fail_msg("'%s' is no number", word);
    return number;
}

void check_row_at(double actual, const struct reference_row *row, struct check_place place)
{
    if (!(fabs(actual - row->number) <= row->tolerance))
        print_error("row '%s'\n", row->arguments);
    check_close_at(actual, row->number, row->tolerance, row->reason, place);
}
