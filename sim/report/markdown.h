/* Writing Markdown in which no text from outside is ever more than text:
 * whatever would be a sign of Markdown or HTML is escaped, control characters
 * become blanks. Every function but markdown_raw escapes what it is given. */
#ifndef VICINAL_REPORT_MARKDOWN_H
#define VICINAL_REPORT_MARKDOWN_H

#include <stdbool.h>
#include <stdio.h>

void markdown_text(FILE *to, const char *text);

/* Code in a line, with as many backticks around it as it needs. */
void markdown_code(FILE *to, const char *text);

void markdown_heading(FILE *to, int level, const char *text);
void markdown_paragraph(FILE *to, const char *format, ...) __attribute__((format(printf, 2, 3)));
void markdown_strong(FILE *to, const char *format, ...) __attribute__((format(printf, 2, 3)));

/* A point of a list, which markdown_gap ends. */
void markdown_point(FILE *to, const char *format, ...) __attribute__((format(printf, 2, 3)));
void markdown_gap(FILE *to);

/* A figure beside the text, what it shows for those who cannot see it, and the
 * caption below it. */
struct markdown_figure {
    const char *file, *shows, *caption;
};
void markdown_figure(FILE *to, const struct markdown_figure *figure);

/* A table, cell by cell; the first row is the heading. `align` has a letter for
 * each column: l or r. */
struct markdown_table {
    FILE *to;
    const char *align;
    size_t at, rows;
};
struct markdown_table markdown_table(FILE *to, const char *align);
void markdown_cell(struct markdown_table *table, const char *format, ...) __attribute__((format(printf, 2, 3)));
/* A cell piece by piece: write to the stream, by the functions here, between
 * the two. */
void markdown_cell_open(struct markdown_table *table);
void markdown_cell_close(struct markdown_table *table);

#endif
