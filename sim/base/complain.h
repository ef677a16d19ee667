/* The user's mistakes: collected with their place, said all at once. */
#ifndef VICINAL_BASE_COMPLAIN_H
#define VICINAL_BASE_COMPLAIN_H

#include <stddef.h>
#include <stdio.h>

/* Where a mistake stands. file NULL: the command line, and `option` is what
 * was typed there, such as "--set solutions.stok". Lines and columns count
 * from 1; 0 is left out. */
struct place {
    const char *file;
    const char *option;
    size_t line, column;
};

struct complaints;

struct complaints *complain_new(void); /* NULL: out of memory */
void complain_free(struct complaints *c);
void complain_at(struct complaints *c, struct place where, const char *format, ...)
    __attribute__((format(printf, 3, 4)));
void complain_memory(struct complaints *c); /* "out of memory", said once; takes none */
size_t complain_count(const struct complaints *c);
const char *complain_text(const struct complaints *c, size_t i); /* without the program's name */
void complain_print(const struct complaints *c, FILE *to);       /* sorted by place, each "vicinal: ...\n" */

#endif
