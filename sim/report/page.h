/* Text for a terminal of 80 columns. */
#ifndef VICINAL_REPORT_PAGE_H
#define VICINAL_REPORT_PAGE_H

#include <stdbool.h>
#include <stdio.h>

struct page {
    FILE *to;
    bool colour;
};

enum page_tone { PAGE_PLAIN, PAGE_BOLD, PAGE_GOOD, PAGE_BAD };

/* Bold and colour only on a terminal, and neither with NO_COLOR set nor with
 * TERM=dumb. */
struct page page_on(FILE *to);

/* A paragraph, broken at blanks before column 80; a number stays with the
 * word behind it. */
void page_say(const struct page *page, enum page_tone tone, const char *format, ...)
    __attribute__((format(printf, 3, 4)));

/* An indented line with a label on the left and a hanging text. */
void page_item(const struct page *page, const char *label, const char *format, ...)
    __attribute__((format(printf, 3, 4)));

/* "  * text" with a hanging indent. */
void page_point(const struct page *page, const char *text);

void page_blank(const struct page *page);

/* Write `length` bytes of a text; what a terminal would obey becomes a
 * question mark. */
void page_plain(FILE *to, const char *text, size_t length);

/* How many columns a UTF-8 text takes (one for each code point). */
int page_width(const char *text);

#endif
