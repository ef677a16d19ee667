#include "sim/base/complain.h"

#include <stdarg.h>
#include <stdbool.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/text.h"

struct complaint {
    size_t file; /* in the order in which files were first named; 0 the command line */
    size_t line, column, order;
    char *text;
};

struct complaints {
    struct complaint *list;
    size_t count, room;
    char **files;
    size_t files_count;
    bool failed; /* memory ran out: at least one is missing */
};

static const char complain_no_memory[] = "out of memory";

struct complaints *complain_new(void)
{
    return calloc(1, sizeof(struct complaints));
}

void complain_free(struct complaints *c)
{
    if (!c)
        return;
    for (size_t i = 0; i < c->count; i++)
        free(c->list[i].text);
    free(c->list);
    for (size_t i = 0; i < c->files_count; i++)
        free(c->files[i]);
    free(c->files);
    free(c);
}

/* The number of a file, from 1; 0 for none, or when memory ran out. */
static size_t complain_file(struct complaints *c, const char *file)
{
    if (!file)
        return 0;
    for (size_t i = 0; i < c->files_count; i++)
        if (strcmp(c->files[i], file) == 0)
            return i + 1;
    char **files = realloc(c->files, (c->files_count + 1) * sizeof *files);
    if (!files)
        return 0;
    c->files = files;
    files[c->files_count] = malloc(strlen(file) + 1);
    if (!files[c->files_count])
        return 0;
    strcpy(files[c->files_count], file);
    return ++c->files_count;
}

static bool complain_reserve(struct complaints *c)
{
    if (c->count < c->room)
        return true;
    const size_t room = 2 * c->room + 8;
    struct complaint *list = realloc(c->list, room * sizeof *list);
    if (!list)
        return false;
    c->list = list;
    c->room = room;
    return true;
}

static void complain_place(struct text *t, struct place where)
{
    if (where.file)
        text_add_safe(t, where.file);
    else if (where.option)
        text_add_safe(t, where.option);
    else
        return;
    if (where.line)
        text_add(t, ":%zu", where.line);
    if (where.line && where.column)
        text_add(t, ":%zu", where.column);
    text_add(t, ": ");
}

void complain_at(struct complaints *c, struct place where, const char *format, ...)
{
    struct text said = {0}, whole = {0};
    va_list arguments;
    va_start(arguments, format);
    text_add_list(&said, format, arguments);
    va_end(arguments);
    complain_place(&whole, where);
    text_add_safe(&whole, said.bytes ? said.bytes : "");
    free(said.bytes);
    if (said.failed || whole.failed || !complain_reserve(c)) {
        free(whole.bytes);
        c->failed = true;
        return;
    }
    const size_t file = complain_file(c, where.file);
    c->list[c->count] = (struct complaint){file, where.line, where.column, c->count, whole.bytes};
    c->count++;
}

void complain_memory(struct complaints *c)
{
    c->failed = true;
}

size_t complain_count(const struct complaints *c)
{
    return c->count + c->failed;
}

const char *complain_text(const struct complaints *c, size_t i)
{
    return i < c->count ? c->list[i].text : complain_no_memory;
}

static int complain_compare(const void *a, const void *b)
{
    const struct complaint *x = *(const struct complaint *const *)a, *y = *(const struct complaint *const *)b;
    if (x->file != y->file)
        return x->file < y->file ? -1 : 1;
    if (x->line != y->line)
        return x->line < y->line ? -1 : 1;
    if (x->column != y->column)
        return x->column < y->column ? -1 : 1;
    return x->order < y->order ? -1 : x->order > y->order;
}

void complain_print(const struct complaints *c, FILE *to)
{
    const struct complaint **sorted = malloc((c->count + 1) * sizeof *sorted);
    if (sorted) {
        for (size_t i = 0; i < c->count; i++)
            sorted[i] = &c->list[i];
        qsort(sorted, c->count, sizeof *sorted, complain_compare);
    }
    if (c->failed)
        fprintf(to, "vicinal: %s\n", complain_no_memory);
    for (size_t i = 0; i < c->count; i++)
        fprintf(to, "vicinal: %s\n", (sorted ? sorted[i] : &c->list[i])->text);
    free(sorted);
}
