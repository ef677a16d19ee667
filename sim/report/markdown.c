#include "sim/report/markdown.h"

#include <stdarg.h>
#include <stdlib.h>
#include <string.h>

static const char signs[] = "\\`*_{}[]<>&|~#$!";

/* How many digits a text opens with when they and what follows would open a
 * list: "1." or "1)". */
static size_t list_number(const char *text)
{
    const size_t digits = strspn(text, "0123456789");
    return digits > 0 && (text[digits] == '.' || text[digits] == ')') ? digits : 0;
}

/* A blank between a number and its unit. */
static bool holds(const char *text, size_t i)
{
    const bool number = i > 0 && text[i] == ' ' && text[i - 1] >= '0' && text[i - 1] <= '9';
    const char next = number ? text[i + 1] : ' ';
    return next == '%' || (next >= 'a' && next <= 'z') || (next >= 'A' && next <= 'Z');
}

/* A text. In prose (`starts` a line) a sign of a list is escaped as well, and a
 * number keeps to its unit. */
static void escape(FILE *to, const char *text, bool starts)
{
    const size_t number = starts ? list_number(text) : 0;
    for (size_t i = 0; text[i]; i++) {
        const unsigned char c = (unsigned char)text[i];
        if (c < ' ' || c == 0x7F) {
            fputc(' ', to);
            continue;
        }
        if (starts && holds(text, i)) {
            fputs("\xC2\xA0", to);
            continue;
        }
        const bool bullet = starts && i == 0 && (c == '-' || c == '+');
        if (strchr(signs, c) || bullet || (number > 0 && i == number))
            fputc('\\', to);
        fputc(c, to);
    }
}

static void escape_list(FILE *to, bool starts, const char *format, va_list arguments)
    __attribute__((format(printf, 3, 0)));
static void escape_list(FILE *to, bool starts, const char *format, va_list arguments)
{
    va_list again;
    va_copy(again, arguments);
    const int length = vsnprintf(NULL, 0, format, arguments);
    char *text = length < 0 ? NULL : malloc((size_t)length + 1);
    if (text) {
        vsnprintf(text, (size_t)length + 1, format, again);
        escape(to, text, starts);
    }
    va_end(again);
    free(text);
}

void markdown_text(FILE *to, const char *text)
{
    escape(to, text, false);
}

void markdown_code(FILE *to, const char *text)
{
    size_t longest = 0, run = 0;
    for (const char *c = text; *c; c++) {
        run = *c == '`' ? run + 1 : 0;
        longest = run > longest ? run : longest;
    }
    for (size_t i = 0; i <= longest; i++)
        fputc('`', to);
    const bool pad = longest > 0 || text[0] == ' ';
    if (pad)
        fputc(' ', to);
    for (const char *c = text; *c; c++)
        fputc((unsigned char)*c < ' ' || *c == 0x7F ? ' ' : *c, to);
    if (pad)
        fputc(' ', to);
    for (size_t i = 0; i <= longest; i++)
        fputc('`', to);
}

void markdown_heading(FILE *to, int level, const char *text)
{
    for (int i = 0; i < level; i++)
        fputc('#', to);
    fputc(' ', to);
    escape(to, text, false);
    fputs("\n\n", to);
}

void markdown_paragraph(FILE *to, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    escape_list(to, true, format, arguments);
    va_end(arguments);
    fputs("\n\n", to);
}

void markdown_strong(FILE *to, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    fputs("**", to);
    escape_list(to, true, format, arguments);
    fputs("**\n\n", to);
    va_end(arguments);
}

void markdown_point(FILE *to, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    fputs("* ", to);
    escape_list(to, true, format, arguments);
    va_end(arguments);
    fputc('\n', to);
}

void markdown_gap(FILE *to)
{
    fputc('\n', to);
}

void markdown_figure(FILE *to, const struct markdown_figure *figure)
{
    fputs("![", to);
    escape(to, figure->shows, false);
    fprintf(to, "](%s)\n\n*", figure->file);
    escape(to, figure->caption, false);
    fputs("*\n\n", to);
}

struct markdown_table markdown_table(FILE *to, const char *align)
{
    return (struct markdown_table){.to = to, .align = align};
}

void markdown_cell_open(struct markdown_table *table)
{
    fputs("| ", table->to);
}

void markdown_cell_close(struct markdown_table *table)
{
    const size_t columns = strlen(table->align);
    fputc(' ', table->to);
    if (++table->at < columns)
        return;
    fputs("|\n", table->to);
    table->at = 0;
    if (table->rows++ > 0)
        return;
    for (size_t i = 0; i < columns; i++)
        fputs(table->align[i] == 'r' ? "| ---: " : "| --- ", table->to);
    fputs("|\n", table->to);
}

void markdown_cell(struct markdown_table *table, const char *format, ...)
{
    va_list arguments;
    va_start(arguments, format);
    markdown_cell_open(table);
    escape_list(table->to, false, format, arguments);
    markdown_cell_close(table);
    va_end(arguments);
}
