#include "sim/report/proposal_html.h"

#include <cmark-gfm-core-extensions.h>
#include <cmark-gfm.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/files.h"
#include "sim/report/html.h"
#include "sim/report/svg.h"

/* A larger figure than this stays beside the page. */
enum { LARGEST_FIGURE = 3000000 };

/* ---- figures ---- */

/* A whole file; `bytes` NULL when it is not there, is too large, or memory ran
 * out. */
static struct files_text whole(const char *folder, const char *name)
{
    struct files_text text = {NULL, NULL, 0};
    char *path = strchr(name, '/') ? NULL : files_path(folder, name);
    FILE *from = path ? fopen(path, "rb") : NULL;
    free(path);
    if (!from)
        return text;
    char *bytes = malloc(LARGEST_FIGURE + 1);
    const size_t size = bytes ? fread(bytes, 1, LARGEST_FIGURE + 1, from) : 0;
    fclose(from);
    if (size > 0 && size <= LARGEST_FIGURE)
        text = (struct files_text){NULL, bytes, size};
    else
        free(bytes);
    return text;
}

/* What an image shows: the text in it. */
static void gather(cmark_node *node, FILE *to)
{
    const char *text = cmark_node_get_literal(node);
    if (text)
        fputs(text, to);
    for (cmark_node *child = cmark_node_first_child(node); child; child = cmark_node_next(child))
        gather(child, to);
}

static bool gathered(cmark_node *node, struct files_text *text)
{
    if (!files_text_open(text))
        return false;
    gather(node, text->stream);
    if (files_text_close(text))
        return true;
    files_text_free(text);
    return false;
}

/* The figure's SVG as text for a page; false: there is none. */
static bool drawn(cmark_node *image, const char *folder, struct files_text *out)
{
    const char *url = cmark_node_get_url(image);
    const char *dot = url ? strrchr(url, '.') : NULL;
    char name[64];
    struct files_text shows;
    if (!dot || strcmp(dot, ".svg") != 0 || (size_t)(dot - url) >= sizeof name || !gathered(image, &shows))
        return false;
    snprintf(name, sizeof name, "%.*s", (int)(dot - url), url);
    const struct files_text file = whole(folder, url);
    bool good = file.bytes && files_text_open(out);
    if (good) {
        const struct svg svg = {.bytes = file.bytes, .size = file.size, .name = name, .shows = shows.bytes};
        fputs("<figure>\n", out->stream);
        const bool written = svg_inline(out->stream, &svg);
        good = files_text_close(out) && written;
        if (!good)
            files_text_free(out);
    }
    free(file.bytes);
    files_text_free(&shows);
    return good;
}

/* The one inline of a paragraph, when it is of that kind. */
static cmark_node *only(cmark_node *paragraph, cmark_node_type type)
{
    cmark_node *child = paragraph ? cmark_node_first_child(paragraph) : NULL;
    const bool alone = child && cmark_node_get_type(paragraph) == CMARK_NODE_PARAGRAPH && !cmark_node_next(child);
    return alone && cmark_node_get_type(child) == type ? child : NULL;
}

/* An image that cannot be part of the page becomes its text. */
static void worded(cmark_node *image)
{
    struct files_text shows;
    cmark_node *text = cmark_node_new(CMARK_NODE_TEXT);
    if (gathered(image, &shows)) {
        cmark_node_set_literal(text, shows.bytes);
        files_text_free(&shows);
    }
    cmark_node_insert_before(image, text);
    cmark_node_free(image);
}

static void word_images(cmark_node *node)
{
    for (cmark_node *child = cmark_node_first_child(node), *next; child; child = next) {
        next = cmark_node_next(child);
        if (cmark_node_get_type(child) == CMARK_NODE_IMAGE)
            worded(child);
        else
            word_images(child);
    }
}

/* An image alone, with the caption below it, becomes a figure. Gives back the
 * last node it stands in. */
