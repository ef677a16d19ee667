/* Words and growing strings. */
#ifndef VICINAL_BASE_TEXT_H
#define VICINAL_BASE_TEXT_H

#include <stdarg.h>
#include <stdbool.h>
#include <stddef.h>

/* A string that grows; start from {0}. `failed` once memory ran out, and
 * what is added from then on is dropped. `bytes` is for free(). */
struct text {
    char *bytes;
    size_t size, room;
    bool failed;
};
void text_add(struct text *t, const char *format, ...) __attribute__((format(printf, 2, 3)));
void text_add_list(struct text *t, const char *format, va_list arguments) __attribute__((format(printf, 2, 0)));
/* As `text_add(t, "%s", s)`, with every byte that a terminal would obey, or
 * that is no UTF-8, written as \xNN. */
void text_add_safe(struct text *t, const char *s);

/* What the user typed, cut to a length that a message bears, at a whole
 * character. Gives back `buffer`. */
enum { TEXT_SHOWN = 64 };
const char *text_shown(char buffer[TEXT_SHOWN], const char *s);

/* UTF-8 without a character that a terminal would obey? */
bool text_is_clean(const char *s);

/* The length in bytes of the UTF-8 character at s, 0 when there is none. */
size_t text_character(const char *s);

/* Edits between two words (a letter put in, left out, changed, or two
 * neighbours swapped); case does not count. At most TEXT_WORD letters of each
 * are looked at. */
enum { TEXT_WORD = 63 };
size_t text_distance(const char *a, const char *b);

/* The nearest of many words: start from {.word = typed}, try each, and read
 * `best`: NULL when none is near enough to be offered. */
struct text_nearest {
    const char *word, *best;
    size_t distance;
};
void text_nearest_try(struct text_nearest *n, const char *candidate);

#endif
