#include "sim/report/page.h"

#include <ctype.h>
#include <stdarg.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

enum { PAGE_COLUMNS = 79, LABEL_COLUMNS = 16 };

struct page page_on(FILE *to)
{
    const char *no_colour = getenv("NO_COLOR"), *term = getenv("TERM");
    const bool dumb = !term || strcmp(term, "dumb") == 0;
    const bool plain = no_colour && *no_colour;
    const int file = fileno(to);
    return (struct page){.to = to, .colour = file >= 0 && isatty(file) && !dumb && !plain};
}

int page_width(const char *text)
{
    int width = 0;
    for (; *text; text++)
        if (((unsigned char)*text & 0xC0) != 0x80)
            width++;
    return width;
}

/* A control character, or the two bytes of one of U+0080 to U+009F. */
static bool obeyed(const char *text, size_t left)
{
    const unsigned char first = (unsigned char)text[0];
    if (first < ' ' || first == 0x7F)
        return true;
    return first == 0xC2 && left > 1 && (unsigned char)text[1] < 0xA0;
}

void page_plain(FILE *to, const char *text, size_t length)
{
    for (size_t i = 0; i < length; i++) {
        const bool bad = obeyed(text + i, length - i);
        if (bad && (unsigned char)text[i] == 0xC2)
            i++;
        fputc(bad ? '?' : text[i], to);
    }
}

static int word_width(const char *word, size_t length)
{
    int width = 0;
    for (size_t i = 0; i < length; i++)
        if (((unsigned char)word[i] & 0xC0) != 0x80)
            width++;
    return width;
}

/* The end of the next piece that must stay in one line: a word, and with a
 * number the word behind it. */
static size_t piece(const char *text)
{
    size_t end = strcspn(text, " \n");
    while (end > 0 && isdigit((unsigned char)text[end - 1]) && text[end] == ' ' && text[end + 1] &&
           text[end + 1] != ' ')
        end += 1 + strcspn(text + end + 1, " \n");
    return end;
}

static void flow(FILE *to, const char *text, int column, int hang)
{
    bool fresh = true;
    while (*text) {
        if (*text == '\n') {
            fprintf(to, "\n%*s", hang, "");
            column = hang;
            fresh = true;
            text++;
            continue;
        }
        if (*text == ' ') {
            text++;
            continue;
        }
        const size_t length = piece(text);
        const int width = word_width(text, length);
        if (!fresh && column + 1 + width > PAGE_COLUMNS) {
            fprintf(to, "\n%*s", hang, "");
            column = hang;
            fresh = true;
        }
        if (!fresh)
            fputc(' ', to);
        page_plain(to, text, length);
        column += width + (fresh ? 0 : 1);
        fresh = false;
        text += length;
    }
    fputc('\n', to);
}

static char *filled(const char *format, va_list arguments) __attribute__((format(printf, 1, 0)));
static char *filled(const char *format, va_list arguments)
{
    va_list again;
    va_copy(again, arguments);
    const int length = vsnprintf(NULL, 0, format, arguments);
    char *text = length < 0 ? NULL : malloc((size_t)length + 1);
    if (text)
        vsnprintf(text, (size_t)length + 1, format, again);
    va_end(again);
    return text;
}

void page_say(const struct page *page, enum page_tone tone, const char *format, ...)
{
    static const char *const start[] = {"", "\033[1m", "\033[1;32m", "\033[1;31m"};
    const bool toned = page->colour && tone != PAGE_PLAIN;
    va_list arguments;
    va_start(arguments, format);
    char *text = filled(format, arguments);
    va_end(arguments);
    if (toned)
        fputs(start[tone], page->to);
    if (text)
        flow(page->to, text, 0, 0);
    if (toned)
        fputs("\033[0m", page->to);
    free(text);
}

void page_item(const struct page *page, const char *label, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    char *text = filled(format, arguments);
    va_end(arguments);
    const int width = page_width(label);
    const int pad = width < LABEL_COLUMNS ? LABEL_COLUMNS - width : 1;
    fprintf(page->to, "  %s%*s", label, pad, "");
    if (text)
        flow(page->to, text, 2 + width + pad, 2 + LABEL_COLUMNS);
    free(text);
}

void page_point(const struct page *page, const char *text)
{
    fputs("  * ", page->to);
    flow(page->to, text, 4, 4);
}

void page_blank(const struct page *page)
{
    fputc('\n', page->to);
}