static cmark_node *figure(cmark_node *paragraph, const char *folder)
{
    cmark_node *image = only(paragraph, CMARK_NODE_IMAGE), *caption = cmark_node_next(paragraph);
    struct files_text svg;
    if (!image || !drawn(image, folder, &svg))
        return paragraph;
    cmark_node *block = cmark_node_new(CMARK_NODE_CUSTOM_BLOCK);
    cmark_node_set_on_enter(block, svg.bytes);
    cmark_node_set_on_exit(block, "</figure>");
    files_text_free(&svg);
    cmark_node_insert_before(paragraph, block);
    cmark_node *emphasis = only(caption, CMARK_NODE_EMPH);
    if (emphasis) {
        cmark_node *text = cmark_node_new(CMARK_NODE_CUSTOM_BLOCK);
        cmark_node_set_on_enter(text, "<figcaption>");
        cmark_node_set_on_exit(text, "</figcaption>");
        cmark_node_append_child(block, text);
        cmark_node_unlink(caption);
        cmark_node_append_child(text, caption);
        for (cmark_node *child = cmark_node_first_child(emphasis); child; child = cmark_node_first_child(emphasis))
            cmark_node_append_child(caption, child);
        cmark_node_free(emphasis);
    }
    cmark_node_free(paragraph);
    return block;
}

/* ---- tables and headings ---- */

/* A wide table gets closer print, and more places where its words may break. */
enum { MANY_COLUMNS = 6 };
static size_t columns(cmark_node *table)
{
    size_t count = 0;
    cmark_node *row = cmark_node_first_child(table);
    for (cmark_node *cell = row ? cmark_node_first_child(row) : NULL; cell; cell = cmark_node_next(cell))
        count++;
    return count;
}

/* A table in a region of its own, named after the heading that it stands
 * under. */
static void frame_table(cmark_node *table, cmark_node *heading)
{
    struct files_text name, open;
    if (!heading || !gathered(heading, &name))
        return;
    const bool good = files_text_open(&open);
    if (good) {
        fprintf(open.stream, "<div class=\"table%s\" role", columns(table) > MANY_COLUMNS ? " many" : "");
        fputs("=\"region\" tabindex=\"0\" aria-label=\"", open.stream);
        html_text(open.stream, name.bytes);
        fputs("\">", open.stream);
    }
    if (good && files_text_close(&open)) {
        cmark_node *block = cmark_node_new(CMARK_NODE_CUSTOM_BLOCK);
        cmark_node_set_on_enter(block, open.bytes);
        cmark_node_set_on_exit(block, "</div>");
        cmark_node_insert_before(table, block);
        cmark_node_append_child(block, table);
    }
    if (good)
        files_text_free(&open);
    files_text_free(&name);
}

/* Rework the document's blocks; the contents go to `to`. */
static void rework(cmark_node *document, const char *folder, FILE *to)
{
    cmark_node *heading = NULL;
    size_t number = 0;
    for (cmark_node *node = cmark_node_first_child(document); node;) {
        const cmark_node_type type = cmark_node_get_type(node);
        cmark_node *next = cmark_node_next(node);
        if (type == CMARK_NODE_HEADING) {
            heading = node;
            struct files_text name;
            if (cmark_node_get_heading_level(node) == 2 && gathered(node, &name)) {
                fprintf(to, "<li><a href=\"#s%zu\">", ++number);
                html_text(to, name.bytes);
                fputs("</a></li>\n", to);
                files_text_free(&name);
            }
        } else if (strcmp(cmark_node_get_type_string(node), "table") == 0) {
            frame_table(node, heading);
        } else if (type == CMARK_NODE_PARAGRAPH) {
            next = cmark_node_next(figure(node, folder));
        }
        node = next;
    }
}

/* Whether a text goes on with a word; then behind it. */
static bool goes_on(const char **text, const char *word)
{
    const size_t length = strlen(word);
    if (strncmp(*text, word, length) != 0)
        return false;
    *text += length;
    return true;
}

/* cmark-gfm's HTML on its way to the page. */
struct finishing {
    FILE *to;
    const char *contents;
    size_t headings;
    bool body, row, head;  /* in a table's body; before a row's first cell; in it */
    bool cell;             /* in any cell */
    size_t unbroken, most; /* letters since a line could last be broken; before it may be again */
};

/* A tag that is not passed on as it stands. */
static bool finish_tag(struct finishing *f, const char **html)
{
    FILE *to = f->to;
    if (goes_on(html, "</h1>"))
        fprintf(to, "</h1>\n<nav aria-label=\"Contents\">\n<ol>\n%s</ol>\n</nav>", f->contents);
    else if (goes_on(html, "<h2>"))
        fprintf(to, "<h2 id=\"s%zu\">", ++f->headings);
    else if (goes_on(html, "<th>") || goes_on(html, "<th "))
        fprintf(to, "<th scope=\"col\"%c", (*html)[-1]);
    else if (f->row && (goes_on(html, "<td>") || goes_on(html, "<td ")))
        fprintf(to, "<th scope=\"row\"%c", (*html)[-1]);
    else if (f->head && goes_on(html, "</td>"))
        fputs("</th>", to);
    else
        return false;
    return true;
}

