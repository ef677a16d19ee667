#include "sim/base/text.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static bool text_reserve(struct text *t, size_t more)
{
    if (t->failed)
        return false;
    if (t->size + more < t->room)
        return true;
    const size_t room = 2 * (t->size + more) + 64;
    char *bytes = realloc(t->bytes, room);
    if (!bytes) {
        t->failed = true;
        return false;
    }
    t->bytes = bytes;
    t->room = room;
    return true;
}

void text_add_list(struct text *t, const char *format, va_list arguments)
{
    va_list again;
    va_copy(again, arguments);
    const int size = vsnprintf(NULL, 0, format, arguments);
    if (size >= 0 && text_reserve(t, (size_t)size + 1)) {
        vsnprintf(t->bytes + t->size, (size_t)size + 1, format, again);
        t->size += (size_t)size;
    }
    va_end(again);
}

void text_add(struct text *t, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    text_add_list(t, format, arguments);
    va_end(arguments);
}

size_t text_character(const char *s)
{
    const unsigned char *u = (const unsigned char *)s;
    if (u[0] == 0)
        return 0;
    if (u[0] < 0x80)
        return 1;
    const size_t size = u[0] >= 0xf0 && u[0] < 0xf5   ? 4
                        : u[0] >= 0xe0 && u[0] < 0xf0 ? 3
                        : u[0] >= 0xc2 && u[0] < 0xe0 ? 2
                                                      : 0;
    for (size_t i = 1; i < size; i++)
        if ((u[i] & 0xc0) != 0x80)
            return 0;
    return size;
}

/* Control characters, those of the second page (U+0080 to U+009F) and the
 * marks that turn the direction of writing (U+202A to U+202E, U+2066 to
 * U+2069) included. */
static bool text_is_control(const char *s, size_t size)
{
    const unsigned char *u = (const unsigned char *)s;
    if (size == 1)
        return u[0] < 0x20 || u[0] == 0x7f;
    if (size == 2)
        return u[0] == 0xc2 && u[1] < 0xa0;
    return size == 3 && u[0] == 0xe2 &&
           ((u[1] == 0x80 && u[2] >= 0xa8 && u[2] <= 0xae) || (u[1] == 0x81 && u[2] >= 0xa6 && u[2] <= 0xa9));
}

bool text_is_clean(const char *s)
{
    for (size_t size; *s; s += size) {
        size = text_character(s);
        if (!size || text_is_control(s, size))
            return false;
    }
    return true;
}

void text_add_safe(struct text *t, const char *s)
{
    while (*s) {
        const size_t size = text_character(s);
        const size_t step = size ? size : 1;
        if (size && !text_is_control(s, size))
            text_add(t, "%.*s", (int)size, s);
        else
            for (size_t i = 0; i < step; i++)
                text_add(t, "\\x%02x", (unsigned)(unsigned char)s[i]);
        s += step;
    }
}

const char *text_shown(char buffer[TEXT_SHOWN], const char *s)
{
    size_t size = 0;
    while (s[size]) {
        const size_t next = text_character(s + size);
        if (size + (next ? next : 1) > TEXT_SHOWN - 4)
            break;
        size += next ? next : 1;
    }
    memcpy(buffer, s, size);
    memcpy(buffer + size, s[size] ? "..." : "", s[size] ? 4 : 1);
    return buffer;
}

static char text_lower(char c)
{
    return c >= 'A' && c <= 'Z' ? (char)(c - 'A' + 'a') : c;
}

static size_t text_least(size_t a, size_t b)
{
    return a < b ? a : b;
}

size_t text_distance(const char *a, const char *b)
{
    size_t rows[3][TEXT_WORD + 1];
    size_t *before = rows[0], *above = rows[1], *row = rows[2];
    const size_t length_a = text_least(strlen(a), TEXT_WORD), length_b = text_least(strlen(b), TEXT_WORD);
    for (size_t j = 0; j <= length_b; j++)
        above[j] = j;
    for (size_t i = 1; i <= length_a; i++) {
        row[0] = i;
        for (size_t j = 1; j <= length_b; j++) {
            const char x = text_lower(a[i - 1]), y = text_lower(b[j - 1]);
            row[j] = text_least(text_least(above[j], row[j - 1]) + 1, above[j - 1] + (x != y));
            if (i > 1 && j > 1 && x == text_lower(b[j - 2]) && text_lower(a[i - 2]) == y)
                row[j] = text_least(row[j], before[j - 2] + 1);
        }
        size_t *spare = before;
        before = above;
        above = row;
        row = spare;
    }
    return above[length_b];
}

void text_nearest_try(struct text_nearest *n, const char *candidate)
{
    const size_t distance = text_distance(n->word, candidate);
    const size_t near = 1 + strlen(candidate) / 4;
    const bool begins = strlen(n->word) >= 3 && strncmp(n->word, candidate, strlen(n->word)) == 0;
    if ((distance > near || distance >= strlen(candidate)) && !begins)
        return;
    if (n->best && distance >= n->distance)
        return;
    n->best = candidate;
    n->distance = distance;
}