/* Where the text is, from the tag that stands there. */
static void finish_place(struct finishing *f, const char *html)
{
    const bool cell = strncmp(html, "<td", 3) == 0 || strncmp(html, "<th>", 4) == 0 || strncmp(html, "<th ", 4) == 0;
    const bool end = strncmp(html, "</td>", 5) == 0 || strncmp(html, "</th>", 5) == 0;
    if (strncmp(html, "<div class=\"table", 17) == 0)
        f->most = strncmp(html + 17, " many", 5) == 0 ? 10 : 16;
    if (strncmp(html, "<tbody>", 7) == 0 || strncmp(html, "</tbody>", 8) == 0)
        f->body = html[1] == 't';
    if (strncmp(html, "<tr>", 4) == 0)
        f->row = f->body;
    if (cell || end) {
        f->head = cell && f->row;
        f->row = f->row && !cell;
        f->cell = cell;
        f->unbroken = 0;
    }
}

/* A letter, or an entity as one; in a table a long word may be broken. */
static const char *finish_letter(struct finishing *f, const char *html)
{
    const char *end = *html == '&' ? strchr(html, ';') : NULL;
    const size_t length = end ? (size_t)(end - html) + 1 : 1;
    const bool follows = ((unsigned char)*html & 0xC0) == 0x80; /* the rest of a character */
    if (f->cell && !follows) {
        const bool breaks = strchr(" \n-_", *html);
        if (f->unbroken >= f->most && !breaks) {
            fputs("<wbr>", f->to);
            f->unbroken = 0;
        }
        f->unbroken = breaks ? 0 : f->unbroken + 1;
    }
    fwrite(html, 1, length, f->to);
    if (f->cell && *html == '_')
        fputs("<wbr>", f->to);
    return html + length;
}

/* Each tag was written by cmark-gfm or by us: the contents go behind the title,
 * the headings of the second level are numbered, those of a table's columns and
 * rows marked so. */
static void finish(FILE *to, const char *html, const char *contents)
{
    struct finishing f = {.to = to, .contents = contents, .most = 16};
    while (*html) {
        if (*html != '<') {
            html = finish_letter(&f, html);
            continue;
        }
        const char *tag = html, *end = strchr(html, '>');
        const bool written = finish_tag(&f, &html);
        finish_place(&f, tag);
        if (end && (!written || html[-1] == ' ')) { /* all of a tag, or its attributes */
            fwrite(html, 1, (size_t)(end - html) + 1, to);
            html = end + 1;
        } else if (!written) {
            fputc(*html++, to);
        }
    }
}

/* ---- the page ---- */

static cmark_node *parse(const struct proposal_html *page)
{
    cmark_gfm_core_extensions_ensure_registered();
    cmark_parser *parser = cmark_parser_new(CMARK_OPT_VALIDATE_UTF8);
    cmark_syntax_extension *tables = cmark_find_syntax_extension("table");
    if (tables)
        cmark_parser_attach_syntax_extension(parser, tables);
    cmark_parser_feed(parser, page->markdown, page->size);
    cmark_node *document = cmark_parser_finish(parser);
    cmark_parser_free(parser);
    return document;
}

static void head(FILE *to, const char *title)
{
    fputs("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n"
          "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n"
          "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; "
          "script-src 'unsafe-inline'; base-uri 'none'; form-action 'none'\">\n"
          "<meta name=\"color-scheme\" content=\"light dark\">\n<title>",
          to);
    html_text(to, title);
    fprintf(to, "</title>\n<style>\n%s</style>\n</head>\n<body>\n", (const char *)vicinal_proposal_css);
}

bool proposal_html_print(FILE *to, const struct proposal_html *page)
{
    struct files_text contents;
    if (!files_text_open(&contents))
        return false;
    cmark_node *document = parse(page);
    rework(document, page->folder, contents.stream);
    word_images(document);
    char *html = cmark_render_html(document, CMARK_OPT_DEFAULT, NULL);
    cmark_node_free(document);
    const bool good = files_text_close(&contents) && html;
    if (good) {
        head(to, page->title);
        fputs("<main>\n", to);
        finish(to, html, contents.bytes);
        fprintf(to, "</main>\n<script>\n%s</script>\n</body>\n</html>\n", (const char *)vicinal_proposal_js);
    }
    free(html);
    files_text_free(&contents);
    return good;
}
